CREATE TABLE "acceptances" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"version_id" text NOT NULL,
	"event_id" text NOT NULL,
	"person_id" text NOT NULL,
	"typed_name" text NOT NULL,
	"terms" text NOT NULL,
	"fingerprint" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "acceptances_event" UNIQUE("firm_id","event_id")
);
--> statement-breakpoint
CREATE TABLE "choice_versions" (
	"firm_id" text NOT NULL,
	"choice_id" text NOT NULL,
	"version_id" text NOT NULL,
	"place" integer NOT NULL,
	CONSTRAINT "choice_versions_firm_id_choice_id_version_id_pk" PRIMARY KEY("firm_id","choice_id","version_id"),
	CONSTRAINT "choice_versions_place" UNIQUE("firm_id","choice_id","place")
);
--> statement-breakpoint
CREATE TABLE "choices" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"project_id" text NOT NULL,
	"title" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"offered_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "choices_firm_id" UNIQUE("firm_id","id")
);
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"person_id" text,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"what" text NOT NULL,
	"subject_type" text NOT NULL,
	"subject_id" text NOT NULL,
	"detail" jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "comment_reads" (
	"firm_id" text NOT NULL,
	"thread_id" text NOT NULL,
	"person_id" text NOT NULL,
	"read_at" timestamp with time zone NOT NULL,
	CONSTRAINT "comment_reads_firm_id_person_id_thread_id_pk" PRIMARY KEY("firm_id","person_id","thread_id")
);
--> statement-breakpoint
CREATE TABLE "comments" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"project_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"version_id" text NOT NULL,
	"thread_id" text NOT NULL,
	"person_id" text NOT NULL,
	"body" text NOT NULL,
	"pin_x" double precision,
	"pin_y" double precision,
	"resolved_at" timestamp with time zone,
	"resolved_by" text,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "comments_firm_id" UNIQUE("firm_id","id"),
	CONSTRAINT "comments_pin" CHECK (("comments"."pin_x" is null) = ("comments"."pin_y" is null)),
	CONSTRAINT "comments_answer" CHECK ("comments"."thread_id" = "comments"."id" or ("comments"."pin_x" is null and "comments"."resolved_at" is null)),
	CONSTRAINT "comments_resolved" CHECK (("comments"."resolved_at" is null) = ("comments"."resolved_by" is null))
);
--> statement-breakpoint
CREATE TABLE "mentions" (
	"firm_id" text NOT NULL,
	"comment_id" text NOT NULL,
	"person_id" text NOT NULL,
	CONSTRAINT "mentions_firm_id_comment_id_person_id_pk" PRIMARY KEY("firm_id","comment_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "draft_presence" (
	"firm_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"person_id" text NOT NULL,
	"seen_at" timestamp with time zone NOT NULL,
	"edited_at" timestamp with time zone,
	CONSTRAINT "draft_presence_firm_id_layout_id_person_id_pk" PRIMARY KEY("firm_id","layout_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"project_id" text,
	"token_hash" text NOT NULL,
	"invited_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"accepted_by" text,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "invitations_token" UNIQUE("token_hash"),
	CONSTRAINT "invitations_email_lower" CHECK ("invitations"."email" = lower("invitations"."email")),
	CONSTRAINT "invitations_role_project" CHECK (case "invitations"."role" when 'client' then "invitations"."project_id" is not null
        when 'installer' then true when 'owner' then "invitations"."project_id" is null
        when 'designer' then "invitations"."project_id" is null else false end),
	CONSTRAINT "invitations_accepted" CHECK (("invitations"."accepted_at" is null) = ("invitations"."accepted_by" is null))
);
--> statement-breakpoint
CREATE TABLE "password_resets" (
	"token_hash" text PRIMARY KEY NOT NULL,
	"person_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text,
	"kind" text NOT NULL,
	"to_address" text NOT NULL,
	"subject" text NOT NULL,
	"text_part" text NOT NULL,
	"html_part" text NOT NULL,
	"message_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"due_at" timestamp with time zone DEFAULT now() NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"claimed_by" text,
	"claimed_until" timestamp with time zone,
	"sent_at" timestamp with time zone,
	"refused_at" timestamp with time zone,
	"last_error" text,
	CONSTRAINT "outbox_message_id" UNIQUE("message_id")
);
--> statement-breakpoint
DROP INDEX "projects_firm_updated";--> statement-breakpoint
ALTER TABLE "firms" ADD COLUMN "terms" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "layouts" ADD COLUMN "archived_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "memberships" ADD COLUMN "digested_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "mail_mentions" boolean DEFAULT true NOT NULL;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "mail_steps" boolean DEFAULT true NOT NULL;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "mail_digest" text DEFAULT 'daily' NOT NULL;--> statement-breakpoint
ALTER TABLE "projects" ADD COLUMN "stage" text DEFAULT 'draft' NOT NULL;--> statement-breakpoint
ALTER TABLE "projects" ADD COLUMN "words" "tsvector" GENERATED ALWAYS AS (to_tsvector('simple', name || ' ' || client_name)) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "sessions" ADD COLUMN "user_agent" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "sessions" ADD COLUMN "last_seen_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "layouts" ADD CONSTRAINT "layouts_project_id" UNIQUE("firm_id","project_id","id");--> statement-breakpoint
ALTER TABLE "version_events" ADD CONSTRAINT "version_events_firm_id" UNIQUE("firm_id","id");--> statement-breakpoint
ALTER TABLE "acceptances" ADD CONSTRAINT "acceptances_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "acceptances" ADD CONSTRAINT "acceptances_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "acceptances" ADD CONSTRAINT "acceptances_event_fk" FOREIGN KEY ("firm_id","event_id") REFERENCES "public"."version_events"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "choice_versions" ADD CONSTRAINT "choice_versions_choice" FOREIGN KEY ("firm_id","choice_id") REFERENCES "public"."choices"("firm_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "choice_versions" ADD CONSTRAINT "choice_versions_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "choices" ADD CONSTRAINT "choices_offered_by_people_id_fk" FOREIGN KEY ("offered_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "choices" ADD CONSTRAINT "choices_project_fk" FOREIGN KEY ("firm_id","project_id") REFERENCES "public"."projects"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comment_reads" ADD CONSTRAINT "comment_reads_thread_fk" FOREIGN KEY ("firm_id","thread_id") REFERENCES "public"."comments"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comment_reads" ADD CONSTRAINT "comment_reads_membership" FOREIGN KEY ("firm_id","person_id") REFERENCES "public"."memberships"("firm_id","person_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comments" ADD CONSTRAINT "comments_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comments" ADD CONSTRAINT "comments_resolved_by_people_id_fk" FOREIGN KEY ("resolved_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comments" ADD CONSTRAINT "comments_layout_fk" FOREIGN KEY ("firm_id","project_id","layout_id") REFERENCES "public"."layouts"("firm_id","project_id","id") ON DELETE no action ON UPDATE cascade;--> statement-breakpoint
ALTER TABLE "comments" ADD CONSTRAINT "comments_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comments" ADD CONSTRAINT "comments_thread_fk" FOREIGN KEY ("firm_id","thread_id") REFERENCES "public"."comments"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mentions" ADD CONSTRAINT "mentions_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mentions" ADD CONSTRAINT "mentions_comment" FOREIGN KEY ("firm_id","comment_id") REFERENCES "public"."comments"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "draft_presence" ADD CONSTRAINT "draft_presence_layout" FOREIGN KEY ("firm_id","layout_id") REFERENCES "public"."layouts"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "draft_presence" ADD CONSTRAINT "draft_presence_membership" FOREIGN KEY ("firm_id","person_id") REFERENCES "public"."memberships"("firm_id","person_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_invited_by_people_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_accepted_by_people_id_fk" FOREIGN KEY ("accepted_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_project" FOREIGN KEY ("firm_id","project_id") REFERENCES "public"."projects"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "password_resets" ADD CONSTRAINT "password_resets_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "acceptances_version" ON "acceptances" USING btree ("firm_id","version_id","at");--> statement-breakpoint
CREATE INDEX "choice_versions_version" ON "choice_versions" USING btree ("firm_id","version_id");--> statement-breakpoint
CREATE INDEX "choices_project" ON "choices" USING btree ("firm_id","project_id","created_at");--> statement-breakpoint
CREATE INDEX "audit_events_at" ON "audit_events" USING btree ("firm_id","at","id");--> statement-breakpoint
CREATE INDEX "audit_events_person" ON "audit_events" USING btree ("firm_id","person_id","at");--> statement-breakpoint
CREATE INDEX "audit_events_subject" ON "audit_events" USING btree ("firm_id","subject_type","subject_id","at");--> statement-breakpoint
CREATE INDEX "audit_events_what" ON "audit_events" USING btree ("firm_id","what","at");--> statement-breakpoint
CREATE INDEX "comment_reads_thread" ON "comment_reads" USING btree ("firm_id","thread_id");--> statement-breakpoint
CREATE INDEX "comments_thread" ON "comments" USING btree ("firm_id","thread_id","at");--> statement-breakpoint
CREATE INDEX "comments_version" ON "comments" USING btree ("firm_id","version_id","at");--> statement-breakpoint
CREATE INDEX "comments_layout" ON "comments" USING btree ("firm_id","layout_id","at");--> statement-breakpoint
CREATE INDEX "comments_project" ON "comments" USING btree ("firm_id","project_id","at");--> statement-breakpoint
CREATE INDEX "comments_at" ON "comments" USING btree ("firm_id","at");--> statement-breakpoint
CREATE INDEX "mentions_person" ON "mentions" USING btree ("firm_id","person_id");--> statement-breakpoint
CREATE INDEX "draft_presence_seen" ON "draft_presence" USING btree ("seen_at");--> statement-breakpoint
CREATE INDEX "invitations_firm" ON "invitations" USING btree ("firm_id","created_at");--> statement-breakpoint
CREATE INDEX "invitations_email" ON "invitations" USING btree ("firm_id","email");--> statement-breakpoint
CREATE INDEX "password_resets_person" ON "password_resets" USING btree ("person_id","created_at");--> statement-breakpoint
CREATE INDEX "password_resets_expiry" ON "password_resets" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "outbox_waiting" ON "outbox" USING btree ("due_at","id") WHERE sent_at is null and refused_at is null;--> statement-breakpoint
CREATE INDEX "outbox_firm" ON "outbox" USING btree ("firm_id","created_at");--> statement-breakpoint
CREATE INDEX "memberships_digest" ON "memberships" USING btree ("digested_at");--> statement-breakpoint
CREATE INDEX "projects_current_updated" ON "projects" USING btree ("firm_id","updated_at","id") WHERE archived_at is null;--> statement-breakpoint
CREATE INDEX "projects_current_name" ON "projects" USING btree ("firm_id",lower("name"),"id") WHERE archived_at is null;--> statement-breakpoint
CREATE INDEX "projects_current_client" ON "projects" USING btree ("firm_id",lower("client_name"),"id") WHERE archived_at is null;--> statement-breakpoint
CREATE INDEX "projects_current_stage" ON "projects" USING btree ("firm_id","stage","updated_at","id") WHERE archived_at is null;--> statement-breakpoint
CREATE INDEX "projects_archived" ON "projects" USING btree ("firm_id","archived_at","id") WHERE archived_at is not null;--> statement-breakpoint
CREATE INDEX "projects_words" ON "projects" USING gin ("words");--> statement-breakpoint
CREATE INDEX "version_events_at" ON "version_events" USING btree ("firm_id","at");--> statement-breakpoint
CREATE INDEX "projects_firm_updated" ON "projects" USING btree ("firm_id","updated_at","id");--> statement-breakpoint
ALTER TABLE "people" ADD CONSTRAINT "people_mail_digest" CHECK ("people"."mail_digest" in ('hourly', 'daily', 'never'));--> statement-breakpoint
ALTER TABLE "projects" ADD CONSTRAINT "projects_stage" CHECK ("projects"."stage" in ('draft', 'superseded', 'saved', 'shared', 'change_asked', 'accepted', 'issued'));--> statement-breakpoint
-- From here on by hand. The two constraints that foreign keys above refer to were moved before them, too.
-- What a client agreed to and who did what are never altered or deleted, whoever asks.
CREATE FUNCTION keep_record_for_ever() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% of % refused: what is on record is never altered or deleted', TG_OP, TG_TABLE_NAME
    USING ERRCODE = 'integrity_constraint_violation';
END;
$$;
--> statement-breakpoint
CREATE TRIGGER acceptances_kept BEFORE UPDATE OR DELETE ON acceptances
  FOR EACH ROW EXECUTE FUNCTION keep_record_for_ever();
--> statement-breakpoint
CREATE TRIGGER acceptances_not_emptied BEFORE TRUNCATE ON acceptances
  FOR EACH STATEMENT EXECUTE FUNCTION keep_record_for_ever();
--> statement-breakpoint
CREATE TRIGGER audit_events_kept BEFORE UPDATE OR DELETE ON audit_events
  FOR EACH ROW EXECUTE FUNCTION keep_record_for_ever();
--> statement-breakpoint
CREATE TRIGGER audit_events_not_emptied BEFORE TRUNCATE ON audit_events
  FOR EACH STATEMENT EXECUTE FUNCTION keep_record_for_ever();
--> statement-breakpoint
-- The furthest state of the versions of a project's current layouts: what lists sort and filter by.
CREATE FUNCTION project_stage(firm text, project text) RETURNS text LANGUAGE sql STABLE AS $$
  SELECT coalesce((
    SELECT latest.kind
    FROM layouts l
    JOIN versions v ON v.firm_id = l.firm_id AND v.layout_id = l.id
    CROSS JOIN LATERAL (
      SELECT e.kind FROM version_events e
      WHERE e.firm_id = v.firm_id AND e.version_id = v.id
      ORDER BY e.place DESC LIMIT 1
    ) latest
    WHERE l.firm_id = firm AND l.project_id = project AND l.archived_at IS NULL
    ORDER BY array_position(
      ARRAY['superseded', 'saved', 'shared', 'change_asked', 'accepted', 'issued'], latest.kind
    ) DESC
    LIMIT 1
  ), 'draft')
$$;
--> statement-breakpoint
-- The projects are locked first, in one order, so that the stage is worked out from what others have
-- committed meanwhile, and so that two that touch the same projects do not wait for each other.
CREATE FUNCTION refresh_stages_of_events() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  touched text[];
BEGIN
  SELECT array_agg(DISTINCT l.project_id) INTO touched
  FROM added e
  JOIN versions v ON v.firm_id = e.firm_id AND v.id = e.version_id
  JOIN layouts l ON l.firm_id = v.firm_id AND l.id = v.layout_id;
  PERFORM 1 FROM projects WHERE id = ANY (touched) ORDER BY id FOR NO KEY UPDATE;
  UPDATE projects SET stage = project_stage(firm_id, id)
  WHERE id = ANY (touched) AND stage IS DISTINCT FROM project_stage(firm_id, id);
  RETURN NULL;
END;
$$;
--> statement-breakpoint
CREATE TRIGGER version_events_set_stage AFTER INSERT ON version_events
  REFERENCING NEW TABLE AS added
  FOR EACH STATEMENT EXECUTE FUNCTION refresh_stages_of_events();
--> statement-breakpoint
CREATE FUNCTION refresh_stages_of_layout() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  PERFORM 1 FROM projects WHERE id IN (OLD.project_id, NEW.project_id) ORDER BY id FOR NO KEY UPDATE;
  UPDATE projects SET stage = project_stage(firm_id, id)
  WHERE id IN (OLD.project_id, NEW.project_id) AND stage IS DISTINCT FROM project_stage(firm_id, id);
  RETURN NULL;
END;
$$;
--> statement-breakpoint
CREATE TRIGGER layouts_set_stage AFTER UPDATE OF project_id, archived_at ON layouts
  FOR EACH ROW EXECUTE FUNCTION refresh_stages_of_layout();
--> statement-breakpoint
UPDATE projects SET stage = project_stage(firm_id, id);

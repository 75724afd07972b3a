CREATE TABLE "drafts" (
	"firm_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"document" jsonb NOT NULL,
	"revision" integer NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_by" text NOT NULL,
	"based_on_version" text,
	"tab_id" text,
	"tab_save" integer,
	CONSTRAINT "drafts_firm_id_layout_id_pk" PRIMARY KEY("firm_id","layout_id")
);
--> statement-breakpoint
CREATE TABLE "firms" (
	"id" text PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"demo" boolean DEFAULT false NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "layouts" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"project_id" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "layouts_firm_id" UNIQUE("firm_id","id")
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"firm_id" text NOT NULL,
	"person_id" text NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "memberships_firm_id_person_id_pk" PRIMARY KEY("firm_id","person_id"),
	CONSTRAINT "memberships_role" CHECK ("memberships"."role" in ('owner', 'designer', 'installer', 'client'))
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" text PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"display" text DEFAULT 'metric' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_email_unique" UNIQUE("email"),
	CONSTRAINT "people_email_lower" CHECK ("people"."email" = lower("people"."email")),
	CONSTRAINT "people_display" CHECK ("people"."display" in ('metric', 'imperial'))
);
--> statement-breakpoint
CREATE TABLE "project_people" (
	"firm_id" text NOT NULL,
	"project_id" text NOT NULL,
	"person_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "project_people_firm_id_project_id_person_id_pk" PRIMARY KEY("firm_id","project_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "projects" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"name" text NOT NULL,
	"client_name" text NOT NULL,
	"site_note" text NOT NULL,
	"archived_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "projects_firm_id" UNIQUE("firm_id","id")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" text PRIMARY KEY NOT NULL,
	"person_id" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"firm_id" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "set_aside_drafts" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"person_id" text NOT NULL,
	"base_revision" integer NOT NULL,
	"document" jsonb NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sign_in_attempts" (
	"id" text PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"email" text NOT NULL,
	"address" text NOT NULL,
	"at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "version_events" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"version_id" text NOT NULL,
	"place" integer NOT NULL,
	"kind" text NOT NULL,
	"person_id" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"note" text NOT NULL,
	CONSTRAINT "version_events_place" UNIQUE("firm_id","version_id","place"),
	CONSTRAINT "version_events_kind_known" CHECK ("version_events"."kind" in ('saved', 'shared', 'accepted', 'change_asked', 'issued', 'superseded'))
);
--> statement-breakpoint
CREATE TABLE "versions" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"number" integer NOT NULL,
	"label" text NOT NULL,
	"note" text NOT NULL,
	"document" jsonb NOT NULL,
	"report" jsonb NOT NULL,
	"fingerprint" text NOT NULL,
	"request_id" text,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "versions_firm_id" UNIQUE("firm_id","id"),
	CONSTRAINT "versions_number" UNIQUE("firm_id","layout_id","number"),
	CONSTRAINT "versions_request" UNIQUE("firm_id","layout_id","request_id")
);
--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_updated_by_people_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_layout" FOREIGN KEY ("firm_id","layout_id") REFERENCES "public"."layouts"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "drafts" ADD CONSTRAINT "drafts_based_on" FOREIGN KEY ("firm_id","based_on_version") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "layouts" ADD CONSTRAINT "layouts_project_fk" FOREIGN KEY ("firm_id","project_id") REFERENCES "public"."projects"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_people" ADD CONSTRAINT "project_people_project" FOREIGN KEY ("firm_id","project_id") REFERENCES "public"."projects"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "project_people" ADD CONSTRAINT "project_people_membership" FOREIGN KEY ("firm_id","person_id") REFERENCES "public"."memberships"("firm_id","person_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "projects" ADD CONSTRAINT "projects_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_membership" FOREIGN KEY ("firm_id","person_id") REFERENCES "public"."memberships"("firm_id","person_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "set_aside_drafts" ADD CONSTRAINT "set_aside_drafts_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "set_aside_drafts" ADD CONSTRAINT "set_aside_layout_fk" FOREIGN KEY ("firm_id","layout_id") REFERENCES "public"."layouts"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version_events" ADD CONSTRAINT "version_events_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version_events" ADD CONSTRAINT "version_events_version" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "versions" ADD CONSTRAINT "versions_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "versions" ADD CONSTRAINT "versions_layout" FOREIGN KEY ("firm_id","layout_id") REFERENCES "public"."layouts"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "layouts_project" ON "layouts" USING btree ("firm_id","project_id","created_at");--> statement-breakpoint
CREATE INDEX "memberships_person" ON "memberships" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "project_people_person" ON "project_people" USING btree ("firm_id","person_id");--> statement-breakpoint
CREATE INDEX "projects_firm_updated" ON "projects" USING btree ("firm_id","updated_at");--> statement-breakpoint
CREATE INDEX "sessions_person" ON "sessions" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "sessions_expiry" ON "sessions" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "set_aside_layout" ON "set_aside_drafts" USING btree ("firm_id","layout_id","at");--> statement-breakpoint
CREATE INDEX "sign_in_attempts_pair" ON "sign_in_attempts" USING btree ("kind","email","address","at");--> statement-breakpoint
CREATE INDEX "sign_in_attempts_address" ON "sign_in_attempts" USING btree ("kind","address","at");--> statement-breakpoint
CREATE INDEX "sign_in_attempts_at" ON "sign_in_attempts" USING btree ("at");--> statement-breakpoint
CREATE INDEX "version_events_kind" ON "version_events" USING btree ("firm_id","version_id","kind");
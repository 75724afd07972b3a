CREATE TABLE "site_entries" (
	"firm_id" text NOT NULL,
	"id" text NOT NULL,
	"version_id" text NOT NULL,
	"device" text NOT NULL,
	"place" integer NOT NULL,
	"kind" text NOT NULL,
	"content" jsonb NOT NULL,
	"person_id" text NOT NULL,
	"made_at" timestamp with time zone NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "site_entries_firm_id_id_pk" PRIMARY KEY("firm_id","id"),
	CONSTRAINT "site_entries_kind" CHECK ("site_entries"."kind" in ('course', 'check', 'note', 'photo', 'proposal'))
);
--> statement-breakpoint
CREATE TABLE "site_keys" (
	"firm_id" text NOT NULL,
	"person_id" text NOT NULL,
	"key" text NOT NULL,
	CONSTRAINT "site_keys_firm_id_person_id_pk" PRIMARY KEY("firm_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "site_photos" (
	"firm_id" text NOT NULL,
	"entry_id" text NOT NULL,
	"width" integer NOT NULL,
	"height" integer NOT NULL,
	"full_hash" text NOT NULL,
	"phone_hash" text NOT NULL,
	CONSTRAINT "site_photos_firm_id_entry_id_pk" PRIMARY KEY("firm_id","entry_id")
);
--> statement-breakpoint
ALTER TABLE "site_entries" ADD CONSTRAINT "site_entries_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_entries" ADD CONSTRAINT "site_entries_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_keys" ADD CONSTRAINT "site_keys_membership" FOREIGN KEY ("firm_id","person_id") REFERENCES "public"."memberships"("firm_id","person_id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_photos" ADD CONSTRAINT "site_photos_entry" FOREIGN KEY ("firm_id","entry_id") REFERENCES "public"."site_entries"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "site_entries_version" ON "site_entries" USING btree ("firm_id","version_id","device","place");--> statement-breakpoint
-- What was written down on the ground is never altered or deleted: a mistake is put right by another entry.
CREATE FUNCTION keep_site_record() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% of % refused: what was written down on site is never altered or deleted', TG_OP, TG_TABLE_NAME
    USING ERRCODE = 'integrity_constraint_violation';
END;
$$;
--> statement-breakpoint
CREATE TRIGGER site_entries_kept BEFORE UPDATE OR DELETE ON site_entries
  FOR EACH ROW EXECUTE FUNCTION keep_site_record();
--> statement-breakpoint
CREATE TRIGGER site_entries_not_emptied BEFORE TRUNCATE ON site_entries
  FOR EACH STATEMENT EXECUTE FUNCTION keep_site_record();
--> statement-breakpoint
CREATE TRIGGER site_photos_kept BEFORE UPDATE OR DELETE ON site_photos
  FOR EACH ROW EXECUTE FUNCTION keep_site_record();
--> statement-breakpoint
CREATE TRIGGER site_photos_not_emptied BEFORE TRUNCATE ON site_photos
  FOR EACH STATEMENT EXECUTE FUNCTION keep_site_record();

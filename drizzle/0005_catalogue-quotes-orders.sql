CREATE TABLE "catalogue_items" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"code" text DEFAULT '' NOT NULL,
	"supplier_id" text,
	"pack_name" text NOT NULL,
	"pack_holds" double precision NOT NULL,
	"pack_measure" text NOT NULL,
	"pack_whole" boolean NOT NULL,
	"length" double precision,
	"width" double precision,
	"thickness" double precision,
	"tolerance" double precision,
	"mass_kg" double precision,
	"colour" text,
	"loose_density" double precision,
	"stone_least" double precision,
	"stone_greatest" double precision,
	"note" text DEFAULT '' NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"retired_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"words" "tsvector" GENERATED ALWAYS AS (to_tsvector('simple', name || ' ' || code)) STORED NOT NULL,
	CONSTRAINT "catalogue_items_firm_id" UNIQUE("firm_id","id"),
	CONSTRAINT "catalogue_items_kind_known" CHECK ("catalogue_items"."kind" in ('unit', 'aggregate', 'sundry')),
	CONSTRAINT "catalogue_items_measure" CHECK ("catalogue_items"."pack_measure" in ('each', 'm', 'm2', 'm3', 't', 'kg')),
	CONSTRAINT "catalogue_items_pack" CHECK ("catalogue_items"."pack_holds" > 0),
	CONSTRAINT "catalogue_items_stone" CHECK (("catalogue_items"."stone_least" is null) = ("catalogue_items"."stone_greatest" is null))
);
--> statement-breakpoint
CREATE TABLE "catalogue_prices" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"item_id" text NOT NULL,
	"from_day" date NOT NULL,
	"place" integer NOT NULL,
	"cost_minor" bigint NOT NULL,
	"set_by" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "catalogue_prices_place" UNIQUE("firm_id","item_id","place"),
	CONSTRAINT "catalogue_prices_cost" CHECK ("catalogue_prices"."cost_minor" >= 0)
);
--> statement-breakpoint
CREATE TABLE "suppliers" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"name" text NOT NULL,
	"email" text DEFAULT '' NOT NULL,
	"phone" text DEFAULT '' NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"retired_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "suppliers_firm_id" UNIQUE("firm_id","id")
);
--> statement-breakpoint
CREATE TABLE "firm_pricing" (
	"firm_id" text PRIMARY KEY NOT NULL,
	"currency" text NOT NULL,
	"tax_name" text NOT NULL,
	"tax_basis_points" integer NOT NULL,
	"tax_on" text NOT NULL,
	"margin_of" text NOT NULL,
	"margin_basis_points" integer NOT NULL,
	"labour_hour_minor" bigint NOT NULL,
	"labour_area_minor" bigint NOT NULL,
	"valid_days" integer NOT NULL,
	"quote_terms" text NOT NULL,
	"order_terms" text NOT NULL,
	"quote_prefix" text NOT NULL,
	"order_prefix" text NOT NULL,
	"address" text NOT NULL,
	"phone" text NOT NULL,
	"email" text NOT NULL,
	"registration" text NOT NULL,
	"paper" text NOT NULL,
	"revision" integer NOT NULL,
	CONSTRAINT "firm_pricing_currency" CHECK ("firm_pricing"."currency" ~ '^[A-Z]{3}$'),
	CONSTRAINT "firm_pricing_tax_on" CHECK ("firm_pricing"."tax_on" in ('lines', 'sum')),
	CONSTRAINT "firm_pricing_margin_of" CHECK ("firm_pricing"."margin_of" in ('cost', 'price')),
	CONSTRAINT "firm_pricing_paper" CHECK ("firm_pricing"."paper" in ('A4', 'Letter'))
);
--> statement-breakpoint
CREATE TABLE "number_sequences" (
	"firm_id" text NOT NULL,
	"kind" text NOT NULL,
	"next" integer NOT NULL,
	CONSTRAINT "number_sequences_firm_id_kind_pk" PRIMARY KEY("firm_id","kind"),
	CONSTRAINT "number_sequences_kind" CHECK ("number_sequences"."kind" in ('quote', 'order'))
);
--> statement-breakpoint
CREATE TABLE "purchase_orders" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"version_id" text NOT NULL,
	"supplier_id" text NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"number" text,
	"lines" jsonb NOT NULL,
	"delivery_day" date,
	"delivery_place" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"sent" jsonb,
	"letter_id" text,
	"revision" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_by" text,
	"sent_at" timestamp with time zone,
	CONSTRAINT "purchase_orders_firm_id" UNIQUE("firm_id","id"),
	CONSTRAINT "purchase_orders_number" UNIQUE("firm_id","number"),
	CONSTRAINT "purchase_orders_state" CHECK ("purchase_orders"."state" in ('draft', 'sent')),
	CONSTRAINT "purchase_orders_sent" CHECK (("purchase_orders"."state" = 'sent') = ("purchase_orders"."number" is not null and "purchase_orders"."sent" is not null
        and "purchase_orders"."sent_at" is not null and "purchase_orders"."sent_by" is not null))
);
--> statement-breakpoint
CREATE TABLE "quotes" (
	"id" text PRIMARY KEY NOT NULL,
	"firm_id" text NOT NULL,
	"version_id" text NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"number" text,
	"draft" jsonb NOT NULL,
	"sent" jsonb,
	"valid_until" date,
	"revision" integer DEFAULT 1 NOT NULL,
	"created_by" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_by" text,
	"sent_at" timestamp with time zone,
	CONSTRAINT "quotes_firm_id" UNIQUE("firm_id","id"),
	CONSTRAINT "quotes_number" UNIQUE("firm_id","number"),
	CONSTRAINT "quotes_state" CHECK ("quotes"."state" in ('draft', 'sent')),
	CONSTRAINT "quotes_sent" CHECK (("quotes"."state" = 'sent') = ("quotes"."number" is not null and "quotes"."sent" is not null
        and "quotes"."sent_at" is not null and "quotes"."sent_by" is not null))
);
--> statement-breakpoint
CREATE TABLE "version_pricings" (
	"firm_id" text NOT NULL,
	"version_id" text NOT NULL,
	"take_off" jsonb NOT NULL,
	"price_list" jsonb NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "version_pricings_firm_id_version_id_pk" PRIMARY KEY("firm_id","version_id")
);
--> statement-breakpoint
ALTER TABLE "outbox" ADD COLUMN "reply_to" text;--> statement-breakpoint
ALTER TABLE "outbox" ADD COLUMN "attachments" jsonb;--> statement-breakpoint
ALTER TABLE "catalogue_items" ADD CONSTRAINT "catalogue_items_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_items" ADD CONSTRAINT "catalogue_items_supplier_fk" FOREIGN KEY ("firm_id","supplier_id") REFERENCES "public"."suppliers"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_prices" ADD CONSTRAINT "catalogue_prices_set_by_people_id_fk" FOREIGN KEY ("set_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_prices" ADD CONSTRAINT "catalogue_prices_item" FOREIGN KEY ("firm_id","item_id") REFERENCES "public"."catalogue_items"("firm_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "suppliers" ADD CONSTRAINT "suppliers_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "firm_pricing" ADD CONSTRAINT "firm_pricing_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "number_sequences" ADD CONSTRAINT "number_sequences_firm_id_firms_id_fk" FOREIGN KEY ("firm_id") REFERENCES "public"."firms"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_sent_by_people_id_fk" FOREIGN KEY ("sent_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "purchase_orders" ADD CONSTRAINT "purchase_orders_supplier" FOREIGN KEY ("firm_id","supplier_id") REFERENCES "public"."suppliers"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_sent_by_people_id_fk" FOREIGN KEY ("sent_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "quotes" ADD CONSTRAINT "quotes_version_fk" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version_pricings" ADD CONSTRAINT "version_pricings_version" FOREIGN KEY ("firm_id","version_id") REFERENCES "public"."versions"("firm_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "catalogue_items_offered" ON "catalogue_items" USING btree ("firm_id",lower("name"),coalesce("supplier_id", '')) WHERE retired_at is null;--> statement-breakpoint
CREATE INDEX "catalogue_items_name" ON "catalogue_items" USING btree ("firm_id",lower("name"),"id") WHERE retired_at is null;--> statement-breakpoint
CREATE INDEX "catalogue_items_kind" ON "catalogue_items" USING btree ("firm_id","kind",lower("name"),"id") WHERE retired_at is null;--> statement-breakpoint
CREATE INDEX "catalogue_items_updated" ON "catalogue_items" USING btree ("firm_id","updated_at","id") WHERE retired_at is null;--> statement-breakpoint
CREATE INDEX "catalogue_items_retired" ON "catalogue_items" USING btree ("firm_id","retired_at","id") WHERE retired_at is not null;--> statement-breakpoint
CREATE INDEX "catalogue_items_supplier" ON "catalogue_items" USING btree ("firm_id","supplier_id",lower("name"),"id");--> statement-breakpoint
CREATE INDEX "catalogue_items_words" ON "catalogue_items" USING gin ("words") WITH (fastupdate=false);--> statement-breakpoint
CREATE INDEX "catalogue_prices_day" ON "catalogue_prices" USING btree ("firm_id","item_id","from_day","place");--> statement-breakpoint
CREATE UNIQUE INDEX "suppliers_name" ON "suppliers" USING btree ("firm_id",lower("name"));--> statement-breakpoint
CREATE UNIQUE INDEX "purchase_orders_one_draft" ON "purchase_orders" USING btree ("firm_id","version_id","supplier_id") WHERE state = 'draft';--> statement-breakpoint
CREATE INDEX "purchase_orders_version" ON "purchase_orders" USING btree ("firm_id","version_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "quotes_one_draft" ON "quotes" USING btree ("firm_id","version_id") WHERE state = 'draft';--> statement-breakpoint
CREATE INDEX "quotes_version" ON "quotes" USING btree ("firm_id","version_id","created_at");--> statement-breakpoint
-- From here on by hand. What a version was priced with is kept as the version is.
CREATE TRIGGER version_pricings_kept BEFORE UPDATE OR DELETE ON version_pricings
  FOR EACH ROW EXECUTE FUNCTION keep_for_ever();
--> statement-breakpoint
CREATE TRIGGER version_pricings_not_emptied BEFORE TRUNCATE ON version_pricings
  FOR EACH STATEMENT EXECUTE FUNCTION keep_for_ever();
--> statement-breakpoint
-- A price is never written over; it goes only with an item that nothing was made with.
CREATE TRIGGER catalogue_prices_kept BEFORE UPDATE ON catalogue_prices
  FOR EACH ROW EXECUTE FUNCTION keep_record_for_ever();
--> statement-breakpoint
-- A quote or an order that went out is never altered or deleted, whoever asks; a draft may be.
CREATE FUNCTION keep_what_was_sent() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'TRUNCATE' OR OLD.state = 'sent' THEN
    RAISE EXCEPTION '% of % refused: what was sent is never altered or deleted', TG_OP, TG_TABLE_NAME
      USING ERRCODE = 'integrity_constraint_violation';
  END IF;
  IF TG_OP = 'DELETE' THEN
    RETURN OLD;
  END IF;
  RETURN NEW;
END;
$$;
--> statement-breakpoint
CREATE TRIGGER quotes_kept BEFORE UPDATE OR DELETE ON quotes
  FOR EACH ROW EXECUTE FUNCTION keep_what_was_sent();
--> statement-breakpoint
CREATE TRIGGER quotes_not_emptied BEFORE TRUNCATE ON quotes
  FOR EACH STATEMENT EXECUTE FUNCTION keep_what_was_sent();
--> statement-breakpoint
CREATE TRIGGER purchase_orders_kept BEFORE UPDATE OR DELETE ON purchase_orders
  FOR EACH ROW EXECUTE FUNCTION keep_what_was_sent();
--> statement-breakpoint
CREATE TRIGGER purchase_orders_not_emptied BEFORE TRUNCATE ON purchase_orders
  FOR EACH STATEMENT EXECUTE FUNCTION keep_what_was_sent();

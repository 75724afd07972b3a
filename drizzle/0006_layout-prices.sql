CREATE TABLE "layout_prices" (
	"firm_id" text NOT NULL,
	"layout_id" text NOT NULL,
	"order_id" text NOT NULL,
	"currency" text NOT NULL,
	"cost_minor" bigint NOT NULL,
	"pack_holds" double precision NOT NULL,
	"pack_measure" text NOT NULL,
	"set_by" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "layout_prices_firm_id_layout_id_order_id_pk" PRIMARY KEY("firm_id","layout_id","order_id"),
	CONSTRAINT "layout_prices_cost" CHECK ("layout_prices"."cost_minor" >= 0),
	CONSTRAINT "layout_prices_holds" CHECK ("layout_prices"."pack_holds" > 0)
);
--> statement-breakpoint
ALTER TABLE "layout_prices" ADD CONSTRAINT "layout_prices_set_by_people_id_fk" FOREIGN KEY ("set_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "layout_prices" ADD CONSTRAINT "layout_prices_layout" FOREIGN KEY ("firm_id","layout_id") REFERENCES "public"."layouts"("firm_id","id") ON DELETE no action ON UPDATE no action;
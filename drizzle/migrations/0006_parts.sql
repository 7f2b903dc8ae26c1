CREATE TYPE "public"."nature" AS ENUM('nothing_replaced', 'like_for_like', 'substitute', 'altered', 'put_back');--> statement-breakpoint
CREATE TYPE "public"."count_settlement" AS ENUM('miscounted', 'lost', 'scrapped', 'sold', 'found', 'fitted_since');--> statement-breakpoint
CREATE TYPE "public"."counted_in" AS ENUM('piece', 'pair', 'set', 'millimetre', 'gram', 'millilitre');--> statement-breakpoint
CREATE TYPE "public"."lot_condition" AS ENUM('new', 'old_stock', 'pulled', 'rebuilt', 'made_here', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."lot_source" AS ENUM('supplier', 'old_stock', 'donor', 'split', 'made_here', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."lot_standing" AS ENUM('good', 'quarantined', 'withdrawn');--> statement-breakpoint
CREATE TYPE "public"."movement_kind" AS ENUM('received', 'found', 'split_off', 'put_back', 'fitted', 'sold', 'scrapped', 'lost');--> statement-breakpoint
CREATE TYPE "public"."part_kind" AS ENUM('resistor', 'capacitor', 'potentiometer', 'inductor', 'transformer', 'valve', 'semiconductor', 'crystal', 'lamp', 'fuse', 'switch', 'connector', 'meter', 'battery', 'wire', 'knob', 'dial', 'panel', 'case', 'assembly', 'mechanical', 'other');--> statement-breakpoint
CREATE TYPE "public"."part_recall_basis" AS ENUM('lot', 'invoice', 'made_between', 'maker_and_value');--> statement-breakpoint
CREATE TYPE "public"."part_recall_outcome" AS ENUM('checked', 'replaced', 'accepted');--> statement-breakpoint
ALTER TYPE "public"."ledger_subject" ADD VALUE 'part_lot';--> statement-breakpoint
ALTER TYPE "public"."ledger_subject" ADD VALUE 'part_recall';--> statement-breakpoint
CREATE TABLE "fittings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"modification_id" uuid NOT NULL,
	"unit_id" uuid NOT NULL,
	"lot_id" uuid,
	"description" text DEFAULT '' NOT NULL,
	"quantity" integer NOT NULL,
	"circuit_reference" text DEFAULT '' NOT NULL,
	"replaced" text DEFAULT '' NOT NULL,
	"replaces_fitting_id" uuid,
	"disposition" "disposition" NOT NULL,
	"old_lot_id" uuid,
	"cost_minor" bigint,
	"currency" text,
	"removed_at" timestamp with time zone,
	"undone_at" timestamp with time zone,
	"undone_because" text,
	"fitted_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "fittings_quantity" CHECK ("fittings"."quantity" > 0),
	CONSTRAINT "fittings_lot_or_words" CHECK ("fittings"."lot_id" is not null or "fittings"."description" <> ''),
	CONSTRAINT "fittings_cost_has_currency" CHECK (("fittings"."cost_minor" is null) = ("fittings"."currency" is null)),
	CONSTRAINT "fittings_undone_says_why" CHECK (("fittings"."undone_at" is null) = ("fittings"."undone_because" is null)),
	CONSTRAINT "fittings_old_lot_was_returned" CHECK ("fittings"."old_lot_id" is null or "fittings"."disposition" = 'returned_to_stock'),
	CONSTRAINT "fittings_not_their_own_place" CHECK ("fittings"."replaces_fitting_id" <> "fittings"."id")
);
--> statement-breakpoint
CREATE TABLE "lot_counts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"lot_id" uuid NOT NULL,
	"counted" integer NOT NULL,
	"book" integer NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"counted_by" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_as" "count_settlement",
	"settled_note" text DEFAULT '' NOT NULL,
	"settled_by" uuid,
	"settled_at" timestamp with time zone,
	CONSTRAINT "lot_counts_not_negative" CHECK ("lot_counts"."counted" >= 0 and "lot_counts"."book" >= 0),
	CONSTRAINT "lot_counts_settled_whole" CHECK (("lot_counts"."settled_as" is null) = ("lot_counts"."settled_at" is null) and ("lot_counts"."settled_at" is null) = ("lot_counts"."settled_by" is null))
);
--> statement-breakpoint
CREATE TABLE "lot_movements" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "lot_movements_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"lot_id" uuid NOT NULL,
	"kind" "movement_kind" NOT NULL,
	"quantity" integer NOT NULL,
	"cost_minor" bigint,
	"fitting_id" uuid,
	"reverses_id" bigint,
	"note" text DEFAULT '' NOT NULL,
	"person_id" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lot_movements_move_something" CHECK ("lot_movements"."quantity" <> 0),
	CONSTRAINT "lot_movements_direction" CHECK (("lot_movements"."reverses_id" is not null) <> (("lot_movements"."kind" in ('received', 'found')) = ("lot_movements"."quantity" > 0)))
);
--> statement-breakpoint
CREATE TABLE "part_lots" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"tag" text NOT NULL,
	"type_id" uuid NOT NULL,
	"maker" text DEFAULT '' NOT NULL,
	"date_code" text DEFAULT '' NOT NULL,
	"made_from" date,
	"made_to" date,
	"condition" "lot_condition" NOT NULL,
	"tested" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"source_kind" "lot_source" NOT NULL,
	"supplier_id" uuid,
	"invoice_number" text DEFAULT '' NOT NULL,
	"donor_unit_id" uuid,
	"from_fitting_id" uuid,
	"parent_lot_id" uuid,
	"acquired_on" date NOT NULL,
	"quantity" integer NOT NULL,
	"cost_minor" bigint,
	"currency" text,
	"standing" "lot_standing" DEFAULT 'good' NOT NULL,
	"standing_because" text DEFAULT '' NOT NULL,
	"location_id" uuid,
	"photo_file_id" uuid,
	"entered_by" uuid NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_lots_tag_form" CHECK ("part_lots"."tag" ~ '^P[0-9]{5,}[0-9A-Z]$'),
	CONSTRAINT "part_lots_never_below_zero" CHECK ("part_lots"."quantity" >= 0),
	CONSTRAINT "part_lots_cost" CHECK ("part_lots"."cost_minor" is null or ("part_lots"."cost_minor" >= 0 and ("part_lots"."quantity" > 0 or "part_lots"."cost_minor" = 0))),
	CONSTRAINT "part_lots_cost_has_currency" CHECK (("part_lots"."cost_minor" is null) = ("part_lots"."currency" is null)),
	CONSTRAINT "part_lots_donor_is_named" CHECK (("part_lots"."source_kind" = 'donor') = ("part_lots"."donor_unit_id" is not null)),
	CONSTRAINT "part_lots_split_names_its_parent" CHECK (("part_lots"."source_kind" = 'split') = ("part_lots"."parent_lot_id" is not null)),
	CONSTRAINT "part_lots_pulled_from_a_donor" CHECK ("part_lots"."donor_unit_id" is not null or "part_lots"."from_fitting_id" is null),
	CONSTRAINT "part_lots_not_its_own_source" CHECK ("part_lots"."parent_lot_id" <> "part_lots"."id"),
	CONSTRAINT "part_lots_made_between" CHECK (("part_lots"."made_from" is null) = ("part_lots"."made_to" is null) and "part_lots"."made_from" <= "part_lots"."made_to"),
	CONSTRAINT "part_lots_standing_says_why" CHECK ("part_lots"."standing" = 'good' or "part_lots"."standing_because" <> '')
);
--> statement-breakpoint
CREATE TABLE "part_recall_decisions" (
	"recall_id" uuid NOT NULL,
	"unit_id" uuid NOT NULL,
	"outcome" "part_recall_outcome" NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"decided_by" uuid NOT NULL,
	"decided_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_recall_decisions_pkey" PRIMARY KEY("recall_id","unit_id")
);
--> statement-breakpoint
CREATE TABLE "part_recalls" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"basis" "part_recall_basis" NOT NULL,
	"lot_id" uuid,
	"supplier_id" uuid,
	"invoice_number" text DEFAULT '' NOT NULL,
	"made_from" date,
	"made_to" date,
	"kind" "part_kind",
	"maker" text DEFAULT '' NOT NULL,
	"value" text DEFAULT '' NOT NULL,
	"why" text NOT NULL,
	"raised_by" uuid NOT NULL,
	"closed_at" timestamp with time zone,
	"closed_by" uuid,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_recalls_basis_is_given" CHECK (case "part_recalls"."basis"
    when 'lot' then "part_recalls"."lot_id" is not null
    when 'invoice' then "part_recalls"."supplier_id" is not null and "part_recalls"."invoice_number" <> ''
    when 'made_between' then "part_recalls"."made_from" is not null and "part_recalls"."made_to" is not null and "part_recalls"."made_from" <= "part_recalls"."made_to"
    else "part_recalls"."maker" <> '' and "part_recalls"."value" <> '' end),
	CONSTRAINT "part_recalls_closed_by" CHECK (("part_recalls"."closed_at" is null) = ("part_recalls"."closed_by" is null))
);
--> statement-breakpoint
CREATE TABLE "part_types" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"kind" "part_kind" NOT NULL,
	"description" text NOT NULL,
	"value" text DEFAULT '' NOT NULL,
	"tolerance" text DEFAULT '' NOT NULL,
	"rating" text DEFAULT '' NOT NULL,
	"package" text DEFAULT '' NOT NULL,
	"counted_in" "counted_in" DEFAULT 'piece' NOT NULL,
	"minimum" integer,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_types_minimum" CHECK ("part_types"."minimum" is null or "part_types"."minimum" > 0)
);
--> statement-breakpoint
ALTER TABLE "shop" ADD COLUMN "bench_rate_minor" bigint;--> statement-breakpoint
ALTER TABLE "units" ADD COLUMN "ceiling_minutes" integer;--> statement-breakpoint
ALTER TABLE "units" ADD COLUMN "examined_inside_on" date;--> statement-breakpoint
ALTER TABLE "units" ADD COLUMN "examined_inside_note" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "modifications" ADD COLUMN "nature" "nature";--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_modification_id_modifications_id_fk" FOREIGN KEY ("modification_id") REFERENCES "public"."modifications"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_lot_id_part_lots_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_replaces_fitting_id_fittings_id_fk" FOREIGN KEY ("replaces_fitting_id") REFERENCES "public"."fittings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_old_lot_id_part_lots_id_fk" FOREIGN KEY ("old_lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "fittings" ADD CONSTRAINT "fittings_fitted_by_people_id_fk" FOREIGN KEY ("fitted_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_counts" ADD CONSTRAINT "lot_counts_lot_id_part_lots_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_counts" ADD CONSTRAINT "lot_counts_counted_by_people_id_fk" FOREIGN KEY ("counted_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_counts" ADD CONSTRAINT "lot_counts_settled_by_people_id_fk" FOREIGN KEY ("settled_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_movements" ADD CONSTRAINT "lot_movements_lot_id_part_lots_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_movements" ADD CONSTRAINT "lot_movements_fitting_id_fittings_id_fk" FOREIGN KEY ("fitting_id") REFERENCES "public"."fittings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_movements" ADD CONSTRAINT "lot_movements_reverses_id_lot_movements_id_fk" FOREIGN KEY ("reverses_id") REFERENCES "public"."lot_movements"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_movements" ADD CONSTRAINT "lot_movements_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_type_id_part_types_id_fk" FOREIGN KEY ("type_id") REFERENCES "public"."part_types"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_supplier_id_parties_id_fk" FOREIGN KEY ("supplier_id") REFERENCES "public"."parties"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_donor_unit_id_units_id_fk" FOREIGN KEY ("donor_unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_from_fitting_id_fittings_id_fk" FOREIGN KEY ("from_fitting_id") REFERENCES "public"."fittings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_parent_lot_id_part_lots_id_fk" FOREIGN KEY ("parent_lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_location_id_locations_id_fk" FOREIGN KEY ("location_id") REFERENCES "public"."locations"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_photo_file_id_files_id_fk" FOREIGN KEY ("photo_file_id") REFERENCES "public"."files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_lots" ADD CONSTRAINT "part_lots_entered_by_people_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recall_decisions" ADD CONSTRAINT "part_recall_decisions_recall_id_part_recalls_id_fk" FOREIGN KEY ("recall_id") REFERENCES "public"."part_recalls"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recall_decisions" ADD CONSTRAINT "part_recall_decisions_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recall_decisions" ADD CONSTRAINT "part_recall_decisions_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recalls" ADD CONSTRAINT "part_recalls_lot_id_part_lots_id_fk" FOREIGN KEY ("lot_id") REFERENCES "public"."part_lots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recalls" ADD CONSTRAINT "part_recalls_supplier_id_parties_id_fk" FOREIGN KEY ("supplier_id") REFERENCES "public"."parties"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recalls" ADD CONSTRAINT "part_recalls_raised_by_people_id_fk" FOREIGN KEY ("raised_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_recalls" ADD CONSTRAINT "part_recalls_closed_by_people_id_fk" FOREIGN KEY ("closed_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "fittings_unit_idx" ON "fittings" USING btree ("unit_id","created_at");--> statement-breakpoint
CREATE INDEX "fittings_lot_idx" ON "fittings" USING btree ("lot_id","created_at");--> statement-breakpoint
CREATE INDEX "fittings_modification_idx" ON "fittings" USING btree ("modification_id");--> statement-breakpoint
CREATE INDEX "fittings_replaces_idx" ON "fittings" USING btree ("replaces_fitting_id");--> statement-breakpoint
CREATE INDEX "fittings_old_lot_idx" ON "fittings" USING btree ("old_lot_id");--> statement-breakpoint
CREATE INDEX "lot_counts_lot_idx" ON "lot_counts" USING btree ("lot_id","at");--> statement-breakpoint
CREATE INDEX "lot_counts_open_idx" ON "lot_counts" USING btree ("at") WHERE "lot_counts"."settled_at" is null and "lot_counts"."counted" <> "lot_counts"."book";--> statement-breakpoint
CREATE INDEX "lot_movements_lot_idx" ON "lot_movements" USING btree ("lot_id","id");--> statement-breakpoint
CREATE INDEX "lot_movements_fitting_idx" ON "lot_movements" USING btree ("fitting_id");--> statement-breakpoint
CREATE UNIQUE INDEX "lot_movements_reversed_once" ON "lot_movements" USING btree ("reverses_id");--> statement-breakpoint
CREATE UNIQUE INDEX "part_lots_tag_key" ON "part_lots" USING btree ("tag");--> statement-breakpoint
CREATE INDEX "part_lots_type_idx" ON "part_lots" USING btree ("type_id");--> statement-breakpoint
CREATE INDEX "part_lots_donor_idx" ON "part_lots" USING btree ("donor_unit_id");--> statement-breakpoint
CREATE INDEX "part_lots_from_fitting_idx" ON "part_lots" USING btree ("from_fitting_id");--> statement-breakpoint
CREATE INDEX "part_lots_parent_idx" ON "part_lots" USING btree ("parent_lot_id");--> statement-breakpoint
CREATE INDEX "part_lots_supplier_idx" ON "part_lots" USING btree ("supplier_id","invoice_number");--> statement-breakpoint
CREATE INDEX "part_lots_location_idx" ON "part_lots" USING btree ("location_id");--> statement-breakpoint
CREATE INDEX "part_recall_decisions_unit_idx" ON "part_recall_decisions" USING btree ("unit_id");--> statement-breakpoint
CREATE UNIQUE INDEX "part_recalls_number_key" ON "part_recalls" USING btree ("number");--> statement-breakpoint
CREATE UNIQUE INDEX "part_types_key" ON "part_types" USING btree ("kind",lower("description"),lower("value"),lower("tolerance"),lower("rating"),lower("package"),"counted_in");--> statement-breakpoint
ALTER TABLE "shop" ADD CONSTRAINT "shop_bench_rate" CHECK ("shop"."bench_rate_minor" is null or "shop"."bench_rate_minor" >= 0);--> statement-breakpoint
ALTER TABLE "units" ADD CONSTRAINT "units_ceiling" CHECK ("units"."ceiling_minutes" is null or "units"."ceiling_minutes" > 0);--> statement-breakpoint
ALTER TABLE "modifications" ADD CONSTRAINT "modifications_left_alone_changes_nothing" CHECK ("modifications"."hand" <> 'left_alone' or "modifications"."nature" is null);
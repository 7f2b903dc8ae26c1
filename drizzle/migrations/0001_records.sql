CREATE TYPE "public"."role" AS ENUM('owner', 'bench', 'floor', 'reader');--> statement-breakpoint
CREATE TYPE "public"."party_kind" AS ENUM('person', 'business');--> statement-breakpoint
CREATE TYPE "public"."location_kind" AS ENUM('room', 'bay', 'shelf', 'bin');--> statement-breakpoint
CREATE TYPE "public"."coverage_function" AS ENUM('generates', 'tunes', 'measures', 'passes', 'transmits');--> statement-breakpoint
CREATE TYPE "public"."equipment_kind" AS ENUM('rf_generator', 'sweep_generator', 'stereo_generator', 'audio_oscillator', 'oscilloscope', 'voltmeter', 'multimeter', 'bridge', 'counter', 'power_supply', 'valve_tester', 'communications_receiver', 'domestic_receiver', 'tuner', 'amplifier', 'transceiver', 'other');--> statement-breakpoint
CREATE TYPE "public"."hazard" AS ENUM('live_chassis', 'perished_insulation', 'stored_charge', 'crt', 'selenium', 'asbestos', 'radium', 'mercury', 'pcb_oil', 'beryllia', 'filter_capacitor', 'battery_leak', 'heavy', 'mould');--> statement-breakpoint
CREATE TYPE "public"."kept_with_kind" AS ENUM('manual', 'lead', 'probe', 'plug_in', 'spare', 'removed_parts', 'case', 'document', 'cover', 'other');--> statement-breakpoint
CREATE TYPE "public"."technology" AS ENUM('valve', 'transistor', 'hybrid', 'passive');--> statement-breakpoint
CREATE TYPE "public"."disclosure_key" AS ENUM('identity', 'working_state', 'tests', 'changes', 'safety', 'supply', 'cosmetic_front', 'cosmetic_left', 'cosmetic_right', 'cosmetic_rear', 'cosmetic_top', 'cosmetic_underneath', 'included', 'missing', 'behaviour', 'terms');--> statement-breakpoint
CREATE TYPE "public"."knowledge" AS ENUM('known', 'not_known', 'not_looked', 'could_not_tell', 'not_applicable');--> statement-breakpoint
CREATE TYPE "public"."ownership" AS ENUM('bought', 'consigned');--> statement-breakpoint
CREATE TYPE "public"."source_kind" AS ENUM('house_clearance', 'auction', 'club_sale', 'private_seller', 'surplus', 'trade', 'trade_in', 'consignor', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."unit_state" AS ENUM('intake', 'bench', 'ready', 'offered', 'held', 'sold', 'dispatched', 'returned', 'parted', 'written_off');--> statement-breakpoint
CREATE TYPE "public"."disposition" AS ENUM('kept_with_unit', 'left_in_place', 'returned_to_stock', 'discarded', 'not_known', 'nothing_removed');--> statement-breakpoint
CREATE TYPE "public"."hand" AS ENUM('done_by_us', 'found_like_this', 'left_alone');--> statement-breakpoint
CREATE TYPE "public"."modification_reason" AS ENUM('fault', 'safety', 'preventive', 'usability', 'looks', 'completeness', 'undoing', 'decision', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."reversibility" AS ENUM('no_trace', 're_solder', 'hole_to_fill', 'not_reversible');--> statement-breakpoint
CREATE TYPE "public"."file_kind" AS ENUM('photo', 'document');--> statement-breakpoint
CREATE TYPE "public"."photo_subject" AS ENUM('front', 'plate', 'left', 'right', 'rear', 'top', 'underneath', 'inside', 'powered', 'detail', 'before', 'after', 'kit', 'packing');--> statement-breakpoint
CREATE TYPE "public"."originality" AS ENUM('original', 'copy', 'replacement', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."whereabouts" AS ENUM('with_unit', 'elsewhere', 'missing');--> statement-breakpoint
CREATE TYPE "public"."check_result" AS ENUM('pass', 'fail', 'not_done', 'not_applicable');--> statement-breakpoint
CREATE TYPE "public"."fitting_condition" AS ENUM('sound', 'perished', 'missing', 'wrong', 'not_looked', 'not_applicable');--> statement-breakpoint
CREATE TYPE "public"."safety_class" AS ENUM('earthed', 'double_insulated', 'live_chassis', 'low_voltage', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."triage_verdict" AS ENUM('may_be_powered', 'do_not_power', 'hazard_hold');--> statement-breakpoint
CREATE TYPE "public"."ledger_subject" AS ENUM('unit', 'model', 'location', 'instrument', 'person', 'shop');--> statement-breakpoint
CREATE TABLE "access_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"name" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_used_at" timestamp with time zone,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"person_id" uuid NOT NULL,
	"key" text NOT NULL,
	"fingerprint" text NOT NULL,
	"status" integer,
	"answer" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_pkey" PRIMARY KEY("person_id","key")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"role" "role" NOT NULL,
	"password_hash" text NOT NULL,
	"disabled_at" timestamp with time zone,
	"must_change_password" boolean DEFAULT false NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_email_is_lower_case" CHECK ("people"."email" = lower("people"."email"))
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"secret_hash" text NOT NULL,
	"device" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "sign_in_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "parties" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"kind" "party_kind" DEFAULT 'person' NOT NULL,
	"contact" text DEFAULT '' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "shop" (
	"id" integer PRIMARY KEY DEFAULT 1 NOT NULL,
	"name" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"currency" text DEFAULT 'GBP' NOT NULL,
	"time_zone" text DEFAULT 'Europe/London' NOT NULL,
	"itu_region" integer DEFAULT 1 NOT NULL,
	"default_terms" text DEFAULT '' NOT NULL,
	"earth_bond_limit_milliohm" integer DEFAULT 100 NOT NULL,
	"insulation_limit_kilohm" integer DEFAULT 1000 NOT NULL,
	"leakage_limit_microamp" integer DEFAULT 3500 NOT NULL,
	"safety_limits_origin" text DEFAULT 'UK code of practice for in-service inspection, Class I; check your own local code' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shop_is_one_row" CHECK ("shop"."id" = 1),
	CONSTRAINT "shop_region_is_itu" CHECK ("shop"."itu_region" between 1 and 3),
	CONSTRAINT "shop_currency_is_iso" CHECK ("shop"."currency" ~ '^[A-Z]{3}$')
);
--> statement-breakpoint
CREATE TABLE "tag_counters" (
	"kind" text PRIMARY KEY NOT NULL,
	"last" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "tag_counters_kind" CHECK ("tag_counters"."kind" in ('U', 'K', 'P', 'L', 'B'))
);
--> statement-breakpoint
CREATE TABLE "locations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"tag" text NOT NULL,
	"kind" "location_kind" NOT NULL,
	"name" text NOT NULL,
	"parent_id" uuid,
	"note" text DEFAULT '' NOT NULL,
	"retired_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "locations_room_is_top" CHECK (("locations"."kind" = 'room') = ("locations"."parent_id" is null)),
	CONSTRAINT "locations_not_in_itself" CHECK ("locations"."parent_id" is distinct from "locations"."id"),
	CONSTRAINT "locations_tag_form" CHECK ("locations"."tag" ~ '^L[0-9]{5,}[0-9A-Z]$')
);
--> statement-breakpoint
CREATE TABLE "bands" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"model_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"label" text NOT NULL,
	"function" "coverage_function" NOT NULL,
	"lower_hz" bigint NOT NULL,
	"upper_hz" bigint NOT NULL,
	"dial_tolerance_percent" numeric(7, 4),
	CONSTRAINT "bands_edges_in_order" CHECK ("bands"."lower_hz" >= 0 and "bands"."lower_hz" <= "bands"."upper_hz" and "bands"."upper_hz" > 0),
	CONSTRAINT "bands_upper_sane" CHECK ("bands"."upper_hz" <= 3000000000000),
	CONSTRAINT "bands_tolerance_positive" CHECK ("bands"."dial_tolerance_percent" is null or "bands"."dial_tolerance_percent" > 0)
);
--> statement-breakpoint
CREATE TABLE "model_kit_items" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"model_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"kind" "kept_with_kind" NOT NULL,
	"description" text NOT NULL,
	"quantity" smallint DEFAULT 1 NOT NULL,
	CONSTRAINT "model_kit_items_quantity" CHECK ("model_kit_items"."quantity" > 0)
);
--> statement-breakpoint
CREATE TABLE "models" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"maker" text NOT NULL,
	"designation" text NOT NULL,
	"kind" "equipment_kind" NOT NULL,
	"technology" "technology",
	"years_from" smallint,
	"years_to" smallint,
	"supply" text DEFAULT '' NOT NULL,
	"summary" text DEFAULT '' NOT NULL,
	"typical_hazards" "hazard"[] DEFAULT '{}' NOT NULL,
	"dial_tolerance_percent" numeric(7, 4),
	"modulation_hz" integer,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "models_years_in_order" CHECK ("models"."years_from" is null or "models"."years_to" is null or "models"."years_from" <= "models"."years_to"),
	CONSTRAINT "models_tolerance_positive" CHECK ("models"."dial_tolerance_percent" is null or "models"."dial_tolerance_percent" > 0)
);
--> statement-breakpoint
CREATE TABLE "holds" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"held_for" text NOT NULL,
	"until" date NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"released_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "unit_coverage" (
	"unit_id" uuid NOT NULL,
	"function" "coverage_function" NOT NULL,
	"ranges" "int8multirange" NOT NULL,
	CONSTRAINT "unit_coverage_pkey" PRIMARY KEY("unit_id","function")
);
--> statement-breakpoint
CREATE TABLE "unit_disclosures" (
	"unit_id" uuid NOT NULL,
	"key" "disclosure_key" NOT NULL,
	"answer" "knowledge" NOT NULL,
	"text" text,
	"answered_by" uuid NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "unit_disclosures_pkey" PRIMARY KEY("unit_id","key"),
	CONSTRAINT "unit_disclosures_answered" CHECK (("unit_disclosures"."answer" = 'known') = ("unit_disclosures"."text" is not null))
);
--> statement-breakpoint
CREATE TABLE "units" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"tag" text NOT NULL,
	"model_id" uuid NOT NULL,
	"serial_answer" "knowledge" NOT NULL,
	"serial" text,
	"state" "unit_state" DEFAULT 'intake' NOT NULL,
	"location_id" uuid,
	"condition_notes" text DEFAULT '' NOT NULL,
	"supply_as_set" text DEFAULT '' NOT NULL,
	"ownership" "ownership" NOT NULL,
	"source_kind" "source_kind" NOT NULL,
	"source_party_id" uuid,
	"source_note" text DEFAULT '' NOT NULL,
	"acquired_on" date NOT NULL,
	"cost_minor" bigint,
	"cost_currency" text,
	"asking_minor" bigint,
	"asking_currency" text,
	"hazard_hold" text,
	"not_energised_disclosure" text,
	"booked_in_by" uuid NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "units_tag_form" CHECK ("units"."tag" ~ '^U[0-9]{5,}[0-9A-Z]$'),
	CONSTRAINT "units_serial_is_answered" CHECK (("units"."serial_answer" = 'known') = ("units"."serial" is not null)),
	CONSTRAINT "units_cost_has_currency" CHECK (("units"."cost_minor" is null) = ("units"."cost_currency" is null)),
	CONSTRAINT "units_cost_not_negative" CHECK ("units"."cost_minor" is null or "units"."cost_minor" >= 0),
	CONSTRAINT "units_asking_has_currency" CHECK (("units"."asking_minor" is null) = ("units"."asking_currency" is null)),
	CONSTRAINT "units_asking_positive" CHECK ("units"."asking_minor" is null or "units"."asking_minor" > 0)
);
--> statement-breakpoint
CREATE TABLE "modifications" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"hand" "hand" NOT NULL,
	"place" text DEFAULT '' NOT NULL,
	"before" text DEFAULT '' NOT NULL,
	"after" text DEFAULT '' NOT NULL,
	"reason" "modification_reason" NOT NULL,
	"reversibility" "reversibility",
	"disposition" "disposition" NOT NULL,
	"disposition_note" text DEFAULT '' NOT NULL,
	"parts" text DEFAULT '' NOT NULL,
	"tested_after" text DEFAULT '' NOT NULL,
	"minutes" integer,
	"done_on" date,
	"owner_consent" text DEFAULT '' NOT NULL,
	"logged_by" uuid NOT NULL,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_because" text,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "modifications_undoable_is_said" CHECK (("modifications"."hand" = 'left_alone') = ("modifications"."reversibility" is null)),
	CONSTRAINT "modifications_our_work_is_dated" CHECK ("modifications"."hand" <> 'done_by_us' or "modifications"."done_on" is not null),
	CONSTRAINT "modifications_minutes" CHECK ("modifications"."minutes" is null or "modifications"."minutes" between 0 and 100000),
	CONSTRAINT "modifications_withdrawn_says_why" CHECK (("modifications"."withdrawn_at" is null) = ("modifications"."withdrawn_because" is null))
);
--> statement-breakpoint
CREATE TABLE "documents" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid,
	"model_id" uuid,
	"file_id" uuid NOT NULL,
	"title" text NOT NULL,
	"is_public" boolean DEFAULT false NOT NULL,
	"removed_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "documents_belong_once" CHECK (num_nonnulls("documents"."unit_id", "documents"."model_id") = 1)
);
--> statement-breakpoint
CREATE TABLE "files" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"kind" "file_kind" NOT NULL,
	"name" text NOT NULL,
	"media_type" text NOT NULL,
	"byte_size" integer NOT NULL,
	"sha256" text NOT NULL,
	"width" integer,
	"height" integer,
	"avif_ready_at" timestamp with time zone,
	"added_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "files_size_positive" CHECK ("files"."byte_size" > 0)
);
--> statement-breakpoint
CREATE TABLE "photos" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"file_id" uuid NOT NULL,
	"modification_id" uuid,
	"subject" "photo_subject" NOT NULL,
	"caption" text DEFAULT '' NOT NULL,
	"position" smallint DEFAULT 0 NOT NULL,
	"is_public" boolean DEFAULT true NOT NULL,
	"removed_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "kept_with_items" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"tag" text NOT NULL,
	"unit_id" uuid NOT NULL,
	"kit_item_id" uuid,
	"kind" "kept_with_kind" NOT NULL,
	"description" text NOT NULL,
	"originality" "originality" NOT NULL,
	"condition" text DEFAULT '' NOT NULL,
	"whereabouts" "whereabouts" DEFAULT 'with_unit' NOT NULL,
	"location_id" uuid,
	"missing_since" timestamp with time zone,
	"absence_disclosed" text DEFAULT '' NOT NULL,
	"packed_at" timestamp with time zone,
	"packed_by" uuid,
	"removed_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "kept_with_items_tag_form" CHECK ("kept_with_items"."tag" ~ '^K[0-9]{5,}[0-9A-Z]$'),
	CONSTRAINT "kept_with_items_elsewhere_is_somewhere" CHECK (("kept_with_items"."whereabouts" = 'elsewhere') = ("kept_with_items"."location_id" is not null)),
	CONSTRAINT "kept_with_items_missing_since" CHECK (("kept_with_items"."whereabouts" = 'missing') = ("kept_with_items"."missing_since" is not null)),
	CONSTRAINT "kept_with_items_packed_by" CHECK (("kept_with_items"."packed_at" is null) = ("kept_with_items"."packed_by" is null))
);
--> statement-breakpoint
CREATE TABLE "instruments" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"tag" text NOT NULL,
	"name" text NOT NULL,
	"serial" text DEFAULT '' NOT NULL,
	"accuracy" text DEFAULT '' NOT NULL,
	"calibrated_on" date,
	"calibration_due" date,
	"calibration_note" text DEFAULT '' NOT NULL,
	"retired_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "instruments_tag_form" CHECK ("instruments"."tag" ~ '^B[0-9]{5,}[0-9A-Z]$')
);
--> statement-breakpoint
CREATE TABLE "readings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"sheet_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"band_label" text NOT NULL,
	"setting_hz" bigint NOT NULL,
	"tolerance_percent" numeric(7, 4) NOT NULL,
	"reading_text" text,
	"reading_hz" numeric(20, 6),
	"instrument_id" uuid,
	"note" text DEFAULT '' NOT NULL,
	CONSTRAINT "readings_setting_positive" CHECK ("readings"."setting_hz" > 0),
	CONSTRAINT "readings_value_positive" CHECK ("readings"."reading_hz" is null or "readings"."reading_hz" > 0),
	CONSTRAINT "readings_typed_and_understood" CHECK (("readings"."reading_text" is null) = ("readings"."reading_hz" is null))
);
--> statement-breakpoint
CREATE TABLE "safety_checks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"sheet_id" uuid,
	"safety_class" "safety_class" NOT NULL,
	"earth_bond_milliohm" integer,
	"insulation_kilohm" integer,
	"insulation_test_volts" integer,
	"leakage_microamp" integer,
	"lead_and_plug" "check_result" NOT NULL,
	"fuse" "check_result" NOT NULL,
	"polarity" "check_result" NOT NULL,
	"visual" "check_result" NOT NULL,
	"earth_bond_limit_milliohm" integer NOT NULL,
	"insulation_limit_kilohm" integer NOT NULL,
	"leakage_limit_microamp" integer NOT NULL,
	"limits_origin" text NOT NULL,
	"passed" boolean NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"instrument_id" uuid,
	"done_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "safety_checks_not_negative" CHECK (coalesce("safety_checks"."earth_bond_milliohm", 0) >= 0 and coalesce("safety_checks"."insulation_kilohm", 0) >= 0 and coalesce("safety_checks"."leakage_microamp", 0) >= 0)
);
--> statement-breakpoint
CREATE TABLE "sheet_checks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"sheet_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"name" text NOT NULL,
	"result" "check_result" DEFAULT 'not_done' NOT NULL,
	"note" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "test_sheet_instruments" (
	"sheet_id" uuid NOT NULL,
	"instrument_id" uuid NOT NULL,
	CONSTRAINT "test_sheet_instruments_pkey" PRIMARY KEY("sheet_id","instrument_id")
);
--> statement-breakpoint
CREATE TABLE "test_sheets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"tested_on" date NOT NULL,
	"warm_up_minutes" integer,
	"supply" text DEFAULT '' NOT NULL,
	"ambient_celsius" numeric(5, 1),
	"note" text DEFAULT '' NOT NULL,
	"tested_by" uuid NOT NULL,
	"signed_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "test_sheets_warm_up" CHECK ("test_sheets"."warm_up_minutes" is null or "test_sheets"."warm_up_minutes" between 0 and 100000)
);
--> statement-breakpoint
CREATE TABLE "triages" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"safety_class" "safety_class" NOT NULL,
	"lead" "fitting_condition" NOT NULL,
	"plug" "fitting_condition" NOT NULL,
	"fuse" "fitting_condition" NOT NULL,
	"fuse_rating" text DEFAULT '' NOT NULL,
	"voltage_setting" text DEFAULT '' NOT NULL,
	"hazards" "hazard"[] DEFAULT '{}' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"verdict" "triage_verdict" NOT NULL,
	"done_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "publications" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"token" text NOT NULL,
	"published_by" uuid NOT NULL,
	"published_at" timestamp with time zone DEFAULT now() NOT NULL,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "sales" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"unit_id" uuid NOT NULL,
	"buyer_id" uuid NOT NULL,
	"price_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"sold_on" date NOT NULL,
	"frozen_sheet" jsonb NOT NULL,
	"sold_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"undone_at" timestamp with time zone,
	CONSTRAINT "sales_price_not_negative" CHECK ("sales"."price_minor" >= 0)
);
--> statement-breakpoint
CREATE TABLE "ledger" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "ledger_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"subject" "ledger_subject" NOT NULL,
	"subject_id" uuid NOT NULL,
	"unit_id" uuid,
	"event" text NOT NULL,
	"details" jsonb NOT NULL,
	"person_id" uuid,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "ledger_unit_is_subject" CHECK (("ledger"."subject" = 'unit') = ("ledger"."unit_id" is not null))
);
--> statement-breakpoint
ALTER TABLE "access_tokens" ADD CONSTRAINT "access_tokens_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locations" ADD CONSTRAINT "locations_parent_id_locations_id_fk" FOREIGN KEY ("parent_id") REFERENCES "public"."locations"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "bands" ADD CONSTRAINT "bands_model_id_models_id_fk" FOREIGN KEY ("model_id") REFERENCES "public"."models"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "model_kit_items" ADD CONSTRAINT "model_kit_items_model_id_models_id_fk" FOREIGN KEY ("model_id") REFERENCES "public"."models"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "holds" ADD CONSTRAINT "holds_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "holds" ADD CONSTRAINT "holds_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit_coverage" ADD CONSTRAINT "unit_coverage_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit_disclosures" ADD CONSTRAINT "unit_disclosures_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unit_disclosures" ADD CONSTRAINT "unit_disclosures_answered_by_people_id_fk" FOREIGN KEY ("answered_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "units" ADD CONSTRAINT "units_model_id_models_id_fk" FOREIGN KEY ("model_id") REFERENCES "public"."models"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "units" ADD CONSTRAINT "units_location_id_locations_id_fk" FOREIGN KEY ("location_id") REFERENCES "public"."locations"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "units" ADD CONSTRAINT "units_source_party_id_parties_id_fk" FOREIGN KEY ("source_party_id") REFERENCES "public"."parties"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "units" ADD CONSTRAINT "units_booked_in_by_people_id_fk" FOREIGN KEY ("booked_in_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "modifications" ADD CONSTRAINT "modifications_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "modifications" ADD CONSTRAINT "modifications_logged_by_people_id_fk" FOREIGN KEY ("logged_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "documents" ADD CONSTRAINT "documents_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "documents" ADD CONSTRAINT "documents_model_id_models_id_fk" FOREIGN KEY ("model_id") REFERENCES "public"."models"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "documents" ADD CONSTRAINT "documents_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_added_by_people_id_fk" FOREIGN KEY ("added_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "photos" ADD CONSTRAINT "photos_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "photos" ADD CONSTRAINT "photos_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "photos" ADD CONSTRAINT "photos_modification_id_modifications_id_fk" FOREIGN KEY ("modification_id") REFERENCES "public"."modifications"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kept_with_items" ADD CONSTRAINT "kept_with_items_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kept_with_items" ADD CONSTRAINT "kept_with_items_kit_item_id_model_kit_items_id_fk" FOREIGN KEY ("kit_item_id") REFERENCES "public"."model_kit_items"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kept_with_items" ADD CONSTRAINT "kept_with_items_location_id_locations_id_fk" FOREIGN KEY ("location_id") REFERENCES "public"."locations"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "kept_with_items" ADD CONSTRAINT "kept_with_items_packed_by_people_id_fk" FOREIGN KEY ("packed_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD CONSTRAINT "safety_checks_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD CONSTRAINT "safety_checks_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD CONSTRAINT "safety_checks_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD CONSTRAINT "safety_checks_done_by_people_id_fk" FOREIGN KEY ("done_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sheet_checks" ADD CONSTRAINT "sheet_checks_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheet_instruments" ADD CONSTRAINT "test_sheet_instruments_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheet_instruments" ADD CONSTRAINT "test_sheet_instruments_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD CONSTRAINT "test_sheets_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD CONSTRAINT "test_sheets_tested_by_people_id_fk" FOREIGN KEY ("tested_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "triages" ADD CONSTRAINT "triages_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "triages" ADD CONSTRAINT "triages_done_by_people_id_fk" FOREIGN KEY ("done_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "publications" ADD CONSTRAINT "publications_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "publications" ADD CONSTRAINT "publications_published_by_people_id_fk" FOREIGN KEY ("published_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_buyer_id_parties_id_fk" FOREIGN KEY ("buyer_id") REFERENCES "public"."parties"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_sold_by_people_id_fk" FOREIGN KEY ("sold_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "ledger" ADD CONSTRAINT "ledger_unit_id_units_id_fk" FOREIGN KEY ("unit_id") REFERENCES "public"."units"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "ledger" ADD CONSTRAINT "ledger_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "access_tokens_hash_key" ON "access_tokens" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "access_tokens_person_idx" ON "access_tokens" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "people_email_key" ON "people" USING btree ("email");--> statement-breakpoint
CREATE INDEX "sessions_person_idx" ON "sessions" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "locations_tag_key" ON "locations" USING btree ("tag");--> statement-breakpoint
CREATE UNIQUE INDEX "locations_name_key" ON "locations" USING btree (coalesce("parent_id", '00000000-0000-0000-0000-000000000000'::uuid),lower("name"));--> statement-breakpoint
CREATE INDEX "locations_parent_idx" ON "locations" USING btree ("parent_id");--> statement-breakpoint
CREATE UNIQUE INDEX "bands_position_key" ON "bands" USING btree ("model_id","position");--> statement-breakpoint
CREATE INDEX "model_kit_items_model_idx" ON "model_kit_items" USING btree ("model_id");--> statement-breakpoint
CREATE UNIQUE INDEX "models_name_key" ON "models" USING btree (lower("maker"),lower("designation"));--> statement-breakpoint
CREATE UNIQUE INDEX "holds_one_standing" ON "holds" USING btree ("unit_id") WHERE "holds"."released_at" is null;--> statement-breakpoint
CREATE INDEX "unit_coverage_ranges_idx" ON "unit_coverage" USING gist ("ranges");--> statement-breakpoint
CREATE UNIQUE INDEX "units_tag_key" ON "units" USING btree ("tag");--> statement-breakpoint
CREATE INDEX "units_model_idx" ON "units" USING btree ("model_id");--> statement-breakpoint
CREATE INDEX "units_state_idx" ON "units" USING btree ("state","created_at");--> statement-breakpoint
CREATE INDEX "units_location_idx" ON "units" USING btree ("location_id");--> statement-breakpoint
CREATE INDEX "units_created_idx" ON "units" USING btree ("created_at","id");--> statement-breakpoint
CREATE INDEX "modifications_unit_idx" ON "modifications" USING btree ("unit_id","created_at");--> statement-breakpoint
CREATE INDEX "documents_unit_idx" ON "documents" USING btree ("unit_id");--> statement-breakpoint
CREATE INDEX "documents_model_idx" ON "documents" USING btree ("model_id");--> statement-breakpoint
CREATE INDEX "files_sha256_idx" ON "files" USING btree ("sha256");--> statement-breakpoint
CREATE INDEX "photos_unit_idx" ON "photos" USING btree ("unit_id");--> statement-breakpoint
CREATE INDEX "photos_modification_idx" ON "photos" USING btree ("modification_id");--> statement-breakpoint
CREATE UNIQUE INDEX "kept_with_items_tag_key" ON "kept_with_items" USING btree ("tag");--> statement-breakpoint
CREATE INDEX "kept_with_items_unit_idx" ON "kept_with_items" USING btree ("unit_id");--> statement-breakpoint
CREATE UNIQUE INDEX "instruments_tag_key" ON "instruments" USING btree ("tag");--> statement-breakpoint
CREATE UNIQUE INDEX "readings_position_key" ON "readings" USING btree ("sheet_id","position");--> statement-breakpoint
CREATE INDEX "safety_checks_unit_idx" ON "safety_checks" USING btree ("unit_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "sheet_checks_position_key" ON "sheet_checks" USING btree ("sheet_id","position");--> statement-breakpoint
CREATE INDEX "test_sheet_instruments_instrument_idx" ON "test_sheet_instruments" USING btree ("instrument_id");--> statement-breakpoint
CREATE UNIQUE INDEX "test_sheets_number_key" ON "test_sheets" USING btree ("unit_id","number");--> statement-breakpoint
CREATE INDEX "triages_unit_idx" ON "triages" USING btree ("unit_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "publications_token_key" ON "publications" USING btree ("token");--> statement-breakpoint
CREATE UNIQUE INDEX "publications_one_standing" ON "publications" USING btree ("unit_id") WHERE "publications"."revoked_at" is null;--> statement-breakpoint
CREATE UNIQUE INDEX "sales_one_standing" ON "sales" USING btree ("unit_id") WHERE "sales"."undone_at" is null;--> statement-breakpoint
CREATE INDEX "sales_sold_on_idx" ON "sales" USING btree ("sold_on");--> statement-breakpoint
CREATE INDEX "ledger_unit_idx" ON "ledger" USING btree ("unit_id","id");--> statement-breakpoint
CREATE INDEX "ledger_subject_idx" ON "ledger" USING btree ("subject","subject_id","id");
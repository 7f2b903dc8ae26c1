CREATE TYPE "public"."decision_rule" AS ENUM('simple', 'guard_band');--> statement-breakpoint
CREATE TYPE "public"."quantity" AS ENUM('frequency', 'voltage', 'current', 'resistance', 'capacitance', 'inductance', 'power', 'level', 'power_level', 'percent', 'duration');--> statement-breakpoint
CREATE TYPE "public"."section" AS ENUM('dial', 'output_level', 'attenuator', 'modulation', 'meter', 'timebase', 'vertical', 'component_range', 'rail', 'voltage_chart', 'other');--> statement-breakpoint
CREATE TYPE "public"."measurement_path" AS ENUM('supply', 'oscillator', 'output', 'modulator', 'signal', 'sweep', 'meter', 'nothing_measured');--> statement-breakpoint
CREATE TYPE "public"."found_error_kind" AS ENUM('percent', 'ppm', 'absolute', 'decibel', 'not_known');--> statement-breakpoint
CREATE TYPE "public"."recall_outcome" AS ENUM('stands', 'stands_corrected', 'measure_again', 'buyer_told', 'accepted');--> statement-breakpoint
CREATE TABLE "drift_readings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"sheet_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"minutes" numeric(9, 2) NOT NULL,
	"reading_text" text NOT NULL,
	"reading_value" numeric NOT NULL,
	CONSTRAINT "drift_readings_minutes" CHECK ("drift_readings"."minutes" >= 0)
);
--> statement-breakpoint
CREATE TABLE "procedure_checkpoints" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"version_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"section" "section" NOT NULL,
	"band_label" text DEFAULT '' NOT NULL,
	"label" text DEFAULT '' NOT NULL,
	"quantity" "quantity" NOT NULL,
	"at_hz" bigint,
	"nominal" numeric,
	"span" numeric,
	"limit_spec" jsonb
);
--> statement-breakpoint
CREATE TABLE "procedure_versions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"model_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"origin" text DEFAULT '' NOT NULL,
	"why" text DEFAULT '' NOT NULL,
	"warm_up_minutes" integer,
	"supply" text DEFAULT '' NOT NULL,
	"decision_rule" "decision_rule" NOT NULL,
	"guard_factor" numeric(4, 2) NOT NULL,
	"made_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "procedure_versions_guard_factor" CHECK ("procedure_versions"."guard_factor" between 0 and 3)
);
--> statement-breakpoint
CREATE TABLE "calibrations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"instrument_id" uuid NOT NULL,
	"calibrated_on" date,
	"due_on" date,
	"certificate_number" text DEFAULT '' NOT NULL,
	"laboratory" text DEFAULT '' NOT NULL,
	"traceable_to" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"file_id" uuid,
	"entered_by" uuid,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_because" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "calibrations_due_after" CHECK (num_nonnulls("calibrations"."calibrated_on", "calibrations"."due_on") > 0 and ("calibrations"."due_on" is null or "calibrations"."calibrated_on" is null or "calibrations"."due_on" > "calibrations"."calibrated_on")),
	CONSTRAINT "calibrations_withdrawn_says_why" CHECK (("calibrations"."withdrawn_at" is null) = ("calibrations"."withdrawn_because" is null))
);
--> statement-breakpoint
CREATE TABLE "instrument_capabilities" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"instrument_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"label" text DEFAULT '' NOT NULL,
	"quantity" "quantity" NOT NULL,
	"lower" numeric NOT NULL,
	"upper" numeric NOT NULL,
	"percent_of_reading" numeric,
	"percent_of_range" numeric,
	"digits" numeric,
	"digit_step" numeric,
	"ppm" numeric,
	"ageing_ppm_per_year" numeric,
	"gate_seconds" numeric,
	"decibels" numeric,
	CONSTRAINT "instrument_capabilities_range_in_order" CHECK ("instrument_capabilities"."lower" >= 0 and "instrument_capabilities"."lower" <= "instrument_capabilities"."upper")
);
--> statement-breakpoint
CREATE TABLE "instrument_recall_sheets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"recall_id" uuid NOT NULL,
	"sheet_id" uuid NOT NULL,
	"outcome" "recall_outcome",
	"note" text DEFAULT '' NOT NULL,
	"decided_by" uuid,
	"decided_at" timestamp with time zone,
	CONSTRAINT "instrument_recall_sheets_decided" CHECK (num_nonnulls("instrument_recall_sheets"."outcome", "instrument_recall_sheets"."decided_by", "instrument_recall_sheets"."decided_at") in (0, 3))
);
--> statement-breakpoint
CREATE TABLE "instrument_recalls" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"instrument_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"found_on" date NOT NULL,
	"good_on" date,
	"quantity" "quantity",
	"error_kind" "found_error_kind" NOT NULL,
	"error_amount" numeric,
	"why" text NOT NULL,
	"started_by" uuid NOT NULL,
	"closed_at" timestamp with time zone,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "instrument_recalls_amount_is_said" CHECK (("instrument_recalls"."error_kind" = 'not_known') = ("instrument_recalls"."error_amount" is null)),
	CONSTRAINT "instrument_recalls_days_in_order" CHECK ("instrument_recalls"."good_on" is null or "instrument_recalls"."good_on" <= "instrument_recalls"."found_on")
);
--> statement-breakpoint
ALTER TABLE "readings" ALTER COLUMN "band_label" SET DEFAULT '';--> statement-breakpoint
ALTER TABLE "shop" ADD COLUMN "decision_rule" "decision_rule" DEFAULT 'guard_band' NOT NULL;--> statement-breakpoint
ALTER TABLE "shop" ADD COLUMN "guard_factor" numeric(4, 2) DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "modifications" ADD COLUMN "touches" "measurement_path"[];--> statement-breakpoint
ALTER TABLE "modifications" ADD COLUMN "affects_nothing_because" text;--> statement-breakpoint
ALTER TABLE "photos" ADD COLUMN "reading_id" uuid;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "section" "section";--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "label" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "quantity" "quantity";--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "at_hz" bigint;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "nominal" numeric;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "span" numeric;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "limit_spec" jsonb;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "found_text" text;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "found_value" numeric;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "left_text" text;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "left_value" numeric;--> statement-breakpoint
ALTER TABLE "readings" ADD COLUMN "signed_results" jsonb;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD COLUMN "fuse_rating" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "safety_checks" ADD COLUMN "reservoir_microfarad" numeric(12, 4);--> statement-breakpoint
ALTER TABLE "safety_checks" ADD COLUMN "bleeder_kilohm" numeric(12, 4);--> statement-breakpoint
ALTER TABLE "safety_checks" ADD COLUMN "reservoir_volts" integer;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "procedure_version_id" uuid;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "deviations" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "decision_rule" "decision_rule" DEFAULT 'simple' NOT NULL;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "guard_factor" numeric(4, 2) DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "drift_label" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "drift_quantity" "quantity" DEFAULT 'frequency' NOT NULL;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD COLUMN "signed_by" uuid;--> statement-breakpoint
ALTER TABLE "drift_readings" ADD CONSTRAINT "drift_readings_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "procedure_checkpoints" ADD CONSTRAINT "procedure_checkpoints_version_id_procedure_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."procedure_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "procedure_versions" ADD CONSTRAINT "procedure_versions_model_id_models_id_fk" FOREIGN KEY ("model_id") REFERENCES "public"."models"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "procedure_versions" ADD CONSTRAINT "procedure_versions_made_by_people_id_fk" FOREIGN KEY ("made_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_file_id_files_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "calibrations" ADD CONSTRAINT "calibrations_entered_by_people_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_capabilities" ADD CONSTRAINT "instrument_capabilities_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_recall_sheets" ADD CONSTRAINT "instrument_recall_sheets_recall_id_instrument_recalls_id_fk" FOREIGN KEY ("recall_id") REFERENCES "public"."instrument_recalls"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_recall_sheets" ADD CONSTRAINT "instrument_recall_sheets_sheet_id_test_sheets_id_fk" FOREIGN KEY ("sheet_id") REFERENCES "public"."test_sheets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_recall_sheets" ADD CONSTRAINT "instrument_recall_sheets_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_recalls" ADD CONSTRAINT "instrument_recalls_instrument_id_instruments_id_fk" FOREIGN KEY ("instrument_id") REFERENCES "public"."instruments"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instrument_recalls" ADD CONSTRAINT "instrument_recalls_started_by_people_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "drift_readings_position_key" ON "drift_readings" USING btree ("sheet_id","position");--> statement-breakpoint
CREATE UNIQUE INDEX "procedure_checkpoints_position_key" ON "procedure_checkpoints" USING btree ("version_id","position");--> statement-breakpoint
CREATE UNIQUE INDEX "procedure_versions_number_key" ON "procedure_versions" USING btree ("model_id","number");--> statement-breakpoint
CREATE INDEX "calibrations_instrument_idx" ON "calibrations" USING btree ("instrument_id","calibrated_on");--> statement-breakpoint
CREATE UNIQUE INDEX "instrument_capabilities_position_key" ON "instrument_capabilities" USING btree ("instrument_id","position");--> statement-breakpoint
CREATE UNIQUE INDEX "instrument_recall_sheets_key" ON "instrument_recall_sheets" USING btree ("recall_id","sheet_id");--> statement-breakpoint
CREATE INDEX "instrument_recall_sheets_sheet_idx" ON "instrument_recall_sheets" USING btree ("sheet_id");--> statement-breakpoint
CREATE UNIQUE INDEX "instrument_recalls_number_key" ON "instrument_recalls" USING btree ("instrument_id","number");--> statement-breakpoint
ALTER TABLE "photos" ADD CONSTRAINT "photos_reading_id_readings_id_fk" FOREIGN KEY ("reading_id") REFERENCES "public"."readings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD CONSTRAINT "test_sheets_procedure_version_id_procedure_versions_id_fk" FOREIGN KEY ("procedure_version_id") REFERENCES "public"."procedure_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "test_sheets" ADD CONSTRAINT "test_sheets_signed_by_people_id_fk" FOREIGN KEY ("signed_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "photos_reading_idx" ON "photos" USING btree ("reading_id");--> statement-breakpoint
CREATE INDEX "readings_instrument_idx" ON "readings" USING btree ("instrument_id");--> statement-breakpoint
ALTER TABLE "shop" ADD CONSTRAINT "shop_guard_factor" CHECK ("shop"."guard_factor" between 0 and 3);--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_found_and_understood" CHECK (("readings"."found_text" is null) = ("readings"."found_value" is null));--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_left_and_understood" CHECK (("readings"."left_text" is null) = ("readings"."left_value" is null));--> statement-breakpoint
ALTER TABLE "test_sheets" ADD CONSTRAINT "test_sheets_guard_factor" CHECK ("test_sheets"."guard_factor" between 0 and 3);
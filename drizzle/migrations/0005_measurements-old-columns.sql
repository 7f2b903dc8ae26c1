ALTER TABLE "readings" DROP CONSTRAINT "readings_setting_positive";--> statement-breakpoint
ALTER TABLE "readings" DROP CONSTRAINT "readings_value_positive";--> statement-breakpoint
ALTER TABLE "readings" DROP CONSTRAINT "readings_typed_and_understood";--> statement-breakpoint
ALTER TABLE "readings" ALTER COLUMN "section" SET NOT NULL;--> statement-breakpoint
ALTER TABLE "readings" ALTER COLUMN "quantity" SET NOT NULL;--> statement-breakpoint
ALTER TABLE "instruments" DROP COLUMN "calibrated_on";--> statement-breakpoint
ALTER TABLE "instruments" DROP COLUMN "calibration_due";--> statement-breakpoint
ALTER TABLE "instruments" DROP COLUMN "calibration_note";--> statement-breakpoint
ALTER TABLE "readings" DROP COLUMN "setting_hz";--> statement-breakpoint
ALTER TABLE "readings" DROP COLUMN "tolerance_percent";--> statement-breakpoint
ALTER TABLE "readings" DROP COLUMN "reading_text";--> statement-breakpoint
ALTER TABLE "readings" DROP COLUMN "reading_hz";
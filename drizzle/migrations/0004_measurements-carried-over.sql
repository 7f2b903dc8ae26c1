-- A dial point becomes a checkpoint of the dial: the setting is its nominal value, its tolerance a per cent of the setting.
UPDATE readings SET
  section = 'dial', quantity = 'frequency', at_hz = setting_hz, nominal = setting_hz,
  limit_spec = jsonb_build_object('kind', 'percent_of_setting', 'amount', tolerance_percent),
  found_text = reading_text, found_value = reading_hz;
--> statement-breakpoint
UPDATE test_sheets SET signed_by = tested_by WHERE signed_at IS NOT NULL;
--> statement-breakpoint
-- What an instrument's record said of its calibration becomes its first certificate.
INSERT INTO calibrations (instrument_id, calibrated_on, due_on, note)
SELECT id, calibrated_on, calibration_due, calibration_note FROM instruments
WHERE calibrated_on IS NOT NULL OR calibration_due IS NOT NULL;
--> statement-breakpoint
-- A note without a day is kept with the accuracy, so that nothing written is lost.
UPDATE instruments SET accuracy = concat_ws('; ', nullif(accuracy, ''), calibration_note)
WHERE calibrated_on IS NULL AND calibration_due IS NULL AND calibration_note <> '';

-- The ledger is append-only, whoever asks.
CREATE FUNCTION refuse_ledger_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'the ledger is append-only' USING ERRCODE = 'restrict_violation';
END $$;
--> statement-breakpoint
CREATE TRIGGER ledger_append_only BEFORE UPDATE OR DELETE ON ledger
  FOR EACH ROW EXECUTE FUNCTION refuse_ledger_change();
--> statement-breakpoint
CREATE TRIGGER ledger_never_emptied BEFORE TRUNCATE ON ledger
  FOR EACH STATEMENT EXECUTE FUNCTION refuse_ledger_change();
--> statement-breakpoint
-- A place's names from the room inwards, and the places it stands in (itself last).
CREATE VIEW location_paths AS
WITH RECURSIVE tree AS (
  SELECT id, ARRAY[name] AS names, ARRAY[id] AS ids FROM locations WHERE parent_id IS NULL
  UNION ALL
  SELECT child.id, tree.names || child.name, tree.ids || child.id
  FROM locations child JOIN tree ON child.parent_id = tree.id
)
SELECT id, names, ids, array_to_string(names, ' · ') AS path FROM tree;
--> statement-breakpoint
INSERT INTO tag_counters (kind) VALUES ('U'), ('K'), ('P'), ('L'), ('B');
--> statement-breakpoint
CREATE INDEX models_words_idx ON models USING gin ((maker || ' ' || designation) gin_trgm_ops);
--> statement-breakpoint
CREATE INDEX units_serial_idx ON units USING gin (serial gin_trgm_ops);

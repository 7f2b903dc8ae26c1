-- What moved in a drawer is never rewritten: a slip is put right by a second movement.
CREATE FUNCTION refuse_movement_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'movements of parts are append-only' USING ERRCODE = 'restrict_violation';
END $$;
--> statement-breakpoint
CREATE TRIGGER lot_movements_append_only BEFORE UPDATE OR DELETE ON lot_movements
  FOR EACH ROW EXECUTE FUNCTION refuse_movement_change();
--> statement-breakpoint
CREATE TRIGGER lot_movements_never_emptied BEFORE TRUNCATE ON lot_movements
  FOR EACH STATEMENT EXECUTE FUNCTION refuse_movement_change();
--> statement-breakpoint
-- What is in the drawer, and what it cost, is what moved in and out: checked when the transaction ends.
CREATE FUNCTION check_lot_balance() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  lot part_lots%ROWTYPE;
  moved bigint;
  cost bigint;
BEGIN
  SELECT * INTO lot FROM part_lots WHERE id = CASE TG_TABLE_NAME WHEN 'part_lots' THEN (to_jsonb(NEW) ->> 'id')::uuid ELSE (to_jsonb(NEW) ->> 'lot_id')::uuid END;
  SELECT coalesce(sum(quantity), 0), coalesce(sum(cost_minor), 0) INTO moved, cost FROM lot_movements WHERE lot_id = lot.id;
  IF moved <> lot.quantity OR (lot.cost_minor IS NOT NULL AND cost <> lot.cost_minor) THEN
    RAISE EXCEPTION 'lot % holds % costing %, but % costing % moved', lot.tag, lot.quantity, lot.cost_minor, moved, cost USING ERRCODE = 'check_violation', CONSTRAINT = 'part_lots_balance';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER part_lots_balance AFTER INSERT OR UPDATE OF quantity, cost_minor ON part_lots
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION check_lot_balance();
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER lot_movements_balance AFTER INSERT ON lot_movements
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION check_lot_balance();
--> statement-breakpoint
CREATE INDEX part_types_words_idx ON part_types USING gin ((description || ' ' || value || ' ' || rating) gin_trgm_ops);

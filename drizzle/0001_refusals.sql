-- What must never happen, refused by the database itself. Hand-written: drizzle has no schema helper for these.
CREATE EXTENSION IF NOT EXISTS btree_gist;
--> statement-breakpoint
ALTER TABLE cryostat_holds ADD CONSTRAINT cryostat_holds_no_overlap
  EXCLUDE USING gist (cryostat_id WITH =, during WITH &&);
--> statement-breakpoint
ALTER TABLE cryostat_holds ADD CONSTRAINT cryostat_holds_one_owner CHECK (num_nonnulls(run_id, closure_id) = 1);
--> statement-breakpoint
CREATE FUNCTION holdtime_hold_for_run() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'UPDATE' AND NEW.state = OLD.state AND NEW.slot = OLD.slot AND NEW.cryostat_id = OLD.cryostat_id THEN
    RETURN NULL;
  END IF;
  IF NEW.state IN ('approved', 'confirmed', 'running') THEN
    INSERT INTO cryostat_holds (cryostat_id, during, run_id) VALUES (NEW.cryostat_id, NEW.slot, NEW.id)
    ON CONFLICT (run_id) DO UPDATE SET cryostat_id = EXCLUDED.cryostat_id, during = EXCLUDED.during
      WHERE cryostat_holds.cryostat_id <> EXCLUDED.cryostat_id OR cryostat_holds.during <> EXCLUDED.during;
  ELSE
    DELETE FROM cryostat_holds WHERE run_id = NEW.id;
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER runs_hold AFTER INSERT OR UPDATE ON runs FOR EACH ROW EXECUTE FUNCTION holdtime_hold_for_run();
--> statement-breakpoint
CREATE FUNCTION holdtime_hold_for_closure() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'DELETE' THEN
    DELETE FROM cryostat_holds WHERE closure_id = OLD.id;
  ELSE
    INSERT INTO cryostat_holds (cryostat_id, during, closure_id) VALUES (NEW.cryostat_id, NEW.during, NEW.id)
    ON CONFLICT (closure_id) DO UPDATE SET cryostat_id = EXCLUDED.cryostat_id, during = EXCLUDED.during;
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER closures_hold AFTER INSERT OR UPDATE OR DELETE ON closures FOR EACH ROW EXECUTE FUNCTION holdtime_hold_for_closure();
--> statement-breakpoint
CREATE FUNCTION holdtime_guard_run_state() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NEW.state <> OLD.state AND (OLD.state || '>' || NEW.state) NOT IN (
    'draft>asked', 'asked>approved', 'asked>declined', 'asked>withdrawn', 'approved>confirmed', 'approved>lapsed',
    'approved>withdrawn', 'confirmed>running', 'confirmed>withdrawn', 'running>finished', 'finished>settled'
  ) THEN
    RAISE EXCEPTION 'a run cannot go from % to %', OLD.state, NEW.state USING ERRCODE = 'check_violation', CONSTRAINT = 'runs_life';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER runs_life BEFORE UPDATE ON runs FOR EACH ROW EXECUTE FUNCTION holdtime_guard_run_state();
--> statement-breakpoint
CREATE FUNCTION holdtime_refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'rows of % are never changed or deleted', TG_TABLE_NAME USING ERRCODE = 'check_violation', CONSTRAINT = TG_TABLE_NAME || '_immutable';
END $$;
--> statement-breakpoint
CREATE TRIGGER run_transitions_immutable BEFORE UPDATE OR DELETE ON run_transitions FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER audit_events_immutable BEFORE UPDATE OR DELETE ON audit_events FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER analyses_immutable BEFORE UPDATE OR DELETE ON analyses FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER sign_offs_immutable BEFORE UPDATE OR DELETE ON sign_offs FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER invoices_immutable BEFORE UPDATE OR DELETE ON invoices FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER invoice_lines_immutable BEFORE UPDATE OR DELETE ON invoice_lines FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER invoice_documents_immutable BEFORE UPDATE OR DELETE ON invoice_documents FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER helium_movements_immutable BEFORE UPDATE OR DELETE ON helium_movements FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE TRIGGER helium_postings_immutable BEFORE UPDATE OR DELETE ON helium_postings FOR EACH ROW EXECUTE FUNCTION holdtime_refuse_change();
--> statement-breakpoint
CREATE FUNCTION holdtime_check_balance() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  movement uuid := CASE WHEN TG_TABLE_NAME = 'helium_movements' THEN (to_jsonb(NEW) ->> 'id')::uuid ELSE (to_jsonb(NEW) ->> 'movement_id')::uuid END;
  total numeric;
  entries integer;
BEGIN
  SELECT coalesce(sum(amount_mg), 0), count(*) INTO total, entries FROM helium_postings WHERE movement_id = movement;
  IF total <> 0 OR entries < 2 THEN
    RAISE EXCEPTION 'helium movement % does not balance: % mg over % postings', movement, total, entries
      USING ERRCODE = 'check_violation', CONSTRAINT = 'helium_movements_balanced';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER helium_movements_balanced AFTER INSERT ON helium_movements
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION holdtime_check_balance();
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER helium_postings_balanced AFTER INSERT ON helium_postings
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION holdtime_check_balance();
--> statement-breakpoint
CREATE FUNCTION holdtime_number_invoice() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  next integer;
  latest timestamptz;
BEGIN
  NEW.year := extract(year FROM NEW.issued_on);
  -- The row lock on the counter makes issuing serial, so a roll-back gives its number back.
  INSERT INTO invoice_counters (series, year, last_sequence) VALUES (NEW.series, NEW.year, 1)
    ON CONFLICT (series, year) DO UPDATE SET last_sequence = invoice_counters.last_sequence + 1
    RETURNING last_sequence INTO next;
  IF NEW.sequence NOT IN (0, next) THEN
    RAISE EXCEPTION 'invoice number % would leave a gap; the next is %', NEW.sequence, next USING ERRCODE = 'check_violation', CONSTRAINT = 'invoices_no_gap';
  END IF;
  SELECT max(issued_at) INTO latest FROM invoices WHERE series = NEW.series AND year = NEW.year;
  IF latest > NEW.issued_at THEN
    RAISE EXCEPTION 'an invoice cannot be dated before the last one of its series' USING ERRCODE = 'check_violation', CONSTRAINT = 'invoices_in_date_order';
  END IF;
  NEW.sequence := next;
  NEW.number := NEW.year || '-' || lpad(next::text, 4, '0');
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER invoices_number BEFORE INSERT ON invoices FOR EACH ROW EXECUTE FUNCTION holdtime_number_invoice();
--> statement-breakpoint
CREATE FUNCTION holdtime_guard_counter() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF pg_trigger_depth() < 2 THEN
    RAISE EXCEPTION 'invoice numbers are given by inserting an invoice' USING ERRCODE = 'check_violation', CONSTRAINT = 'invoice_counters_guarded';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER invoice_counters_guarded BEFORE INSERT OR UPDATE OR DELETE ON invoice_counters FOR EACH ROW EXECUTE FUNCTION holdtime_guard_counter();
--> statement-breakpoint
CREATE FUNCTION holdtime_check_invoice_lines() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  target uuid := CASE WHEN TG_TABLE_NAME = 'invoices' THEN (to_jsonb(NEW) ->> 'id')::uuid ELSE (to_jsonb(NEW) ->> 'invoice_id')::uuid END;
  lines numeric;
  net numeric;
BEGIN
  SELECT sum(net_minor) INTO lines FROM invoice_lines WHERE invoice_id = target;
  SELECT net_minor INTO net FROM invoices WHERE id = target;
  IF lines IS DISTINCT FROM net THEN
    RAISE EXCEPTION 'the lines of invoice % add up to %, not to its net amount %', target, lines, net
      USING ERRCODE = 'check_violation', CONSTRAINT = 'invoices_lines_add_up';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER invoices_lines_add_up AFTER INSERT ON invoices
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION holdtime_check_invoice_lines();
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER invoice_lines_add_up AFTER INSERT ON invoice_lines
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION holdtime_check_invoice_lines();
--> statement-breakpoint
CREATE FUNCTION holdtime_guard_rate_card() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_TABLE_NAME = 'rate_cards' THEN
    IF OLD.issued_at IS NOT NULL THEN
      RAISE EXCEPTION 'an issued rate card never changes' USING ERRCODE = 'check_violation', CONSTRAINT = 'rate_cards_issued';
    END IF;
  ELSIF EXISTS (SELECT 1 FROM rate_cards WHERE id = (CASE WHEN TG_OP = 'DELETE' THEN OLD.rate_card_id ELSE NEW.rate_card_id END) AND issued_at IS NOT NULL) THEN
    RAISE EXCEPTION 'an issued rate card never changes' USING ERRCODE = 'check_violation', CONSTRAINT = 'rate_cards_issued';
  END IF;
  RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
END $$;
--> statement-breakpoint
CREATE TRIGGER rate_cards_issued BEFORE UPDATE OR DELETE ON rate_cards FOR EACH ROW EXECUTE FUNCTION holdtime_guard_rate_card();
--> statement-breakpoint
CREATE TRIGGER rate_card_prices_issued BEFORE INSERT OR UPDATE OR DELETE ON rate_card_prices FOR EACH ROW EXECUTE FUNCTION holdtime_guard_rate_card();
--> statement-breakpoint
-- Live updates: every process hears of a run that changed, whichever process changed it.
CREATE FUNCTION holdtime_notify_run() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  PERFORM pg_notify('holdtime_run', coalesce(to_jsonb(NEW) ->> 'run_id', to_jsonb(NEW) ->> 'id'));
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER runs_notify AFTER INSERT OR UPDATE ON runs FOR EACH ROW EXECUTE FUNCTION holdtime_notify_run();
--> statement-breakpoint
CREATE TRIGGER run_entries_notify AFTER INSERT ON run_entries FOR EACH ROW EXECUTE FUNCTION holdtime_notify_run();

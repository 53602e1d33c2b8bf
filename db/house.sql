-- Seals the house after every migration. Idempotent, and it reads the catalogue, so a new table is sealed at birth.
CREATE EXTENSION IF NOT EXISTS btree_gist;

-- Three working roles own nothing: app (web), job (worker), backup (reads everything, bypasses row security).
DO $$
DECLARE t record; has_policy boolean;
BEGIN
  EXECUTE 'REVOKE ALL ON SCHEMA public FROM PUBLIC';
  EXECUTE 'GRANT USAGE ON SCHEMA public TO vk_app, vk_job, vk_backup';
  FOR t IN
    SELECT c.relname, EXISTS (SELECT 1 FROM pg_attribute a WHERE a.attrelid = c.oid AND a.attname = 'shop_id' AND NOT a.attisdropped) AS has_shop
    FROM pg_class c WHERE c.relnamespace = 'public'::regnamespace AND c.relkind = 'r'
  LOOP
    EXECUTE format('GRANT SELECT ON %I TO vk_app, vk_job, vk_backup', t.relname);
    IF t.relname IN ('applied_steps') THEN CONTINUE; END IF;
    EXECUTE format('GRANT INSERT ON %I TO vk_app, vk_job', t.relname);
    -- Ledgers are insert-only: no role but the owner may change or remove a row.
    IF t.relname NOT IN ('audit_log', 'journal_entries', 'journal_lines', 'stock_movements', 'punches', 'approvals',
                         'inspections', 'receiving_checks', 'bench_checks', 'flow_readings', 'command_log', 'shipments',
                         'receipts', 'receipt_lines', 'flow_comparisons', 'measurements', 'epoxy_fills', 'promises') THEN
      EXECUTE format('GRANT UPDATE ON %I TO vk_app, vk_job', t.relname);
    END IF;
    IF t.relname IN ('estimate_lines', 'invoice_lines', 'kit_lines', 'purchase_order_lines', 'rate_limits', 'pay_rates') THEN
      EXECUTE format('GRANT DELETE ON %I TO vk_app, vk_job', t.relname);
    END IF;
    IF t.has_shop THEN
      EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', t.relname);
      EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', t.relname);
      SELECT EXISTS (SELECT 1 FROM pg_policies WHERE schemaname = 'public' AND tablename = t.relname AND policyname = 'one_shop') INTO has_policy;
      IF NOT has_policy THEN
        -- After a transaction-local set the setting reads as an empty string, not as unset: nullif refuses both.
        EXECUTE format($p$CREATE POLICY one_shop ON %I FOR ALL TO PUBLIC
          USING (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid)
          WITH CHECK (shop_id = nullif(current_setting('app.shop_id', true), '')::uuid)$p$, t.relname);
      END IF;
    END IF;
  END LOOP;
  EXECUTE 'GRANT USAGE, SELECT ON ALL SEQUENCES IN SCHEMA public TO vk_app, vk_job';
  -- A dump takes in the sequences and the list of migrations as well.
  EXECUTE 'GRANT SELECT ON ALL SEQUENCES IN SCHEMA public TO vk_backup';
  IF EXISTS (SELECT 1 FROM pg_namespace WHERE nspname = 'drizzle') THEN
    EXECUTE 'GRANT USAGE ON SCHEMA drizzle TO vk_backup';
    EXECUTE 'GRANT SELECT ON ALL TABLES IN SCHEMA drizzle TO vk_backup';
    EXECUTE 'GRANT SELECT ON ALL SEQUENCES IN SCHEMA drizzle TO vk_backup';
  END IF;
  EXECUTE 'REVOKE INSERT, UPDATE, DELETE ON shops FROM vk_app, vk_job';
  EXECUTE 'REVOKE INSERT ON shop_settings FROM vk_app, vk_job';
END $$;

-- Narrow doors that stand before a shop is known. Each shows only the row whose secret the caller already holds.
DROP POLICY IF EXISTS own_memberships ON people;
CREATE POLICY own_memberships ON people FOR SELECT TO PUBLIC
  USING (user_id = nullif(current_setting('app.user_id', true), '')::uuid);
DROP POLICY IF EXISTS held_token ON links;
CREATE POLICY held_token ON links FOR SELECT TO PUBLIC
  USING (token_hash = nullif(current_setting('app.link_hash', true), ''));
DROP POLICY IF EXISTS held_token ON devices;
CREATE POLICY held_token ON devices FOR SELECT TO PUBLIC
  USING (token_hash = nullif(current_setting('app.device_hash', true), '')
      OR enrol_code_hash = nullif(current_setting('app.device_hash', true), ''));
DROP POLICY IF EXISTS held_session ON payment_requests;
CREATE POLICY held_session ON payment_requests FOR SELECT TO PUBLIC
  USING (provider_session_id = nullif(current_setting('app.provider_session', true), ''));
DROP POLICY IF EXISTS held_payment ON payments;
CREATE POLICY held_payment ON payments FOR SELECT TO PUBLIC
  USING (provider_payment_id = nullif(current_setting('app.provider_session', true), ''));
-- The worker looks for ready jobs over all shops; it may lease them, then enters each job's shop to run it.
DROP POLICY IF EXISTS worker_queue ON jobs;
CREATE POLICY worker_queue ON jobs FOR ALL TO vk_job USING (true) WITH CHECK (true);

-- Insert-only, second net behind the missing grants.
CREATE OR REPLACE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN RAISE EXCEPTION 'rows of % are never changed or removed', TG_TABLE_NAME USING ERRCODE = 'VK001'; END $$;
DO $$
DECLARE t text;
BEGIN
  FOREACH t IN ARRAY ARRAY['audit_log', 'journal_entries', 'journal_lines', 'stock_movements', 'punches', 'approvals',
                           'inspections', 'receiving_checks', 'bench_checks', 'flow_readings', 'command_log', 'shipments',
                           'receipts', 'receipt_lines', 'flow_comparisons', 'measurements', 'epoxy_fills', 'promises'] LOOP
    EXECUTE format('DROP TRIGGER IF EXISTS insert_only ON %I', t);
    EXECUTE format('CREATE TRIGGER insert_only BEFORE UPDATE OR DELETE ON %I FOR EACH ROW EXECUTE FUNCTION refuse_change()', t);
    EXECUTE format('DROP TRIGGER IF EXISTS insert_only_truncate ON %I', t);
    EXECUTE format('CREATE TRIGGER insert_only_truncate BEFORE TRUNCATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', t);
  END LOOP;
END $$;

-- Every entry sums to zero, looked at when the transaction ends.
CREATE OR REPLACE FUNCTION entry_balances() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE rest bigint; n integer;
BEGIN
  SELECT coalesce(sum(amount_minor), 0), count(*) INTO rest, n FROM journal_lines WHERE shop_id = NEW.shop_id
    AND entry_id = CASE TG_TABLE_NAME WHEN 'journal_lines' THEN (to_jsonb(NEW) ->> 'entry_id')::uuid ELSE (to_jsonb(NEW) ->> 'id')::uuid END;
  IF rest <> 0 OR n < 2 THEN
    RAISE EXCEPTION 'entry does not balance: % apart over % lines', rest, n USING ERRCODE = 'VK002', CONSTRAINT = 'entry_balances';
  END IF;
  RETURN NULL;
END $$;
DROP TRIGGER IF EXISTS entry_balances ON journal_lines;
CREATE CONSTRAINT TRIGGER entry_balances AFTER INSERT ON journal_lines DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION entry_balances();
DROP TRIGGER IF EXISTS entry_balances ON journal_entries;
CREATE CONSTRAINT TRIGGER entry_balances AFTER INSERT ON journal_entries DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION entry_balances();

-- Balances follow the movements; no code path can forget them.
CREATE OR REPLACE FUNCTION keep_stock() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  -- The row is made first: an insert that proposes a negative balance would fail its own check before it met the conflict.
  INSERT INTO stock_balances (shop_id, part_id) VALUES (NEW.shop_id, NEW.part_id) ON CONFLICT DO NOTHING;
  UPDATE stock_balances SET on_hand_milli = on_hand_milli + NEW.qty_milli, value_minor = value_minor + NEW.value_minor
    WHERE shop_id = NEW.shop_id AND part_id = NEW.part_id;
  IF NEW.lot_id IS NOT NULL THEN
    UPDATE lots SET on_hand_milli = on_hand_milli + NEW.qty_milli WHERE shop_id = NEW.shop_id AND id = NEW.lot_id;
  END IF;
  RETURN NULL;
END $$;
DROP TRIGGER IF EXISTS keep_stock ON stock_movements;
CREATE TRIGGER keep_stock AFTER INSERT ON stock_movements FOR EACH ROW EXECUTE FUNCTION keep_stock();

DO $$ BEGIN
  IF NOT EXISTS (SELECT 1 FROM pg_constraint WHERE conname = 'time_no_overlap') THEN
    ALTER TABLE time_entries ADD CONSTRAINT time_no_overlap
      EXCLUDE USING gist (shop_id WITH =, person_id WITH =, clock WITH =, during WITH &&) WHERE (voided_at IS NULL);
  END IF;
  IF NOT EXISTS (SELECT 1 FROM pg_constraint WHERE conname = 'time_forward') THEN
    ALTER TABLE time_entries ADD CONSTRAINT time_forward CHECK (ended_at IS NULL OR ended_at >= started_at);
  END IF;
END $$;

-- An issued invoice is fixed: only how it was paid, credited and sent may still change.
CREATE OR REPLACE FUNCTION issued_is_fixed() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF OLD.state = 'issued' AND (NEW.state, NEW.number, NEW.kind, NEW.customer_id, NEW.issued_on, NEW.supply_on, NEW.total_minor,
      NEW.deposit_applied_minor, NEW.reference, NEW.snapshot, NEW.issued_at, NEW.terms)
     IS DISTINCT FROM (OLD.state, OLD.number, OLD.kind, OLD.customer_id, OLD.issued_on, OLD.supply_on, OLD.total_minor,
      OLD.deposit_applied_minor, OLD.reference, OLD.snapshot, OLD.issued_at, OLD.terms) THEN
    RAISE EXCEPTION 'an issued invoice is never changed' USING ERRCODE = 'VK003';
  END IF;
  RETURN NEW;
END $$;
DROP TRIGGER IF EXISTS issued_is_fixed ON invoices;
CREATE TRIGGER issued_is_fixed BEFORE UPDATE ON invoices FOR EACH ROW EXECUTE FUNCTION issued_is_fixed();
CREATE OR REPLACE FUNCTION issued_lines_are_fixed() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (SELECT 1 FROM invoices i WHERE i.shop_id = OLD.shop_id AND i.id = OLD.invoice_id AND i.state = 'issued') THEN
    RAISE EXCEPTION 'lines of an issued invoice are never changed' USING ERRCODE = 'VK003';
  END IF;
  RETURN COALESCE(NEW, OLD);
END $$;
DROP TRIGGER IF EXISTS issued_lines_are_fixed ON invoice_lines;
CREATE TRIGGER issued_lines_are_fixed BEFORE UPDATE OR DELETE ON invoice_lines FOR EACH ROW EXECUTE FUNCTION issued_lines_are_fixed();

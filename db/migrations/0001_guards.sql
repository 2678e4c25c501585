-- What the table definitions cannot say: forced row-level security, grants, counters, histories, insert-only tables and
-- the few functions that look across shops.

-- P5: the policies hold for the owner of the tables as well, so a data migration has to loop over shops.
DO $$
DECLARE
  name text;
BEGIN
  FOR name IN SELECT tablename FROM pg_tables WHERE schemaname = 'public' LOOP
    EXECUTE format('ALTER TABLE public.%I FORCE ROW LEVEL SECURITY', name);
    EXECUTE format('GRANT SELECT, INSERT, UPDATE ON public.%I TO boltwalk_app', name);
  END LOOP;
END
$$;
--> statement-breakpoint
REVOKE CREATE ON SCHEMA public FROM PUBLIC;
--> statement-breakpoint
GRANT USAGE ON SCHEMA public TO boltwalk_app, boltwalk_lookup;
--> statement-breakpoint

-- Insert-only (decision 14). The grant keeps the application from trying, the trigger keeps everybody else.
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% is insert-only: % refused', TG_TABLE_NAME, TG_OP USING ERRCODE = 'BW002';
END
$$;
--> statement-breakpoint
DO $$
DECLARE
  name text;
BEGIN
  FOREACH name IN ARRAY ARRAY[
    'walk_events', 'quarantined_events', 'quarantine_settlings', 'confirmations', 'branch_choices', 'ledger', 'audit',
    'shop_policies', 'person_roles', 'wrench_history', 'pins'
  ] LOOP
    EXECUTE format('REVOKE UPDATE ON public.%I FROM boltwalk_app', name);
    EXECUTE format('CREATE TRIGGER insert_only BEFORE UPDATE OR DELETE ON public.%I FOR EACH ROW EXECUTE FUNCTION refuse_change()', name);
    EXECUTE format('CREATE TRIGGER insert_only_truncate BEFORE TRUNCATE ON public.%I FOR EACH STATEMENT EXECUTE FUNCTION refuse_change()', name);
  END LOOP;
END
$$;
--> statement-breakpoint

-- Decision 9: one counter row per shop, moved in the writing transaction. Its row lock makes the numbers appear in the
-- order of commits, so that a tablet that has read up to n misses nothing below n.
CREATE FUNCTION next_count(shop uuid, counter text) RETURNS bigint LANGUAGE sql VOLATILE AS $$
  INSERT INTO shop_counters (shop_id, name, value) VALUES (shop, counter, 1)
  ON CONFLICT (shop_id, name) DO UPDATE SET value = shop_counters.value + 1
  RETURNING value
$$;
--> statement-breakpoint
CREATE FUNCTION stamp_changed() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  NEW.changed := next_count(NEW.shop_id, 'catalogue');
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE FUNCTION stamp_shop_changed() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  NEW.changed := next_count(NEW.id, 'catalogue');
  RETURN NEW;
END
$$;
--> statement-breakpoint
DO $$
DECLARE
  name text;
BEGIN
  FOREACH name IN ARRAY ARRAY[
    'people', 'wrenches', 'procedures', 'procedure_revisions', 'jobs', 'job_joints', 'walks', 'orders', 'confirmations'
  ] LOOP
    EXECUTE format('CREATE TRIGGER stamp_changed BEFORE INSERT OR UPDATE ON public.%I FOR EACH ROW EXECUTE FUNCTION stamp_changed()', name);
  END LOOP;
END
$$;
--> statement-breakpoint
CREATE TRIGGER stamp_changed BEFORE INSERT OR UPDATE ON shops FOR EACH ROW EXECUTE FUNCTION stamp_shop_changed();
--> statement-breakpoint

-- Histories by catalogue cursor (decision 1): what the server compares an event's snapshot with.
CREATE FUNCTION keep_shop_policy() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'INSERT' OR NEW.settings IS DISTINCT FROM OLD.settings THEN
    INSERT INTO shop_policies (shop_id, since, settings) VALUES (NEW.id, NEW.changed, NEW.settings);
  END IF;
  RETURN NULL;
END
$$;
--> statement-breakpoint
CREATE TRIGGER keep_policy AFTER INSERT OR UPDATE ON shops FOR EACH ROW EXECUTE FUNCTION keep_shop_policy();
--> statement-breakpoint
CREATE FUNCTION keep_person_roles() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'INSERT' OR NEW.roles IS DISTINCT FROM OLD.roles OR NEW.state IS DISTINCT FROM OLD.state THEN
    INSERT INTO person_roles (shop_id, person_id, since, roles, state)
    VALUES (NEW.shop_id, NEW.id, NEW.changed, NEW.roles, NEW.state);
  END IF;
  RETURN NULL;
END
$$;
--> statement-breakpoint
CREATE TRIGGER keep_roles AFTER INSERT OR UPDATE ON people FOR EACH ROW EXECUTE FUNCTION keep_person_roles();
--> statement-breakpoint
CREATE FUNCTION keep_wrench_history() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'INSERT' OR NEW.snapshot IS DISTINCT FROM OLD.snapshot OR NEW.state IS DISTINCT FROM OLD.state THEN
    INSERT INTO wrench_history (shop_id, wrench_id, since, snapshot, state)
    VALUES (NEW.shop_id, NEW.id, NEW.changed, NEW.snapshot, NEW.state);
  END IF;
  RETURN NULL;
END
$$;
--> statement-breakpoint
CREATE TRIGGER keep_history AFTER INSERT OR UPDATE ON wrenches FOR EACH ROW EXECUTE FUNCTION keep_wrench_history();
--> statement-breakpoint

-- P1: nobody countersigns a walk in which they took a reading, whatever the program above has decided.
CREATE FUNCTION refuse_self_countersign() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (
    SELECT FROM walk_hands h JOIN walks w ON w.shop_id = h.shop_id AND w.id = h.walk_id
    WHERE h.shop_id = NEW.shop_id AND h.walk_id = NEW.walk_id AND h.person_id = NEW.by_person AND NOT w.shop_of_one
  ) THEN
    RAISE EXCEPTION 'countersigned by somebody who took readings' USING ERRCODE = 'BW001';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER no_self_countersign BEFORE INSERT ON walk_events FOR EACH ROW
  WHEN (NEW.type = 'walk.countersigned') EXECUTE FUNCTION refuse_self_countersign();
--> statement-breakpoint

-- An approved revision never changes, and a signed proof is made once (decision 16).
CREATE FUNCTION refuse_revision_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF OLD.state <> 'draft' AND (NEW.document IS DISTINCT FROM OLD.document OR NEW.hash <> OLD.hash OR NEW.state = 'draft') THEN
    RAISE EXCEPTION 'revision % is approved and never changes', OLD.revision USING ERRCODE = 'BW003';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER approved_stays BEFORE UPDATE ON procedure_revisions FOR EACH ROW EXECUTE FUNCTION refuse_revision_change();
--> statement-breakpoint
CREATE FUNCTION refuse_proof_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF NEW.jws <> OLD.jws OR NEW.fingerprint <> OLD.fingerprint OR NEW.number <> OLD.number OR NEW.issue <> OLD.issue
    OR NEW.head_hash <> OLD.head_hash OR NEW.public_token <> OLD.public_token THEN
    RAISE EXCEPTION 'proof % is signed and never changes', OLD.number USING ERRCODE = 'BW003';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER signed_stays BEFORE UPDATE ON proofs FOR EACH ROW EXECUTE FUNCTION refuse_proof_change();
--> statement-breakpoint

-- Decision 12: the three functions that look across shops. boltwalk_lookup owns them, bypasses row-level security and
-- nobody signs in as it; it may read no more than they ask for.
GRANT CREATE ON SCHEMA public TO boltwalk_lookup;
--> statement-breakpoint
GRANT SELECT (shop_id, id, email, state, password_hash) ON people TO boltwalk_lookup;
--> statement-breakpoint
GRANT SELECT (shop_id, next_at, done_at) ON outbox TO boltwalk_lookup;
--> statement-breakpoint
GRANT SELECT (shop_id, id, search, changed_at) ON jobs TO boltwalk_lookup;
--> statement-breakpoint
GRANT SELECT (shop_id, id, search, issued_at) ON proofs TO boltwalk_lookup;
--> statement-breakpoint
CREATE FUNCTION shops_for_email(address text) RETURNS TABLE (shop_id uuid, person_id uuid)
LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp AS $$
  SELECT p.shop_id, p.id FROM people p
  WHERE lower(p.email) = lower(address) AND p.state = 'active' AND p.password_hash IS NOT NULL
  LIMIT 20
$$;
--> statement-breakpoint
CREATE FUNCTION shops_with_outbox(moment timestamptz) RETURNS TABLE (shop_id uuid)
LANGUAGE sql STABLE SECURITY DEFINER SET search_path = public, pg_temp AS $$
  SELECT DISTINCT o.shop_id FROM outbox o WHERE o.done_at IS NULL AND o.next_at <= moment
$$;
--> statement-breakpoint
-- Decision 13: LIKE is not leakproof, so under a policy it would scan every shop. Here the shop is the first predicate,
-- taken from the setting and never from the caller.
CREATE FUNCTION search_shop(kind text, phrase text, most integer) RETURNS TABLE (id uuid)
LANGUAGE plpgsql STABLE SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE
  shop uuid := nullif(current_setting('app.shop_id', true), '')::uuid;
  pattern text := '%' || replace(replace(replace(lower(phrase), '\', '\\'), '%', '\%'), '_', '\_') || '%';
BEGIN
  IF kind = 'jobs' THEN
    RETURN QUERY SELECT j.id FROM jobs j WHERE j.shop_id = shop AND j.search LIKE pattern ORDER BY j.changed_at DESC LIMIT most;
  ELSIF kind = 'proofs' THEN
    RETURN QUERY SELECT p.id FROM proofs p WHERE p.shop_id = shop AND p.search LIKE pattern ORDER BY p.issued_at DESC LIMIT most;
  ELSE
    RAISE EXCEPTION 'search_shop knows no %', kind;
  END IF;
END
$$;
--> statement-breakpoint
CREATE EXTENSION IF NOT EXISTS pg_trgm;
--> statement-breakpoint
CREATE EXTENSION IF NOT EXISTS btree_gin;
--> statement-breakpoint
CREATE INDEX jobs_search ON jobs USING gin (shop_id, search gin_trgm_ops);
--> statement-breakpoint
CREATE INDEX proofs_search ON proofs USING gin (shop_id, search gin_trgm_ops);
--> statement-breakpoint
ALTER FUNCTION shops_for_email(text) OWNER TO boltwalk_lookup;
--> statement-breakpoint
ALTER FUNCTION shops_with_outbox(timestamptz) OWNER TO boltwalk_lookup;
--> statement-breakpoint
ALTER FUNCTION search_shop(text, text, integer) OWNER TO boltwalk_lookup;
--> statement-breakpoint
REVOKE CREATE ON SCHEMA public FROM boltwalk_lookup;
--> statement-breakpoint
REVOKE ALL ON FUNCTION shops_for_email(text), shops_with_outbox(timestamptz), search_shop(text, text, integer) FROM PUBLIC;
--> statement-breakpoint
GRANT EXECUTE ON FUNCTION shops_for_email(text), shops_with_outbox(timestamptz), search_shop(text, text, integer) TO boltwalk_app;

-- The acting group and person of the transaction, set by db/client.ts; null when unset.
CREATE FUNCTION current_group() RETURNS integer LANGUAGE sql STABLE
  AS $$ SELECT nullif(current_setting('idem.group_id', true), '')::integer $$;
--> statement-breakpoint
CREATE FUNCTION current_person() RETURNS integer LANGUAGE sql STABLE
  AS $$ SELECT nullif(current_setting('idem.person_id', true), '')::integer $$;
--> statement-breakpoint
-- The number in a cell as written: decimal point or comma, NULL for anything that is not a number.
CREATE FUNCTION cell_number(cell text) RETURNS double precision LANGUAGE sql IMMUTABLE PARALLEL SAFE
  AS $$ SELECT CASE WHEN cell ~ '^\s*[-+]?(\d{1,200}([.,]\d*)?|[.,]\d+)([eE][-+]?\d{1,2})?\s*$'
               THEN replace(cell, ',', '.')::double precision END $$;
--> statement-breakpoint
-- Second lock: every table that carries group_id shows and takes only rows of the acting group.
DO $$
DECLARE t text;
BEGIN
  FOR t IN SELECT c.relname FROM pg_class c JOIN pg_attribute a ON a.attrelid = c.oid AND a.attname = 'group_id'
           WHERE c.relnamespace = 'public'::regnamespace AND c.relkind IN ('r', 'p') AND c.relname <> 'membership'
  LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', t);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', t);
    EXECUTE format('CREATE POLICY group_rows ON %I USING (group_id = current_group()) WITH CHECK (group_id = current_group())', t);
  END LOOP;
END $$;
--> statement-breakpoint
ALTER TABLE membership ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE membership FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
CREATE POLICY own_or_group_rows ON membership
  USING (group_id = current_group() OR person_id = current_person())
  WITH CHECK (group_id = current_group());
--> statement-breakpoint
ALTER TABLE research_group ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE research_group FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
-- A person sees the groups they belong to; anybody signed in may found a new one.
CREATE POLICY own_groups ON research_group FOR SELECT
  USING (id = current_group() OR id IN (SELECT group_id FROM membership WHERE person_id = current_person()));
--> statement-breakpoint
CREATE POLICY change_acting_group ON research_group FOR UPDATE USING (id = current_group()) WITH CHECK (id = current_group());
--> statement-breakpoint
CREATE POLICY found_group ON research_group FOR INSERT WITH CHECK (id = current_group() AND current_person() IS NOT NULL);
--> statement-breakpoint
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% is append-only', TG_TABLE_NAME USING ERRCODE = '42501';
END $$;
--> statement-breakpoint
CREATE TRIGGER verdict_append_only BEFORE UPDATE OR DELETE ON verdict FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER audit_event_append_only BEFORE UPDATE OR DELETE ON audit_event FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- Sources, entries and candidates are loaded in bulk: COPY is not allowed under row-level security, and indexes are
-- built faster than they are kept up row by row. So a load goes into a table of its own, into which the application may only insert and whose check constraint fixes the group;
-- attaching makes it a partition, readable only through the parent and so under the parent's policy.
CREATE SCHEMA bulk;
--> statement-breakpoint
CREATE FUNCTION open_partition(parent text, part integer) RETURNS text
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public AS $$
DECLARE
  part_name text := parent || '_' || part;
  part_key text;
  known boolean;
BEGIN
  IF parent = 'source' THEN
    part_key := 'revision_id';
    known := EXISTS (SELECT 1 FROM public.catalogue_revision WHERE id = part AND group_id = public.current_group());
  ELSIF parent = 'entry' THEN
    part_key := 'catalogue_id';
    known := EXISTS (SELECT 1 FROM public.catalogue WHERE id = part AND group_id = public.current_group());
  ELSIF parent = 'candidate' THEN
    part_key := 'run_id';
    known := EXISTS (SELECT 1 FROM public.match_run WHERE id = part AND group_id = public.current_group());
  END IF;
  IF known IS NOT TRUE THEN
    RAISE EXCEPTION 'no % partition % for the acting group', parent, part USING ERRCODE = '42501';
  END IF;
  EXECUTE format(
    'CREATE TABLE bulk.%I (LIKE public.%I INCLUDING DEFAULTS, CHECK (%I = %s AND group_id = %s))',
    part_name, parent, part_key, part, public.current_group());
  EXECUTE format('GRANT INSERT ON bulk.%I TO idem_app', part_name);
  RETURN format('bulk.%I', part_name);
END $$;
--> statement-breakpoint
CREATE FUNCTION attach_partition(parent text, part integer) RETURNS void
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public AS $$
DECLARE
  part_name text := parent || '_' || part;
BEGIN
  IF parent NOT IN ('source', 'entry', 'candidate') THEN
    RAISE EXCEPTION 'no partitions of %', parent USING ERRCODE = '42501';
  END IF;
  EXECUTE format('REVOKE INSERT ON bulk.%I FROM idem_app', part_name);
  EXECUTE format('ALTER TABLE public.%I ATTACH PARTITION bulk.%I FOR VALUES IN (%s)', parent, part_name, part);
  EXECUTE format('ANALYZE bulk.%I', part_name);
END $$;
--> statement-breakpoint
-- A block of entry ids for a load that assigns them while it streams; gaps are harmless.
CREATE FUNCTION reserve_entry_ids(how_many integer) RETURNS bigint
  LANGUAGE plpgsql SECURITY DEFINER SET search_path = pg_catalog, public AS $$
DECLARE
  first bigint;
BEGIN
  IF how_many < 1 OR how_many > 10000000 THEN
    RAISE EXCEPTION 'how_many out of range: %', how_many USING ERRCODE = '22003';
  END IF;
  PERFORM pg_advisory_xact_lock(hashtext('reserve_entry_ids'));
  first := nextval('public.entry_id_seq');
  PERFORM setval('public.entry_id_seq', first + how_many - 1);
  RETURN first;
END $$;

-- How a table comes under guard. Called by migrations, as the owner. The definition is kept in records_guarded_table, which is itself
-- under guard: each call is an act on the chain of the house, so that a definition cannot be bent unnoticed.

CREATE OR REPLACE FUNCTION guard_table(
    name text, key text[], mode text, operator text,
    personal text[] DEFAULT '{}', hidden text[] DEFAULT '{}', closes text[] DEFAULT '{}'
) RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
DECLARE
    personal_text text[];
    personal_bytes text[];
    arguments text;
BEGIN
    PERFORM check_definition(name, key, mode, operator, personal, hidden, closes);
    SELECT coalesce(array_agg(c) FILTER (WHERE column_type(name, c) <> 'bytea'), '{}'),
           coalesce(array_agg(c) FILTER (WHERE column_type(name, c) = 'bytea'), '{}')
    INTO personal_text, personal_bytes FROM unnest(personal) AS u (c);
    arguments := format('%L, %L, %L, %L, %L, %L', key, personal_text, personal_bytes, hidden, closes, operator);

    IF cardinality(personal) > 0 THEN
        EXECUTE format('ALTER TABLE %I ALTER COLUMN salt SET NOT NULL, DROP CONSTRAINT IF EXISTS %I, '
                       'ADD CONSTRAINT %I CHECK (octet_length(salt) >= 16)', name, name || '_salt_is_long', name || '_salt_is_long');
    END IF;
    PERFORM put_trigger(name, 'witness_insert',
        format('AFTER INSERT ON %I REFERENCING NEW TABLE AS new_rows FOR EACH STATEMENT EXECUTE FUNCTION witness_insert(%s)',
               name, arguments));
    IF mode = 'append' THEN
        EXECUTE format('DROP TRIGGER IF EXISTS witness_update ON %I', name);
        PERFORM put_trigger(name, 'refuse_update',
            format('BEFORE UPDATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_write()', name));
    ELSE
        EXECUTE format('DROP TRIGGER IF EXISTS refuse_update ON %I', name);
        PERFORM put_trigger(name, 'witness_update',
            format('AFTER UPDATE ON %I REFERENCING OLD TABLE AS old_rows NEW TABLE AS new_rows '
                   'FOR EACH STATEMENT EXECUTE FUNCTION witness_update(%s)', name, arguments));
    END IF;
    PERFORM put_refusals(name, '{DELETE,TRUNCATE}');
    PERFORM grant_rights(name, CASE mode
        WHEN 'append' THEN 'SELECT, INSERT'
        WHEN 'edit' THEN 'SELECT, INSERT, UPDATE'
        ELSE format('SELECT, INSERT, UPDATE (%s)', (SELECT string_agg(quote_ident(c), ', ') FROM unnest(closes) AS u (c))) END);
    PERFORM keep_definition(name, mode, key, personal_text, personal_bytes, hidden, closes, operator, '');
END $$;

-- A table that is not under guard, with the reason. `rights` is what the service role gets.
CREATE OR REPLACE FUNCTION exempt_table(name text, reason text, rights text DEFAULT 'SELECT, INSERT, UPDATE, DELETE')
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
BEGIN
    IF coalesce(reason, '') = '' OR to_regclass('public.' || quote_ident(name)) IS NULL THEN
        RAISE EXCEPTION USING ERRCODE = 'TB006', MESSAGE = format('%L needs to exist and to have a reason', name);
    END IF;
    PERFORM grant_rights(name, rights);
    PERFORM keep_definition(name, 'exempt', '{}', '{}', '{}', '{}', '{}', '', reason);
END $$;

CREATE OR REPLACE FUNCTION column_type(of_table text, of_column text)
RETURNS text LANGUAGE sql STABLE SET search_path = public, pg_temp AS $$
    SELECT format_type(a.atttypid, NULL) FROM pg_attribute a
    WHERE a.attrelid = to_regclass('public.' || quote_ident(of_table)) AND a.attname = of_column
      AND a.attnum > 0 AND NOT a.attisdropped
$$;

CREATE OR REPLACE FUNCTION check_definition(
    name text, key text[], mode text, operator text, personal text[], hidden text[], closes text[]
) RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
DECLARE
    wrong text;
BEGIN
    SELECT CASE
        WHEN NOT EXISTS (SELECT FROM pg_class c WHERE c.oid = to_regclass('public.' || quote_ident(name)) AND c.relkind = 'r')
            THEN 'it is not an ordinary table of this schema'
        WHEN mode IS NULL OR mode NOT IN ('append', 'close-once', 'edit') THEN 'its mode is none of append, close-once, edit'
        WHEN cardinality(key) = 0 OR key IS NULL THEN 'it has no key'
        WHEN coalesce(operator, '') = '' THEN 'no column says whose rows these are'
        WHEN (mode = 'close-once') <> (cardinality(closes) > 0) THEN 'closing columns go with close-once, and only with it'
        WHEN cardinality(personal) > 0 AND column_type(name, 'salt') IS DISTINCT FROM 'bytea'
            THEN 'personal columns need a column salt of type bytea'
    END INTO wrong;
    IF wrong IS NULL THEN
        SELECT format('it has no column %I', c) INTO wrong
        FROM unnest(key || personal || hidden || closes || operator) AS u (c) WHERE column_type(name, c) IS NULL;
    END IF;
    IF wrong IS NOT NULL THEN
        RAISE EXCEPTION USING ERRCODE = 'TB006', MESSAGE = format('the table %L cannot be guarded: %s', name, wrong);
    END IF;
END $$;

CREATE OR REPLACE FUNCTION put_trigger(of_table text, called text, definition text)
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
BEGIN
    EXECUTE format('DROP TRIGGER IF EXISTS %I ON %I', called, of_table);
    EXECUTE format('CREATE TRIGGER %I %s', called, definition);
    EXECUTE format('ALTER TABLE %I ENABLE ALWAYS TRIGGER %I', of_table, called);
END $$;

CREATE OR REPLACE FUNCTION put_refusals(of_table text, operations text[])
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
DECLARE
    operation text;
BEGIN
    FOREACH operation IN ARRAY operations LOOP
        PERFORM put_trigger(of_table, 'refuse_' || lower(operation),
            format('BEFORE %s ON %I FOR EACH STATEMENT EXECUTE FUNCTION refuse_write()', operation, of_table));
    END LOOP;
END $$;

-- Exactly these rights on the table, and the use of its sequences, for the service role; nothing for anybody else.
CREATE OR REPLACE FUNCTION grant_rights(of_table text, rights text)
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
DECLARE
    sequence regclass;
BEGIN
    EXECUTE format('REVOKE ALL ON %I FROM PUBLIC, tarebook_service', of_table);
    EXECUTE format('GRANT %s ON %I TO tarebook_service', rights, of_table);
    IF rights LIKE '%INSERT%' THEN
        FOR sequence IN SELECT d.objid::regclass FROM pg_depend d JOIN pg_class c ON c.oid = d.objid AND c.relkind = 'S'
                        WHERE d.refobjid = to_regclass('public.' || quote_ident(of_table)) AND d.deptype IN ('a', 'i') LOOP
            EXECUTE format('GRANT USAGE ON SEQUENCE %s TO tarebook_service', sequence);
        END LOOP;
    END IF;
END $$;

CREATE OR REPLACE FUNCTION keep_definition(
    name text, mode text, key text[], personal text[], binary_personal text[], hidden text[], closes text[], operator text,
    reason text
) RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
BEGIN
    PERFORM act_open('house', CASE mode WHEN 'exempt' THEN 'exempt-table' ELSE 'guard-table' END, 'service', 'service:migration',
                     '', 'migration', 'table:' || name, reason);
    INSERT INTO records_guarded_table (name, mode, key, personal, binary_personal, hidden, closes, operator_column, reason,
                                       triggers, chain)
    VALUES (name, mode, key, personal, binary_personal, hidden, closes, operator, reason, trigger_definitions(name), 'house')
    ON CONFLICT ON CONSTRAINT records_guarded_table_pkey DO UPDATE SET
        mode = excluded.mode, key = excluded.key, personal = excluded.personal, binary_personal = excluded.binary_personal,
        hidden = excluded.hidden, closes = excluded.closes, operator_column = excluded.operator_column,
        reason = excluded.reason, triggers = excluded.triggers;
    SET CONSTRAINTS ALL IMMEDIATE;
    SET CONSTRAINTS records_closing_seals IMMEDIATE;
    SET CONSTRAINTS ALL DEFERRED;
END $$;

-- The guards of a table as PostgreSQL itself states them, each with its state of firing ("A": always).
CREATE OR REPLACE FUNCTION trigger_definitions(of_table text)
RETURNS text[] LANGUAGE sql STABLE SET search_path = public, pg_temp AS $$
    SELECT coalesce(array_agg(t.tgenabled::text || ' ' || pg_get_triggerdef(t.oid) ORDER BY t.tgname), '{}') FROM pg_trigger t
    WHERE t.tgrelid = to_regclass('public.' || quote_ident(of_table)) AND NOT t.tgisinternal
      AND (t.tgname LIKE 'witness\_%' OR t.tgname LIKE 'refuse\_%' OR t.tgname LIKE 'records\_%')
$$;

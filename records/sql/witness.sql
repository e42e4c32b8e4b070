-- The witnesses: AFTER, one call a statement, with transition tables, never deferrable, ENABLE ALWAYS. Each finds the open
-- act of this very transaction and leaves one row in records_change for each row written.
-- Arguments: key, personal text, personal bytes, hidden, closing columns (each an array), operator column.

CREATE OR REPLACE FUNCTION refuse_without_act(for_table text)
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
BEGIN
    RAISE EXCEPTION USING ERRCODE = 'TB001', TABLE = for_table,
        MESSAGE = format('a write to %I with no open act', for_table),
        HINT = 'Every change happens inside "with act(...)"; nothing is written after its seal.';
END $$;

-- An act writes rows of its own operator only. The house enters an operator: it may write that operator's rows as long as the
-- operator's own chain has not begun.
CREATE OR REPLACE FUNCTION check_operator(for_table text, act_chain text, row_operator text)
RETURNS void LANGUAGE plpgsql STABLE SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
    IF act_chain = row_operator
       OR act_chain = 'house' AND row_operator IS NOT NULL
          AND NOT EXISTS (SELECT FROM records_seal s WHERE s.chain = row_operator) THEN
        RETURN;
    END IF;
    RAISE EXCEPTION USING ERRCODE = 'TB003', TABLE = for_table,
        MESSAGE = format('an act of %L may not write a row of %L in %I', act_chain, row_operator, for_table);
END $$;

CREATE OR REPLACE FUNCTION witness_insert()
RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = public, pg_temp SET "TimeZone" = 'UTC' SET "DateStyle" = 'ISO, YMD' SET "IntervalStyle" = 'iso_8601'
SET bytea_output = 'hex' SET extra_float_digits = 1 AS $$
DECLARE
    act record;
    key_columns text[];
    operators text[];
    operator text;
BEGIN
    -- TG_ARGV is NULL for a trigger made without arguments: nothing may pass then.
    IF TG_NARGS IS DISTINCT FROM 6 OR TG_WHEN <> 'AFTER' OR TG_LEVEL <> 'STATEMENT' THEN
        RAISE EXCEPTION USING ERRCODE = 'TB006', MESSAGE = format('the guard of %I is not set up as it must be', TG_TABLE_NAME);
    END IF;
    -- The unsealed one, since the number alone does not tell: a restored cluster starts low again, so that an old, sealed act may
    -- carry the number of today. One that is closed waits for its seal and takes no more rows.
    SELECT a.id, a.chain INTO act FROM records_act a WHERE a.txid = pg_current_xact_id_if_assigned()
        AND NOT EXISTS (SELECT FROM records_seal s WHERE s.act_id = a.id)
        AND NOT EXISTS (SELECT FROM records_closing c WHERE c.act_id = a.id);
    IF NOT FOUND THEN
        PERFORM refuse_without_act(TG_TABLE_NAME);
    END IF;
    key_columns := TG_ARGV[0]::text[];
    -- Each row becomes JSON once, in one pass. The plain table (one key column, nothing to leave out) goes without the calls
    -- that make up most of the cost of an import of thousands of rows; tests hold both ways to the same image.
    IF cardinality(key_columns) = 1 AND TG_ARGV[1] = '{}' AND TG_ARGV[2] = '{}' AND TG_ARGV[3] = '{}' THEN
        WITH written AS MATERIALIZED (SELECT to_jsonb(n.*) AS r FROM new_rows n),
        kept AS (INSERT INTO records_change (act_id, table_name, row_key, operation, image)
                 SELECT act.id, TG_TABLE_NAME, w.r ->> key_columns[1], 'insert', w.r::text FROM written w)
        SELECT array_agg(DISTINCT w.r ->> TG_ARGV[5]) INTO operators FROM written w;
    ELSE
        WITH written AS MATERIALIZED (SELECT to_jsonb(n.*) AS r FROM new_rows n),
        kept AS (INSERT INTO records_change (act_id, table_name, row_key, operation, image)
                 SELECT act.id, TG_TABLE_NAME, row_key(w.r, key_columns), 'insert',
                        (row_image(w.r, TG_ARGV[1]::text[], TG_ARGV[2]::text[], TG_ARGV[3]::text[])
                         || hidden_words(NULL, w.r, TG_ARGV[3]::text[]))::text
                 FROM written w)
        SELECT array_agg(DISTINCT w.r ->> TG_ARGV[5]) INTO operators FROM written w;
    END IF;
    FOREACH operator IN ARRAY coalesce(operators, '{}') LOOP
        IF operator IS DISTINCT FROM act.chain THEN
            PERFORM check_operator(TG_TABLE_NAME, act.chain, operator);
        END IF;
    END LOOP;
    RETURN NULL;
END $$;

CREATE OR REPLACE FUNCTION witness_update()
RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = public, pg_temp SET "TimeZone" = 'UTC' SET "DateStyle" = 'ISO, YMD' SET "IntervalStyle" = 'iso_8601'
SET bytea_output = 'hex' SET extra_float_digits = 1 AS $$
DECLARE
    act record;
    pair record;
    closing text[];
    seen bigint := 0;
BEGIN
    IF TG_NARGS IS DISTINCT FROM 6 OR TG_WHEN <> 'AFTER' OR TG_LEVEL <> 'STATEMENT' THEN
        RAISE EXCEPTION USING ERRCODE = 'TB006', MESSAGE = format('the guard of %I is not set up as it must be', TG_TABLE_NAME);
    END IF;
    -- The unsealed one, since the number alone does not tell: a restored cluster starts low again, so that an old, sealed act may
    -- carry the number of today. One that is closed waits for its seal and takes no more rows.
    SELECT a.id, a.chain INTO act FROM records_act a WHERE a.txid = pg_current_xact_id_if_assigned()
        AND NOT EXISTS (SELECT FROM records_seal s WHERE s.act_id = a.id)
        AND NOT EXISTS (SELECT FROM records_closing c WHERE c.act_id = a.id);
    IF NOT FOUND THEN
        PERFORM refuse_without_act(TG_TABLE_NAME);
    END IF;
    closing := TG_ARGV[4]::text[];
    FOR pair IN
        SELECT o.r AS was, n.r AS became, n.k AS key
        FROM (SELECT to_jsonb(t.*) AS r, row_key(to_jsonb(t.*), TG_ARGV[0]::text[]) AS k FROM old_rows t) AS o
        JOIN (SELECT to_jsonb(t.*) AS r, row_key(to_jsonb(t.*), TG_ARGV[0]::text[]) AS k FROM new_rows t) AS n USING (k)
        ORDER BY n.k
    LOOP
        seen := seen + 1;
        PERFORM check_operator(TG_TABLE_NAME, act.chain, pair.was ->> TG_ARGV[5]),
                check_operator(TG_TABLE_NAME, act.chain, pair.became ->> TG_ARGV[5]);
        IF closing <> '{}' AND (pair.was - closing IS DISTINCT FROM pair.became - closing OR EXISTS (
            SELECT FROM unnest(closing) AS u (c) WHERE closed_once(pair.was ->> c, pair.became ->> c) IS NOT TRUE)) THEN
            RAISE EXCEPTION USING ERRCODE = 'TB005', TABLE = TG_TABLE_NAME,
                MESSAGE = format('row %s of %I may be closed once, and nothing else of it may change', pair.key, TG_TABLE_NAME);
        END IF;
        INSERT INTO records_change (act_id, table_name, row_key, operation, image)
        VALUES (act.id, TG_TABLE_NAME, pair.key, 'update',
                (row_image(pair.became, TG_ARGV[1]::text[], TG_ARGV[2]::text[], TG_ARGV[3]::text[])
                 || hidden_words(pair.was, pair.became, TG_ARGV[3]::text[]))::text);
    END LOOP;
    IF seen <> (SELECT count(*) FROM new_rows) THEN
        RAISE EXCEPTION USING ERRCODE = 'TB005', TABLE = TG_TABLE_NAME,
            MESSAGE = format('the key of a row of %I may not change', TG_TABLE_NAME);
    END IF;
    RETURN NULL;
END $$;

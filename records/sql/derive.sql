-- A table that says again, for quick reading, what guarded rows say already: triggers on those keep it, nobody else may write it, no act
-- witnesses it. `derived_by` is the query that says what must stand there, with the same columns; it stands in the register, which is
-- under guard, and reconciliation compares its answer with the table row for row.

CREATE OR REPLACE FUNCTION derive_table(called text, by_key text[], query text, because text)
RETURNS void LANGUAGE plpgsql SET search_path = public, pg_temp AS $$
BEGIN
    IF coalesce(because, '') = '' OR coalesce(query, '') = '' OR to_regclass('public.' || quote_ident(called)) IS NULL
       OR NOT EXISTS (SELECT FROM unnest(by_key)) OR EXISTS (SELECT FROM unnest(by_key) AS u (c) WHERE column_type(called, c) IS NULL) THEN
        RAISE EXCEPTION USING ERRCODE = 'TB006', MESSAGE = format('%L needs to exist and to have a key, a query and a reason', called);
    END IF;
    PERFORM grant_rights(called, 'SELECT');
    PERFORM act_open('house', 'derive-table', 'service', 'service:migration', '', 'migration', 'table:' || called, because);
    INSERT INTO records_guarded_table AS g (name, mode, key, personal, binary_personal, hidden, closes, operator_column, reason,
                                            triggers, chain, derived_by)
    VALUES (called, 'derived', by_key, '{}', '{}', '{}', '{}', '', because, trigger_definitions(called), 'house', query)
    ON CONFLICT ON CONSTRAINT records_guarded_table_pkey DO UPDATE SET
        mode = excluded.mode, key = excluded.key, reason = excluded.reason, triggers = excluded.triggers,
        derived_by = excluded.derived_by;
    SET CONSTRAINTS ALL IMMEDIATE;
    SET CONSTRAINTS records_closing_seals IMMEDIATE;
    SET CONSTRAINTS ALL DEFERRED;
END $$;

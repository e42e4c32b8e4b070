-- Who may call what. The service role may open an act and read with the reconciling functions; nobody else may call anything, and the
-- trigger functions may not be hung on a table by anybody but their owner.
DO $$
DECLARE
    ours regprocedure;
BEGIN
    FOR ours IN SELECT p.oid::regprocedure FROM pg_proc p WHERE p.pronamespace = 'public'::regnamespace AND p.proname = ANY ('{
        act_open,name_kept,salted_digest,refuse_write,row_key,row_image,hidden_words,closed_once,refuse_without_act,
        check_operator,witness_insert,witness_update,act_closes,closing_seals,entry_digest,entry_text,
        guard_table,exempt_table,derive_table,column_type,check_definition,put_trigger,put_refusals,grant_rights,keep_definition,
        trigger_definitions,access_note,access_kept_as,access_digest}'::text[]) LOOP
        EXECUTE format('REVOKE ALL ON FUNCTION %s FROM PUBLIC, tarebook_service', ours);
    END LOOP;
    FOR ours IN SELECT p.oid::regprocedure FROM pg_proc p WHERE p.pronamespace = 'public'::regnamespace AND p.proname = ANY ('{
        act_open,salted_digest,row_key,row_image,entry_digest,trigger_definitions,access_note}'::text[]) LOOP
        EXECUTE format('GRANT EXECUTE ON FUNCTION %s TO tarebook_service', ours);
    END LOOP;
END $$;

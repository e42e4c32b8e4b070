-- How an act begins. Nobody has INSERT on records_act: this function is the only way in, so an act cannot carry a false
-- transaction or a false time. Every function here pins search_path (an attacker's object must not be found first) and the
-- settings that shape text, so that the same row gives the same image in every session.
--
-- Refusals of the door, all of class TB:
--   TB001 a write with no open act            TB002 an act inside an act, or in the wrong isolation level
--   TB003 a row of another operator           TB004 a write that this table never takes
--   TB005 a change to what is fixed for good  TB006 a guard that is not set up as it must be

CREATE OR REPLACE FUNCTION act_open(
    for_chain text, of_kind text, by_kind text, by_key text, by_name text, in_capacity text,
    what_about text, why text DEFAULT '', because_of uuid DEFAULT NULL, in_request text DEFAULT '',
    OUT act_id uuid, OUT opened timestamptz
) RETURNS record LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE
    name_digest text;
BEGIN
    -- The seal reads the last link after it has the lock; a snapshot taken earlier would not see it.
    IF current_setting('transaction_isolation') <> 'read committed' THEN
        RAISE EXCEPTION USING ERRCODE = 'TB002', MESSAGE = 'an act needs a READ COMMITTED transaction';
    END IF;
    IF EXISTS (SELECT FROM records_act a WHERE a.txid = pg_current_xact_id()
               AND NOT EXISTS (SELECT FROM records_seal s WHERE s.act_id = a.id)
               AND NOT EXISTS (SELECT FROM records_closing c WHERE c.act_id = a.id)) THEN
        RAISE EXCEPTION USING ERRCODE = 'TB002', MESSAGE = format('the act %s was opened inside another act', of_kind);
    END IF;
    IF by_name <> '' THEN
        SELECT n.digest INTO name_digest FROM records_name n
        WHERE n.actor_key = by_key AND n.chain = for_chain AND n.name = convert_to(by_name, 'UTF8') ORDER BY n.id LIMIT 1;
        name_digest := coalesce(name_digest, name_kept(for_chain, by_key, by_name));
    END IF;
    act_id := uuidv7();
    opened := clock_timestamp();
    INSERT INTO records_act (id, txid, at, chain, kind, actor_kind, actor_key, name_digest, capacity, about, reason,
                             caused_by, request)
    VALUES (act_id, pg_current_xact_id(), opened, for_chain, of_kind, by_kind, by_key, name_digest, in_capacity,
            what_about, why, because_of, in_request);
END $$;

-- Keeps a name as printed under a salted digest, and returns that. The name itself stands only in records_name, where it can be
-- destroyed. Not unique on purpose: two first acts of one person must not wait for each other.
CREATE OR REPLACE FUNCTION name_kept(for_chain text, of_key text, as_printed text)
RETURNS text LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE
    printed bytea := convert_to(as_printed, 'UTF8');
    new_salt bytea := uuid_send(gen_random_uuid()) || uuid_send(gen_random_uuid());
BEGIN
    INSERT INTO records_name (chain, actor_key, name, salt, digest)
    VALUES (for_chain, of_key, printed, new_salt, salted_digest(new_salt, printed));
    RETURN salted_digest(new_salt, printed);
END $$;

CREATE OR REPLACE FUNCTION salted_digest(salt bytea, value bytea)
RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT 'sha256:' || encode(sha256(salt || value), 'hex')
$$;

-- Refuses what the table it hangs on never takes, whoever asks.
CREATE OR REPLACE FUNCTION refuse_write()
RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
    RAISE EXCEPTION USING ERRCODE = 'TB004', TABLE = TG_TABLE_NAME,
        MESSAGE = format('%s is refused: rows of %I are never changed this way', TG_OP, TG_TABLE_NAME);
END $$;

-- The seal, in two stages. A deferred trigger on records_act closes the act: it writes a row into records_closing, and from then on the
-- witnesses take no more rows for this act. The deferred trigger of that table is therefore last in the queue, after the deferred
-- foreign-key checks, and seals at commit. A seal in one stage would hold the chain's lock while a foreign-key check waits for a row
-- that another transaction holds while it waits for the chain. An act may be closed long before its transaction ends (the answer to
-- its request is kept beside it); sealed then, it would hold up the whole chain until a busy client finds the time to commit.

CREATE OR REPLACE FUNCTION act_closes()
RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
    -- Under SET CONSTRAINTS ALL IMMEDIATE the second stage would fire at once, ahead of the foreign-key checks still queued.
    SET CONSTRAINTS records_closing_seals DEFERRED;
    INSERT INTO records_closing (act_id) VALUES (NEW.id);
    RETURN NULL;
END $$;

CREATE OR REPLACE FUNCTION closing_seals()
RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER
SET search_path = public, pg_temp SET "TimeZone" = 'UTC' SET "DateStyle" = 'ISO, YMD' AS $$
DECLARE
    act records_act;
    changes text;
    last_position bigint := 0;
    last_digest text;
    entry text;
BEGIN
    SELECT a.* INTO STRICT act FROM records_act a WHERE a.id = NEW.act_id;
    SELECT coalesce(string_agg(
        '{"table":' || to_json(c.table_name)::text || ',"key":' || to_json(c.row_key)::text
        || ',"operation":' || to_json(c.operation)::text || ',"image":' || c.image || '}', ',' ORDER BY c.id), '')
    INTO changes FROM records_change c WHERE c.act_id = act.id;
    PERFORM pg_advisory_xact_lock(hashtextextended(act.chain, 4201));
    -- A new statement, so a new snapshot: it sees the link of whoever held the lock before.
    SELECT s.position, s.digest INTO last_position, last_digest FROM records_seal s
    WHERE s.chain = act.chain ORDER BY s.position DESC LIMIT 1;
    last_position := coalesce(last_position, 0) + 1;
    entry := entry_text(act, last_position, last_digest, changes);
    INSERT INTO records_seal (act_id, chain, position, previous, digest, entry)
    VALUES (act.id, act.chain, last_position, last_digest, entry_digest(entry), entry);
    DELETE FROM records_closing c WHERE c.act_id = act.id;
    RETURN NULL;
END $$;

-- SHA-256 over one zero byte and the entry exactly as stored: the leaf hash of RFC 6962 section 2.1, where the zero byte is the
-- prefix of the kind "leaf", so that the seal of an entry is also its leaf in a later tree.
CREATE OR REPLACE FUNCTION entry_digest(entry text)
RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT encode(sha256('\x00'::bytea || convert_to(entry, 'UTF8')), 'hex')
$$;

CREATE OR REPLACE FUNCTION entry_text(act records_act, at_position bigint, previous text, changes text)
RETURNS text LANGUAGE sql STABLE AS $$
    SELECT '{"schema":"tarebook.entry/1","chain":' || to_json(act.chain)::text
        || ',"position":' || at_position
        || ',"previous":' || coalesce(to_json(previous)::text, 'null')
        || ',"act":{"id":"' || act.id
        || '","at":"' || to_char(act.at AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')
        || '","kind":' || to_json(act.kind)::text
        || ',"actor":{"kind":' || to_json(act.actor_kind)::text || ',"key":' || to_json(act.actor_key)::text
        || ',"name":' || coalesce(to_json(act.name_digest)::text, 'null')
        || ',"capacity":' || to_json(act.capacity)::text
        || '},"about":' || to_json(act.about)::text
        || ',"reason":' || to_json(act.reason)::text
        || ',"caused_by":' || coalesce(to_json(act.caused_by)::text, 'null')
        || ',"request":' || to_json(act.request)::text
        || '},"changes":[' || changes || ']}'
$$;

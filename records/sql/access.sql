-- The log of sign-ins, of failures to sign in and of the use of tokens. It is apart from the acts, because strangers write it: whatever
-- they send costs at most a few rows a minute. Nobody has INSERT on records_access: access_note() is the only way in. Each row names
-- the digest of the one before it, one row of numbers without gaps a chain; once a minute an act seals the last digest.
-- No login, no address and no secret stands here: keys of people and tokens, and keyed digests of the rest.

CREATE OR REPLACE FUNCTION access_note(
    for_chain text, of_what text, by_key text, typed_digest text, from_origin text, in_request text
) RETURNS bigint LANGUAGE plpgsql SECURITY DEFINER
SET search_path = public, pg_temp SET "TimeZone" = 'UTC' SET "DateStyle" = 'ISO, YMD' AS $$
DECLARE
    what_now text;
    moment timestamptz;
    last_number bigint;
    last_digest text;
BEGIN
    -- Asked before the lock: who floods the log waits for nobody and holds up nobody.
    IF access_kept_as(for_chain, of_what, by_key) IS NULL THEN
        RETURN NULL;
    END IF;
    PERFORM pg_advisory_xact_lock(hashtextextended(for_chain, 4202));
    -- New statements, so new snapshots: they see the rows of whoever held the lock before.
    what_now := access_kept_as(for_chain, of_what, by_key);
    IF what_now IS NULL THEN
        RETURN NULL;
    END IF;
    SELECT a.number, a.digest INTO last_number, last_digest FROM records_access a
    WHERE a.chain = for_chain ORDER BY a.number DESC LIMIT 1;
    last_number := coalesce(last_number, 0) + 1;
    moment := clock_timestamp();
    INSERT INTO records_access (chain, number, at, what, key, typed, origin, request, previous, digest)
    VALUES (for_chain, last_number, moment, what_now, by_key, typed_digest, from_origin, in_request, last_digest,
            access_digest(for_chain, last_number, moment, what_now, by_key, typed_digest, from_origin, in_request, last_digest));
    RETURN last_number;
END $$;

-- What is written for an event: itself; 'more-not-listed', once an hour, when its bearer wrote too much; or nothing. The use of a token
-- is noted once in five minutes. Whoever is no person and no token (an empty key) shares one small allowance.
CREATE OR REPLACE FUNCTION access_kept_as(for_chain text, of_what text, by_key text)
RETURNS text LANGUAGE plpgsql STABLE SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE
    now_is timestamptz := clock_timestamp();
    of_minute bigint;
    of_day bigint;
    told boolean;
BEGIN
    IF of_what = 'token-used' AND EXISTS (SELECT FROM records_access a WHERE a.chain = for_chain AND a.key = by_key
            AND a.what = 'token-used' AND a.at > now_is - interval '5 minutes') THEN
        RETURN NULL;
    END IF;
    -- Each kind has its own allowance, so that no flood of failures hides the sign-in that worked in the end.
    SELECT count(*) FILTER (WHERE a.what = of_what AND a.at > now_is - interval '1 minute'),
           count(*) FILTER (WHERE a.what = of_what), coalesce(bool_or(a.what = 'more-not-listed' AND a.at > now_is - interval '1 hour'), false)
    INTO of_minute, of_day, told FROM records_access a
    WHERE a.chain = for_chain AND a.key = by_key AND a.at > now_is - interval '1 day';
    IF of_minute < 20 AND of_day < 1000 THEN
        RETURN of_what;
    END IF;
    RETURN CASE WHEN NOT told THEN 'more-not-listed' END;
END $$;

-- SHA-256 over one JSON text; its schema's name keeps it from passing for anything else that is hashed here.
CREATE OR REPLACE FUNCTION access_digest(
    for_chain text, at_number bigint, moment timestamptz, of_what text, by_key text, typed_digest text, from_origin text,
    in_request text, previous text
) RETURNS text LANGUAGE sql STABLE SET search_path = public, pg_temp AS $$
    SELECT encode(sha256(convert_to(
        '{"schema":"tarebook.access/1","chain":' || to_json(for_chain)::text
        || ',"number":' || at_number
        || ',"previous":' || coalesce(to_json(previous)::text, 'null')
        || ',"at":"' || to_char(moment AT TIME ZONE 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')
        || '","what":' || to_json(of_what)::text
        || ',"key":' || to_json(by_key)::text
        || ',"typed":' || to_json(typed_digest)::text
        || ',"origin":' || to_json(from_origin)::text
        || ',"request":' || to_json(in_request)::text || '}', 'UTF8')), 'hex')
$$;

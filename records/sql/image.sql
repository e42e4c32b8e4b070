-- What the trail keeps of a row: its key as text, and its image as JSON. Used by the witnesses and by reconciliation, so that
-- both speak of the same thing.

-- One key column: its text. Several: a JSON array of them, in the order of the definition.
CREATE OR REPLACE FUNCTION row_key(of_row jsonb, key_columns text[])
RETURNS text LANGUAGE sql IMMUTABLE AS $$
    SELECT CASE WHEN cardinality(key_columns) = 1 THEN of_row ->> key_columns[1]
           ELSE (SELECT jsonb_agg(of_row -> k ORDER BY n)::text FROM unnest(key_columns) WITH ORDINALITY AS u (k, n)) END
$$;

-- The row without what is secret, and with salted digests in place of what is personal. The salt itself is left out: with it, a
-- short name could be guessed from the digest after both were destroyed.
CREATE OR REPLACE FUNCTION row_image(of_row jsonb, personal text[], binary_personal text[], hidden text[])
RETURNS jsonb LANGUAGE sql IMMUTABLE AS $$
    SELECT CASE WHEN personal = '{}' AND binary_personal = '{}' AND hidden = '{}' THEN of_row
    ELSE of_row - personal - binary_personal - hidden - CASE WHEN personal || binary_personal = '{}' THEN '' ELSE 'salt' END
        || coalesce((SELECT jsonb_object_agg(c, salted_digest(decode(substr(of_row ->> 'salt', 3), 'hex'),
                                                              convert_to(of_row ->> c, 'UTF8')))
                     FROM unnest(personal) AS u (c)), '{}')
        || coalesce((SELECT jsonb_object_agg(c, salted_digest(decode(substr(of_row ->> 'salt', 3), 'hex'),
                                                              decode(substr(of_row ->> c, 3), 'hex')))
                     FROM unnest(binary_personal) AS u (c)), '{}')
    END
$$;

-- For hidden columns the image says only whether they changed.
CREATE OR REPLACE FUNCTION hidden_words(old_row jsonb, new_row jsonb, hidden text[])
RETURNS jsonb LANGUAGE sql IMMUTABLE AS $$
    SELECT coalesce((SELECT jsonb_object_agg(
        c, CASE WHEN old_row IS NULL OR old_row -> c IS DISTINCT FROM new_row -> c THEN 'changed' ELSE 'unchanged' END)
        FROM unnest(hidden) AS u (c)), '{}')
$$;

-- True when a column went from open to closed and nothing before the end moved: NULL or infinity to a value, or a range
-- without an upper end to one with an end and the same beginning.
CREATE OR REPLACE FUNCTION closed_once(was text, became text)
RETURNS boolean LANGUAGE sql IMMUTABLE AS $$
    SELECT coalesce(CASE
        WHEN was IS NULL OR was = 'infinity' THEN became IS NOT NULL AND became <> 'infinity'
        WHEN was ~ ',(infinity)?[)\]]$'
            THEN became !~ ',(infinity)?[)\]]$' AND split_part(was, ',', 1) = split_part(became, ',', 1)
        END, false)
$$;

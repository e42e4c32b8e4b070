"""Attacks on the trail, one a row: what is done, by whom, and what must then be said.

Each starts from a sound database: chain "kt" with entries 1 to 12, each a thing noted by person 7, entry n
writing the thing with number 100 + n; entries 3, 6 and 9 also write the person with that number. Statements
run as the superuser or the owner, one after the other. They strike at a place drawn anew for each trial:
`<p>` is that place, `<q>`, `<r>` and `<s>` the three after it, `<id>` the thing of that place, `<t>` a place
that wrote a person.
"""

from dataclasses import dataclass, replace
from random import Random

OFF = "ALTER TABLE {0} DISABLE TRIGGER USER"
SEAL_OFF, SEAL_ON = "ALTER TABLE records_seal DISABLE TRIGGER USER", "SELECT enable_always('records_seal')"
CHANGE_OFF, CHANGE_ON = (
    "ALTER TABLE records_change DISABLE TRIGGER USER",
    "SELECT enable_always('records_change')",
)
ACT_OFF, ACT_ON = "ALTER TABLE records_act DISABLE TRIGGER USER", "SELECT enable_always('records_act')"
THING_OFF, THING_ON = (
    "ALTER TABLE scratch_thing DISABLE TRIGGER USER",
    "SELECT enable_always('scratch_thing')",
)


@dataclass(frozen=True)
class Attack:
    """One attack with its verdict: `names` must stand in what verify says first, `says` in how it is put."""

    description: str
    statements: tuple[str, ...]
    names: str
    says: str
    by: str = "superuser"

    def drawn(self, seed: int) -> "Attack":
        """This function will return the attack at the place this seed draws."""
        random = Random(f"{seed} {self.description}")
        place, person = random.randint(2, 9), random.choice((3, 6, 9))
        tokens = {
            "<p>": place,
            "<q>": place + 1,
            "<r>": place + 2,
            "<s>": place + 3,
            "<id>": 100 + place,
            "<t>": person,
        }

        def filled(words: str) -> str:
            for token, value in tokens.items():
                words = words.replace(token, str(value))
            return words

        return replace(
            self, statements=tuple(filled(one) for one in self.statements), names=filled(self.names)
        )


ATTACKS = (
    Attack(
        "edit: a word inside a sealed entry is replaced",
        (
            SEAL_OFF,
            "UPDATE records_seal SET entry = replace(entry, 'thing <p>', 'thing S') "
            "WHERE chain='kt' AND position=<p>",
            SEAL_ON,
        ),
        "chain kt, entry <p>",
        "the digest of the stored entry",
    ),
    Attack(
        "edit: an entry is replaced and its digest made to fit",
        (
            SEAL_OFF,
            "UPDATE records_seal SET entry = replace(entry, 'thing <p>', 'thing S') "
            "WHERE chain='kt' AND position=<p>",
            "UPDATE records_seal SET digest = entry_digest(entry) WHERE chain='kt' AND position=<p>",
            SEAL_ON,
        ),
        "chain kt, entry <q>",
        "the link to the entry before",
    ),
    Attack(
        "edit: an entry and every link after it are made anew, rows and changes left as they were",
        (SEAL_OFF, "SELECT chain_anew('kt', <p>, 'thing <p>', 'thing S')", SEAL_ON),
        "chain kt, entry <p>",
        "the changes of the act",
    ),
    Attack(
        "edit: a change is altered behind its sealed entry",
        (
            CHANGE_OFF,
            "UPDATE records_change SET image = replace(image, 'thing <p>', 'thing S') WHERE row_key = '<id>'",
            CHANGE_ON,
        ),
        "chain kt, entry <p>",
        "the changes of the act",
    ),
    Attack(
        "edit: an act is laid at somebody else's door",
        (ACT_OFF, "UPDATE records_act SET actor_key = 'person:9' WHERE id = act_at('kt', <p>)", ACT_ON),
        "chain kt, entry <p>",
        "actor of the act",
    ),
    Attack(
        "edit: a kept name is replaced",
        (
            "ALTER TABLE records_name DISABLE TRIGGER USER",
            "UPDATE records_name SET name = 'S. Omebody' WHERE actor_key = 'person:7'",
            "SELECT enable_always('records_name')",
        ),
        "name ",
        "the digest of a name",
    ),
    Attack(
        "delete: an entry in the middle is taken out",
        (SEAL_OFF, "DELETE FROM records_seal WHERE chain='kt' AND position=<p>", SEAL_ON),
        "chain kt, entry <p>",
        "the place in the chain",
    ),
    Attack(
        "delete: the first entry is taken out",
        (SEAL_OFF, "DELETE FROM records_seal WHERE chain='kt' AND position=1", SEAL_ON),
        "chain kt, entry 1",
        "the place in the chain",
    ),
    Attack(
        "delete: the tail is cut off, its rows left",
        (SEAL_OFF, "DELETE FROM records_seal WHERE chain='kt' AND position=12", SEAL_ON),
        "act ",
        "its seal",
    ),
    Attack(
        "delete: the tail is cut off with its act and changes, the rows left",
        (SEAL_OFF, ACT_OFF, CHANGE_OFF, "SELECT cut_tail('kt', 12)", SEAL_ON, ACT_ON, CHANGE_ON),
        "row 12 of scratch_person",
        "it was never witnessed",
    ),
    Attack(
        "delete: the middle is taken out and the rest moved up, links as they were",
        (
            SEAL_OFF,
            "DELETE FROM records_seal WHERE chain='kt' AND position=<p>",
            "UPDATE records_seal SET position = position + 1000 WHERE chain='kt' AND position > <p>",
            "UPDATE records_seal SET position = position - 1001 WHERE chain='kt' AND position > 1000",
            SEAL_ON,
        ),
        "chain kt, entry <p>",
        "the link to the entry before",
    ),
    Attack(
        "swap: two neighbours change places",
        (
            SEAL_OFF,
            "UPDATE records_seal SET position = 1000 WHERE chain='kt' AND position=<p>",
            "UPDATE records_seal SET position = <p> WHERE chain='kt' AND position=<q>",
            "UPDATE records_seal SET position = <q> WHERE chain='kt' AND position=1000",
            SEAL_ON,
        ),
        "chain kt, entry <p>",
        "the link to the entry before",
    ),
    Attack(
        "swap: the texts of two entries change places",
        (
            SEAL_OFF,
            "UPDATE records_seal a SET entry = b.entry, digest = b.digest FROM records_seal b "
            "WHERE a.chain='kt' AND b.chain='kt' AND (a.position, b.position) IN ((<p>, <s>), (<s>, <p>))",
            SEAL_ON,
        ),
        "chain kt, entry <p>",
        "position inside the entry",
    ),
    Attack(
        "insert: a forged entry is put in the middle, the rest moved down",
        (
            SEAL_OFF,
            "UPDATE records_seal SET position = position + 1000 WHERE chain='kt' AND position > <p>",
            "SELECT forge('kt', <q>)",
            "UPDATE records_seal SET position = position - 999 WHERE chain='kt' AND position > 1000",
            SEAL_ON,
        ),
        "chain kt, entry <r>",
        "the link to the entry before",
    ),
    Attack(
        "insert: a forged entry is put at the end, of an act that never was",
        (SEAL_OFF, "SELECT forge('kt', 13)", SEAL_ON),
        "chain kt, entry 13",
        "the act it seals",
    ),
    Attack(
        "insert: a change is slipped under an old act",
        (
            CHANGE_OFF,
            "INSERT INTO records_change (act_id, table_name, row_key, operation, image) "
            "VALUES (act_at('kt', <p>), 'scratch_thing', '999', 'insert', '{}')",
            CHANGE_ON,
        ),
        "chain kt, entry <p>",
        "the changes of the act",
    ),
    Attack(
        "disable a trigger: a row is edited with its guards off, and they are put on again",
        (THING_OFF, "UPDATE scratch_thing SET what = 'thing S' WHERE id = <id>", THING_ON),
        "row <id> of scratch_thing, last witnessed by chain kt, entry <p>",
        "it differs in what",
        by="owner",
    ),
    Attack(
        "disable a trigger: a row is taken out with its guards off, and they are put on again",
        (
            THING_OFF,
            "ALTER TABLE scratch_part DISABLE TRIGGER USER",
            "DELETE FROM scratch_thing WHERE id = <id>",
            "SELECT enable_always('scratch_part')",
            THING_ON,
        ),
        "row <id> of scratch_thing, last witnessed by chain kt, entry <p>",
        "it is gone",
        by="owner",
    ),
    Attack(
        "disable a trigger: a row is added with its guards off, and they are put on again",
        (
            THING_OFF,
            "INSERT INTO scratch_thing (id, operator_id, what) VALUES (999, 'kt', 'thing S')",
            THING_ON,
        ),
        "row 999 of scratch_thing",
        "it was never witnessed",
        by="owner",
    ),
    Attack(
        "disable a trigger: a personal value is replaced with its guards off, salt and all",
        (
            "ALTER TABLE scratch_person DISABLE TRIGGER USER",
            "UPDATE scratch_person SET name = 'S. Omebody' WHERE id = <t>",
            "SELECT enable_always('scratch_person')",
        ),
        "row <t> of scratch_person, last witnessed by chain kt, entry <t>",
        "it differs in name",
        by="owner",
    ),
    Attack(
        "disable a trigger: a session in replica mode, to which ordinary triggers are deaf",
        (
            "SET session_replication_role = replica",
            "SELECT write_or_say('UPDATE scratch_thing SET what = ''x''')",
        ),
        "refused TB004",
        "",
    ),
    Attack(
        "disable a trigger: it stays off",
        ("ALTER TABLE scratch_thing DISABLE TRIGGER witness_insert",),
        "guards",
        "The guard witness_insert of scratch_thing is not enabled always",
        by="owner",
    ),
    Attack(
        "disable a trigger: it is put on again, but not always",
        ("ALTER TABLE scratch_thing DISABLE TRIGGER USER", "ALTER TABLE scratch_thing ENABLE TRIGGER USER"),
        "guards",
        "is not enabled always",
        by="owner",
    ),
    Attack(
        "disable a trigger: it is dropped",
        ("DROP TRIGGER refuse_delete ON scratch_thing",),
        "guards",
        "The guard refuse_delete of scratch_thing is missing",
        by="owner",
    ),
    Attack(
        "disable a trigger: it is dropped and the register made to agree",
        (
            "DROP TRIGGER refuse_delete ON scratch_thing",
            "ALTER TABLE records_guarded_table DISABLE TRIGGER USER",
            "UPDATE records_guarded_table SET triggers = trigger_definitions(name) "
            "WHERE name = 'scratch_thing'",
            "SELECT enable_always('records_guarded_table')",
        ),
        "row scratch_thing of records_guarded_table",
        "it differs in triggers",
        by="owner",
    ),
    Attack(
        "disable a trigger: it is made anew with a condition that never holds",
        (
            "DROP TRIGGER refuse_delete ON scratch_thing",
            "CREATE TRIGGER refuse_delete BEFORE DELETE ON scratch_thing "
            "FOR EACH STATEMENT WHEN (false) EXECUTE FUNCTION refuse_write()",
            "ALTER TABLE scratch_thing ENABLE ALWAYS TRIGGER refuse_delete",
        ),
        "guards",
        "The guard refuse_delete of scratch_thing is missing or was changed",
        by="owner",
    ),
    Attack(
        "disable a trigger: its function is made to do nothing",
        (
            "CREATE OR REPLACE FUNCTION refuse_write() RETURNS trigger "
            "LANGUAGE plpgsql AS 'BEGIN RETURN NULL; END'",
        ),
        "guards",
        "The body of the function refuse_write() is not that of the file",
        by="owner",
    ),
    Attack(
        "disable a trigger: the function loses its pinned settings",
        ("ALTER FUNCTION witness_insert() RESET ALL",),
        "guards",
        "The function witness_insert() runs with other rights or settings",
        by="owner",
    ),
    Attack(
        "past the guards: a rule turns writes into nothing",
        ("CREATE RULE quiet AS ON INSERT TO scratch_thing DO INSTEAD NOTHING",),
        "guards",
        "has a rewrite rule",
        by="owner",
    ),
    Attack(
        "past the guards: a new table in no list",
        ("CREATE TABLE side_door (id int)",),
        "guards",
        "The table side_door is in no list",
        by="owner",
    ),
    Attack(
        "past the guards: the service role is given what it must not have",
        ("GRANT DELETE ON scratch_thing TO tarebook_service",),
        "guards",
        "The role tarebook_service may DELETE on scratch_thing",
        by="owner",
    ),
    Attack(
        "past the guards: the service role may make temporary tables",
        ("SELECT grant_temporary()",),
        "guards",
        "may make temporary tables",
    ),
)

# Tools of the attacker, made in the same transaction and gone with it.
TOOLS = """
CREATE SCHEMA attacker;
CREATE FUNCTION attacker.enable_always(t text) RETURNS void LANGUAGE plpgsql AS $$
DECLARE g record; BEGIN
    FOR g IN SELECT tgname FROM pg_trigger WHERE tgrelid = t::regclass AND NOT tgisinternal LOOP
        EXECUTE format('ALTER TABLE %I ENABLE ALWAYS TRIGGER %I', t, g.tgname); END LOOP; END $$;
CREATE FUNCTION attacker.act_at(c text, p bigint) RETURNS uuid LANGUAGE sql AS
    'SELECT act_id FROM records_seal WHERE chain = c AND position = p';
CREATE FUNCTION attacker.chain_anew(c text, p bigint, was text, becomes text) RETURNS void
LANGUAGE plpgsql AS $$
DECLARE s record; old_digest text; new_digest text; BEGIN
    UPDATE records_seal SET entry = replace(entry, was, becomes) WHERE chain = c AND position = p;
    FOR s IN SELECT * FROM records_seal WHERE chain = c AND position >= p ORDER BY position LOOP
        IF new_digest IS NOT NULL THEN
            UPDATE records_seal SET previous = new_digest, entry = replace(entry, old_digest, new_digest)
            WHERE chain = c AND position = s.position; END IF;
        old_digest := s.digest;
        UPDATE records_seal SET digest = entry_digest(entry) WHERE chain = c AND position = s.position
            RETURNING digest INTO new_digest; END LOOP; END $$;
CREATE FUNCTION attacker.cut_tail(c text, p bigint) RETURNS void LANGUAGE plpgsql AS $$
DECLARE a uuid := attacker.act_at(c, p); BEGIN
    DELETE FROM records_seal WHERE act_id = a; DELETE FROM records_change WHERE act_id = a;
    DELETE FROM records_act WHERE id = a; END $$;
CREATE FUNCTION attacker.forge(c text, p bigint) RETURNS void LANGUAGE plpgsql AS $$
DECLARE a records_act; before text; body text; BEGIN
    SELECT digest INTO before FROM records_seal WHERE chain = c AND position = p - 1;
    SELECT * INTO a FROM records_act WHERE id = attacker.act_at(c, 2);
    a.id := uuidv7(); a.reason := 'forged';
    body := entry_text(a, p, before, '');
    INSERT INTO records_seal VALUES (a.id, c, p, before, entry_digest(body), body); END $$;
CREATE FUNCTION attacker.write_or_say(statement text) RETURNS void LANGUAGE plpgsql AS $$
BEGIN EXECUTE statement; EXCEPTION WHEN OTHERS THEN RAISE EXCEPTION 'refused %', SQLSTATE; END $$;
CREATE FUNCTION attacker.grant_temporary() RETURNS void LANGUAGE plpgsql AS $$
BEGIN EXECUTE format('GRANT TEMPORARY ON DATABASE %I TO tarebook_service', current_database()); END $$;
SET search_path = public, attacker;
GRANT USAGE ON SCHEMA attacker TO tarebook_owner;
"""

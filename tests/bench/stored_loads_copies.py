"""Copies of loads in great number, for the measurement of stored loads alone: written past every guard."""

from typing import Any, Final

AIRCRAFT: Final = tuple(f"Q9-B{number:02d}" for number in range(20))

# One departs every quarter of an hour, up to three days from now: with more loads the past is longer, not
# fuller. Of those to come one in three is outside; of those gone one in fifty was outside and withdrawn, and
# the rest has departed, each with its manifest's number.
_MADE: Final = """
CREATE TEMP TABLE made AS
SELECT i, uuidv7() AS id, uuidv7() AS assessment, uuidv7() AS act, %(aircraft)s::uuid[] AS fleet,
       now() + interval '3 days' - (%(count)s - i) * interval '15 minutes' AS departure,
       CASE WHEN i > %(count)s - 288 AND i %% 3 = 0 THEN 'reject'
            WHEN i > %(count)s - 288 THEN 'open'
            WHEN i %% 50 = 0 THEN 'withdrawn' ELSE 'departed' END AS kind
FROM generate_series(1, %(count)s) i
"""
_LOADS: Final = """
INSERT INTO loads_load (id, configuration, reference, leg, departure, departure_text, origin, destination,
    operation, submitted_at, aircraft_id, operator_id, pilot_id)
SELECT m.id, t.configuration, 'FT-' || lpad(m.i::text, 7, '0'), 1, m.departure, t.departure_text, t.origin,
    t.destination, t.operation, m.departure - interval '1 day', m.fleet[1 + m.i %% cardinality(m.fleet)],
    t.operator_id, t.pilot_id
FROM made m, loads_load t WHERE t.id = %(within)s;
INSERT INTO loads_declaration (load_id, body, salt, operator_id)
SELECT m.id, t.body, t.salt, t.operator_id FROM made m, loads_declaration t WHERE t.load_id = %(within)s;
INSERT INTO loads_assessment (id, number, verdict, result, salt, digest, engine, assessed_at, empty_weight_id,
    loading_basis_id, operator_id, load_id, provisions)
SELECT m.assessment, 1, t.verdict, t.result, t.salt, t.digest, t.engine, m.departure - interval '1 day',
    t.empty_weight_id, t.loading_basis_id, t.operator_id, m.id, t.provisions
FROM made m, loads_assessment t
WHERE t.load_id = CASE WHEN m.kind IN ('reject', 'withdrawn') THEN %(outside)s ELSE %(within)s END::uuid;
"""
_STEPS: Final = """
INSERT INTO loads_step (number, before, after, previous, reason, at, departed_at, act, assessment_id, load_id,
    operator_id, person_id)
SELECT s.number, s.before, s.after, nullif(s.number - 1, 0),
    CASE s.after WHEN 'withdrawn' THEN 'off' ELSE '' END, m.departure - interval '1 day',
    CASE s.after WHEN 'departed' THEN m.departure END, m.act, m.assessment, m.id, %(operator)s, %(person)s
FROM made m JOIN (VALUES
    (1, '', 'open', '{open,reject,withdrawn,departed}'::text[]), (2, 'open', 'withdrawn', '{withdrawn}'),
    (2, 'open', 'prepared', '{departed}'), (3, 'prepared', 'accepted', '{departed}'),
    (4, 'accepted', 'departed', '{departed}')) s (number, before, after, kinds) ON m.kind = ANY (s.kinds);
INSERT INTO loads_paper (load_id, number, previous, act, operator_id)
SELECT m.id, row_number() OVER (ORDER BY m.i), nullif(row_number() OVER (ORDER BY m.i) - 1, 0), m.act,
    %(operator)s
FROM made m WHERE m.kind = 'departed';
"""
_TRAIL: Final = """
INSERT INTO records_act (id, at, chain, kind, actor_kind, actor_key, name_digest, capacity, about, reason,
    request, txid)
SELECT m.act, m.departure, %(operator)s, 'submit-load', t.actor_kind, t.actor_key, t.name_digest, t.capacity,
    'load:' || m.id, '', '', '1'
FROM made m, records_act t WHERE t.about = 'load:' || %(within)s AND t.kind = 'submit-load';
INSERT INTO records_seal (act_id, chain, position, previous, digest, entry)
SELECT m.act, %(operator)s, h.position + m.i, repeat('0', 64), encode(sha256(m.act::text::bytea), 'hex'),
    h.entry
FROM made m, (SELECT position, entry FROM records_seal WHERE chain = %(operator)s
    ORDER BY position DESC LIMIT 1) h;
"""


def copy_loads(people: Any, count: int) -> None:
    """This function will submit one load within and one outside, and write `count` copies of them."""
    from fleet.models import Aircraft
    from loads.actions.submit_load import submit_load
    from tests import databases
    from tests.cast import actor
    from tests.loads.making import load_document, outside_document

    preparer = actor(people.preparer)
    within = submit_load(load_document(people, aircraft=AIRCRAFT[0]), by=preparer).load
    outside = submit_load(outside_document(people) | {"aircraft": AIRCRAFT[0]}, by=preparer).load
    values = {
        "count": count,
        "aircraft": [str(one.pk) for one in Aircraft.objects.order_by("registration")],
        "within": str(within.id),
        "outside": str(outside.id),
        "operator": people.operator.code,
        "person": people.pilot.pk,
    }
    with databases.connect("superuser") as admin, admin.cursor() as cursor:
        cursor.execute("SET session_replication_role = replica")
        cursor.execute("SELECT tgrelid::regclass::text, tgname FROM pg_trigger WHERE tgenabled = 'A'")
        always = cursor.fetchall()
        for table, trigger in always:
            cursor.execute(f'ALTER TABLE {table} DISABLE TRIGGER "{trigger}"')
        for statements in (_MADE, _LOADS, _STEPS, _TRAIL):
            for statement in filter(str.strip, statements.split(";\n")):
                cursor.execute(statement, values)
        # The triggers that keep it were off: what must stand there is asked of the register.
        cursor.execute("SELECT derived_by FROM records_guarded_table WHERE name = 'loads_present'")
        ((derived_by,),) = cursor.fetchall()
        cursor.execute(
            "INSERT INTO loads_present (load_id, operator_id, aircraft_id, departure, step_id, number, "
            f"state, assessment_id, verdict, rejected) SELECT * FROM ({derived_by}) one ORDER BY departure "
            "ON CONFLICT DO NOTHING"  # in the order in which loads come in
        )
        for table, trigger in always:
            cursor.execute(f'ALTER TABLE {table} ENABLE ALWAYS TRIGGER "{trigger}"')
        cursor.execute("VACUUM ANALYZE")

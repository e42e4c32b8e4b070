"""What stands now of each load: kept by every step, written by nobody, and a false row found and named."""

import pytest
from django.db import DatabaseError, connection, connections, transaction

from loads.actions.assess_again import assess_again
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.acts import SUBMIT_LOAD
from loads.models import Present, Step
from records.act import act
from records.derived import false_rows
from records.guard import missing_guards
from records.reconcile import reconcile
from tests.cast import actor, cast
from tests.loads.late import BAG, bounded, change_of, changed
from tests.loads.making import accepted, load_document, outside_document, submitted
from tests.makers import make_aircraft, make_basis, make_empty_weight, ready_aircraft

COLUMNS = (
    "load_id, operator_id, aircraft_id, departure, step_id, number, state, assessment_id, verdict, rejected"
)


@pytest.fixture
def people(db):
    made = cast()
    ready_aircraft(made)
    return made


def standing(load) -> tuple[str, int, str, bool]:
    row = Present.objects.get(load_id=load)
    assert row.step == Step.objects.filter(load_id=load).order_by("-number").first()
    assert row.assessment_id == row.step.assessment_id
    return row.state, row.number, row.verdict, row.rejected


def test_a_load_stands_where_its_last_step_left_it(people) -> None:
    current = submitted(people)
    begun = standing(current.load.id)
    gone = withdraw_load(current.load.id, seen="1", reason="not flown", by=actor(people.preparer))

    assert begun == ("open", 1, "within", False)
    assert standing(gone.load.id) == ("withdrawn", 2, "within", False)
    assert list(false_rows()) == []


def test_a_revision_moves_both_loads(people) -> None:
    first = submit_load(outside_document(people), by=actor(people.preparer))
    begun = standing(first.load.id)
    second = revise_load(
        first.load.id, load_document(people), reason="lighter", seen="1", by=actor(people.preparer)
    )

    assert begun == ("open", 1, "outside", True)
    assert standing(first.load.id) == ("superseded", 2, "outside", True)
    assert standing(second.load.id) == ("open", 1, "within", False)
    assert list(false_rows()) == []


def test_a_load_that_was_rejected_once_stays_known_as_such(people) -> None:
    aircraft = make_aircraft(people, "Q9-NEW")
    first = submitted(people, aircraft="Q9-NEW")
    begun = standing(first.load.id)
    make_basis(people, aircraft)
    make_empty_weight(people, aircraft)
    assess_again(first.load.id, seen="1", by=actor(people.preparer))

    assert begun == ("open", 1, "unresolved", True)
    assert standing(first.load.id) == ("open", 2, "within", True)
    assert list(false_rows()) == []


def test_a_last_minute_change_brings_its_assessment(people) -> None:
    bounded(people)
    current = accepted(people)
    late = changed(people, current, change_of(BAG))

    assert standing(current.load.id) == ("accepted", late.step.number, "within", False)
    assert Present.objects.get(load=current.load).assessment_id == late.assessment.id
    assert list(false_rows()) == []


@pytest.mark.parametrize(
    "statement",
    [
        f"INSERT INTO loads_present ({COLUMNS}) SELECT {COLUMNS} FROM loads_present",
        "UPDATE loads_present SET state = 'open'",
        "DELETE FROM loads_present",
        "TRUNCATE loads_present",
        "SELECT step_moves_present()",
    ],
)
def test_the_service_has_no_right_to_write_it(people, statement) -> None:
    submitted(people)

    with pytest.raises(DatabaseError) as refused, transaction.atomic(), connection.cursor() as cursor:
        cursor.execute(statement)

    assert refused.value.__cause__.sqlstate == "42501"


def test_steps_out_of_their_order_are_refused(people) -> None:
    current = submitted(people)
    same = "now(), %(act)s, %(assessment)s, %(load)s, %(operator)s, %(person)s"
    later = (
        "INSERT INTO loads_step (number, before, after, previous, reason, at, act, assessment_id, load_id, "
        f"operator_id, person_id) VALUES (3, 'prepared', 'withdrawn', 2, 'off', {same}), "
        f"(2, 'open', 'prepared', 1, '', {same})"
    )

    with (
        pytest.raises(DatabaseError) as refused,
        act(SUBMIT_LOAD, by=actor(people.preparer), about="load:test") as entry,
        connection.cursor() as cursor,
    ):
        values = {
            "act": entry.id,
            "assessment": current.assessment.id,
            "load": current.load.id,
            "operator": current.load.operator_id,
            "person": people.preparer.id,
        }
        cursor.execute(later, values)

    assert refused.value.__cause__.diag.constraint_name == "steps_are_written_in_their_order"


@pytest.fixture(scope="module")
def two_loads(own_database):
    made = cast("present-air")
    ready_aircraft(made)
    outside = submit_load(outside_document(made), by=actor(made.preparer))
    return submitted(made).load.id, outside.load.id


def found_after(*statements: str, by: str = "superuser") -> list[tuple[str, str]]:
    """What reconciliation finds after these statements of the owner, all of it taken back."""
    with transaction.atomic(using=by):
        with connections[by].cursor() as cursor:
            for statement in statements:
                cursor.execute(statement)
        found = [(one.where, one.what) for one in reconcile(by)]
        transaction.set_rollback(True, using=by)
    return found


@pytest.mark.usefixtures("two_loads")
def test_untouched_all_is_sound() -> None:
    assert found_after() == []
    assert missing_guards() == ()


def test_a_false_state_is_found_and_named(two_loads) -> None:
    load, _ = two_loads

    found = found_after(f"UPDATE loads_present SET state = 'withdrawn' WHERE load_id = '{load}'", by="owner")

    assert found == [(f"row {load} of loads_present", "it differs in state from the rows it follows from")]


def test_a_reject_made_to_look_within_is_found_and_named(two_loads) -> None:
    _, load = two_loads
    false = "UPDATE loads_present SET verdict = 'within', rejected = false WHERE load_id = '{}'"

    found = found_after(false.format(load), by="owner")

    assert found == [
        (f"row {load} of loads_present", "it differs in rejected, verdict from the rows it follows from")
    ]


def test_a_row_that_was_taken_out_is_found_and_named(two_loads) -> None:
    load, _ = two_loads

    found = found_after(f"DELETE FROM loads_present WHERE load_id = '{load}'", by="owner")

    assert found == [(f"row {load} of loads_present", "it is missing")]


@pytest.mark.usefixtures("two_loads")
def test_a_row_of_no_load_is_found_and_named() -> None:
    load = "01a20000-0000-7000-8000-000000000001"
    others = COLUMNS.removeprefix("load_id, ")
    forged = f"INSERT INTO loads_present ({COLUMNS}) SELECT '{load}', {others} FROM loads_present LIMIT 1"

    found = found_after(forged, by="owner")

    assert found == [(f"row {load} of loads_present", "it follows from no guarded row")]


def test_a_trigger_switched_off_while_a_step_was_written_is_found_by_its_row(two_loads) -> None:
    load, _ = two_loads
    step = (
        "INSERT INTO loads_step (number, before, after, previous, reason, at, act, assessment_id, load_id, "
        "operator_id) SELECT 2, 'open', 'withdrawn', 1, 'off', now(), act_id, assessment_id, load_id, "
        f"operator_id FROM loads_present, opened WHERE load_id = '{load}'"
    )
    opening = (
        "WITH o AS (SELECT act_id FROM act_open('present-air', 'withdraw-load', 'service', 'service:x', '', "
        f"'', 'load:{load}')) SELECT act_id INTO TEMPORARY opened FROM o"
    )

    found = found_after(
        "ALTER TABLE loads_step DISABLE TRIGGER step_moves_present",
        opening,
        step,
        "SET CONSTRAINTS ALL IMMEDIATE; SET CONSTRAINTS records_closing_seals IMMEDIATE",
        "ALTER TABLE loads_step ENABLE ALWAYS TRIGGER step_moves_present",
    )

    where, what = found[0]
    assert where == f"row {load} of loads_present"
    assert what == "it differs in number, state, step_id from the rows it follows from"


@pytest.mark.usefixtures("two_loads")
def test_another_query_in_the_register_is_found_and_named() -> None:
    found = found_after(
        "ALTER TABLE records_guarded_table DISABLE TRIGGER USER",
        "UPDATE records_guarded_table SET derived_by = 'SELECT * FROM loads_present' WHERE mode = 'derived'",
        "DO $$ DECLARE g record; BEGIN FOR g IN SELECT tgname FROM pg_trigger WHERE NOT tgisinternal "
        "AND tgrelid = 'records_guarded_table'::regclass LOOP EXECUTE format('ALTER TABLE "
        "records_guarded_table ENABLE ALWAYS TRIGGER %I', g.tgname); END LOOP; END $$",
        by="owner",
    )

    (where, what), *rest = found
    assert where.startswith("row loads_present of records_guarded_table, last witnessed by chain house")
    assert what == "it differs in derived_by"
    assert rest == []


@pytest.mark.usefixtures("two_loads")
def test_a_right_to_write_it_is_named() -> None:
    found = found_after("GRANT UPDATE ON loads_present TO tarebook_service", by="owner")

    assert found == [("guards", "The role tarebook_service may UPDATE on loads_present.")]

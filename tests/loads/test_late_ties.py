"""Below the models: what the database itself refuses of last-minute changes, notes and notices."""

from decimal import Decimal

import pytest
from django.db import DatabaseError, connection, transaction
from django.utils import timezone

from loads.acts import CHANGE_LATE
from loads.models import Assessment, LateChange, Note, Signature, StaleNotice, Step
from records.act import act
from tests.cast import actor, cast, strangers
from tests.loads.late import BAG, again, bounded, change_of, changed
from tests.loads.making import accepted, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db
NOW = timezone.now()


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    bounded(made)
    return made


def _broken(people, write):
    """Do a write inside an act and return the name of the tie that refused it."""
    with (
        pytest.raises(DatabaseError) as refused,
        act(CHANGE_LATE, by=actor(people.pilot), about="load:test") as entry,
    ):
        write(entry)
    return refused.value.__cause__.diag.constraint_name


def _assessment(current, **changes):
    """The same assessment once more, as another row."""
    row = Assessment.objects.get(pk=current.assessment.pk)
    row.pk, row.number = None, row.number + 1
    row._state.adding = True
    for name, value in changes.items():
        setattr(row, name, value)
    row.save(force_insert=True)
    return row


def _step(current, entry, assessment, **changes):
    fields = {
        "operator_id": current.load.operator_id,
        "load": current.load,
        "number": current.step.number + 1,
        "before": current.state,
        "after": "accepted",
        "previous": current.step.number,
        "assessment": assessment,
        "person_id": current.load.pilot_id,
        "at": NOW,
        "act": entry.id,
    }
    return Step.objects.create(**(fields | changes))


def _signature(step):
    return Signature.objects.create(
        operator_id=step.operator_id,
        load=step.load,
        assessment=step.assessment,
        step=step,
        person_id=step.person_id,
        meaning="accepted",
        capacity="test",
        statement="test",
        digest=step.assessment.digest,
        name=b"R. Amani",
        salt=b"x" * 32,
        signed_at=NOW,
        means="session",
    )


def _change(step, entry, **changes):
    fields = {
        "step": step,
        "operator_id": step.operator_id,
        "load": step.load,
        "number": 1,
        "previous": None,
        "assessment": step.assessment,
        "person_id": step.person_id,
        "lines": "[]",
        "body": b"{}",
        "salt": b"x" * 32,
        "settings_number": 1,
        "kilograms_moved": Decimal(1),
        "kilograms_bound": Decimal("90.718474"),
        "persons_moved": 0,
        "persons_bound": 1,
        "changed_at": NOW,
        "act": entry.id,
    }
    return LateChange.objects.create(**(fields | changes))


def _whole(current, entry, step_changes=None, **changes):
    step = _step(current, entry, _assessment(current), **(step_changes or {}))
    _signature(step)
    return _change(step, entry, **changes)


def test_the_rows_of_a_change_are_taken_when_they_fit(people) -> None:
    current = accepted(people)

    with act(CHANGE_LATE, by=actor(people.pilot), about="load:test") as entry:
        _whole(current, entry)

    assert LateChange.objects.get().taken == "accepted"


@pytest.mark.parametrize(
    ("changes", "tie"),
    [
        ({"kilograms_moved": Decimal("90.718474000001")}, "late_change_is_within_its_bound"),
        ({"kilograms_moved": Decimal(0)}, "late_change_is_within_its_bound"),
        ({"persons_moved": 2}, "late_change_is_within_its_bound"),
        ({"kilograms_bound": Decimal(91)}, "late_change_keeps_the_settings_bound"),
        ({"persons_bound": 2}, "late_change_keeps_the_settings_bound"),
        ({"settings_number": 7}, "late_change_keeps_a_bound_of_its_operator"),
        ({"number": 2, "previous": None}, "late_change_follows_the_one_before"),
        ({"number": 2, "previous": 1}, "late_changes_have_no_gaps"),
    ],
)
def test_a_change_keeps_bound_and_order(people, changes, tie) -> None:
    current = accepted(people)

    assert _broken(people, lambda entry: _whole(current, entry, **changes)) == tie


def test_what_moved_is_added_up(people) -> None:
    current = again(changed(people, accepted(people), change_of(BAG)))
    less = {"number": 2, "previous": 1, "kilograms_moved": Decimal(9)}

    assert _broken(people, lambda entry: _whole(current, entry, **less)) == "late_change_adds_to_the_sum"


def test_only_the_loads_pilot_changes_it(people) -> None:
    current = accepted(people)
    other = {"person_id": people.other_pilot.pk}

    tie = _broken(people, lambda entry: _whole(current, entry, step_changes=other))

    assert tie == "step_of_acceptance_is_the_pilots"


def test_a_change_is_by_who_took_its_step(people) -> None:
    current = accepted(people)

    tie = _broken(people, lambda entry: _whole(current, entry, person_id=people.other_pilot.pk))

    assert tie == "late_change_is_the_steps"


def test_a_load_is_not_accepted_again_without_a_change(people) -> None:
    current = accepted(people)

    def write(entry):
        _signature(_step(current, entry, _assessment(current)))

    assert _broken(people, write) == "step_of_a_late_change_says_what_changed"


def test_a_changed_load_is_signed(people) -> None:
    current = accepted(people)

    def write(entry):
        _change(_step(current, entry, _assessment(current)), entry)

    assert _broken(people, write) == "step_is_signed"


def test_a_load_that_is_outside_is_not_accepted_again(people) -> None:
    current = accepted(people)

    def write(entry):
        _signature(_step(current, entry, _assessment(current, verdict="outside")))

    assert _broken(people, write) == "signature_is_under_what_was_shown"


def test_an_acceptance_is_no_last_minute_change(people) -> None:
    current = accepted(people)
    first = current.step

    def write(entry):
        _change(first, entry, act=first.act)

    assert _broken(people, write) == "late_change_starts_from_accepted"


def test_a_departure_brings_no_assessment(people) -> None:
    current = accepted(people)

    def write(entry):
        _step(current, entry, _assessment(current), after="departed", departed_at=NOW)

    assert _broken(people, write) == "step_keeps_the_assessment"


def _note(current, entry, **changes):
    fields = {
        "operator_id": current.load.operator_id,
        "load": current.load,
        "person_id": current.load.pilot_id,
        "text": "x",
        "salt": b"x" * 32,
        "written_at": NOW,
        "act": entry.id,
    }
    return Note.objects.create(**(fields | changes))


def test_a_note_is_on_a_departed_load_of_its_operator(people) -> None:
    current, stranger = accepted(people), strangers().pilot

    assert _broken(people, lambda entry: _note(current, entry)) == "note_is_after_departure"
    assert _broken(people, lambda entry: _note(current, entry, text="")) == "note_says_something"
    tie = _broken(people, lambda entry: _note(current, entry, person_id=stranger.pk))
    assert tie in {"note_is_by_a_person_of_its_operator", "note_is_after_departure"}


def _notice(current, entry, **changes):
    fields = {
        "operator_id": current.load.operator_id,
        "load": current.load,
        "assessment": current.assessment,
        "changed": "empty weight",
        "mail_addresses": 0,
        "told_at": NOW,
        "act": entry.id,
    }
    return StaleNotice.objects.create(**(fields | changes))


def test_a_stale_load_is_told_of_once_and_only_when_it_was_accepted(people) -> None:
    current, other = accepted(people), submitted(people)

    def twice(entry):
        _notice(current, entry)
        _notice(current, entry)

    assert _broken(people, twice) == "stale_notice_is_given_once"
    assert _broken(people, lambda entry: _notice(other, entry)) == "stale_notice_is_of_an_accepted_load"
    tie = _broken(people, lambda entry: _notice(current, entry, assessment=other.assessment))
    assert tie in {"stale_notice_is_of_an_assessment_of_its_load", "stale_notice_is_of_an_accepted_load"}
    tie = _broken(people, lambda entry: _notice(current, entry, changed=""))
    assert tie == "stale_notice_says_what_changed"


@pytest.mark.parametrize("table", ["loads_latechange", "loads_filedissue", "loads_note", "loads_stalenotice"])
def test_nothing_of_it_is_changed_afterwards(people, table: str) -> None:
    changed(people, accepted(people), change_of(BAG))

    with (
        pytest.raises(DatabaseError) as refused,
        transaction.atomic(),
        connection.cursor() as cursor,
    ):
        cursor.execute(f"UPDATE {table} SET operator_id = operator_id")

    # The service role has no right to update them, and the guard would refuse the owner.
    assert refused.value.__cause__.diag.sqlstate in {"42501", "TB001", "TB004"}

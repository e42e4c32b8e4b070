"""Below the models: what the database itself refuses, each tie tried by breaking it."""

from uuid import uuid4

import pytest
from django.db import DatabaseError, connection, transaction
from django.utils import timezone

from loads.acts import ACCEPT_LOAD, PREPARE_LOAD
from loads.lifecycle import STEPS
from loads.models import AllowedStep, Assessment, Load, Paper, Signature, Step
from records.act import act
from records.guard import NeverChanged, NoOpenAct, OtherOperator
from tests.cast import actor, cast, strangers
from tests.loads.making import accepted, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db
NOW = timezone.now()


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def _broken(people, write, *, by=None):
    """Do a write inside an act and return the name of the tie that refused it."""
    who = actor(by or people.pilot)
    with pytest.raises(DatabaseError) as refused, act(ACCEPT_LOAD, by=who, about="load:test") as entry:
        write(entry)
    return refused.value.__cause__.diag.constraint_name


def _step(current, entry, **changes):
    fields = {
        "operator_id": current.load.operator_id,
        "load": current.load,
        "number": current.step.number + 1,
        "before": current.state,
        "after": "withdrawn",
        "previous": current.step.number,
        "assessment": current.assessment,
        "reason": "test",
        "at": NOW,
        "act": entry.id,
    }
    return Step.objects.create(**(fields | changes))


def _signature(current, step, **changes):
    fields = {
        "operator_id": current.load.operator_id,
        "load": current.load,
        "assessment": current.assessment,
        "step": step,
        "person_id": step.person_id,
        "meaning": step.after,
        "capacity": "test",
        "statement": "test",
        "digest": current.assessment.digest,
        "name": b"R. Amani",
        "salt": b"x" * 32,
        "signed_at": NOW,
        "means": "session",
    }
    return Signature.objects.create(**(fields | changes))


def test_the_pairs_of_states_in_the_database_are_those_of_the_table() -> None:
    pairs = {("", "open")} | {(one.start, one.end) for one in STEPS}

    assert set(AllowedStep.objects.values_list("before", "after")) == pairs


def test_a_pair_that_is_not_listed_is_refused(people) -> None:
    current = submitted(people)

    tie = _broken(people, lambda e: _step(current, e, after="departed", departed_at=NOW))

    assert tie == "step_is_allowed"


def test_a_step_starts_where_the_last_one_ended(people) -> None:
    current = submitted(people)

    tie = _broken(people, lambda e: _step(current, e, before="prepared"))

    assert tie == "step_starts_where_the_last_ended"


def test_a_step_number_is_not_skipped(people) -> None:
    current = submitted(people)

    tie = _broken(people, lambda e: _step(current, e, number=5, previous=4))

    assert tie == "step_starts_where_the_last_ended"


def test_a_step_number_is_taken_once(people) -> None:
    current = submitted(people)
    prepared(people, current)

    assert _broken(people, lambda e: _step(current, e)) == "step_number_is_taken_once"


def test_a_step_keeps_the_assessment_unless_it_opens(people) -> None:
    current, other = submitted(people), submitted(people)

    tie = _broken(people, lambda e: _step(current, e, assessment=other.assessment))

    assert tie in {"step_has_an_assessment_of_its_load", "step_keeps_the_assessment"}


def test_a_withdrawal_needs_a_reason(people) -> None:
    current = submitted(people)

    assert _broken(people, lambda e: _step(current, e, reason="")) == "step_of_withdrawal_has_a_reason"


def test_a_signed_step_needs_its_signature_when_the_act_ends(people) -> None:
    current = submitted(people)

    tie = _broken(people, lambda e: _step(current, e, after="prepared", person=people.preparer))

    assert tie == "step_is_signed"


def test_a_signature_is_the_one_of_the_person_who_took_the_step(people) -> None:
    current = submitted(people)

    def write(entry):
        step = _step(current, entry, after="prepared", person=people.preparer)
        _signature(current, step, person_id=people.pilot.pk)

    assert _broken(people, write) == "signature_is_the_steps"


def test_a_signature_means_the_state_of_its_step(people) -> None:
    current = submitted(people)

    def write(entry):
        _signature(current, _step(current, entry, after="prepared", person=people.pilot), meaning="accepted")

    assert _broken(people, write) == "signature_is_the_steps"


def test_a_signature_stands_under_the_digest_of_its_assessment(people) -> None:
    current = submitted(people)

    def write(entry):
        _signature(current, _step(current, entry, after="prepared", person=people.pilot), digest="0" * 64)

    assert _broken(people, write) == "signature_is_under_what_was_shown"


def test_only_a_load_that_is_within_is_signed(people) -> None:
    current = submitted(people, configuration="four-seat-skis")
    assert current.assessment.verdict == "unresolved"

    def write(entry):
        _signature(current, _step(current, entry, after="prepared", person=people.pilot))

    assert _broken(people, write) == "signature_is_under_what_was_shown"


def test_only_the_loads_own_pilot_accepts(people) -> None:
    current = prepared(people)

    def write(entry):
        _step(current, entry, after="accepted", person=people.other_pilot)

    assert _broken(people, write) == "step_of_acceptance_is_the_pilots"


def test_an_acceptance_takes_a_manifest_number(people) -> None:
    current = prepared(people)

    def write(entry):
        _signature(current, _step(current, entry, after="accepted", person=people.pilot))

    assert _broken(people, write) == "step_of_acceptance_takes_a_number"


def test_manifest_numbers_have_no_gaps(people) -> None:
    current = prepared(people)

    def write(entry):
        Paper.objects.create(load=current.load, operator_id=entry.chain, number=5, previous=4, act=entry.id)

    assert _broken(people, write) == "paper_follows_the_one_before"


def test_a_manifest_number_is_taken_only_by_an_acceptance(people) -> None:
    current = prepared(people)

    def write(entry):
        Paper.objects.create(load=current.load, operator_id=entry.chain, number=1, act=entry.id)

    assert _broken(people, write) == "paper_is_of_an_accepted_load"


def test_only_a_revision_supersedes(people) -> None:
    current = submitted(people)

    tie = _broken(people, lambda e: _step(current, e, after="superseded"))

    assert tie == "step_to_superseded_has_a_revision"


def _copy(current, entry, **changes):
    fields = {
        "id": uuid4(),
        "operator_id": entry.chain,
        "aircraft": current.load.aircraft,
        "configuration": "four-seat",
        "reference": "x",
        "departure": NOW,
        "departure_text": "x",
        "origin": "x",
        "destination": "x",
        "operation": "x",
        "submitted_at": NOW,
    }
    return Load.objects.create(**(fields | changes))


def test_a_load_is_complete_when_its_act_ends(people) -> None:
    current = submitted(people)

    assert _broken(people, lambda e: _copy(current, e)) == "load_is_complete"


def test_an_assessment_is_brought_into_use_by_its_act(people) -> None:
    current = submitted(people)

    def write(entry):
        Assessment.objects.create(
            operator_id=entry.chain,
            load=current.load,
            number=2,
            verdict="unresolved",
            result="{}",
            salt=b"x" * 32,
            digest="0" * 64,
            engine="1",
            assessed_at=NOW,
        )

    assert _broken(people, write) == "assessment_is_brought_by_a_step"


def test_an_assessment_uses_versions_of_its_own_aircraft(people) -> None:
    other = ready_aircraft(people, "Q9-KTC")
    current = submitted(people)

    def write(entry):
        Assessment.objects.create(
            operator_id=entry.chain,
            load=current.load,
            number=2,
            verdict="within",
            result="{}",
            salt=b"x" * 32,
            digest="0" * 64,
            engine="1",
            loading_basis=other.loading_bases.get(),
            empty_weight=other.empty_weights.get(),
            assessed_at=NOW,
        )

    assert _broken(people, write) == "assessment_uses_versions_of_its_aircraft"


def test_a_load_flies_an_aircraft_of_its_operator(people) -> None:
    others = strangers()
    current = submitted(people)

    with (
        pytest.raises((DatabaseError, OtherOperator)),
        act(ACCEPT_LOAD, by=actor(others.pilot), about="x") as e,
    ):
        _copy(current, e)


def test_without_an_act_nothing_is_written(people) -> None:
    current = submitted(people)

    with pytest.raises(DatabaseError) as refused, transaction.atomic():
        Step.objects.create(
            operator_id=current.load.operator_id,
            load=current.load,
            number=2,
            before="open",
            after="withdrawn",
            previous=1,
            assessment=current.assessment,
            reason="test",
            at=NOW,
            act=uuid4(),
        )

    assert refused.value.__cause__.sqlstate == NoOpenAct.sqlstate
    assert Step.objects.filter(load=current.load).count() == 1


@pytest.mark.parametrize(
    "table",
    ["load", "declaration", "assessment", "step", "signature", "paper"],
)
@pytest.mark.parametrize("words", ["UPDATE loads_{} SET operator_id = operator_id", "DELETE FROM loads_{}"])
def test_rows_are_only_ever_added(people, table: str, words: str) -> None:
    accepted(people)

    with (
        pytest.raises((DatabaseError, NeverChanged)) as refused,
        act(PREPARE_LOAD, by=actor(people.pilot), about="x"),
        connection.cursor() as cursor,
    ):
        cursor.execute(words.format(table))

    state = getattr(refused.value.__cause__, "sqlstate", "")
    assert state in {"42501", NeverChanged.sqlstate}  # no right to, or refused by the guard


def test_a_later_number_names_the_one_before_it(people) -> None:
    """A comparison with NULL breaks no check, so that a number stands there is asked for by name."""
    current = prepared(people)

    def write(entry):
        Paper.objects.create(
            load=current.load, operator_id=entry.chain, number=5, previous=None, act=entry.id
        )

    assert _broken(people, write) == "paper_numbers_have_no_gaps"
    tie = _broken(people, lambda e: _step(current, e, previous=None))
    assert tie == "step_follows_the_one_before"

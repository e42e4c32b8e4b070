"""Revising, assessing again, withdrawing, departing: each moves a load once, for good."""

from datetime import timedelta

import pytest
from django.utils import timezone

from loads.actions.assess_again import assess_again
from loads.actions.depart_load import depart_load
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.models import Load, Paper, Step
from loads.queries.current import declared_in, load_of
from loads.queries.stale import stale_parts
from records.models import Act
from records.refusal import Invalid, NotKnown, PreconditionFailed, StepRefused
from tests.cast import actor, cast, strangers
from tests.loads.making import accepted, load_document, outside_document, prepared, submitted
from tests.makers import (
    basis_document,
    make_aircraft,
    make_basis,
    make_empty_weight,
    ready_aircraft,
)

pytestmark = pytest.mark.django_db


def _revise(people, current, document=None, *, seen=None, by=None):
    return revise_load(
        current.load.id,
        document or load_document(people),
        reason="two bags fewer",
        seen=seen or str(current.step.number),
        by=actor(by or people.preparer),
    )


def _withdraw(people, current, **changes):
    fields = {"reason": "weather", "seen": str(current.step.number), "by": actor(people.preparer)} | changes
    return withdraw_load(current.load.id, **fields)


def _depart(people, current, at=None):
    return depart_load(
        current.load.id, at=at or timezone.now(), seen=str(current.step.number), by=actor(people.pilot)
    )


def _now(people, current):
    return load_of(people.operator.code, current.load.id)


def test_a_revision_is_a_new_load_and_supersedes_the_old_one_in_one_act() -> None:
    people = cast()
    ready_aircraft(people)
    outside = submit_load(outside_document(people), by=actor(people.preparer))

    new = _revise(people, outside)

    old = _now(people, outside)
    assert (old.state, new.state, new.load.replaces_id) == ("superseded", "open", outside.load.id)
    assert (new.assessment.verdict, old.step.reason) == ("within", "two bags fewer")
    assert old.step.act == new.step.act == Act.objects.get(kind="revise-load").id


def test_an_accepted_load_can_be_revised_and_keeps_its_manifest_number() -> None:
    people = cast()
    ready_aircraft(people)
    current = accepted(people)

    new = _revise(people, current)

    assert (_now(people, current).state, new.state) == ("superseded", "open")
    assert Paper.objects.get().load_id == current.load.id


def test_a_faulty_revision_leaves_the_old_load_as_it_was() -> None:
    people = cast()
    ready_aircraft(people)
    current = submitted(people)

    with pytest.raises(Invalid):
        _revise(people, current, load_document(people, persons_on_board=9))

    assert (_now(people, current).step.number, Load.objects.count()) == (1, 1)


@pytest.mark.parametrize("end", ["departed", "withdrawn", "superseded"])
def test_nothing_replaces_or_withdraws_a_load_that_has_ended(end: str) -> None:
    people = cast()
    ready_aircraft(people)
    match end:
        case "departed":
            current = _depart(people, accepted(people))
        case "withdrawn":
            current = _withdraw(people, submitted(people))
        case _:
            first = submitted(people)
            _revise(people, first)
            current = _now(people, first)

    for move in (_revise, _withdraw, _depart):
        with pytest.raises(StepRefused):
            move(people, current)

    assert _now(people, current).state == end


def test_only_an_accepted_load_departs() -> None:
    people = cast()
    ready_aircraft(people)

    with pytest.raises(StepRefused):
        _depart(people, prepared(people))


@pytest.mark.parametrize(("minutes", "code"), [(30, "in-the-future"), (-30, "before-acceptance")])
def test_a_departure_is_after_the_acceptance_and_not_in_the_future(minutes: int, code: str) -> None:
    people = cast()
    ready_aircraft(people)
    current = accepted(people)

    with pytest.raises(Invalid) as refused:
        _depart(people, current, timezone.now() + timedelta(minutes=minutes))

    assert [(f.pointer, f.code) for f in refused.value.faults] == [("/at", code)]


def test_a_withdrawal_keeps_its_reason() -> None:
    people = cast()
    ready_aircraft(people)

    done = _withdraw(people, prepared(people))

    assert (done.state, done.step.reason) == ("withdrawn", "weather")
    assert Act.objects.get(kind="withdraw-load").reason == "weather"


def test_a_step_is_taken_from_the_state_that_was_seen() -> None:
    people = cast()
    ready_aircraft(people)
    current = submitted(people)
    prepared(people, current)

    with pytest.raises(PreconditionFailed):
        _withdraw(people, current)


def test_another_operator_moves_nothing() -> None:
    people, others = cast(), strangers()
    ready_aircraft(people)
    current = submitted(people)

    with pytest.raises(NotKnown):
        _withdraw(people, current, by=actor(others.pilot))
    with pytest.raises(NotKnown):
        _revise(people, current, by=others.pilot)

    assert Step.objects.count() == 1


def test_a_load_without_an_empty_weight_is_stale_once_one_is_approved_and_within_when_assessed_again() -> (
    None
):
    people = cast()
    aircraft = make_aircraft(people)
    make_basis(people, aircraft)
    current = submitted(people)
    assert stale_parts(current, timezone.now()) == ()
    make_empty_weight(people, aircraft)
    assert stale_parts(current, timezone.now()) == ("empty weight",)

    again = assess_again(current.load.id, seen="1", by=actor(people.preparer))

    assert (again.state, again.step.number, again.assessment.number) == ("open", 2, 2)
    assert again.assessment.verdict == "within"
    assert again.assessment.digest != current.assessment.digest


def test_a_prepared_load_that_is_assessed_again_is_open_and_signed_anew() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    current = prepared(people)
    make_basis(
        people, aircraft, basis_document(document={"title": "manual", "number": "FL9", "revision": "D"})
    )

    again = assess_again(current.load.id, seen="2", by=actor(people.preparer))
    done = accepted(people, prepared(people, again))

    assert (again.state, again.step.number) == ("open", 3)
    assert (done.state, done.assessment.number) == ("accepted", 2)


def test_what_has_not_changed_is_not_assessed_again() -> None:
    people = cast()
    ready_aircraft(people)
    current = submitted(people)

    with pytest.raises(StepRefused) as refused:
        assess_again(current.load.id, seen="1", by=actor(people.preparer))

    assert refused.value.code == "assessment-current"


def test_an_accepted_load_is_revised_and_not_assessed_again() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    current = accepted(people)
    make_empty_weight(people, aircraft)

    with pytest.raises(StepRefused) as refused:
        assess_again(current.load.id, seen="3", by=actor(people.preparer))

    assert refused.value.code == "step-not-allowed"


def test_an_empty_weight_from_another_datum_leaves_a_load_unresolved_and_says_why() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    make_basis(people, aircraft, basis_document(datum={"name": "nose tip", "source": {"page": "6-2"}}))

    current = submitted(people)

    (check,) = [c for c in current.result()["checks"] if c["code"] == "standing.empty-weight"]
    assert (current.assessment.verdict, check["result"]) == ("unresolved", "unresolved")
    assert "nose tip" in check["margin_text"]


def test_what_was_declared_is_kept_as_typed() -> None:
    people = cast()
    ready_aircraft(people)
    document = load_document(people)
    document["items"][0]["weight"]["value"] = "120.50"

    current = submit_load(document, by=actor(people.preparer))

    assert declared_in(current.load) == document

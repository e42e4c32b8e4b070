"""Signing: what is refused, and what a signature is bound to."""

import pytest

from fleet.models import Operator
from loads.actions.accept_load import accept_load
from loads.actions.prepare_load import prepare_load
from loads.actions.signing import Signing
from loads.actions.submit_load import submit_load
from loads.models import Paper, Signature, Step
from loads.queries.current import load_of
from records.models.outbox import Outbox
from records.refusal import NotAllowed, NotKnown, PreconditionFailed, Refused, StepRefused
from tests.cast import actor, cast, strangers
from tests.loads.making import accepted, load_document, outside_document, prepared, signing, submitted
from tests.makers import make_aircraft, make_basis, make_empty_weight, ready_aircraft

pytestmark = pytest.mark.django_db


def _prepare(people, current, *, digest=None, seen=None, by=None):
    shown = Signing(digest or current.assessment.digest, "127.0.0.1")
    return prepare_load(
        current.load.id, shown, seen=seen or str(current.step.number), by=actor(by or people.preparer)
    )


def _accept(people, current, *, digest=None, seen=None, by=None):
    shown = Signing(digest or current.assessment.digest, "127.0.0.1")
    return accept_load(
        current.load.id, shown, seen=seen or str(current.step.number), by=actor(by or people.pilot)
    )


def test_a_load_is_prepared_and_accepted_with_a_signature_each() -> None:
    people = cast()
    ready_aircraft(people)

    done = accepted(people)

    first, second = Signature.objects.order_by("signed_at")
    assert (done.state, done.step.number) == ("accepted", 3)
    assert (first.meaning, first.capacity, first.person) == ("prepared", "load preparer", people.preparer)
    assert (second.meaning, second.capacity, second.person) == ("accepted", "pilot in command", people.pilot)
    assert {first.digest, second.digest} == {done.assessment.digest}
    assert bytes(second.name).decode() == "R. Amani"
    assert second.signed_from == "127.0.0.1"
    assert done.assessment.digest in second.statement
    assert "R. Amani" not in second.statement


def test_acceptance_takes_the_next_manifest_number_and_promises_the_paper() -> None:
    people = cast()
    ready_aircraft(people)

    first, second = accepted(people), accepted(people)

    assert list(Paper.objects.order_by("number").values_list("number", "previous", "load_id")) == [
        (1, None, first.load.id),
        (2, 1, second.load.id),
    ]
    promised = Outbox.objects.filter(task="loads.tasks.file_manifest").values_list("key", flat=True)
    assert set(promised) == {str(first.load.id), str(second.load.id)}


def test_one_person_may_prepare_and_accept_by_default() -> None:
    people = cast()
    ready_aircraft(people)

    done = _accept(people, _prepare(people, submitted(people), by=people.pilot))

    assert done.state == "accepted"


def test_the_digest_that_was_shown_must_be_the_one_that_is_signed() -> None:
    people = cast()
    ready_aircraft(people)

    with pytest.raises(StepRefused) as refused:
        _prepare(people, submitted(people), digest="0" * 64)

    assert refused.value.code == "digest-differs"
    assert Signature.objects.count() == 0


def test_an_outside_load_is_never_signed() -> None:
    people = cast()
    ready_aircraft(people)
    outside = submit_load(outside_document(people), by=actor(people.preparer))

    with pytest.raises(StepRefused) as refused:
        _prepare(people, outside)

    assert refused.value.code == "not-within"


def test_an_unresolved_load_is_never_signed() -> None:
    people = cast()
    make_basis(people, make_aircraft(people))

    with pytest.raises(StepRefused) as refused:
        _prepare(people, submitted(people))

    assert refused.value.code == "not-within"


def test_a_stale_load_is_not_signed_until_it_is_assessed_again() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    current = prepared(people)
    make_empty_weight(people, aircraft)

    with pytest.raises(StepRefused) as refused:
        _accept(people, current)

    assert refused.value.code == "stale"
    assert "empty weight" in refused.value.detail


@pytest.mark.parametrize("who", ["other_pilot", "preparer", "manager", "auditor"])
def test_nobody_but_the_loads_own_pilot_accepts(who: str) -> None:
    people = cast()
    ready_aircraft(people)
    current = prepared(people)

    with pytest.raises(Refused) as refused:
        _accept(people, current, by=getattr(people, who))

    assert isinstance(refused.value, NotAllowed if who != "other_pilot" else StepRefused)
    assert refused.value.code == ("not-pilot-in-command" if who == "other_pilot" else "act-not-allowed")
    assert load_of(people.operator.code, current.load.id).state == "prepared"


def test_a_load_that_names_no_login_for_its_pilot_cannot_be_accepted() -> None:
    people = cast()
    ready_aircraft(people)
    document = load_document(people)
    del document["crew"][0]["person"]
    current = _prepare(people, submit_load(document, by=actor(people.preparer)))

    with pytest.raises(StepRefused) as refused:
        _accept(people, current)

    assert refused.value.code == "no-pilot-in-command"


def test_a_load_is_not_accepted_before_it_is_prepared() -> None:
    people = cast()
    ready_aircraft(people)

    with pytest.raises(StepRefused) as refused:
        _accept(people, submitted(people))

    assert refused.value.code == "step-not-allowed"


def test_a_signature_on_one_flight_is_none_on_another() -> None:
    people = cast()
    ready_aircraft(people)
    one = submitted(people)
    flight = load_document(people)["flight"] | {"reference": "KT-215"}
    other = submitted(people, flight=flight)

    with pytest.raises(StepRefused) as refused:
        _prepare(people, other, digest=one.assessment.digest)

    assert refused.value.code == "digest-differs"


def test_the_state_that_was_seen_must_be_the_state_that_is() -> None:
    people = cast()
    ready_aircraft(people)

    with pytest.raises(PreconditionFailed):
        _prepare(people, submitted(people), seen="2")


def test_another_operators_load_is_not_known() -> None:
    people, others = cast(), strangers()
    ready_aircraft(people)
    current = submitted(people)

    with pytest.raises(NotKnown):
        _prepare(people, current, by=others.pilot)


def test_an_integration_never_signs() -> None:
    people = cast()
    ready_aircraft(people)
    current = submitted(people)
    machine = actor(people.pilot, kind="token", key="token:1", may=frozenset({"submit-load"}))

    with pytest.raises(NotAllowed):
        prepare_load(current.load.id, signing(current), seen="1", by=machine)


def test_estimated_weights_of_people_are_not_signed_unless_the_procedure_says_so() -> None:
    people = cast()
    ready_aircraft(people)
    document = load_document(people)
    document["passengers"][0]["how"] = "estimated"
    current = submit_load(document, by=actor(people.preparer))

    with pytest.raises(StepRefused) as refused:
        _prepare(people, current)

    assert refused.value.code in {"estimated-weights", "not-within"}
    assert not Operator.objects.get().estimates_may_be_signed


def _mutations():
    """Every field of a load a signature covers, changed one at a time."""
    return [
        (["aircraft"], "Q9-KTC"),
        (["configuration"], "four-seat-skis"),
        (["flight", "reference"], "KT-999"),
        (["flight", "leg"], 2),
        (["flight", "departure"], "2026-12-01T09:30:00-06:00"),
        (["flight", "origin"], "XOTH"),
        (["flight", "destination"], "XOTH"),
        (["flight", "operation"], "cargo-charter"),
        (["crew", 0, "name"], "R. Amano"),
        (["crew", 0, "weight", "value"], "182"),
        (["crew", 0, "how"], "declared"),
        (["crew", 0, "seat"], "COCKPIT-R"),
        (["passengers", 0, "name"], "L. Ossei"),
        (["passengers", 0, "weight", "value"], "176.0"),
        (["passengers", 1, "seat"], "ROW2-L"),
        (["items", 0, "what"], "unchecked bags"),
        (["items", 0, "place"], "NOSE-HOLD"),
        (["items", 0, "weight", "value"], "121"),
        (["items", 0, "kind"], "cargo"),
        (["fuel", "density", "value"], "6.71"),
        (["fuel", "density", "source"], "delivery note 4472"),
        (["fuel", "at_engine_start", "LEFT", "value"], "99"),
        (["fuel", "taxi", "value"], "41"),
        (["fuel", "trip", "value"], "641"),
        (["fuel", "minimum_at_landing", "value"], "421"),
        (["limits", 0, "weight", "value"], "8749"),
        (["limits", 0, "source"], "performance sheet 13"),
    ]


def test_a_signature_is_bound_to_every_field_that_was_declared() -> None:
    people = cast()
    ready_aircraft(people)
    ready_aircraft(people, "Q9-KTC")
    signed = submitted(people).assessment.digest
    refusals = []

    for path, value in _mutations():
        document = load_document(people)
        inner = document
        for step in path[:-1]:
            inner = inner[step]
        inner[path[-1]] = value
        other = submit_load(document, by=actor(people.preparer))
        with pytest.raises(StepRefused) as refused:
            _prepare(people, other, digest=signed)
        refusals.append(refused.value.code)

    assert refusals == ["digest-differs"] * len(_mutations())
    assert (Signature.objects.count(), Step.objects.exclude(after="open").count()) == (0, 0)

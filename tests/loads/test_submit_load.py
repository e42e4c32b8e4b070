"""Submitting a load: computed and kept in one act, whatever its verdict."""

import pytest

from loads.actions.submit_load import submit_load
from loads.models import Assessment, Declaration, Load, Step
from records.models import Act, Change
from records.refusal import Invalid, NotAllowed
from tests.cast import actor, cast
from tests.loads.making import load_document, outside_document, submitted
from tests.makers import make_aircraft, make_basis, ready_aircraft

pytestmark = pytest.mark.django_db


def test_a_load_within_every_limit_is_kept_open_under_one_act() -> None:
    people = cast()
    ready_aircraft(people)

    current = submitted(people)

    failed = [c for c in current.result()["checks"] if c["result"] not in {"pass", "advisory"}]
    assert (current.state, current.step.number, current.assessment.verdict, failed) == (
        "open",
        1,
        "within",
        [],
    )
    entry = Act.objects.get(kind="submit-load")
    assert entry.about == f"load:{current.load.id}"
    tables = sorted(Change.objects.filter(act_id=entry.id).values_list("table_name", flat=True))
    assert tables == ["loads_assessment", "loads_declaration", "loads_load", "loads_step"]


def test_an_outside_load_is_kept_too() -> None:
    people = cast()
    ready_aircraft(people)

    current = submit_load(outside_document(people), by=actor(people.preparer))

    assert (current.state, current.assessment.verdict) == ("open", "outside")


def test_without_an_empty_weight_in_force_a_load_is_kept_unresolved() -> None:
    people = cast()
    make_basis(people, make_aircraft(people))

    current = submitted(people)

    assert (current.assessment.verdict, current.assessment.empty_weight_id) == ("unresolved", None)


def test_without_a_basis_in_force_a_load_is_kept_unresolved() -> None:
    people = cast()
    make_aircraft(people)

    current = submitted(people)

    assert (current.assessment.verdict, current.assessment.loading_basis_id) == ("unresolved", None)


def test_without_a_basis_the_general_shape_is_still_demanded() -> None:
    people = cast()
    make_aircraft(people)
    document = load_document(people)
    document["crew"][0]["weight"] = {"value": "181"}

    with pytest.raises(Invalid) as refused:
        submit_load(document, by=actor(people.preparer))

    assert [fault.pointer for fault in refused.value.faults] == ["/crew/0/weight/unit"]
    assert Load.objects.count() == 0


def test_an_aircraft_nobody_entered_is_a_fault_of_the_document() -> None:
    people = cast()

    with pytest.raises(Invalid) as refused:
        submitted(people)

    assert [(f.pointer, f.code) for f in refused.value.faults] == [("/aircraft", "unknown-aircraft")]


def test_a_login_nobody_has_is_a_fault_of_the_document() -> None:
    people = cast()
    ready_aircraft(people)
    document = load_document(people)
    document["crew"][0]["person"] = "nobody.here"

    with pytest.raises(Invalid) as refused:
        submit_load(document, by=actor(people.preparer))

    assert [(f.pointer, f.code) for f in refused.value.faults] == [("/crew/0/person", "unknown-person")]


def test_an_auditor_submits_nothing() -> None:
    people = cast()
    ready_aircraft(people)

    with pytest.raises(NotAllowed):
        submitted(people, people.auditor)

    assert (Load.objects.count(), Declaration.objects.count()) == (0, 0)
    assert (Assessment.objects.count(), Step.objects.count()) == (0, 0)


def test_the_same_inputs_and_versions_give_the_same_digest() -> None:
    people = cast()
    ready_aircraft(people)

    first, second = submitted(people), submitted(people)

    assert first.load.id != second.load.id
    assert first.assessment.digest == second.assessment.digest


def test_the_trail_holds_no_name_of_anybody_aboard() -> None:
    people = cast()
    ready_aircraft(people)

    submitted(people)

    images = "".join(Change.objects.values_list("image", flat=True))
    assert all(name not in images for name in ("Osei", "Dravo", "R. Amani"))

"""Loads that count by the operator's table of standard weights: the version in force, in the statement, and
what happens when it changes.
"""

import json
from fractions import Fraction
from typing import Any

import pytest

from fleet.actions.approve_standard_weights import approve_standard_weights
from fleet.actions.enter_standard_weights import enter_standard_weights
from fleet.models import Provision
from loads.actions.prepare_load import prepare_load
from loads.actions.submit_load import submit_load
from loads.balance.late_change import said
from loads.models import LateChange
from loads.queries.answer import answer_of
from loads.queries.current import load_of
from loads.queries.declaration import declared_now
from loads.queries.late_change import moved_by
from loads.queries.overtaken import database_time
from loads.queries.signable import words_to_sign
from loads.queries.stale import stale_parts
from records.refusal import NotAllowed, StepRefused
from tests.cast import Cast, actor, cast
from tests.loads.late import again, bounded, change_of, changed, proposed
from tests.loads.making import accepted, load_document, signing
from tests.makers import q, ready_aircraft
from tests.pure.loads.standards import seasonal_document

pytestmark = pytest.mark.django_db
DECLARED = {
    "below_seats": 10,
    "additions": [
        {"what": "clothing", "weight": q("4", "kg")},
        {"what": "hand baggage", "weight": q("6", "kg")},
    ],
    "source": {"page": "8-3"},
}


def table(people: Cast, **changes: Any) -> Provision:
    entered = enter_standard_weights(actor(people.manager), seasonal_document(**changes))
    approve_standard_weights(actor(people.approver), entered)
    return entered


def standard_load(people: Cast) -> dict[str, Any]:
    document = load_document(people)
    document["passengers"] = [
        {"name": "L. Osei", "seat": "ROW1-L", "category": "adult", "how": "standard"},
        {"name": "M. Dravo", "seat": "ROW1-R", "category": "child", "how": "standard"},
    ]
    return document


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def test_a_load_counts_by_the_approved_table_and_names_it_in_its_statement(people: Cast) -> None:
    used = table(people)

    current = submit_load(standard_load(people), by=actor(people.preparer))

    assert current.assessment.verdict == "within"
    answer = answer_of(current, reach=None)
    assert answer["basis"]["standard_weights"] == {"id": str(used.id), "digest": used.digest}
    assert answer["standard_weights"]["table"] == "Company weights, version 1"
    assert answer["standard_weights"]["season"] == "winter"  # 1 December
    words = words_to_sign(current, standard_load(people), "prepared")
    assert f"Standard weights: {used.id}, digest {used.digest}." in words
    prepared = prepare_load(current.load.id, signing(current), seen="1", by=actor(people.preparer))
    assert prepared.state == "prepared"


def test_a_table_counts_for_nothing_before_another_person_approved_it(people: Cast) -> None:
    entered = enter_standard_weights(actor(people.manager), seasonal_document())

    current = submit_load(standard_load(people), by=actor(people.preparer))

    assert current.assessment.verdict == "unresolved"
    with pytest.raises(NotAllowed):
        approve_standard_weights(actor(people.manager), entered)
    approve_standard_weights(actor(people.approver), entered)
    assert stale_parts(current, database_time()) == ("standard weights",)
    with pytest.raises(StepRefused) as refused:
        approve_standard_weights(actor(people.approver), entered)
    assert refused.value.code == "approved-already"


def test_a_later_table_makes_loads_stale_that_counted_by_it_and_no_others(people: Cast) -> None:
    table(people)
    by_table = submit_load(standard_load(people), by=actor(people.preparer))
    weighed = load_document(people)
    for one in weighed["passengers"]:
        one["how"] = "weighed"
    weighed["flight"]["reference"] = "KT-215"
    other = submit_load(weighed, by=actor(people.preparer))

    table(people, title="Company weights, heavier", true_from="2026-11-30T00:00:00Z")

    now = database_time()
    assert stale_parts(by_table, now) == ("standard weights",)
    assert stale_parts(other, now) == ()
    with pytest.raises(StepRefused) as refused:
        prepare_load(by_table.load.id, signing(by_table), seen="1", by=actor(people.preparer))
    assert refused.value.code == "stale"


def test_of_two_tables_the_one_with_the_latest_beginning_before_the_departure_counts(people: Cast) -> None:
    table(people, title="first", true_from="2026-06-01T00:00:00Z")
    table(people, title="later", true_from="2026-12-02T00:00:00Z")
    table(people, title="corrected first", true_from="2026-06-01T00:00:00Z")

    current = submit_load(standard_load(people), by=actor(people.preparer))

    assert json.loads(current.assessment.result)["standard_weights"]["table"] == "corrected first, version 3"
    assert load_of(people.operator.code, current.load.id).assessment.provisions == [
        Provision.objects.get(number=3).id
    ]


def test_a_last_minute_change_counts_what_the_table_adds_to_a_declared_passenger(people: Cast) -> None:
    """Declared 150 lb with 10 kg by the table are 172.1 lb, held against the bound like that."""
    bounded(people, weight="172", persons=2)
    table(people, declared=DECLARED)
    current = accepted(people)
    on = {"change": "passenger-on", "name": "N. Fell", "seat": "ROW2-L", "how": "declared"}
    heavy, light = (on | {"weight": q(weight, "lb")} for weight in ("150", "149"))

    with pytest.raises(StepRefused) as refused:
        proposed(current, change_of(heavy, persons=4))
    shown = proposed(current, change_of(light, persons=4))
    done = again(changed(people, current, change_of(light, persons=4)))

    assert refused.value.code == "beyond-the-bound"
    assert "172.1 lb" in refused.value.detail
    weights = {phase["phase"]: Fraction(phase["weight"]) for phase in done.result()["phases"]}
    before = {phase["phase"]: Fraction(phase["weight"]) for phase in current.result()["phases"]}
    rise = shown.moved.kilograms / Fraction("0.45359237")
    assert abs(weights["take-off"] - before["take-off"] - rise) < Fraction("0.1")
    change = LateChange.objects.get(load=current.load)
    assert Fraction(change.kilograms_moved) == shown.moved.kilograms
    assert shown.bound.said(moved_by((change,), declared_now(done))) == "171.1 lb and 1 person"


def test_who_leaves_at_the_last_minute_takes_along_what_the_table_added(people: Cast) -> None:
    bounded(people, weight="300", persons=2)
    table(people, declared=DECLARED)
    current = accepted(people)

    shown = proposed(current, change_of({"change": "passenger-off", "seat": "ROW1-R"}, persons=2))

    assert shown.moved.kilograms == 190 * Fraction("0.45359237") + 10
    assert "and by the table of standard weights" in said(shown.lines[0], named=False)

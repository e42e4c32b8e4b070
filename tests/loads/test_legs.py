"""Legs are linked loads, each with its own manifest: what is refused, shown, and held by the database."""

import uuid
from typing import Any

import psycopg
import pytest
from django.db import DatabaseError
from django.utils import timezone

from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.actions.withdraw_load import withdraw_load
from loads.acts import SUBMIT_LOAD
from loads.balance.declared import read_outline
from loads.manifest.gathering import facts_of
from loads.manifest.printing import html_of
from loads.models import Leg, Paper
from loads.queries.answer import full_answer_of
from loads.queries.current import Current
from loads.queries.legs import leg_before
from records.act import act
from records.refusal import Invalid
from tests.cast import Cast, actor, cast, strangers
from tests.loads.late import bounded, change_of, changed
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.makers import make_aircraft, q, ready_aircraft

pytestmark = pytest.mark.django_db
BACK = {"leg": 2, "departure": "2026-12-01T11:00:00-06:00", "origin": "XKOR", "destination": "XNAL"}


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def _next(people: Cast, before: Current, **flight: Any) -> dict[str, Any]:
    document = load_document(people)
    document["flight"] |= BACK | {"follows": str(before.load.id)} | flight
    return document


def _refusal(people: Cast, document: dict[str, Any]) -> tuple[str, str]:
    with pytest.raises(Invalid) as refused:
        submit_load(document, by=actor(people.preparer))
    (fault,) = refused.value.faults
    return fault.pointer, fault.code


def cast_error(error: DatabaseError) -> psycopg.Error:
    """The driver's own error, which names the constraint."""
    assert isinstance(error.__cause__, psycopg.Error)
    return error.__cause__


def _legs(current: Current) -> dict[str, Any]:
    found = full_answer_of(current, known=timezone.now(), reach=None)["legs"]
    assert isinstance(found, dict)
    return found


def test_both_legs_show_the_other_and_the_planned_uplift_is_told(people: Cast) -> None:
    first = submitted(people)
    second = submit_load(_next(people, first), by=actor(people.preparer))

    # 200 US gal at 6.7 lb each are 1340 lb; 40 + 640 lb burned leave 660 lb; 1340 - 660 = 680 lb.
    assert _legs(second) == {
        "follows": {
            "load": first.load.id,
            "flight": "KT-214 leg 1, XNAL to XKOR, 2026-12-01T08:30:00-06:00",
            "state": "open",
            "href": f"/api/v1/loads/{first.load.id}",
        },
        "followed_by": [],
        "uplift": "planned uplift 680 lb, to 1340 lb at engine start",
    }
    shown = _legs(first)
    assert shown["follows"] is None
    assert [leg["load"] for leg in shown["followed_by"]] == [second.load.id]


def test_less_fuel_than_the_leg_before_lands_with_is_said(people: Cast) -> None:
    first = submitted(people)
    document = _next(people, first)
    document["fuel"]["at_engine_start"] = {"LEFT": q("45", "US gal"), "RIGHT": q("45", "US gal")}
    document["fuel"] |= {"trip": q("100", "lb")}
    second = submit_load(document, by=actor(people.preparer))

    # 90 US gal at 6.7 lb each are 603 lb, 57 lb less than the 660 lb left over.
    words = "57 lb less fuel at engine start than the leg before is to land with"
    assert _legs(second)["uplift"] == words


@pytest.mark.parametrize(
    ("flight", "code"),
    [
        ({"follows": str(uuid.uuid4())}, "unknown-load"),
        ({"follows": "KT-214"}, "id-form"),
        ({"origin": "XNAL", "destination": "XKOR"}, "leg-ends-elsewhere"),
        ({"departure": "2026-12-01T08:30:00-06:00"}, "leg-not-before"),
    ],
)
def test_a_link_that_cannot_be_is_refused_by_its_field(
    people: Cast, flight: dict[str, Any], code: str
) -> None:
    assert _refusal(people, _next(people, submitted(people), **flight)) == ("/flight/follows", code)
    assert not Leg.objects.exists()


def test_another_aircraft_another_operator_or_a_withdrawn_load_is_not_followed(people: Cast) -> None:
    first = submitted(people)
    make_aircraft(people, registration="Q9-OTH", serial_number="77")
    document = _next(people, first) | {"aircraft": "Q9-OTH"}
    assert _refusal(people, document) == ("/flight/follows", "leg-of-another-aircraft")

    flight = read_outline(_next(people, first)).flight
    with pytest.raises(Invalid) as refused:
        leg_before(strangers().operator.code, first.load.aircraft, flight)
    assert refused.value.faults[0].code == "unknown-load"

    withdraw_load(first.load.id, reason="weather", seen="1", by=actor(people.preparer))
    assert _refusal(people, _next(people, first)) == ("/flight/follows", "leg-not-standing")


def test_a_revision_of_the_next_leg_takes_its_place_in_the_link(people: Cast) -> None:
    first = submitted(people)
    second = submit_load(_next(people, first), by=actor(people.preparer))
    third = revise_load(
        second.load.id, _next(people, first), reason="later", seen="1", by=actor(people.preparer)
    )

    assert [leg["load"] for leg in _legs(first)["followed_by"]] == [third.load.id]


def test_the_paper_of_each_leg_names_the_other(people: Cast) -> None:
    first = submitted(people)
    second = submit_load(_next(people, first), by=actor(people.preparer))
    papers = {}
    for leg in (first, second):
        accepted(people, prepared(people, leg))
        papers[leg.load.id] = html_of(facts_of(Paper.objects.get(load=leg.load)))

    assert (
        f"follows KT-214 leg 1, XNAL to XKOR, 2026-12-01T08:30:00-06:00 (load {first.load.id})"
        in (papers[second.load.id])
    )
    assert f"(load {second.load.id})" in papers[first.load.id]


def test_the_database_itself_refuses_a_leg_that_does_not_follow(people: Cast) -> None:
    first, second = submitted(people), submitted(people)
    for load, before, tie in (
        (first, first, "leg_does_not_follow_itself"),
        (second, first, "leg_follows_the_flight_before"),
    ):
        with (
            pytest.raises(DatabaseError) as refused,
            act(SUBMIT_LOAD, by=actor(people.preparer), about="load:test") as entry,
        ):
            Leg.objects.create(load=load.load, operator_id=entry.chain, follows=before.load)
        assert cast_error(refused.value).diag.constraint_name == tie


def test_the_paper_prints_the_planned_uplift_as_it_was_at_the_acceptance(people: Cast) -> None:
    bounded(people)
    first = accepted(people)
    second = accepted(people, prepared(people, submit_load(_next(people, first), by=actor(people.preparer))))
    words = "Planned uplift 680 lb, to 1340 lb at engine start."

    alone, before = (html_of(facts_of(Paper.objects.get(load=leg.load))) for leg in (first, second))
    changed(people, first, change_of({"change": "fuel-on", "tank": "LEFT", "quantity": q("5", "US gal")}))
    after = html_of(facts_of(Paper.objects.get(load=second.load)))

    assert words in before
    assert "plift" not in alone
    assert after == before
    assert _legs(second)["uplift"].startswith("planned uplift 646.5 lb")  # 5 US gal at 6.7 lb less

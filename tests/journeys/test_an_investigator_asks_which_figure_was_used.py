"""Months later somebody asks which empty weight, which basis and which program a flight was computed with."""

import json
from typing import Any
from urllib.parse import quote

import pytest

from fleet.models import Aircraft
from loads.balance.engine import ENGINE_VERSION
from records.canonical import digest
from tests.cast import Cast, strangers
from tests.journeys.over_the_api import Answer, Desk
from tests.journeys.trail import unsound
from tests.loads.making import load_document
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft


@pytest.fixture(autouse=True)
def aircraft(people: Cast) -> Aircraft:
    return ready_aircraft(people)


def flown(people: Cast) -> Answer:
    load = Desk(people.preparer).post("/loads", load_document(people))
    accepted = Desk(people.pilot).sign(Desk(people.preparer).sign(load, "prepared"), "accepted")
    assert accepted.status == 200
    return accepted


def weights(people: Cast, at: str, known: str) -> Any:
    query = f"at={quote(at)}&as-known-at={quote(known)}"
    answer = Desk(people.auditor).get(f"/aircraft/Q9-KTB/empty-weights?{query}")
    assert answer.status == 200
    return answer.body


def test_the_figures_of_a_flight_are_found_although_they_were_corrected_since(
    people: Cast, aircraft: Aircraft
) -> None:
    before = flown(people)
    heavier = empty_weight_document(weight=q("5301", "lb"), report="W-2026-40")
    make_empty_weight(people, aircraft, heavier)

    load = Desk(people.auditor).get(f"/loads/{before.body['id']}").body
    used, departure = load["basis"], load["flight"]["departure"]
    then = weights(people, departure, load["assessed_at"])
    now = weights(people, departure, "2027-06-01T00:00:00Z")

    assert [one["id"] for one in then["in_force"]] == [used["empty_weight"]["id"]]
    assert [one["digest"] for one in then["in_force"]] == [used["empty_weight"]["digest"]]
    assert [one["id"] for one in now["in_force"]] != [used["empty_weight"]["id"]]
    version = Desk(people.auditor).get(f"/aircraft/Q9-KTB/empty-weights/{used['empty_weight']['id']}").body
    assert version["document"]["weight"] == {"value": "5214", "unit": "lb"}
    assert version["document"]["report"] == "W-2025-31"
    assert version["entered_by"] == f"person:{people.maintenance.pk}"
    assert version["approval"]["approved_by"] == f"person:{people.approver.pk}"
    assert used["engine"] == ENGINE_VERSION


def test_every_digest_in_the_answer_is_that_of_what_it_names(people: Cast) -> None:
    load = Desk(people.auditor).get(f"/loads/{flown(people).body['id']}").body

    for kind, path in (("empty_weight", "empty-weights"), ("loading_basis", "loading-bases")):
        used = load["basis"][kind]
        version = Desk(people.auditor).get(f"/aircraft/Q9-KTB/{path}/{used['id']}").body
        assert (version["digest"], digest(version["document"])) == (used["digest"], used["digest"])
    assert {signature["digest"] for signature in load["signatures"]} == {load["digest"]}
    assert load["digest"] in load["signatures"][0]["statement"]


def test_who_signed_is_told_with_capacity_and_time_and_who_asks_leaves_no_mark(people: Cast) -> None:
    done = flown(people)

    load = Desk(people.auditor).get(f"/loads/{done.body['id']}").body

    assert [(one["name"], one["capacity"], one["meaning"]) for one in load["signatures"]] == [
        ("D. Lorn", "load preparer", "prepared"),
        ("R. Amani", "pilot in command", "accepted"),
    ]
    assert [step["state"] for step in load["steps"]] == ["open", "prepared", "accepted"]
    assert unsound() == ()


def test_another_operators_investigator_is_told_of_nothing(people: Cast) -> None:
    done = flown(people)
    outsider = Desk(strangers().manager)

    answers = [
        outsider.get(f"/loads/{done.body['id']}"),
        outsider.get(f"/loads/{done.body['id']}/manifest"),
        outsider.get("/aircraft/Q9-KTB/empty-weights"),
        outsider.get(f"/aircraft/Q9-KTB/empty-weights/{done.body['basis']['empty_weight']['id']}"),
    ]

    assert {answer.status for answer in answers} == {404}
    assert "5214" not in json.dumps([answer.body for answer in answers])

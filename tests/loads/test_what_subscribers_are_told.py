"""What the loads room tells subscribers: when, of what, and never a person's name."""

import json

import pytest

from fleet.actions.announcing import announce_falling_due
from loads.actions.accept_load import accept_load
from loads.actions.announcing import announce_stale
from loads.actions.assess_again import assess_again
from loads.actions.file_manifest import file_manifest
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.acts import ASSESS_LOAD
from loads.models import Paper
from records.act import act
from records.models import WebhookEvent
from records.refusal import Refused
from records.webhooks.message import MOST_BYTES
from records.webhooks.subscribe import subscribe
from tests.cast import actor, cast, strangers
from tests.loads.making import (
    DEPARTURE_AT,
    accepted,
    load_document,
    outside_document,
    prepared,
    signing,
    submitted,
)
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft

pytestmark = pytest.mark.django_db
EVERYTHING = ("load.rejected", "load.accepted", "load.stale", "manifest.filed", "falling.due")


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    for who in (made.manager, strangers().manager):
        subscribe(actor(who), address="https://hooks.example.org/", events=EVERYTHING, label="")
    return made


def told() -> list[tuple[str, str]]:
    return list(WebhookEvent.objects.order_by("id").values_list("name", "about"))


def data() -> dict:
    event = WebhookEvent.objects.order_by("id").last()
    assert not any(name in event.body for name in ("Osei", "Dravo", "Amani", "Orr", "Pell", "Lorn"))
    assert len(event.body) < MOST_BYTES
    return json.loads(event.body)["data"]


def test_a_load_within_its_limits_is_no_event(people):
    submitted(people)

    assert told() == []


def test_a_reject_is_told_with_its_failed_checks(people):
    load = submit_load(outside_document(people), by=actor(people.preparer)).load

    assert told() == [("load.rejected", f"load:{load.id}")]
    assert (data()["aircraft"], data()["reference"], data()["verdict"]) == ("Q9-KTB", "KT-214", "outside")
    assert data()["href"] == f"/api/v1/loads/{load.id}"
    assert data()["checks"]
    assert {check["result"] for check in data()["checks"]} <= {"fail", "unresolved"}


def test_a_revision_that_is_a_reject_is_told_with_what_it_replaces(people):
    first = submitted(people)

    revise_load(
        first.load.id, outside_document(people), reason="castings aboard", seen="1", by=actor(people.preparer)
    )

    assert data()["replaces"] == str(first.load.id)


def test_a_load_that_turns_into_a_reject_when_assessed_again_is_told(people):
    load = submitted(people).load
    heavy = empty_weight_document(weight=q("7900", "lb"), moment=q("971210", "lb in"))
    make_empty_weight(people, load.aircraft, heavy)

    assess_again(load.id, seen="1", by=actor(people.preparer))

    assert told() == [("load.rejected", f"load:{load.id}")]


def test_an_acceptance_and_its_filed_manifest_are_told_once_each(people):
    current = accepted(people)
    about = f"load:{current.load.id}"
    assert told() == [("load.accepted", about)]
    assert (data()["digest"], data()["manifest"]["number"]) == (current.assessment.digest, 1)

    filed = file_manifest(Paper.objects.get())
    file_manifest(Paper.objects.get())

    assert told() == [("load.accepted", about), ("manifest.filed", about)]
    assert data()["manifest"]["digest"] == filed.document_id


def test_an_acceptance_that_is_refused_is_not_told(people):
    current = prepared(people)

    with pytest.raises(Refused):
        accept_load(current.load.id, signing(current), seen="2", by=actor(people.other_pilot))

    assert told() == []


def test_staleness_and_what_falls_due_are_told_by_whoever_finds_them(people):
    current = submitted(people)
    with act(ASSESS_LOAD, by=actor(people.preparer), about=f"load:{current.load.id}") as entry:
        announce_stale(entry, current.load, current.assessment, ["empty weight"])
        assert data()["changed"] == ["empty weight"]
        announce_falling_due(entry, "aircraft:1", what="weighing", due=DEPARTURE_AT, registration="Q9-KTB")

    assert [name for name, _ in told()] == ["load.stale", "falling.due"]
    assert data() == {
        "about": "aircraft:1", "aircraft": "Q9-KTB", "due": DEPARTURE_AT.isoformat(), "what": "weighing",
    }  # fmt: skip


def test_a_load_with_many_failed_checks_is_told_shortly(people):
    document = load_document(people)
    document["items"] = [dict(document["items"][0], what=f"box {n}") for n in range(150)]

    submit_load(document, by=actor(people.preparer))

    assert len(data()["checks"]) <= 20

"""A weighing turns out wrong: the correction is a new version, flown loads keep what they were flown on."""

import hashlib

import pytest

from fleet.models import Aircraft
from loads.models import Assessment
from tests.cast import Cast
from tests.journeys.over_the_api import Answer, Desk
from tests.journeys.trail import unsound
from tests.loads.making import load_document
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft


@pytest.fixture
def aircraft(people: Cast) -> Aircraft:
    return ready_aircraft(people)


def submitted(people: Cast, reference: str) -> Answer:
    flight = load_document(people)["flight"] | {"reference": reference}
    return Desk(people.preparer).post("/loads", load_document(people, flight=flight))


def corrected(people: Cast, aircraft: Aircraft, weight: str = "5301") -> None:
    document = empty_weight_document(
        weight=q(weight, "lb"), report="W-2025-31 corrected", true_from="2026-01-01T00:00:00Z"
    )
    make_empty_weight(people, aircraft, document)


def test_a_flown_load_keeps_its_figures_its_digest_and_its_paper(people: Cast, aircraft: Aircraft) -> None:
    load = submitted(people, "KT-OLD")
    accepted = Desk(people.pilot).sign(Desk(people.preparer).sign(load, "prepared"), "accepted")
    path = f"/loads/{accepted.body['id']}"
    paper = Desk(people.pilot).get(f"{path}/manifest").body
    before = Desk(people.auditor).get(path).body

    corrected(people, aircraft)
    after = Desk(people.auditor).get(path).body

    assert after["stale"] == ["empty weight"]
    assert {**after, "stale": []} == {**before, "stale": []}
    again = Desk(people.pilot).get(f"{path}/manifest").body
    assert hashlib.sha256(again).hexdigest() == hashlib.sha256(paper).hexdigest()
    assert unsound() == ()


def test_an_open_load_is_stale_and_is_signed_only_when_assessed_again(
    people: Cast, aircraft: Aircraft
) -> None:
    load = submitted(people, "KT-OPEN")
    corrected(people, aircraft)
    path = f"/loads/{load.body['id']}"

    refused = Desk(people.preparer).sign(load, "prepared")
    assert (refused.status, refused.body["code"]) == (409, "stale")

    again = Desk(people.preparer).post(f"{path}/assessment", {}, seen=load.etag)
    assert (again.status, again.body["state"]) == (200, "open")
    assert again.body["digest"] != load.body["digest"]
    old, new = (answer.body["operating_weight"]["weight"] for answer in (load, again))
    assert float(new) - float(old) == 87.0
    old_digest = Desk(people.preparer).post(
        f"{path}/signatures",
        {"meaning": "prepared", "digest": load.body["digest"], "password": "quiet-harbour-lantern-7"},
        seen=again.etag,
    )
    assert (old_digest.status, old_digest.body["code"]) == (409, "digest-differs")

    signed = Desk(people.preparer).sign(again, "prepared")
    assert signed.status == 200
    assert Assessment.objects.filter(load=load.body["id"]).count() == 2
    assert unsound() == ()


def test_a_correction_that_makes_an_open_load_too_heavy_makes_it_a_reject(
    people: Cast, aircraft: Aircraft
) -> None:
    load = submitted(people, "KT-OPEN")
    prepared = Desk(people.preparer).sign(load, "prepared")
    corrected(people, aircraft, weight="7600")

    again = Desk(people.preparer).post(f"/loads/{load.body['id']}/assessment", {}, seen=prepared.etag)

    assert (again.status, again.body["state"], again.body["verdict"]) == (200, "open", "outside")
    refused = Desk(people.pilot).sign(again, "accepted")
    assert refused.status == 409
    assert unsound() == ()


def test_loads_submitted_afterwards_rest_on_the_correction(people: Cast, aircraft: Aircraft) -> None:
    before = submitted(people, "KT-BEFORE").body["basis"]["empty_weight"]["id"]

    corrected(people, aircraft)

    after = submitted(people, "KT-AFTER").body["basis"]["empty_weight"]["id"]
    assert after != before

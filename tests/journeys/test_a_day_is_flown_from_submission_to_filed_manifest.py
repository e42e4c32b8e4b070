"""One load goes all the way: rejected, mended by a revision, signed by two people, filed, departed."""

import hashlib

import pytest
from django.utils import timezone

from fleet.models import Aircraft, Person
from tests.cast import Cast
from tests.journeys.over_the_api import Answer, Desk
from tests.journeys.trail import acts_about, unsound
from tests.loads.making import load_document, outside_document
from tests.makers import ready_aircraft


@pytest.fixture(autouse=True)
def aircraft(people: Cast) -> Aircraft:
    return ready_aircraft(people)


def submitted(person: Person, document: dict[str, object]) -> Answer:
    made = Desk(person).post("/loads", document)
    assert made.status == 201
    return made


def test_a_rejected_load_is_mended_signed_filed_and_flown(people: Cast) -> None:
    preparer, pilot = Desk(people.preparer), Desk(people.pilot)

    reject = submitted(people.preparer, outside_document(people))
    assert (reject.body["verdict"], reject.body["state"]) == ("outside", "open")
    failed = [check for check in reject.body["checks"] if check["result"] == "fail"]
    assert failed
    assert all(check["what_next"] for check in failed)
    refused = preparer.sign(reject, "prepared")
    assert (refused.status, refused.body["code"]) == (409, "not-within")

    mended = load_document(people) | {"reason": "two passengers and the castings go on the next flight"}
    revision = preparer.post(f"/loads/{reject.body['id']}/revisions", mended, seen=reject.etag)
    assert (revision.status, revision.body["verdict"]) == (201, "within")
    assert revision.body["replaces"] == reject.body["id"]
    assert preparer.get(f"/loads/{reject.body['id']}").body["state"] == "superseded"

    prepared = preparer.sign(revision, "prepared")
    stranger = Desk(people.other_pilot).sign(prepared, "accepted")
    assert (stranger.status, stranger.body["code"]) == (409, "not-pilot-in-command")
    accepted = pilot.sign(prepared, "accepted")
    assert (accepted.status, accepted.body["state"]) == (200, "accepted")

    paper = pilot.get(f"/loads/{revision.body['id']}/manifest")
    assert paper.status == 200
    assert paper.body.startswith(b"%PDF-")

    left = pilot.post(
        f"/loads/{revision.body['id']}/departure", {"at": timezone.now().isoformat()}, seen=accepted.etag
    )
    assert (left.status, left.body["state"]) == (200, "departed")
    too_late = preparer.post(f"/loads/{revision.body['id']}/revisions", mended, seen=left.etag)
    assert (too_late.status, too_late.body["code"]) == (409, "step-not-allowed")

    again = Desk(people.auditor).get(f"/loads/{revision.body['id']}/manifest")
    assert hashlib.sha256(again.body).digest() == hashlib.sha256(paper.body).digest()
    assert acts_about(f"load:{revision.body['id']}") == [
        "revise-load",
        "prepare-load",
        "accept-load",
        "file-manifest",
        "depart-load",
    ]
    assert unsound() == ()


def test_the_manifests_of_a_day_are_numbered_without_gaps_whatever_is_rejected_between(people: Cast) -> None:
    numbers = []
    for reference in ("KT-1", "KT-2", "KT-3"):
        submitted(people.preparer, outside_document(people))
        flight = load_document(people)["flight"] | {"reference": reference}
        load = submitted(people.preparer, load_document(people, flight=flight))
        wrong = Desk(people.preparer).sign(load, "prepared", password="not-this-one-at-all")
        assert wrong.status == 422
        accepted = Desk(people.pilot).sign(Desk(people.preparer).sign(load, "prepared"), "accepted")
        numbers.append(accepted.body["manifest"]["number"])

    listed = Desk(people.auditor).get("/loads?state=accepted").body["loads"]

    assert numbers == [1, 2, 3]
    assert {line["flight"]["reference"] for line in listed} == {"KT-1", "KT-2", "KT-3"}
    assert unsound() == ()

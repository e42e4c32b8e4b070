"""Last-minute changes and notes over the API: previewed, signed, read, and what bad requests get."""

import json

import pytest
from django.utils import timezone

from loads.models import LateChange, Note
from tests.cast import PASSWORD, actor, api, cast, strangers
from tests.loads.api.test_loads_api import answer, send
from tests.loads.late import BAG, bounded, change_of
from tests.loads.making import accepted
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    bounded(made)
    return made


def preview(person, load, change):
    body = json.dumps(change)
    return api(person).post(
        f"/api/v1/loads/{load}/last-minute-changes/preview", data=body, content_type="application/json"
    )


def test_a_change_is_previewed_then_signed_by_the_digest_that_was_shown(people) -> None:
    load = accepted(people).load.id

    shown = preview(people.pilot, load, change_of(BAG))
    body = answer(shown)
    assert (shown.status_code, body["verdict"], body["issue"], body["step"]) == (200, "within", 2, 3)
    assert body["lines"] == ["baggage “bag at the door” on, NOSE-HOLD, 20 lb weighed"]
    assert body["moved"] == "20 lb and 0 persons"
    assert body["bound"] == {"weight": q("200", "lb"), "persons": 1, "settings": 1}
    assert body["digest"] in body["to_sign"]
    assert LateChange.objects.count() == 0

    signed = send(
        people.pilot,
        f"/loads/{load}/last-minute-changes",
        change_of(BAG) | {"digest": body["digest"], "password": PASSWORD},
        seen='"3"',
    )
    made = answer(signed)
    assert (signed.status_code, signed["ETag"], made["state"]) == (200, '"4"', "accepted")
    assert made["manifest"] == {"number": 1, "issue": 2, "href": f"/api/v1/loads/{load}/manifest"}
    (change,) = made["late_changes"]
    assert (change["number"], change["issue"], change["digest"]) == (1, 2, body["digest"])
    assert change["moved"] == {"kilograms": "9.0718474", "persons": 0}
    assert "Amani" not in signed.content.decode()
    read = answer(api(people.auditor).get(f"/api/v1/loads/{load}"))
    assert [item["what"] for item in read["declared"]["items"]] == ["checked bags", "bag at the door"]
    assert read["to_sign"] == {}


def test_each_issue_of_the_manifest_can_be_fetched(people) -> None:
    load = accepted(people).load.id
    digest = answer(preview(people.pilot, load, change_of(BAG)))["digest"]
    body = change_of(BAG) | {"digest": digest, "password": PASSWORD}
    send(people.pilot, f"/loads/{load}/last-minute-changes", body, seen='"3"')
    at = f"/api/v1/loads/{load}/manifest"

    first, second, last = (api(people.auditor).get(at + part) for part in ("?issue=1", "?issue=2", ""))

    assert first.content.startswith(b"%PDF-")
    assert second.content == last.content != first.content
    assert api(people.auditor).get(f"{at}?issue=3").status_code == 404
    assert api(people.auditor).get(f"{at}?issue=one").status_code == 422


def test_beyond_the_bound_the_next_step_is_a_revision(people) -> None:
    load = accepted(people).load.id

    refused = preview(people.pilot, load, change_of(BAG | {"weight": q("201", "lb")}))

    assert (refused.status_code, answer(refused)["code"]) == (409, "beyond-the-bound")
    assert "Revise" in answer(refused)["next_step"]


@pytest.mark.parametrize(
    ("changes", "seen", "status", "code"),
    [
        ({"password": "wrong"}, '"3"', 422, None),
        ({}, None, 428, None),
        ({}, '"2"', 412, "state-moved-on"),
        ({"digest": "0" * 64}, '"3"', 409, "digest-differs"),
        ({"note": "x"}, '"3"', 422, None),
        ({"lines": "x"}, '"3"', 422, None),
        ({"persons_on_board": "3"}, '"3"', 422, None),
    ],
)
def test_a_request_that_does_not_do_stores_nothing(people, changes, seen, status, code) -> None:
    load = accepted(people).load.id
    digest = answer(preview(people.pilot, load, change_of(BAG)))["digest"]
    body = change_of(BAG) | {"digest": digest, "password": PASSWORD} | changes

    refused = send(people.pilot, f"/loads/{load}/last-minute-changes", body, seen=seen)

    assert refused.status_code == status
    assert code in {None, answer(refused)["code"]}
    assert LateChange.objects.count() == 0


def test_who_may_not_sign_cannot_try_passwords_here(people) -> None:
    load = accepted(people).load.id
    body = change_of(BAG) | {"digest": "0" * 64, "password": "wrong"}

    refused = send(people.preparer, f"/loads/{load}/last-minute-changes", body, seen='"3"')

    assert (refused.status_code, answer(refused)["code"]) == (403, "signature-not-allowed")


def test_another_operators_load_is_not_known(people) -> None:
    load, stranger = accepted(people).load.id, strangers().pilot
    body = change_of(BAG) | {"digest": "0" * 64, "password": PASSWORD}

    assert preview(stranger, load, change_of(BAG)).status_code == 404
    assert send(stranger, f"/loads/{load}/last-minute-changes", body, seen='"3"').status_code == 404
    assert send(stranger, f"/loads/{load}/notes", {"text": "x"}).status_code == 404


def test_a_note_is_written_once_and_read_with_the_load(people) -> None:
    current = accepted(people)
    at = f"/loads/{current.load.id}"
    assert send(people.pilot, f"{at}/notes", {"text": "early"}).status_code == 409
    send(people.pilot, f"{at}/departure", {"at": timezone.now().isoformat()}, seen='"3"')

    made = send(people.pilot, f"{at}/notes", {"text": "M. Dravo sat in row 2."}, key="once")
    again = send(people.pilot, f"{at}/notes", {"text": "M. Dravo sat in row 2."}, key="once")

    assert (made.status_code, again.content) == (201, made.content)
    assert Note.objects.count() == 1
    (note,) = answer(api(people.auditor).get(f"/api/v1{at}"))["notes"]
    assert (note["text"], note["name"]) == ("M. Dravo sat in row 2.", "R. Amani")
    assert send(people.auditor, f"{at}/notes", {"text": "x"}).status_code == 403


def test_a_stale_accepted_load_says_so_and_what_was_told(people) -> None:
    current = accepted(people)
    make_empty_weight(people, current.load.aircraft, empty_weight_document(weight=q("5210", "lb")))

    read = answer(api(people.auditor).get(f"/api/v1/loads/{current.load.id}"))

    assert (read["stale"], read["stale_notices"]) == (["empty weight"], [])
    assert preview(people.pilot, current.load.id, change_of(BAG)).status_code == 409
    assert actor(people.pilot).may >= {"change-load-late"}

"""Tables, rules, restrictions and permits over the API: entered, listed on both clocks, approved, ended."""

import uuid
from datetime import timedelta

import pytest
from django.utils import timezone

from tests.cast import api, cast
from tests.makers import ready_aircraft
from tests.pure.loads.papers import lb, permit_document, restriction_document
from tests.pure.loads.standards import seasonal_document

pytestmark = pytest.mark.django_db
LOWER = {"effect": "limit", "limit": "take_off", "weight": lb("8000")}
ONE = "/api/v1/aircraft/Q9-KTB"


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def post(person, path, body):
    return api(person).post(path, body, format="json", headers={"Idempotency-Key": str(uuid.uuid4())})


def test_a_table_is_entered_approved_and_then_in_force_on_both_clocks(people) -> None:
    entered = post(people.manager, "/api/v1/standard-weights", seasonal_document())
    assert entered.status_code == 201
    line = entered.json()
    assert entered.headers["Location"] == f"/api/v1/standard-weights/{line['id']}"
    assert (line["kind"], line["number"], line["approval"], line["aircraft"]) == (
        "standard weights",
        1,
        None,
        None,
    )
    before = timezone.now()

    approved = post(people.approver, f"/api/v1/standard-weights/{line['id']}/approval", {"reason": "read"})

    assert approved.json()["approval"]["approved_by"] == f"person:{people.approver.id}"
    asked = {"at": "2026-06-01T00:00:00Z"}
    found = api(people.pilot).get("/api/v1/standard-weights", asked).json()
    assert found["in_force"] == [line["id"]]
    known = asked | {"as-known-at": before.isoformat()}
    assert api(people.pilot).get("/api/v1/standard-weights", known).json()["in_force"] == []
    early = {"at": "2025-12-31T23:59:59Z"}
    assert api(people.pilot).get("/api/v1/standard-weights", early).json()["in_force"] == []
    one = api(people.pilot).get(f"/api/v1/standard-weights/{line['id']}")
    assert one.json()["document"] == seasonal_document()


def test_an_approval_states_no_beginning_of_its_own(people) -> None:
    line = post(people.manager, "/api/v1/standard-weights", seasonal_document()).json()

    refused = post(
        people.approver,
        f"/api/v1/standard-weights/{line['id']}/approval",
        {"true_from": "2026-01-01T00:00:00Z"},
    )

    assert refused.status_code == 422
    assert refused.json()["errors"][0]["pointer"] == "/true_from"


def test_a_restriction_is_in_force_at_once_and_until_it_is_lifted(people) -> None:
    document = restriction_document(LOWER, true_from="2026-01-01T00:00:00Z")
    line = post(people.maintenance, f"{ONE}/restrictions", document).json()
    assert api(people.pilot).get(f"{ONE}/restrictions").json()["in_force"] == [line["id"]]

    lifted = post(people.approver, f"{ONE}/restrictions/{line['id']}/lifting", {"reason": "repaired"})

    assert lifted.json()["ending"]["reason"] == "repaired"
    now = api(people.pilot).get(f"{ONE}/restrictions").json()
    assert (now["in_force"], len(now["versions"])) == ([], 1)
    then = {"at": "2026-03-01T00:00:00Z"}
    assert api(people.pilot).get(f"{ONE}/restrictions", then).json()["in_force"] == [line["id"]]


def test_a_permit_holds_from_its_approval_between_its_dates(people) -> None:
    soon = timezone.now()
    dates = {
        "true_from": (soon - timedelta(days=1)).isoformat(timespec="seconds"),
        "true_until": (soon + timedelta(days=1)).isoformat(timespec="seconds"),
    }
    line = post(people.maintenance, f"{ONE}/permits", permit_document(LOWER, **dates)).json()
    assert api(people.pilot).get(f"{ONE}/permits").json()["in_force"] == []

    post(people.approver, f"{ONE}/permits/{line['id']}/approval", {})

    assert api(people.pilot).get(f"{ONE}/permits").json()["in_force"] == [line["id"]]
    after = {"at": dates["true_until"]}
    assert api(people.pilot).get(f"{ONE}/permits", after).json()["in_force"] == []
    ended = post(people.maintenance, f"{ONE}/permits/{line['id']}/ending", {"reason": "not needed"})
    assert ended.status_code == 201
    assert api(people.pilot).get(f"{ONE}/permits").json()["in_force"] == []


def test_a_version_of_another_aircraft_is_not_known(people) -> None:
    ready_aircraft(people, "Q9-OTH")
    line = post(people.maintenance, f"{ONE}/restrictions", restriction_document(LOWER)).json()

    assert api(people.pilot).get(f"/api/v1/aircraft/Q9-OTH/restrictions/{line['id']}").status_code == 404
    assert api(people.pilot).get(f"{ONE}/permits/{line['id']}").status_code == 404

"""Empty weights over the API: entered, approved by another person, asked for by both clocks."""

import json
from typing import Any
from urllib.parse import quote

import pytest
from django.http import HttpResponse

from fleet.models import Approval, EmptyWeight, Standing
from records.models import Change, Seal
from tests.cast import Cast, api, cast, get, post, strangers
from tests.makers import basis_document, empty_weight_document, make_aircraft, make_basis, q

pytestmark = pytest.mark.django_db

ONE = "/aircraft/Q9-KTB"
WEIGHINGS, WEIGHTS = f"{ONE}/weighings", f"{ONE}/empty-weights"


@pytest.fixture
def people() -> Cast:
    people = cast()
    make_basis(people, make_aircraft(people))
    return people


def entered(people: Cast, **changes: Any) -> dict[str, Any]:
    response = post(api(people.maintenance), WEIGHINGS, empty_weight_document(**changes))
    assert response.status_code == 201, response.content
    return dict(json.loads(response.content))


def approved(people: Cast, **changes: Any) -> dict[str, Any]:
    weight = entered(people, **changes)
    response = post(api(people.approver), f"{WEIGHTS}/{weight['id']}/approval", {})
    assert response.status_code == 201, response.content
    return dict(json.loads(response.content))


def code(response: HttpResponse, status: int) -> str:
    assert response.status_code == status, response.content
    return str(json.loads(response.content)["code"])


def faults(response: HttpResponse) -> list[tuple[str, str]]:
    assert response.status_code == 422, response.content
    return [(error["pointer"], error["code"]) for error in json.loads(response.content)["errors"]]


def in_force(people: Cast, at: str, known: str = "") -> list[str]:
    query = f"?at={quote(at)}" + (f"&as-known-at={quote(known)}" if known else "")
    response = get(api(people.auditor), WEIGHTS + query)
    assert response.status_code == 200, response.content
    return [each["id"] for each in json.loads(response.content)["in_force"]]


def test_a_weighing_is_entered_and_stands_once_a_second_person_approves(people: Cast) -> None:
    weight = entered(people)
    before = in_force(people, "2026-06-01T00:00:00Z")

    response = post(api(people.approver), f"{WEIGHTS}/{weight['id']}/approval", {"reason": "report seen"})

    assert response.status_code == 201, response.content
    body = json.loads(response.content)
    assert before == []
    assert in_force(people, "2026-06-01T00:00:00Z") == [weight["id"]]
    assert body["approval"]["true_from"] == body["true_from"] == "2026-01-01T00:00:00Z"
    assert body["fit"] == "wheels"


def test_an_opening_entry_from_paper_begins_a_history(people: Cast) -> None:
    weight = approved(people, how="opening entry", date="2019-04-02", true_from="2019-04-02T00:00:00-06:00")

    shown = json.loads(get(api(people.pilot), f"{WEIGHTS}/{weight['id']}").content)

    assert shown["document"]["how"] == "opening entry"
    assert in_force(people, "2019-04-02T06:00:00Z") == [weight["id"]]
    assert in_force(people, "2019-04-02T05:59:59Z") == []


def test_a_weighing_entered_late_is_true_then_and_known_only_now(people: Cast) -> None:
    first = approved(people)
    known_then = first["approval"]["approved_at"]
    late = approved(people, true_from="2026-03-01T00:00:00Z", report="W-2026-02")

    flight = "2026-04-01T12:00:00Z"

    assert in_force(people, flight) == [late["id"]]
    assert in_force(people, flight, known_then) == [first["id"]]
    assert in_force(people, "2026-02-01T00:00:00Z") == [first["id"]]


def test_each_base_fit_has_its_own_empty_weight(people: Cast) -> None:
    wheels = approved(people)
    skis = approved(people, fit="skis", report="W-2026-03")

    assert in_force(people, "2026-06-01T00:00:00Z") == [skis["id"], wheels["id"]]


def test_the_history_shows_every_version_with_author_approval_and_windows(people: Cast) -> None:
    approved(people)
    correction = approved(people, moment=q("641500", "lb in"), report="W-2025-31 corrected")

    versions = json.loads(get(api(people.auditor), WEIGHTS).content)["empty_weights"]

    by_id = {each["id"]: each for each in versions}
    corrected = by_id.pop(correction["id"])
    (first,) = by_id.values()
    assert corrected["windows"][0]["known_until"] is None
    assert first["windows"][0]["known_until"] == corrected["windows"][0]["known_from"]
    assert first["entered_by"] == f"person:{people.maintenance.id}"
    assert first["document"]["weight"] == {"value": "5214", "unit": "lb"}


def test_who_signed_the_report_stands_nowhere_in_the_trail(people: Cast) -> None:
    approved(people, signed_by="Orrin Vashti")

    assert not Seal.objects.filter(entry__contains="Vashti").exists()
    change = Change.objects.get(table_name="fleet_emptyweight")
    assert "sha256:" in change.image
    assert EmptyWeight.objects.get().digest in change.image


@pytest.mark.parametrize(
    ("changes", "fault"),
    [
        ({"datum": "nose"}, ("/datum", "datum-differs")),
        ({"fit": "floats"}, ("/fit", "fit-unknown")),
        (
            {"weight": q("9900", "lb"), "moment": q("1217000", "lb in")},
            ("/weight", "empty-weight-implausible"),
        ),
        (
            {"weight": q("5214", "kg"), "moment": q("641000", "kg in")},
            ("/weight", "empty-weight-implausible"),
        ),
        ({"weight": q("0", "lb")}, ("/weight/value", "not-above-zero")),
        ({"weight": q("-5214", "lb")}, ("/weight/value", "not-above-zero")),
        ({"weight": {"value": "5214"}}, ("/weight/unit", "unit-missing")),
        ({"weight": q("5214", "in")}, ("/weight/unit", "unit-dimension")),
        ({"weight": q("5214", "stone")}, ("/weight/unit", "unit-unknown")),
        ({"weight": q("5,214", "lb")}, ("/weight/value", "number-form")),
        ({"weight": q(" 5214", "lb")}, ("/weight/value", "number-form")),
        ({"weight": q("5e3", "lb")}, ("/weight/value", "number-form")),
        ({"weight": q("NaN", "lb")}, ("/weight/value", "number-form")),
        ({"weight": q("1" * 16, "lb")}, ("/weight/value", "number-digits")),
        ({"weight": 5214}, ("/weight", "wrong-type")),
        ({"moment": q("641000", "lb")}, ("/moment/unit", "unit-dimension")),
        ({"moment": q("641000", "lb in"), "arm": q("12.3", "in")}, ("/moment", "moment-against-arm")),
        ({"how": "calculated"}, ("/how", "not-a-choice")),
        ({"date": "2026-02-30"}, ("/date", "wrong-form")),
        ({"date": "30.12.2025"}, ("/date", "wrong-form")),
        ({"true_from": "2026-01-01T00:00:00"}, ("/true_from", "wrong-form")),
        ({"true_from": "2025-11-01T00:00:00Z"}, ("/true_from", "true-before-weighing")),
        (
            {"how": "opening entry", "true_from": "0001-01-01T00:00:00+14:00"},
            ("/true_from", "instant-implausible"),
        ),
        ({"true_from": "9999-12-31T23:59:59-14:00"}, ("/true_from", "instant-implausible")),
        ({"report": ""}, ("/report", "empty")),
        ({"fit": "x" * 200}, ("/fit", "too-long")),
        ({"includes": {"oil": "full"}}, ("/includes/unusable_fuel", "missing")),
        ({"schema": "tarebook.empty-weight/9"}, ("/schema", "schema-unknown")),
        ({"remark": "x"}, ("/remark", "unknown-field")),
    ],
)
def test_what_is_wrong_with_an_empty_weight_is_named(
    changes: dict[str, Any], fault: tuple[str, str], people: Cast
) -> None:
    response = post(api(people.maintenance), WEIGHINGS, empty_weight_document(**changes))

    assert fault in faults(response)
    assert not EmptyWeight.objects.exists()


@pytest.mark.parametrize("field", sorted(empty_weight_document()))
def test_every_field_of_an_empty_weight_is_needed(field: str, people: Cast) -> None:
    document = empty_weight_document()
    del document[field]

    response = post(api(people.maintenance), WEIGHINGS, document)

    assert response.status_code == 422
    assert not EmptyWeight.objects.exists()


def test_an_empty_weight_may_be_given_in_other_units_than_the_basis_has(people: Cast) -> None:
    weight = approved(
        people, weight=q("2365.03", "kg"), moment=q("7385290", "kg mm"), lateral_moment=q("0", "kg mm")
    )

    assert in_force(people, "2026-06-01T00:00:00Z") == [weight["id"]]


def test_without_a_basis_in_force_an_opening_entry_names_its_own_datum() -> None:
    people = cast()
    make_aircraft(people)

    assert approved(people, datum="nose", fit="floats")["fit"] == "floats"


def test_an_empty_weight_that_no_longer_goes_with_the_basis_is_not_approved(people: Cast) -> None:
    aircraft_basis = basis_document(datum={"name": "aft face of firewall", "source": {"page": "6-2"}})
    weight = entered(people)
    basis = json.loads(post(api(people.maintenance), f"{ONE}/loading-bases", aircraft_basis).content)
    post(
        api(people.approver),
        f"{ONE}/loading-bases/{basis['id']}/approval",
        {"true_from": "2026-01-01T00:00:00Z"},
    )

    refused = post(api(people.approver), f"{WEIGHTS}/{weight['id']}/approval", {})

    assert code(refused, 409) == "empty-weight-unfit"
    assert json.loads(refused.content)["errors"][0]["code"] == "datum-differs"
    assert not Approval.objects.filter(empty_weight__isnull=False).exists()


def test_the_person_who_entered_it_the_pilot_and_a_second_approval_are_refused(people: Cast) -> None:
    own = json.loads(post(api(people.manager), WEIGHINGS, empty_weight_document()).content)
    address = f"{WEIGHTS}/{own['id']}/approval"

    assert code(post(api(people.manager), address, {}), 403) == "second-person-needed"
    assert code(post(api(people.pilot), address, {}), 403) == "act-not-allowed"
    assert code(post(api(people.maintenance), address, {}), 403) == "act-not-allowed"
    assert post(api(people.approver), address, {}).status_code == 201
    assert code(post(api(people.approver), address, {}), 409) == "approved-already"
    assert Standing.objects.filter(kind="empty weight").count() == 1


def test_an_approval_does_not_move_when_an_empty_weight_holds(people: Cast) -> None:
    weight = entered(people)

    response = post(
        api(people.approver), f"{WEIGHTS}/{weight['id']}/approval", {"true_from": "2026-05-01T00:00:00Z"}
    )

    assert faults(response) == [("/true_from", "unknown-field")]


def test_another_operators_empty_weight_is_not_known(people: Cast) -> None:
    weight = entered(people)
    theirs = strangers()

    assert get(api(theirs.pilot), WEIGHTS).status_code == 404
    assert get(api(theirs.pilot), f"{WEIGHTS}/{weight['id']}").status_code == 404
    assert post(api(theirs.manager), WEIGHINGS, empty_weight_document()).status_code == 404
    assert post(api(theirs.manager), f"{WEIGHTS}/{weight['id']}/approval", {}).status_code == 404


@pytest.mark.parametrize(
    "query", ["at=now", "as-known-at=2026-01-01", "at=2026-01-01T00:00:00", "when=1", "at="]
)
def test_a_question_that_cannot_be_read_is_refused(query: str, people: Cast) -> None:
    response = get(api(people.pilot), f"{WEIGHTS}?{query}")

    assert response.status_code == 422

"""Loading bases over the API: entered by one person, approved by another, proven by the manual's sample
loads.
"""

import json
import uuid
from typing import Any

import pytest
from django.http import HttpResponse

from fleet.models import Approval, LoadingBasis, Standing
from records.canonical import digest
from records.models import Act, Change
from records.strict_json import read
from tests.cast import Cast, api, cast, get, post, strangers
from tests.makers import basis_document, make_aircraft, page, q

pytestmark = pytest.mark.django_db

BASES = "/aircraft/Q9-KTB/loading-bases"


@pytest.fixture
def people() -> Cast:
    people = cast()
    make_aircraft(people)
    return people


def entered(people: Cast, **changes: Any) -> dict[str, Any]:
    response = post(api(people.maintenance), BASES, basis_document(**changes))
    assert response.status_code == 201, response.content
    return dict(json.loads(response.content))


def code(response: HttpResponse, status: int) -> str:
    assert response.status_code == status, response.content
    return str(json.loads(response.content)["code"])


def faults(response: HttpResponse) -> list[tuple[str, str]]:
    assert response.status_code == 422, response.content
    return [(error["pointer"], error["code"]) for error in json.loads(response.content)["errors"]]


def test_a_basis_is_entered_as_the_next_revision_and_not_in_force(people: Cast) -> None:
    first = entered(people)
    second = entered(
        people, document={"title": "Fenlark 9 flight manual", "number": "FL9-FM", "revision": "D"}
    )

    assert [first["revision"], second["revision"]] == [1, 2]
    assert first["approval"] is None
    assert first["windows"] == []
    assert first["entered_by"] == f"person:{people.maintenance.id}"
    assert not Standing.objects.exists()
    act = Act.objects.filter(kind="enter-loading-basis").first()
    assert act is not None
    assert act.about.startswith("aircraft:")


def test_the_document_is_kept_with_its_numbers_as_typed(people: Cast) -> None:
    document = basis_document()
    document["seats"][0]["arm"]["value"] = "100.500"
    text = json.dumps(document).replace('"100.500"', "100.500").encode()

    first = json.loads(post(api(people.maintenance), BASES, text).content)
    shown = json.loads(get(api(people.pilot), f"{BASES}/{first['id']}").content)

    assert shown["document"] == document
    assert shown["digest"] == digest(read(text)) == digest(document)


def test_a_second_person_approves_and_the_basis_stands_from_the_act(people: Cast) -> None:
    basis = entered(people)

    response = post(
        api(people.approver), f"{BASES}/{basis['id']}/approval", {"reason": "checked with the manual"}
    )

    assert response.status_code == 201, response.content
    body = json.loads(response.content)
    approval = Approval.objects.get()
    assert approval.true_from == approval.known_from
    assert body["approval"]["approved_by"] == f"person:{people.approver.id}"
    assert len(body["windows"]) == 1
    assert body["windows"][0]["valid_until"] is None
    assert body["windows"][0]["known_from"] == body["approval"]["approved_at"]
    act = Act.objects.get(kind="approve-loading-basis")
    assert act.reason == "checked with the manual"
    assert act.at == approval.known_from
    assert set(Change.objects.filter(act=act).values_list("table_name", flat=True)) == {
        "fleet_approval",
        "fleet_standing",
    }


def test_an_approval_may_say_from_when_the_basis_holds(people: Cast) -> None:
    basis = entered(people)

    body = json.loads(
        post(
            api(people.approver),
            f"{BASES}/{basis['id']}/approval",
            {"true_from": "2026-02-01T00:00:00-07:00"},
        ).content
    )

    assert body["approval"]["true_from"] == "2026-02-01T07:00:00Z"
    assert body["windows"][0]["valid_from"] == "2026-02-01T07:00:00Z"


def test_whoever_entered_a_basis_does_not_approve_it(people: Cast) -> None:
    response = post(api(people.manager), BASES, basis_document())
    basis = json.loads(response.content)

    refused = post(api(people.manager), f"{BASES}/{basis['id']}/approval", {})

    assert code(refused, 403) == "second-person-needed"
    assert not Approval.objects.exists()


@pytest.mark.parametrize("who", ["pilot", "preparer", "auditor", "maintenance", "idle"])
def test_who_does_not_approve_is_refused(who: str, people: Cast) -> None:
    basis = json.loads(post(api(people.manager), BASES, basis_document()).content)

    refused = post(api(getattr(people, who)), f"{BASES}/{basis['id']}/approval", {})

    assert code(refused, 403) == "act-not-allowed"


@pytest.mark.parametrize("who", ["pilot", "approver", "auditor"])
def test_who_does_not_enter_is_refused(who: str, people: Cast) -> None:
    assert code(post(api(getattr(people, who)), BASES, basis_document()), 403) == "act-not-allowed"
    assert not LoadingBasis.objects.exists()


def test_an_approval_is_given_once(people: Cast) -> None:
    basis = entered(people)
    address = f"{BASES}/{basis['id']}/approval"
    post(api(people.approver), address, {})

    assert code(post(api(people.manager), address, {}), 409) == "approved-already"
    assert Standing.objects.count() == 1


def test_a_basis_without_a_sample_load_is_not_approved(people: Cast) -> None:
    basis = entered(people, sample_loads={"none": True, "source": page("6-20")})

    assert (
        code(post(api(people.approver), f"{BASES}/{basis['id']}/approval", {}), 409) == "sample-load-missing"
    )
    assert not Standing.objects.exists()


def test_a_basis_whose_sample_load_comes_out_otherwise_is_not_approved(people: Cast) -> None:
    samples = basis_document()["sample_loads"]
    samples[0]["total_moment"] = q("659000", "lb in")
    basis = entered(people, sample_loads=samples)

    refused = post(api(people.approver), f"{BASES}/{basis['id']}/approval", {})

    assert code(refused, 409) == "sample-load-failed"
    errors = json.loads(refused.content)["errors"]
    assert errors[0]["code"] == "sample-moment"
    assert "manual sample 1" in errors[0]["detail"]
    assert not Approval.objects.exists()


def test_a_newer_basis_ends_the_older_one_where_it_begins(people: Cast) -> None:
    for start in ("2026-02-01T00:00:00Z", "2026-03-01T00:00:00Z"):
        basis = entered(people)
        post(api(people.approver), f"{BASES}/{basis['id']}/approval", {"true_from": start})

    newer, older = json.loads(get(api(people.auditor), BASES).content)["loading_bases"]

    assert [window["known_until"] is None for window in older["windows"]] == [False, True]
    assert older["windows"][1]["valid_until"] == newer["windows"][0]["valid_from"] == "2026-03-01T00:00:00Z"
    assert older["windows"][0]["known_until"] == older["windows"][1]["known_from"]
    assert "document" not in older


@pytest.mark.parametrize(
    ("changes", "fault"),
    [
        ({"aircraft_type": "Fenlark 7"}, ("/aircraft_type", "not-this-aircraft")),
        ({"category": "helicopter"}, ("/category", "not-this-aircraft")),
        ({"engines": 1}, ("/engines", "not-this-aircraft")),
        ({"passenger_seats_installed": 6}, ("/passenger_seats_installed", "not-this-aircraft")),
        ({"lateral_positive": "left"}, ("/lateral_positive", "lateral-positive")),
        ({"schema": "tarebook.loading-basis/2"}, ("/schema", "schema-unknown")),
        ({"extra": 1}, ("/extra", "unknown-field")),
    ],
)
def test_what_is_wrong_with_a_basis_is_named(
    changes: dict[str, Any], fault: tuple[str, str], people: Cast
) -> None:
    response = post(api(people.maintenance), BASES, basis_document(**changes))

    assert fault in faults(response)
    assert not LoadingBasis.objects.exists()


def test_a_zone_over_an_unknown_place_and_a_missing_unit_are_both_named(people: Cast) -> None:
    document = basis_document()
    document["zones"][0]["members"] = ["ROW2-L", "NOWHERE"]
    del document["places"][0]["arm"]["unit"]

    found = faults(post(api(people.maintenance), BASES, document))

    assert ("/zones/0/members/1", "unknown-id") in found
    assert ("/places/0/arm/unit", "unit-missing") in found


def test_a_limit_shown_to_be_none_is_entered_with_its_page(people: Cast) -> None:
    limits = basis_document()["limits"] | {"zero_fuel": {"none": True, "source": page("2-4")}}

    assert entered(people, limits=limits)["revision"] == 1


@pytest.mark.parametrize(
    ("body", "fault"),
    [
        ({"true_from": "2026-02-01"}, ("/true_from", "wrong-form")),
        ({"true_from": "2026-02-01T00:00:00"}, ("/true_from", "wrong-form")),
        ({"true_from": 5}, ("/true_from", "wrong-type")),
        ({"true_from": "0001-01-01T00:00:00+14:00"}, ("/true_from", "instant-implausible")),
        ({"true_from": "9999-12-31T23:59:59-14:00"}, ("/true_from", "instant-implausible")),
        ({"reason": "x" * 401}, ("/reason", "too-long")),
        ({"force": True}, ("/force", "unknown-field")),
    ],
)
def test_what_is_wrong_with_an_approval_is_named(
    body: dict[str, Any], fault: tuple[str, str], people: Cast
) -> None:
    basis = entered(people)

    response = post(api(people.approver), f"{BASES}/{basis['id']}/approval", body)

    assert fault in faults(response)
    assert not Approval.objects.exists()


def test_another_operators_basis_is_not_known(people: Cast) -> None:
    basis = entered(people)
    theirs = strangers()

    for client in (api(theirs.manager), api(theirs.pilot)):
        assert get(client, BASES).status_code == 404
        assert get(client, f"{BASES}/{basis['id']}").status_code == 404
    assert code(post(api(theirs.manager), BASES, basis_document()), 404) == "aircraft-not-known"
    assert post(api(theirs.manager), f"{BASES}/{basis['id']}/approval", {}).status_code == 404
    assert not Approval.objects.exists()


def test_a_basis_of_another_aircraft_is_not_known_under_this_one(people: Cast) -> None:
    basis = entered(people)
    make_aircraft(people, "Q9-SIS")

    for number in (basis["id"], uuid.uuid4(), "7"):
        address = f"/aircraft/Q9-SIS/loading-bases/{number}"
        assert get(api(people.approver), address).status_code == 404
        assert post(api(people.approver), f"{address}/approval", {}).status_code == 404

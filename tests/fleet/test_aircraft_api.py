"""Aircraft over the API: entered, listed, shown, and nothing of another operator's."""

import json

import pytest
from django.http import HttpResponse

from fleet.models import Aircraft
from records.models import Act
from tests.cast import api, cast, get, post, strangers
from tests.makers import basis_document, make_aircraft, make_basis, ready_aircraft

pytestmark = pytest.mark.django_db

TWIN = {
    "registration": "Q9-KTB",
    "type": "Fenlark 9",
    "serial_number": "9-0041",
    "category": "aeroplane",
    "engines": 2,
    "passenger_seats": 4,
}


def problem(response: HttpResponse, status: int) -> list[tuple[str, str]]:
    """The pointers and codes of a refusal with this status."""
    assert response.status_code == status, response.content
    assert response["Content-Type"] == "application/problem+json"
    return [(error["pointer"], error["code"]) for error in json.loads(response.content)["errors"]]


def test_maintenance_enters_an_aircraft_and_everybody_of_the_operator_reads_it() -> None:
    people = cast()

    entered = post(api(people.maintenance), "/aircraft", TWIN | {"reason": "bought in March"})

    assert entered.status_code == 201, entered.content
    assert entered["Location"] == "/api/v1/aircraft/Q9-KTB"
    shown = get(api(people.pilot), "/aircraft/Q9-KTB")
    assert shown.status_code == 200
    body = json.loads(shown.content)
    assert body == json.loads(entered.content)
    assert {field: body[field] for field in TWIN} == TWIN
    assert body["loading_basis"] is None
    assert body["empty_weights"] == []
    assert shown["ETag"] == get(api(people.pilot), "/aircraft/q9-ktb")["ETag"]
    act = Act.objects.get(kind="enter-aircraft")
    assert act.about == f"aircraft:{body['id']}"
    assert act.reason == "bought in March"
    assert act.actor_key == f"person:{people.maintenance.id}"


def test_the_same_key_enters_one_aircraft_and_gives_the_same_bytes() -> None:
    client = api(cast().maintenance)

    first = post(client, "/aircraft", TWIN, key="enter-ktb")
    second = post(client, "/aircraft", TWIN, key="enter-ktb")

    assert second.content == first.content
    assert second["Idempotency-Replayed"] == "true"
    assert Aircraft.objects.count() == 1


def test_a_key_is_needed() -> None:
    client = api(cast().maintenance)

    response = client.post("/api/v1/aircraft", data=json.dumps(TWIN), content_type="application/json")

    assert response.status_code == 400
    assert json.loads(response.content)["code"] == "idempotency-key-missing"


def test_the_list_is_whole_and_by_registration() -> None:
    people, others = cast(), strangers()
    for registration in ("Q9-ZZZ", "Q9-AAA"):
        make_aircraft(people, registration)
    post(api(others.manager), "/aircraft", TWIN)

    listed = json.loads(get(api(people.auditor), "/aircraft").content)["aircraft"]

    assert [each["registration"] for each in listed] == ["Q9-AAA", "Q9-ZZZ"]


def test_an_aircraft_shows_what_is_in_force() -> None:
    people = cast()
    aircraft = ready_aircraft(people)

    body = json.loads(get(api(people.pilot), "/aircraft/Q9-KTB").content)

    basis, weight = aircraft.loading_bases.get(), aircraft.empty_weights.get()
    assert body["loading_basis"] == {"id": str(basis.id), "revision": 1, "digest": basis.digest}
    assert body["empty_weights"] == [{"id": str(weight.id), "fit": "wheels", "digest": weight.digest}]


def test_configurations_are_those_of_the_basis_in_force() -> None:
    people = cast()
    aircraft = make_aircraft(people)
    before = json.loads(get(api(people.pilot), "/aircraft/Q9-KTB/configurations").content)
    basis = make_basis(people, aircraft)

    after = json.loads(get(api(people.pilot), "/aircraft/Q9-KTB/configurations").content)

    assert before["loading_basis"] is None
    assert before["configurations"] == []
    assert after["loading_basis"]["id"] == str(basis.id)
    assert [(each["id"], each["fit"]) for each in after["configurations"]] == [
        ("four-seat", "wheels"),
        ("four-seat-skis", "skis"),
    ]
    assert (
        after["configurations"][0]["operating_items"]
        == basis_document()["configurations"][0]["operating_items"]
    )


@pytest.mark.parametrize("path", ["/aircraft/Q9-KTB", "/aircraft/Q9-KTB/configurations"])
def test_another_operators_aircraft_is_not_known(path: str) -> None:
    make_aircraft(cast())

    response = get(api(strangers().pilot), path)

    assert response.status_code == 404
    assert json.loads(response.content)["code"] == "aircraft-not-known"


@pytest.mark.parametrize("name", ["Q9-NON", "Q9%00KTB", "Q9%20KTB", "%F0%9F%9B%A9", "a" * 500])
def test_an_unknown_registration_is_not_known(name: str) -> None:
    people = cast()
    make_aircraft(people)

    assert get(api(people.pilot), f"/aircraft/{name}").status_code == 404


@pytest.mark.parametrize("who", ["pilot", "preparer", "auditor", "approver"])
def test_who_may_not_enter_aircraft_is_refused(who: str) -> None:
    people = cast()

    response = post(api(getattr(people, who)), "/aircraft", TWIN)

    assert response.status_code == 403
    assert json.loads(response.content)["code"] == "act-not-allowed"
    assert not Aircraft.objects.exists()


def test_who_holds_no_duty_reads_nothing() -> None:
    people = cast()
    make_aircraft(people)

    assert get(api(people.idle), "/aircraft").status_code == 403


@pytest.mark.parametrize(
    ("change", "faults"),
    [
        ({"registration": "q9-ktb"}, [("/registration", "wrong-form")]),
        ({"registration": "Q9 KTB"}, [("/registration", "wrong-form")]),
        ({"registration": "Q"}, [("/registration", "wrong-form")]),
        ({"registration": "Q9-KTB-TOO-LONG"}, [("/registration", "wrong-form")]),
        ({"registration": 9}, [("/registration", "wrong-type")]),
        ({"registration": None}, [("/registration", "wrong-type")]),
        ({"type": ""}, [("/type", "empty"), ("/type", "wrong-form")]),
        ({"type": "   "}, [("/type", "wrong-form")]),
        ({"type": "x" * 81}, [("/type", "too-long")]),
        ({"type": "Fen\u0007lark"}, [("/type", "wrong-form")]),
        ({"serial_number": "x" * 41}, [("/serial_number", "too-long")]),
        ({"serial_number": ["9"]}, [("/serial_number", "wrong-type")]),
        ({"category": "balloon"}, [("/category", "not-a-choice")]),
        ({"engines": 0}, [("/engines", "too-small")]),
        ({"engines": 13}, [("/engines", "too-large")]),
        ({"engines": "2"}, [("/engines", "wrong-type")]),
        ({"engines": True}, [("/engines", "wrong-type")]),
        ({"passenger_seats": -1}, [("/passenger_seats", "too-small")]),
        ({"passenger_seats": 401}, [("/passenger_seats", "too-large")]),
        ({"passenger_seats": 999999999999999}, [("/passenger_seats", "too-large")]),
        ({"reason": ""}, [("/reason", "empty"), ("/reason", "wrong-form")]),
        ({"colour": "red"}, [("/colour", "unknown-field")]),
    ],
)
def test_what_is_wrong_with_an_aircraft_is_named_by_pointer(
    change: dict[str, object], faults: list[tuple[str, str]]
) -> None:
    client = api(cast().maintenance)

    response = post(client, "/aircraft", TWIN | change)

    assert sorted(problem(response, 422)) == sorted(faults)
    assert not Aircraft.objects.exists()


@pytest.mark.parametrize("field", sorted(TWIN))
def test_every_field_of_an_aircraft_is_needed(field: str) -> None:
    client = api(cast().maintenance)

    response = post(client, "/aircraft", {name: value for name, value in TWIN.items() if name != field})

    assert problem(response, 422) == [(f"/{field}", "missing")]


@pytest.mark.parametrize(
    ("body", "status"),
    [
        (b"", 422),  # no body is an object without fields
        (b"{", 400),
        (b'{"engines": 1, "engines": 2}', 400),
        (b'{"engines": NaN}', 400),
        (b'{"engines": 1e9999999}', 400),
        (b'{"engines": 1234567890123456}', 400),
        (b'{"type": "a\\u0000"}', 400),
        (b'{"type": "\\ud800"}', 400),
        (b"[" * 40 + b"]" * 40, 400),
        (b"\xff\xfe", 400),
        (b"[]", 422),
        (b'"Q9-KTB"', 422),
        (b"null", 422),
    ],
)
def test_a_body_that_is_no_aircraft_at_all_is_refused(body: bytes, status: int) -> None:
    response = post(api(cast().maintenance), "/aircraft", body)

    assert response.status_code == status, response.content
    assert not Aircraft.objects.exists()


def test_a_registration_and_a_serial_number_are_entered_once() -> None:
    client = api(cast().maintenance)
    post(client, "/aircraft", TWIN)

    same_registration = post(client, "/aircraft", TWIN | {"serial_number": "9-0042"})
    same_serial = post(client, "/aircraft", TWIN | {"registration": "Q9-KTC"})

    assert problem(same_registration, 422) == [("/registration", "registration-taken")]
    assert problem(same_serial, 422) == [("/serial_number", "serial-taken")]


def test_parameters_nobody_reads_are_refused() -> None:
    people = cast()
    make_aircraft(people)

    assert problem(get(api(people.pilot), "/aircraft?page=2"), 422) == [("?page", "parameter-unknown")]
    assert problem(get(api(people.pilot), "/aircraft/Q9-KTB/configurations?at=yesterday"), 422) == [
        ("?at", "instant-malformed")
    ]

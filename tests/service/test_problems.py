"""Whatever goes wrong under /api/ is a problem body with a stable code, and says nothing of our inside."""

import json

import pytest
from django.test import Client

from tests.service.stub_addresses import FAILURES, SECRET

pytestmark = pytest.mark.urls("tests.service.stub_addresses")
FIELDS = {"type", "title", "status", "code", "detail", "next_step", "errors", "request"}


@pytest.fixture
def client():
    return Client(raise_request_exception=False)


def _problem(response, status, code):
    assert response.status_code == status
    assert response["Content-Type"] == "application/problem+json"
    body = json.loads(response.content)
    assert set(body) == FIELDS
    assert (body["status"], body["code"], body["type"]) == (status, code, f"/problems/{code}")
    assert body["title"]
    assert body["detail"].endswith(".")
    assert body["request"] == response["X-Request-ID"]
    assert SECRET not in response.content.decode()
    return body


@pytest.mark.parametrize(
    ("how", "status", "code"),
    [
        ("unreadable", 400, "u"),
        ("not-allowed", 403, "n"),
        ("not-known", 404, "k"),
        ("step", 409, "s"),
        ("failed", 412, "f"),
        ("large", 413, "l"),
        ("missing", 428, "m"),
        ("locked", 429, "locked-out"),
        ("http404", 404, "not-found"),
        ("denied", 403, "not-allowed"),
        ("suspicious", 400, "unreadable"),
        ("throttled", 429, "too-many-requests"),
        ("database", 503, "database-unavailable"),
        ("bug", 500, "unexpected"),
    ],
)
def test_every_kind_of_failure_becomes_a_problem(client, how, status, code):
    _problem(client.get(f"/api/v1/fails/{how}"), status, code)


def test_no_kind_of_failure_is_left_out_of_the_table_above():
    assert len(FAILURES) == 16  # the fourteen above, and the two with fields below


def test_fields_that_are_wrong_are_named_by_pointer(client):
    body = _problem(_get_invalid(client), 422, "invalid")

    assert body["errors"] == [
        {"pointer": "/a/0", "code": "a-wrong", "detail": "this is wrong"},
        {"pointer": "?b", "code": "b-wrong", "detail": "and this"},
    ]


def _get_invalid(client):
    response = client.get("/api/v1/fails/invalid")
    body = json.loads(response.content)
    assert body["detail"] == "/a/0: this is wrong; ?b: and this."
    return response


def test_what_a_serializer_refuses_is_named_by_pointer_too(client):
    body = _problem(client.get("/api/v1/fails/serializer"), 422, "invalid")

    assert [(error["pointer"], error["code"]) for error in body["errors"]] == [
        ("/a/0/b", "invalid"),
        ("", "invalid"),
    ]


def test_the_next_step_and_the_wait_are_stated(client):
    assert json.loads(client.get("/api/v1/fails/step").content)["next_step"] == "Do this."
    assert client.get("/api/v1/fails/locked")["Retry-After"] == "61"
    assert client.get("/api/v1/fails/throttled")["Retry-After"] == "3"
    assert client.get("/api/v1/fails/database")["Retry-After"] == "5"


def test_a_failure_is_logged_under_the_number_the_answer_carries(client, caplog):
    response = client.get("/api/v1/fails/bug", headers={"X-Request-ID": "number-of-this-one"})

    assert response["X-Request-ID"] == "number-of-this-one"
    assert "request number-of-this-one failed" in caplog.text
    assert SECRET in caplog.text


@pytest.mark.parametrize(
    "path", ["/api/v1/nothing-here", "/api/", "/api/v2/loads", "/api/v1/echoes/", "/api/v1/\x00"]
)
def test_an_address_that_names_nothing_is_a_problem_under_the_api(client, path):
    _problem(client.get(path), 404, "not-found")


def test_an_address_that_names_nothing_elsewhere_is_a_page(client):
    response = client.get("/nothing-here")

    assert response.status_code == 404
    assert response["Content-Type"].startswith("text/")


def test_a_view_of_django_that_breaks_is_a_problem_under_the_api_and_a_page_elsewhere(client):
    _problem(client.get("/api/v1/breaks"), 500, "unexpected")
    page = client.get("/page-breaks")

    assert page.status_code == 500
    assert page["Content-Type"].startswith("text/")
    assert SECRET not in page.content.decode()


def test_a_refusal_that_a_view_of_django_let_through_is_shown_as_what_it_is(client):
    page = client.get("/page-refuses")

    _problem(client.get("/api/v1/refuses"), 409, "s")
    assert page.status_code == 409
    assert "The load has departed." in page.content.decode()
    assert "Write a note." in page.content.decode()


def test_another_method_is_refused_with_those_that_are_there(client):
    response = client.delete("/api/v1/echoes")

    _problem(response, 405, "method-not-allowed")
    assert response["Allow"] == "POST, OPTIONS"


def test_an_answer_of_another_kind_is_refused_as_a_problem_all_the_same(client):
    response = client.post(
        "/api/v1/echoes", b"{}", content_type="application/json", headers={"Accept": "text/html"}
    )

    _problem(response, 406, "not-acceptable")


@pytest.mark.parametrize(
    "kind", ["text/plain", "application/x-www-form-urlencoded", "multipart/form-data", ""]
)
def test_a_body_of_another_kind_is_refused(client, kind):
    _problem(client.post("/api/v1/echoes", b"a=1", content_type=kind), 415, "media-type-not-read")


@pytest.mark.parametrize(
    ("body", "status", "code"),
    [
        (b'{"a": ', 400, "json-malformed"),
        (b'{"a": 1e9999999}', 400, "json-number-exponent"),
        (b'{"a": NaN}', 400, "json-not-a-number"),
        (b'{"a": 1, "a": 2}', 400, "json-duplicate-key"),
        (b'{"a": "\\u0000"}', 400, "json-nul"),
        (b"\xff", 400, "json-not-utf-8"),
        (b"[" * 100, 400, "json-too-deep"),
        (b"[" + b" " * 1024 * 1024, 413, "body-too-large"),
        (b"[" + b" " * 5 * 1024 * 1024, 413, "body-too-large"),
    ],
    ids=lambda value: repr(value)[:20],
)
def test_a_body_that_cannot_be_read_is_refused_by_name(client, body, status, code):
    _problem(client.post("/api/v1/echoes", body, content_type="application/json"), status, code)


def test_what_was_read_is_given_back_digit_for_digit(client):
    response = client.post(
        "/api/v1/echoes", '{"b":6.70,"a":"é"}'.encode(), content_type="application/json; charset=utf-8"
    )

    assert response.status_code == 200
    assert response["Content-Type"] == "application/json"
    assert response.content == '{"b":"6.70","a":"é"}'.encode()


def test_a_foreign_host_is_refused_as_a_problem(client):
    _problem(client.get("/api/v1/echoes", headers={"Host": "elsewhere.invalid"}), 400, "unreadable")

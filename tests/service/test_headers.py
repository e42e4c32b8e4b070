"""What every answer carries."""

import uuid

import pytest
from django.test import Client

from records.act import request_id

pytestmark = pytest.mark.urls("tests.service.stub_addresses")


@pytest.fixture
def answer():
    return Client().post("/api/v1/echoes", b"{}", content_type="application/json")


def test_nothing_inline_and_nothing_from_elsewhere_is_run(answer):
    policy = dict(part.strip().split(" ", 1) for part in answer["Content-Security-Policy"].split(";"))

    assert policy["default-src"] == "'none'"
    assert policy["script-src"] == policy["style-src"] == "'self'"
    assert "unsafe" not in answer["Content-Security-Policy"]
    assert "http" not in answer["Content-Security-Policy"]
    assert policy["frame-ancestors"] == "'none'"
    assert policy["form-action"] == "'self'"


def test_the_powers_of_a_browser_are_off_and_nothing_is_kept_on_the_way(answer):
    assert "camera=()" in answer["Permissions-Policy"]
    assert "geolocation=()" in answer["Permissions-Policy"]
    assert answer["Cache-Control"] == "no-store"
    assert answer["X-Content-Type-Options"] == "nosniff"
    assert answer["X-Frame-Options"] == "DENY"
    assert answer["Referrer-Policy"] == "same-origin"


def test_a_request_has_a_number_of_its_own(answer):
    assert uuid.UUID(answer["X-Request-ID"])
    assert request_id.get() == ""


@pytest.mark.parametrize(
    ("given", "taken"),
    [
        ("proxy-number-1234", True),
        ("a" * 64, True),
        ("short", False),
        ("a" * 65, False),
        ("with space in it", False),
        ("<script>alert(1)</script>", False),
    ],
)
def test_a_number_that_was_given_is_taken_when_it_is_plain(given, taken):
    response = Client().post(
        "/api/v1/echoes", b"{}", content_type="application/json", headers={"X-Request-ID": given}
    )

    assert (response["X-Request-ID"] == given) is taken


def test_a_page_with_nul_in_its_address_is_not_found():
    assert Client().get("/loads/\x00").status_code == 404

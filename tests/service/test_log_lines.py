"""No line of the log holds a secret: neither ours, nor what libraries and the database quote."""

import io
import json
import logging
from datetime import timedelta
from uuid import uuid4

import pytest
from django.db import IntegrityError, transaction
from django.test import Client
from django.utils import timezone

from fleet.actions.issue_token import issue_token
from fleet.models import Person
from records.act import request_id
from records.models import Act, Receipt
from service import allowed
from service.log_lines import HIDDEN, Numbered, Plain, hide
from tests.cast import PASSWORD, actor, browser, cast
from tests.loads.making import submitted
from tests.makers import ready_aircraft

WRONG = "wrong-harbour-41-lantern"


@pytest.fixture
def lines():
    """Every line every logger writes, as the console would show it."""
    stream = io.StringIO()
    handler = logging.StreamHandler(stream)
    handler.addFilter(Numbered())
    handler.setFormatter(Plain("%(levelname)s %(name)s [%(request_number)s] %(message)s"))
    root, before = logging.getLogger(), logging.getLogger().level
    root.addHandler(handler)
    root.setLevel(logging.DEBUG)
    yield stream
    root.removeHandler(handler)
    root.setLevel(before)


@pytest.mark.django_db
def test_tokens_passwords_and_headers_that_were_sent_stand_in_no_line(lines, settings):
    people = cast()
    ready_aircraft(people)
    load = submitted(people)
    issued = issue_token(
        actor(people.pilot),
        people.pilot,
        label="desk",
        scopes=["read", "sign", "prepare-load"],
        grantable=allowed.grantable(("pilot",), integration=False),
        valid_for=timedelta(days=1),
        integration=False,
    )
    guessed, basic = f"tb_{uuid4().hex}{uuid4().hex[:11]}", "cGlsb3Q6bGFudGVybi00Mg=="
    signing = {"meaning": "prepared", "digest": load.assessment.digest}
    at = f"/api/v1/loads/{load.load.id}/signatures"
    stepping = {"Idempotency-Key": "key-of-this-test", "If-Match": '"1"'}

    Client().get("/api/v1/loads", headers={"Authorization": f"Bearer {issued.secret}"})
    Client().get("/api/v1/loads", headers={"Authorization": f"Bearer {guessed}"})
    Client().get("/api/v1/loads", headers={"Authorization": f"Basic {basic}"})
    Client().get(f"/loads/{guessed}?password={WRONG}")
    for password in (WRONG, PASSWORD):
        Client(headers={"Authorization": f"Bearer {issued.secret}", **stepping}).post(
            at, json.dumps({**signing, "password": password}), content_type="application/json"
        )
        Client().post("/sign-in", {"login": people.pilot.login, "password": password})
    session = browser(people.pilot)
    session.get("/")

    said = lines.getvalue()
    assert said.count("tarebook.requests") >= 9
    for secret in (issued.secret, guessed, basic, WRONG, PASSWORD, session.cookies["sessionid"].value):
        assert secret not in said
    assert settings.SECRET_KEY not in said


@pytest.mark.django_db
def test_a_row_the_database_refused_is_not_quoted(lines):
    person = cast().pilot

    with pytest.raises(IntegrityError) as refused, transaction.atomic():
        Receipt.objects.create(
            actor="person:1", key=f"{WRONG} {person.password}", request_digest="0" * 64, status=500,
            headers={}, body=b"", answered_at=timezone.now(),
        )  # fmt: skip
    logging.getLogger("some.library").error("failed", exc_info=refused.value)

    assert WRONG in str(refused.value)  # the database does quote it
    said = lines.getvalue()
    assert f"DETAIL:{HIDDEN}" in said
    assert WRONG not in said
    assert Person.objects.get(pk=person.pk).password not in said


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("token tb_abcdefgh12345678 came", "token [hidden] came"),
        ("Authorization: Bearer abc.def-123", "Authorization: Bearer [hidden]"),
        ("Authorization: basic YWJjOmRlZg==", "Authorization: basic [hidden]"),
        ("secret whsec_MfKQ9r8GKYqrTwjU", "secret [hidden]"),
        ("postgresql://tarebook_owner:deep-sea@/tarebook", "postgresql://[hidden]@/tarebook"),
        ("redis://:deep-sea@queue:6379/0", "redis://[hidden]@queue:6379/0"),
        ("is pbkdf2_sha256$1000000$salt$hash= stored", "is [hidden] stored"),
        ("{'password': 'deep sea'}", "{'password': [hidden]"),
        ("ERROR: no\nDETAIL:  Row contains (1, deep).\nHINT: x", "ERROR: no\nDETAIL:[hidden]\nHINT: x"),
        ("GET /api/v1/loads 200 person:7 3.1 ms", "GET /api/v1/loads 200 person:7 3.1 ms"),
    ],
)
def test_what_looks_like_a_secret_is_hidden_and_nothing_else(text, shown):
    assert hide(text) == shown


def test_a_line_carries_the_number_of_its_request(lines):
    token = request_id.set("number-of-this-request")
    try:
        logging.getLogger("anything").warning("words")
    finally:
        request_id.reset(token)
    logging.getLogger("anything").warning("words")

    assert lines.getvalue().splitlines() == [
        "WARNING anything [number-of-this-request] words",
        "WARNING anything [-] words",
    ]


@pytest.mark.django_db
def test_answer_problem_body_log_and_act_carry_one_number(lines):
    people = cast()
    number = "number-from-the-proxy-1"
    headers = {"X-Request-ID": number, "Idempotency-Key": "k", "If-Match": '"1"'}
    ready_aircraft(people)
    load = submitted(people)

    refused = browser(people.pilot).get("/api/v1/loads/00000000-0000-7000-8000-000000000000", headers=headers)
    done = browser(people.pilot).post(
        f"/api/v1/loads/{load.load.id}/withdrawal",
        json.dumps({"reason": "The flight is cancelled."}),
        content_type="application/json",
        headers=headers,
    )

    assert (refused.status_code, done.status_code) == (404, 200)
    assert refused["X-Request-ID"] == done["X-Request-ID"] == json.loads(refused.content)["request"] == number
    assert Act.objects.filter(kind="withdraw-load").get().request == number
    assert sum(f"[{number}]" in line for line in lines.getvalue().splitlines()) >= 2

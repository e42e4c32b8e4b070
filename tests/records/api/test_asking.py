"""What endpoints ask of a request: parameters, instants, the state last seen."""

from datetime import UTC, datetime

import pytest
from rest_framework.request import Request
from rest_framework.test import APIRequestFactory

from records.actor import Actor
from records.api.asking import (
    actor_of,
    document_of,
    etag,
    instant,
    operator_of,
    parameters_of,
    refuse_stale,
)
from records.api.parser import StrictJSONParser
from records.refusal import (
    Invalid,
    NotAllowed,
    NotSignedIn,
    PreconditionFailed,
    PreconditionMissing,
    TooLarge,
)

ACTOR = Actor(operator="op", kind="person", key="person:1", name="", capacity="", may=frozenset(), person=1)


def _get(query="", **headers):
    return Request(APIRequestFactory().get(f"/x?{query}", headers=headers))


def _post(body, kind="application/json"):
    return Request(
        APIRequestFactory().generic("POST", "/x", body, content_type=kind), parsers=[StrictJSONParser()]
    )


def test_nobody_and_a_stranger_are_told_to_sign_in():
    request = _get()
    with pytest.raises(NotSignedIn):
        actor_of(request)

    request.actor = Actor(
        operator=None, kind="stranger", key="stranger", name="", capacity="", may=frozenset()
    )
    with pytest.raises(NotSignedIn):
        actor_of(request)

    request.actor = ACTOR
    assert actor_of(request) == ACTOR
    assert operator_of(request) == "op"


def test_who_belongs_to_no_operator_is_not_let_to_an_operators_records():
    request = _get()
    request.actor = Actor(
        operator=None, kind="service", key="service:x", name="", capacity="", may=frozenset()
    )

    with pytest.raises(NotAllowed):
        operator_of(request)


@pytest.mark.parametrize("body", [b"[]", b"1", b'"a"', b"null", b"true"])
def test_a_document_is_an_object(body):
    with pytest.raises(Invalid) as refused:
        document_of(_post(body))

    assert refused.value.faults[0].code == "not-an-object"


def test_a_document_too_large_is_refused_before_it_is_read(settings):
    settings.DATA_UPLOAD_MAX_MEMORY_SIZE = 10

    with pytest.raises(TooLarge):
        document_of(_post(b'{"a": "0123456789"}'))


def test_parameters_come_by_name():
    assert parameters_of(_get("aircraft=Q9-KTB"), allowed={"aircraft", "from"}) == {"aircraft": "Q9-KTB"}


@pytest.mark.parametrize(
    ("query", "pointer", "code"),
    [
        ("aircaft=Q9-KTB", "?aircaft", "parameter-unknown"),
        ("aircraft=a&aircraft=b", "?aircraft", "parameter-repeated"),
        ("aircraft=", "?aircraft", "parameter-malformed"),
        ("aircraft=%00", "?aircraft", "parameter-malformed"),
        ("aircraft=a%0Ab", "?aircraft", "parameter-malformed"),
        (f"aircraft={'a' * 401}", "?aircraft", "parameter-malformed"),
    ],
)
def test_an_odd_parameter_is_refused_by_name(query, pointer, code):
    with pytest.raises(Invalid) as refused:
        parameters_of(_get(query), allowed={"aircraft"})

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [(pointer, code)]


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("2026-12-01T08:30:00-06:00", datetime(2026, 12, 1, 14, 30, tzinfo=UTC)),
        ("2026-12-01T08:30:00Z", datetime(2026, 12, 1, 8, 30, tzinfo=UTC)),
        ("2026-12-01T08:30:00 02:00", datetime(2026, 12, 1, 6, 30, tzinfo=UTC)),
    ],
)
def test_an_instant_carries_its_offset(text, value):
    assert instant(text, where="?at") == value


@pytest.mark.parametrize(
    "text",
    [
        "",
        "today",
        "2026-12-01",
        "2026-12-01T08:30:00",
        "2026-02-30T00:00:00Z",
        "0001-01-01T00:00:00+14:00",
        "9999-12-31T23:59:59-14:00",
        "2026-12-01T24:01:00Z",
        "1" * 300,
    ],
)
def test_what_is_no_instant_is_refused_at_its_place(text):
    with pytest.raises(Invalid) as refused:
        instant(text, where="?at")

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [("?at", "instant-malformed")]


def test_the_state_last_seen_must_be_named_and_be_the_present_one():
    refuse_stale(_get(**{"If-Match": etag(3)}), 3)
    with pytest.raises(PreconditionMissing):
        refuse_stale(_get(), 3)
    for odd in ('"2"', "3", "*", 'W/"3"', '"3", "4"', '""'):
        with pytest.raises(PreconditionFailed):
            refuse_stale(_get(**{"If-Match": odd}), 3)

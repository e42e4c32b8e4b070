"""Issuing and revoking bearer tokens: shown once, kept as a digest, theirs alone, at most a year."""

import threading
from concurrent.futures import ThreadPoolExecutor
from datetime import timedelta

import pytest
from django.db import connection, connections

from fleet.actions.issue_token import issue_token
from fleet.actions.revoke_token import revoke_token
from fleet.models import Token
from fleet.queries.tokens import SHAPE, digest_of, token_sent, tokens_of
from records.models import Act, Change
from records.refusal import Invalid, NotAllowed, NotKnown, NotSignedIn, StepRefused
from service import allowed
from tests.cast import actor, cast, strangers

PILOTS = allowed.grantable(["pilot"], integration=False)
DAY = timedelta(days=1)

pytestmark = pytest.mark.django_db


def _issue(people, **changes):
    settings = {"label": "planning desk", "scopes": ["read"], "grantable": PILOTS, "valid_for": DAY}
    return issue_token(actor(people.pilot), people.pilot, **(settings | changes))


def test_the_secret_is_returned_once_and_kept_nowhere():
    people = cast()

    issued = _issue(people, scopes=["read", "submit-load"])

    assert SHAPE.fullmatch(issued.secret)
    assert token_sent(issued.secret, at=issued.token.issued_at) == issued.token
    images = "".join(Change.objects.filter(act__kind="issue-token").values_list("image", flat=True))
    assert issued.token.digest in images
    with connection.cursor() as cursor:
        cursor.execute("SELECT string_agg(t::text, '') FROM fleet_token t")
        (rows,) = cursor.fetchone()
    assert issued.secret not in rows + images
    assert Act.objects.get(kind="issue-token").about == f"person:{people.pilot.pk}"


@pytest.mark.parametrize(
    ("changes", "pointer", "code"),
    [
        ({"label": " "}, "/label", "label-malformed"),
        ({"label": "x" * 81}, "/label", "label-malformed"),
        ({"label": "a\x00b"}, "/label", "label-malformed"),
        ({"scopes": []}, "/scopes", "scopes-missing"),
        ({"scopes": ["read", "approve-empty-weight"]}, "/scopes/1", "scope-not-grantable"),
        ({"scopes": ["no-such-act"]}, "/scopes/0", "scope-not-grantable"),
        ({"valid_for": timedelta(0)}, "/valid_for", "expiry-out-of-bounds"),
        ({"valid_for": -DAY}, "/valid_for", "expiry-out-of-bounds"),
        ({"valid_for": 366 * DAY}, "/valid_for", "expiry-out-of-bounds"),
    ],
)
def test_what_is_wrong_is_named_and_nothing_is_issued(changes, pointer, code):
    people = cast()

    with pytest.raises(Invalid) as refused:
        _issue(people, **changes)

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [(pointer, code)]
    assert not Token.objects.exists()


def test_nobody_holds_a_token_in_the_name_of_another_person():
    people, others = cast(), strangers()
    of_pilot = {"label": "x", "scopes": ["read"], "grantable": PILOTS, "valid_for": DAY}

    for somebody in (people.other_pilot, people.manager):
        with pytest.raises(NotAllowed):
            issue_token(actor(somebody), people.pilot, **of_pilot)
    with pytest.raises(NotKnown):
        issue_token(actor(others.manager), people.pilot, **of_pilot)
    with pytest.raises(NotAllowed):
        issue_token(actor(people.other_pilot), people.pilot, **of_pilot, integration=True)
    assert not Token.objects.exists()

    assert issue_token(actor(people.manager), people.pilot, **of_pilot, integration=True).token.integration


def test_a_revoked_token_serves_nobody_from_then_on():
    people = cast()
    issued = _issue(people)

    revoked = revoke_token(actor(people.pilot), issued.token.pk, reason="lost")

    with pytest.raises(NotSignedIn) as refused:
        token_sent(issued.secret, at=revoked.revoked_at)
    assert refused.value.code == "token-revoked"
    with pytest.raises(StepRefused):
        revoke_token(actor(people.pilot), issued.token.pk, reason="again")
    assert Act.objects.filter(kind="revoke-token").count() == 1


def test_a_token_is_revoked_by_its_own_person_only():
    people, others = cast(), strangers()
    issued = _issue(people)

    with pytest.raises(NotAllowed):
        revoke_token(actor(people.other_pilot), issued.token.pk, reason="")
    with pytest.raises(NotKnown):
        revoke_token(actor(others.manager), issued.token.pk, reason="")
    with pytest.raises(NotKnown):
        revoke_token(actor(people.pilot), issued.token.pk + 1000, reason="")

    assert Token.objects.get().revoked_at is None


def test_a_token_that_does_not_serve_says_why():
    people = cast()
    issued = _issue(people)
    expires = issued.token.expires_at

    def code(secret, at):
        with pytest.raises(NotSignedIn) as refused:
            token_sent(secret, at=at)
        return refused.value.code

    assert token_sent(issued.secret, at=expires - timedelta(microseconds=1)) == issued.token
    assert code(issued.secret, expires) == "token-expired"
    assert code(issued.secret[:-1] + "!", expires) == "token-malformed"
    assert code("tb_" + "A" * 43, expires) == "token-unknown"
    assert code("", expires) == "token-malformed"
    assert code(issued.secret + "\n", expires) == "token-malformed"


def test_tokens_are_listed_newest_first_and_for_their_own_operator_only():
    people, others = cast(), strangers()
    first, second = _issue(people).token, _issue(people).token

    assert tokens_of(people.operator.code, people.pilot.pk) == (second, first)
    assert tokens_of(others.operator.code, people.pilot.pk) == ()


def test_the_digest_is_sha_256():
    # SHA-256 of "abc": FIPS 180-4, example in its appendix, remembered and computed with sha256sum.
    assert digest_of("abc") == "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"


@pytest.mark.django_db(transaction=True)
def test_of_two_who_revoke_at_once_one_is_told_it_was_done():
    people = cast()
    issued = _issue(people)
    together = threading.Barrier(2)
    by = actor(people.pilot)

    def revoke(_number):
        try:
            together.wait(timeout=30)
            revoke_token(by, issued.token.pk, reason="lost")
        except StepRefused as refused:
            return refused.code
        finally:
            connections.close_all()
        return "revoked"

    with ThreadPoolExecutor(2) as pool:
        answers = sorted(pool.map(revoke, range(2)))

    assert answers == ["revoked", "token-already-revoked"]
    assert Act.objects.filter(kind="revoke-token").count() == 1

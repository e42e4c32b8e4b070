"""What we sign, an outside implementation of the standard accepts, and nothing else."""

import base64
from datetime import UTC, datetime, timedelta

import pytest
from hypothesis import given
from hypothesis import strategies as st
from standardwebhooks import Webhook, WebhookVerificationError

from records.webhooks.signing import headers, secret_text

SECRET, OTHER = b"s" * 32, b"t" * 32
BODY = b'{"data":{},"timestamp":"2026-12-01T08:30:00Z","type":"load.rejected"}'


def now() -> datetime:
    return datetime.now(tz=UTC)  # the outside implementation compares with its own clock


def accepts(secret: bytes, body: bytes, sent: dict[str, str]) -> bool:
    try:
        Webhook(secret_text(secret)).verify(body, sent)
    except WebhookVerificationError:
        return False
    return True


def test_the_outside_implementation_accepts_the_signature():
    assert accepts(SECRET, BODY, headers("0198f0", now(), BODY, [SECRET]))


def test_both_signatures_serve_while_a_secret_is_replaced():
    sent = headers("0198f0", now(), BODY, [OTHER, SECRET])

    assert len(sent["webhook-signature"].split(" ")) == 2
    assert accepts(SECRET, BODY, sent)
    assert accepts(OTHER, BODY, sent)
    assert not accepts(b"u" * 32, BODY, sent)


@pytest.mark.parametrize("changed", ["webhook-id", "webhook-timestamp", "body"])
def test_nothing_signed_can_be_changed(changed):
    sent, body = headers("0198f0", now(), BODY, [SECRET]), BODY
    if changed == "body":
        body += b" "
    elif changed == "webhook-id":
        sent["webhook-id"] += "0"
    else:
        sent["webhook-timestamp"] = str(int(sent["webhook-timestamp"]) + 1)

    assert not accepts(SECRET, body, sent)


def test_an_old_attempt_is_refused_by_the_outside_implementation():
    assert not accepts(SECRET, BODY, headers("0198f0", now() - timedelta(hours=1), BODY, [SECRET]))


@given(
    st.binary(min_size=24, max_size=64),
    st.binary(max_size=200),
    st.from_regex(r"[a-z0-9_-]{1,40}", fullmatch=True),
)
def test_both_implementations_write_the_same_signature(secret, body, message):
    at = now()
    text = body.decode("latin-1")

    ours = headers(message, at, text.encode(), [secret])

    assert ours["webhook-signature"] == Webhook(secret_text(secret)).sign(message, at, text)


def test_a_secret_is_base64_behind_its_prefix():
    assert secret_text(SECRET).startswith("whsec_")
    assert base64.b64decode(secret_text(SECRET).removeprefix("whsec_")) == SECRET


@pytest.mark.parametrize(("message", "secrets"), [("a.b", [SECRET]), ("ab", [])])
def test_a_message_with_a_full_stop_or_without_a_secret_is_not_signed(message, secrets):
    with pytest.raises(ValueError, match="full stop"):
        headers(message, now(), BODY, secrets)

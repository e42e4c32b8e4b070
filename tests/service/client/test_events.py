"""What arrives at a subscribed address, judged by the standard's own package: `standardwebhooks`."""

import base64
import json
from datetime import UTC, datetime

import pytest
from standardwebhooks import Webhook

from service.client import MessageRefused, read_message

NOW = datetime(2026, 12, 1, 15, 0, tzinfo=UTC)
SECRET, OLD, STRANGE = (f"whsec_{base64.b64encode(one * 32).decode()}" for one in (b"a", b"b", b"c"))
BODY = json.dumps(
    {"type": "load.rejected", "timestamp": "2026-12-01T15:00:00Z", "data": {"load": "7"}}
).encode()


def headers(*secrets: str, at: datetime = NOW, body: bytes = BODY) -> dict[str, str]:
    signed = " ".join(Webhook(secret).sign("msg-1", at, body.decode()) for secret in secrets)
    return {
        "Webhook-Id": "msg-1",
        "Webhook-Timestamp": str(int(at.timestamp())),
        "Webhook-Signature": signed,
    }


def test_a_message_the_standards_package_signed_is_read() -> None:
    message = read_message(BODY, headers(SECRET), SECRET, now=NOW.timestamp())

    assert (message.id, message.type, message.data) == ("msg-1", "load.rejected", {"load": "7"})


@pytest.mark.parametrize(("signed", "known"), [([OLD, SECRET], [SECRET]), ([OLD], [SECRET, OLD])])
def test_two_secrets_serve_while_one_follows_the_other(signed: list[str], known: list[str]) -> None:
    assert read_message(BODY, headers(*signed), *known, now=NOW.timestamp()).type == "load.rejected"


REFUSED = [
    (BODY, headers(STRANGE), 0.0),
    (BODY + b" ", headers(SECRET), 0.0),
    (BODY, headers(SECRET), 301.0),
    (BODY, headers(SECRET), -301.0),
    (BODY, headers(SECRET) | {"Webhook-Id": "msg-2"}, 0.0),
    (BODY, headers(SECRET) | {"Webhook-Timestamp": "now"}, 0.0),
    (BODY, headers(SECRET) | {"Webhook-Signature": "v1,%%%"}, 0.0),
    (BODY, headers(SECRET) | {"Webhook-Signature": "v2,abc"}, 0.0),
    (BODY, {}, 0.0),
    (b"[1]", headers(SECRET, body=b"[1]"), 0.0),
]


@pytest.mark.parametrize(("body", "named", "late"), REFUSED)
def test_any_other_message_is_refused(body: bytes, named: dict[str, str], late: float) -> None:
    with pytest.raises(MessageRefused):
        read_message(body, named, SECRET, now=NOW.timestamp() + late)


def test_without_a_secret_nothing_is_believed() -> None:
    with pytest.raises(MessageRefused):
        read_message(BODY, headers(SECRET), now=NOW.timestamp())

"""Reading what arrives at a subscribed address, per the Standard Webhooks specification 1.0.0."""

import base64
import binascii
import hmac
import json
import time
from collections.abc import Mapping
from dataclasses import dataclass, field
from hashlib import sha256
from typing import Any, Final

from service.client.problems import TarebookError

PREFIX: Final = "whsec_"
# How far a message's time may be from ours, as the specification's own libraries have it.
TOLERANCE_SECONDS: Final = 300


class MessageRefused(TarebookError):
    """A message that nobody who knows the secret sent, or an old one. Answer it with 400 and do nothing."""


@dataclass(frozen=True, slots=True)
class Message:
    """One event. `id` is the same whenever the same event comes again: do its work once."""

    id: str
    type: str
    data: Mapping[str, Any] = field(compare=False)


def read_message(body: bytes, headers: Mapping[str, str], *secrets: str, now: float | None = None) -> Message:
    """This function will check a message's signature and time, with the body as it came, and read it.

    Give the old secret and the new one while a new one is being taken into use. Raises MessageRefused.
    """
    named = {name.lower(): value for name, value in headers.items()}
    number, sent = named.get("webhook-id", ""), named.get("webhook-timestamp", "")
    if not number or not (sent.isascii() and sent.isdigit()):
        raise MessageRefused("the message has no number or no time")
    if abs((time.time() if now is None else now) - int(sent)) > TOLERANCE_SECONDS:
        raise MessageRefused("the message is too old, or from the future")
    signed = b".".join((number.encode(), sent.encode(), body))
    given = [
        one.removeprefix("v1,") for one in named.get("webhook-signature", "").split() if one[:3] == "v1,"
    ]
    if not any(_fits(secret, signed, one) for secret in secrets for one in given):
        raise MessageRefused("no signature fits")
    try:
        document = json.loads(body)
        return Message(number, str(document["type"]), dict(document["data"]))
    except (ValueError, KeyError, TypeError) as problem:
        raise MessageRefused("the message is of another form than described") from problem


def _fits(secret: str, signed: bytes, given: str) -> bool:
    try:
        key = base64.b64decode(secret.removeprefix(PREFIX), validate=True)
        return hmac.compare_digest(
            hmac.new(key, signed, sha256).digest(), base64.b64decode(given, validate=True)
        )
    except (binascii.Error, ValueError):
        return False

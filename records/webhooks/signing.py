"""Signs what is sent, per the Standard Webhooks specification 1.0.0 (read for this): symmetric, `v1`."""

import base64
import hmac
from collections.abc import Sequence
from datetime import datetime
from hashlib import sha256
from typing import Final

PREFIX: Final = "whsec_"
# "Random. At least 24 bytes (192 bits, 512 maximum)."
SECRET_BYTES: Final = 32


def secret_text(secret: bytes) -> str:
    """This function will write a secret as the receiver gets it: base64 behind `whsec_`."""
    return PREFIX + base64.b64encode(secret).decode("ascii")


def headers(message: str, at: datetime, body: bytes, secrets: Sequence[bytes]) -> dict[str, str]:
    """This function will return the three headers of one attempt, signed with each secret, the newest first.

    `message` is the event's number and stays the same for every attempt; `at` is the attempt's instant.
    Raises ValueError for a message with a full stop, which would let one text be read as two, and without a
    secret.
    """
    if "." in message or not secrets:
        raise ValueError("a message is named without a full stop and signed with at least one secret")
    moment = str(int(at.timestamp()))
    signed = b".".join((message.encode("ascii"), moment.encode("ascii"), body))
    return {
        "webhook-id": message,
        "webhook-timestamp": moment,
        "webhook-signature": " ".join(f"v1,{_signature(secret, signed)}" for secret in secrets),
    }


def _signature(secret: bytes, signed: bytes) -> str:
    return base64.b64encode(hmac.new(secret, signed, sha256).digest()).decode("ascii")

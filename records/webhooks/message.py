"""The body that is sent for an event, in the form the Standard Webhooks specification recommends."""

import re
from collections.abc import Mapping
from datetime import UTC, datetime
from typing import Final

from records.canonical import canonical

# "usually smaller than 20kb", says the specification; a payload names things, it does not carry them.
MOST_BYTES: Final = 20_000
_NAME: Final = re.compile(r"[a-z0-9_]+(\.[a-z0-9_]+)+")


def body_of(name: str, at: datetime, about: str, payload: Mapping[str, object]) -> bytes:
    """This function will return the bytes of one event: `type`, `timestamp`, and `data` with `about`.

    The same event gives the same bytes, always (RFC 8785), and no name of a person belongs in it. Raises
    ValueError for a name that is not words between full stops, and for more than 20,000 bytes.
    """
    if not _NAME.fullmatch(name):
        raise ValueError(f"an event is named by words between full stops, not {name!r}")
    timestamp = at.astimezone(UTC).isoformat().replace("+00:00", "Z")
    body = canonical({"type": name, "timestamp": timestamp, "data": {**payload, "about": about}})
    if len(body) > MOST_BYTES:
        raise ValueError(f"the event {name} has {len(body)} bytes; at most {MOST_BYTES} are sent")
    return body

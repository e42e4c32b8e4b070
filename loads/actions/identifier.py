"""The number of a load, made before its act is opened, because the act names what it is about."""

import secrets
import time
from uuid import UUID

_RANDOM_BITS = 74


def new_load_id() -> UUID:
    """This function will return a fresh time-ordered identifier (RFC 9562 section 5.7, version 7)."""
    milliseconds = time.time_ns() // 1_000_000
    noise = secrets.randbits(_RANDOM_BITS)
    high, low = noise >> 62, noise & ((1 << 62) - 1)
    return UUID(int=(milliseconds & ((1 << 48) - 1)) << 80 | 0x7 << 76 | high << 64 | 0b10 << 62 | low)

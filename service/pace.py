"""Asking the broker whether a request may go on: one script, one round trip, nothing decided here.

A broker that is down limits nobody: loads are signed without it. That is said in the log, once a minute.
"""

import logging
import time
from collections.abc import Sequence
from dataclasses import dataclass
from functools import lru_cache
from pathlib import Path
from typing import Any, Final

import redis
from django.conf import settings
from redis.backoff import NoBackoff
from redis.retry import Retry

log = logging.getLogger(__name__)

SCRIPT: Final = Path(__file__).with_name("pace.lua").read_text(encoding="utf-8")
WINDOW_SECONDS: Final = 60
# How long a credential that served is known by its holder. What came to nothing is charged to its address.
KNOWN_FOR_SECONDS: Final = 600
_PATIENCE_SECONDS: Final = 0.25
# After a failure nobody waits for the broker again for this long.
_REST_SECONDS: Final = 5.0
_SAID_EVERY_SECONDS: Final = 60.0


@dataclass(frozen=True, slots=True)
class Allowance:
    """One limit: requests a minute, requests left now, seconds until all of them are there again."""

    name: str
    quota: int
    left: int
    whole_after: int


@dataclass(frozen=True, slots=True)
class Pace:
    """Whether a request may go on (`refused` names the allowance that has no room), and after which wait."""

    known: bool
    refused: str
    wait_seconds: int
    allowances: tuple[Allowance, ...]


OPEN: Final = Pace(known=True, refused="", wait_seconds=0, allowances=())


_now: Final = time.monotonic


@dataclass
class _Rest:
    """Until when this process leaves the broker alone, and when it last said so."""

    until: float = 0.0
    said: float = -_SAID_EVERY_SECONDS


_rest: Final = _Rest()


def asked(mark: str, address: str, further: Sequence[tuple[str, str, int]]) -> Pace:
    """This function will charge one request and say whether it may go on; it never raises.

    `mark` stands for the credential sent ("" without one), `address` for where it came from; `further` are
    allowances besides the general one: name, "who" or "address", requests a minute.
    """
    if _now() < _rest.until:
        return OPEN
    limits = settings.RATE_LIMITS
    words: list[Any] = [address or "unknown", limits["known"], limits["stranger"]]
    for one in further:
        words += one
    try:
        answer = _script(settings.BROKER_URL)(keys=[_mark(mark)], args=words)
    except (redis.RedisError, OSError) as problem:
        _left_alone(problem)
        return OPEN
    return _read(answer)


def note_holder(mark: str, holder: str) -> None:
    """This function will note whose credential that was ("token:3", "person:7"), for some minutes; it never
    raises.
    """
    if _now() < _rest.until:
        return
    try:
        _client(settings.BROKER_URL).set(_mark(mark), holder, ex=KNOWN_FOR_SECONDS)
    except (redis.RedisError, OSError) as problem:
        _left_alone(problem)


def _mark(mark: str) -> str:
    return f"tarebook:pace:holder:{mark}" if mark else ""


def _read(answer: Sequence[Any]) -> Pace:
    known, refused, wait = (int(word) for word in answer[:3])
    rest = answer[3:]
    allowances = tuple(
        Allowance(
            name.decode() if isinstance(name, bytes) else str(name),
            int(quota),
            int(left),
            -(-int(whole) // 1000),
        )
        for name, quota, left, whole in zip(*[iter(rest)] * 4, strict=True)
    )
    return Pace(
        known=bool(known),
        refused=allowances[refused - 1].name if refused else "",
        wait_seconds=max(1, -(-wait // 1000)) if refused else 0,
        allowances=allowances,
    )


def _left_alone(problem: Exception) -> None:
    now = _now()
    _rest.until = now + _REST_SECONDS
    if now - _rest.said >= _SAID_EVERY_SECONDS:
        _rest.said = now
        log.warning("broker not reached (%s): requests are not limited meanwhile", type(problem).__name__)


@lru_cache(maxsize=4)
def _client(address: str) -> redis.Redis:
    # A socket is spelled redis+socket:// by the queue and unix:// by the client.
    return redis.Redis.from_url(
        address.replace("redis+socket://", "unix://", 1),
        retry=Retry(NoBackoff(), 0),
        socket_connect_timeout=_PATIENCE_SECONDS,
        socket_timeout=_PATIENCE_SECONDS,
    )


@lru_cache(maxsize=4)
def _script(address: str) -> Any:
    return _client(address).register_script(SCRIPT)

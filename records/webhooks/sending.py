"""Sends one event to one receiver, once, over HTTP/1.1 and the standard library.

A name is resolved once, every number it gave is judged, and the connection goes to a number that was judged:
a name that resolves otherwise a moment later changes nothing. The name itself is still what the certificate
is checked against and what the header Host says. Redirects are not followed, proxies of the environment not
asked.
"""

import http.client
import socket
import ssl
import threading
import time
from collections.abc import Callable, Iterator, Mapping
from contextlib import contextmanager, suppress
from dataclasses import dataclass
from datetime import timedelta
from functools import lru_cache
from http import HTTPStatus
from typing import Final, TypeAlias

from records.webhooks.addresses import Receiver, reason_against

# The most a receiver may stay silent, and all that one try may take. The specification recommends 15 to 30 s
# for a request.
SILENCE_SECONDS: Final = 10.0
WHOLE_SECONDS: Final = 15.0
MOST_BYTES_READ: Final = 64 * 1024
SENDER: Final = "Tarebook"
LONGEST_DETAIL: Final = 200

Resolve: TypeAlias = Callable[[str, int], tuple[str, ...]]


@dataclass(frozen=True, slots=True)
class Outcome:
    """What came of one try. `name` is a stable word; `asked` is the wait the receiver named."""

    name: str
    status: int | None = None
    detail: str = ""
    asked: timedelta | None = None

    @property
    def delivered(self) -> bool:
        """Whether the receiver took it."""
        return self.name == "delivered"


def resolve(host: str, port: int) -> tuple[str, ...]:
    """This function will return the numbers a name has, each once and in order; raises OSError."""
    found = socket.getaddrinfo(host, port, type=socket.SOCK_STREAM)
    return tuple(dict.fromkeys(str(place[4][0]) for place in found))


def send(
    receiver: Receiver,
    body: bytes,
    headers: Mapping[str, str],
    *,
    trusted: bool,
    resolving: Resolve = resolve,
    tls: ssl.SSLContext | None = None,
) -> Outcome:
    """This function will post `body` to the receiver and say what came of it; it raises nothing.

    A `trusted` place is not judged. One number that is not public is enough to send nothing at all.
    """
    try:
        numbers = resolving(receiver.host, receiver.port)
    except (OSError, UnicodeError):
        return Outcome("not-resolved", detail=f"{receiver.host} has no address")
    if not trusted:
        for number in numbers:
            if (reason := reason_against(number)) is not None:
                return Outcome("address-refused", detail=reason[:LONGEST_DETAIL])
    try:
        return _posted(receiver, numbers, body, headers, tls or _tls())
    except (OSError, ValueError, http.client.HTTPException) as problem:
        return _failure(problem)


def _failure(problem: Exception) -> Outcome:
    match problem:
        case ssl.SSLError():
            words = getattr(problem, "verify_message", "") or problem.reason or "the connection is not secure"
            return Outcome("tls-refused", detail=str(words)[:LONGEST_DETAIL])
        case TimeoutError():
            return Outcome("timed-out", detail="no answer in time")
        case http.client.HTTPException():
            return Outcome("answer-unreadable", detail=type(problem).__name__)
        case _:
            return Outcome("not-connected", detail=type(problem).__name__)


def _posted(
    receiver: Receiver, numbers: tuple[str, ...], body: bytes, headers: Mapping[str, str], tls: ssl.SSLContext
) -> Outcome:
    ends = time.monotonic() + WHOLE_SECONDS
    plain = _connected(receiver, numbers, ends)
    with plain, _cut_off(plain, ends) as was_cut:
        try:
            outcome = _outcome(_answer(receiver, plain, body, headers, tls))
        except (OSError, ValueError, http.client.HTTPException) as problem:
            if was_cut.is_set():
                raise TimeoutError from problem
            raise
    if was_cut.is_set():  # what was cut off reads like an answer that ended
        raise TimeoutError
    return outcome


def _connected(receiver: Receiver, numbers: tuple[str, ...], ends: float) -> socket.socket:
    last: OSError = ConnectionError("no address")
    for number in numbers:
        patience = min(SILENCE_SECONDS, ends - time.monotonic())
        if patience <= 0:
            raise TimeoutError
        try:
            return socket.create_connection((number, receiver.port), timeout=patience)
        except OSError as problem:
            last = problem
    raise last


@contextmanager
def _cut_off(connected: socket.socket, ends: float) -> Iterator[threading.Event]:
    """Hold the connection no longer than agreed, however slowly a receiver drips; tell when it was cut."""
    was_cut = threading.Event()
    # Under TLS the plain socket is detached, so the way to cut it is a second handle of the same connection.
    same = connected.dup()

    def cut() -> None:
        was_cut.set()
        with suppress(OSError):  # the receiver had closed it
            same.shutdown(socket.SHUT_RDWR)

    timer = threading.Timer(max(0.0, ends - time.monotonic()), cut)
    timer.daemon = True
    timer.start()
    try:
        yield was_cut
    finally:
        timer.cancel()
        timer.join()
        same.close()


def _answer(
    receiver: Receiver, plain: socket.socket, body: bytes, headers: Mapping[str, str], tls: ssl.SSLContext
) -> http.client.HTTPResponse:
    stream = plain if receiver.scheme == "http" else tls.wrap_socket(plain, server_hostname=receiver.host)
    with stream:
        exchange = http.client.HTTPConnection(receiver.host, receiver.port, timeout=SILENCE_SECONDS)
        exchange.auto_open = 0  # it uses the connection it is given and never opens one of its own
        exchange.sock = stream
        exchange.putrequest("POST", receiver.target, skip_host=True, skip_accept_encoding=True)
        named = {"Host": receiver.host_header, "Content-Type": "application/json", "User-Agent": SENDER}
        for name, value in {
            **named,
            "Content-Length": str(len(body)),
            "Connection": "close",
            **headers,
        }.items():
            exchange.putheader(name, value)
        exchange.endheaders(body)
        answer = exchange.getresponse()
        answer.read(MOST_BYTES_READ)  # so that the receiver is heard out; what it says is not kept
        return answer


def _outcome(answer: http.client.HTTPResponse) -> Outcome:
    status = answer.status
    if HTTPStatus.OK <= status < HTTPStatus.MULTIPLE_CHOICES:
        return Outcome("delivered", status)
    if status == HTTPStatus.GONE:
        return Outcome("gone", status)
    if HTTPStatus.MULTIPLE_CHOICES <= status < HTTPStatus.BAD_REQUEST:
        return Outcome("redirected", status, "redirects are not followed; subscribe the new address")
    wait = answer.getheader("Retry-After", "").strip()
    asked = timedelta(seconds=int(wait)) if wait.isascii() and wait.isdigit() and len(wait) < 7 else None  # noqa: PLR2004  # a date is not read, and eleven days are enough
    return Outcome("refused", status, asked=asked)


@lru_cache(maxsize=1)
def _tls() -> ssl.SSLContext:
    return ssl.create_default_context()

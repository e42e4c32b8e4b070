"""One request and its answer over HTTP, sent again where that is safe and may help.

Everything this client sends may be sent again: reading changes nothing, and whatever stores something carries
an Idempotency-Key, so the server does it once and gives the same answer again.
"""

import http.client
import json
import random
import ssl
import time
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from decimal import Decimal
from http import HTTPStatus
from typing import Any, Final
from urllib.parse import urlsplit

from service.client.problems import AnswerUnusable, Refused, Unanswered, refusal

API: Final = "/api/v1"
IN_FLIGHT: Final = "idempotency-key-in-flight"


@dataclass(frozen=True, slots=True)
class Patience:
    """How long to wait for an answer, how often to try, and how long to wait between tries (seconds).

    The wait doubles from `first_wait` up to `longest_wait`, less up to half of it by chance, so that many
    clients do not come back at the same moment. A wait the server asks for is kept, unless it is longer than
    `longest_wait`: then its refusal is raised at once.
    """

    tries: int = 6
    first_wait: float = 0.5
    longest_wait: float = 60.0
    answer_within: float = 30.0


@dataclass(frozen=True, slots=True)
class Answer:
    """A 2xx answer: its headers by lower-case name, and its bytes."""

    headers: Mapping[str, str]
    body: bytes

    @property
    def etag(self) -> str:
        """The entity tag as it came, with its quotes; empty without one."""
        return self.headers.get("etag", "")

    @property
    def replayed(self) -> bool:
        """Whether the server had done this before and gave its answer of then."""
        return self.headers.get("idempotency-replayed") == "true"

    @property
    def following(self) -> str:
        """The path of the next page, as the header Link gives it; empty at the last one."""
        target, _, relation = self.headers.get("link", "").partition(">")
        if 'rel="next"' not in relation:
            return ""
        parts = urlsplit(target.removeprefix("<"))
        # Never another host: the token goes with the request.
        return f"{parts.path}?{parts.query}".removeprefix(API)

    def document(self) -> dict[str, Any]:
        """This function will return the body as an object; raises AnswerUnusable."""
        try:
            found = json.loads(self.body)
        except ValueError:
            found = None
        if not isinstance(found, dict):
            raise AnswerUnusable("the answer is no JSON object")
        return found

    def rows(self, name: str) -> list[dict[str, Any]]:
        """This function will return the list `name` of the body; raises AnswerUnusable."""
        found = self.document().get(name)
        if not isinstance(found, list):
            raise AnswerUnusable(f"the answer has no list {name}")
        return found


class Exchange:
    """Sends to one server with one token. Each request has its own connection, so threads may share this."""

    def __init__(
        self,
        address: str,
        token: str,
        *,
        patience: Patience,
        tls: ssl.SSLContext | None,
        sleep: Callable[[float], None] = time.sleep,
    ) -> None:
        parts = urlsplit(address)
        if parts.scheme not in {"http", "https"} or not parts.hostname or parts.query or parts.fragment:
            raise ValueError("an address is like https://tarebook.example.org")
        self.address = address
        self._secure, self._host, self._port = parts.scheme == "https", parts.hostname, parts.port
        self._prefix = parts.path.rstrip("/") + API
        self._token, self._patience, self._sleep = token, patience, sleep
        self._tls = (tls or ssl.create_default_context()) if self._secure else None

    def get(self, path: str, accept: str = "application/json") -> Answer:
        """This function will read `path`, which begins after /api/v1."""
        return self._asked("GET", path, None, {"Accept": accept}, "")

    def post(
        self, path: str, document: Mapping[str, object] | None, *, key: str = "", etag: str = ""
    ) -> Answer:
        """This function will send `document` under `key`, with the state last seen in `etag`."""
        headers = {"Accept": "application/json", "Content-Type": "application/json"}
        if key:
            headers["Idempotency-Key"] = key
        if etag:
            headers["If-Match"] = etag
        return self._asked("POST", path, written(document), headers, key)

    def delete(self, path: str) -> Answer:
        """This function will delete what is at `path`."""
        return self._asked("DELETE", path, None, {"Accept": "application/json"}, "")

    def _asked(
        self, method: str, path: str, body: bytes | None, headers: Mapping[str, str], key: str
    ) -> Answer:
        """This function will try until an answer comes; raises Refused and Unanswered."""
        asked = f"{method} {API}{path.partition('?')[0]}"
        for tried in range(1, self._patience.tries + 1):
            last = tried == self._patience.tries
            try:
                status, found, content = self._exchanged(method, path, body, headers)
            except ssl.SSLCertVerificationError as problem:
                raise Unanswered(
                    asked, key, tried, str(problem)
                ) from problem  # it will not change by waiting
            except (OSError, http.client.HTTPException) as problem:
                if last:
                    raise Unanswered(asked, key, tried, type(problem).__name__) from problem
                self._sleep(self._wait(tried))
                continue
            if HTTPStatus.OK <= status < HTTPStatus.MULTIPLE_CHOICES:
                return Answer(found, content)
            refused = refusal(asked, status, found, content, key)
            wait = self._wait_after(refused, tried)
            if last or wait is None:
                raise refused
            self._sleep(wait)
        raise ValueError("patience has at least one try")

    def _exchanged(
        self, method: str, path: str, body: bytes | None, headers: Mapping[str, str]
    ) -> tuple[int, dict[str, str], bytes]:
        connection = self._connection()
        try:
            named = {**headers, "Authorization": f"Bearer {self._token}", "Connection": "close"}
            connection.request(method, f"{self._prefix}{path}", body, named)
            answer = connection.getresponse()
            content = answer.read()  # raises IncompleteRead when the connection is cut in the middle
            return answer.status, {name.lower(): value for name, value in answer.getheaders()}, content
        finally:
            connection.close()

    def _connection(self) -> http.client.HTTPConnection:
        within = self._patience.answer_within
        if self._secure:
            return http.client.HTTPSConnection(self._host, self._port, timeout=within, context=self._tls)
        return http.client.HTTPConnection(self._host, self._port, timeout=within)

    def _wait(self, tried: int) -> float:
        full = min(self._patience.first_wait * 2.0 ** (tried - 1), self._patience.longest_wait)
        return full * (1 - random.random() / 2)  # noqa: S311  # spreads clients out, guards nothing

    def _wait_after(self, refused: Refused, tried: int) -> float | None:
        """This function will return how long to wait before the same is sent again, None where that would
        not help.
        """
        busy = refused.status in {
            HTTPStatus.TOO_MANY_REQUESTS,
            HTTPStatus.BAD_GATEWAY,
            HTTPStatus.SERVICE_UNAVAILABLE,
        }
        if not busy and refused.code != IN_FLIGHT:
            return None
        if refused.wait_seconds is None:
            return self._wait(tried)
        return float(refused.wait_seconds) if refused.wait_seconds <= self._patience.longest_wait else None


def written(document: Mapping[str, object] | None) -> bytes:
    """This function will write a document as JSON; a Decimal becomes a decimal string, which the server keeps
    as typed. Raises ValueError for NaN and infinity, TypeError for what has no form.
    """
    if document is None:
        return b""
    return json.dumps(document, default=_decimal, allow_nan=False, ensure_ascii=False).encode()


def _decimal(value: object) -> str:
    if isinstance(value, Decimal):
        return format(value, "f")
    raise TypeError(f"{type(value).__name__} has no form in JSON")

"""What can go wrong, as exceptions: a refusal with its stable code and faults, or no answer at all."""

import json
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any, Final


class TarebookError(Exception):
    """Whatever this client raises of its own."""


class Unanswered(TarebookError):
    """No answer came, although it was tried again: it is not known whether the server did what was asked.

    Send the same again with `key`: if it was done, the answer comes now, and nothing is done twice. `key` is
    empty where nothing is stored.
    """

    def __init__(self, asked: str, key: str, tries: int, cause: str) -> None:
        super().__init__(f"{asked}: no answer after {tries} tries ({cause})")
        self.key = key


class AnswerUnusable(TarebookError):
    """An answer came that is not what the API describes, or whose bytes are not those it names."""


@dataclass(frozen=True, slots=True)
class Fault:
    """One thing wrong in what was sent: a JSON pointer (or `?name`), a stable code, a sentence."""

    pointer: str
    code: str
    detail: str


class Refused(TarebookError):
    """The server refused (RFC 9457). `code` stays the same; `next_step` says what would help.

    `request` is the number of the request in the server's logs and trail; `wait_seconds` is what the header
    Retry-After asked for; `key` is the Idempotency-Key that was sent.
    """

    def __init__(self, asked: str, status: int, headers: Mapping[str, str], body: bytes, key: str) -> None:
        problem = _problem_in(body)
        self.status = status
        self.code = str(problem.get("code", ""))
        self.detail = str(problem.get("detail", ""))
        self.next_step = str(problem.get("next_step", ""))
        self.request = str(problem.get("request", ""))
        self.faults = tuple(_fault(one) for one in problem.get("errors") or ())
        self.wait_seconds = _seconds(headers.get("retry-after", ""))
        self.key = key
        said = "; ".join(f"{one.pointer}: {one.detail}" for one in self.faults) or self.detail
        super().__init__(f"{asked}: {status} {self.code}: {said}")


class Unreadable(Refused):
    """400: what was sent cannot be read."""


class NotSignedIn(Refused):
    """401: the token does not serve."""


class NotAllowed(Refused):
    """403: the token may not do this."""


class NotKnown(Refused):
    """404: there is nothing of that name for this token."""


class StepRefused(Refused):
    """409: the state does not allow this step."""


class MovedOn(Refused):
    """412: somebody moved it since it was read. Read it again and look before sending anything."""


class TooLarge(Refused):
    """413: more was sent than is read."""


class Invalid(Refused):
    """422: `faults` names every field that is wrong."""


class StateNotSent(Refused):
    """428: the state last seen has to be sent along."""


class TooSoon(Refused):
    """429: too many requests, or too many wrong passwords; `wait_seconds` says how long to wait."""


class ServerFailed(Refused):
    """5xx: the server or what stands before it failed."""


_BY_STATUS: Final[Mapping[int, type[Refused]]] = {
    400: Unreadable,
    401: NotSignedIn,
    403: NotAllowed,
    404: NotKnown,
    409: StepRefused,
    412: MovedOn,
    413: TooLarge,
    422: Invalid,
    428: StateNotSent,
    429: TooSoon,
}
_FIRST_OF_SERVER: Final = 500


def refusal(asked: str, status: int, headers: Mapping[str, str], body: bytes, key: str) -> Refused:
    """This function will return the exception of an answer that is none of 2xx."""
    otherwise = ServerFailed if status >= _FIRST_OF_SERVER else Refused
    return _BY_STATUS.get(status, otherwise)(asked, status, headers, body, key)


def _problem_in(body: bytes) -> Mapping[str, Any]:
    """This function will read a problem body; a proxy's own page says nothing to us."""
    try:
        problem = json.loads(body)
    except ValueError:
        return {}
    return problem if isinstance(problem, dict) else {}


def _fault(one: Mapping[str, Any]) -> Fault:
    return Fault(str(one.get("pointer", "")), str(one.get("code", "")), str(one.get("detail", "")))


def _seconds(text: str) -> int | None:
    return int(text) if text.isascii() and text.isdigit() else None

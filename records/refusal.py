"""What the service refuses, as exceptions every room raises and `service.problems` turns into problem bodies.

`pointer` is a JSON pointer (RFC 6901) into the document that was sent; "" means the whole of it.
"""

from dataclasses import dataclass
from typing import ClassVar


@dataclass(frozen=True, slots=True)
class Fault:
    """One field that is wrong: where, a stable code, and a sentence with the next step."""

    pointer: str
    code: str
    detail: str


class Refused(Exception):
    """A request that is not carried out. Nothing was stored."""

    status: ClassVar[int] = 400
    title: ClassVar[str] = "refused"

    def __init__(
        self, code: str, detail: str, *, faults: tuple[Fault, ...] = (), next_step: str = ""
    ) -> None:
        super().__init__(detail)
        self.code = code
        self.detail = detail
        self.faults = faults
        self.next_step = next_step


class Unreadable(Refused):
    """The body cannot be read at all."""

    status = 400
    title = "unreadable"


class NotSignedIn(Refused):
    """Nobody is signed in and no valid token was sent."""

    status = 401
    title = "not signed in"


class NotAllowed(Refused):
    """The actor may not do an act of this kind."""

    status = 403
    title = "not allowed"


class NotKnown(Refused):
    """The address names nothing, or something of another operator."""

    status = 404
    title = "not known"


class StepRefused(Refused):
    """The state does not allow this step, or another request holds the key."""

    status = 409
    title = "step refused"


class PreconditionFailed(Refused):
    """`If-Match` does not fit the current state."""

    status = 412
    title = "precondition failed"


class TooLarge(Refused):
    """The body is larger than is read."""

    status = 413
    title = "too large"


class Invalid(Refused):
    """The body was read, and fields in it are wrong."""

    status = 422
    title = "invalid"

    def __init__(self, *faults: Fault, code: str = "invalid", detail: str = "", next_step: str = "") -> None:
        named = "; ".join(
            f"{fault.pointer or 'document'}: {fault.detail.rstrip('.')}" for fault in faults[:3]
        )
        detail = detail or f"{named}{', and more' if len(faults) > 3 else ''}."  # noqa: PLR2004  # as named
        super().__init__(code, detail, faults=faults, next_step=next_step)


class PreconditionMissing(Refused):
    """`If-Match` is required here and was not sent."""

    status = 428
    title = "precondition required"


class LockedOut(Refused):
    """Too many failures; wait as stated."""

    status = 429
    title = "too many requests"

    def __init__(self, code: str, detail: str, *, wait_seconds: int, next_step: str = "") -> None:
        super().__init__(code, detail, next_step=next_step)
        self.wait_seconds = wait_seconds

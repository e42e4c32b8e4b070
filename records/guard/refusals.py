"""What the guards of the database refuse, as exceptions. These are mistakes of our own code, never of a
request.
"""

from collections.abc import Iterator
from contextlib import contextmanager
from typing import ClassVar

from django.db import DatabaseError


class GuardRefused(Exception):
    """The database refused a write at the door; nothing was changed. The message is the database's own
    sentence.
    """

    sqlstate: ClassVar[str] = ""


class NoOpenAct(GuardRefused):
    """A write outside `with act(...)`, or after its seal."""

    sqlstate = "TB001"


class ActMisplaced(GuardRefused):
    """An act inside another act, in a plain transaction, or at the wrong isolation level."""

    sqlstate = "TB002"


class OtherOperator(GuardRefused):
    """A row of another operator than the act's."""

    sqlstate = "TB003"


class NeverChanged(GuardRefused):
    """An update, delete or truncate of rows that are only ever added."""

    sqlstate = "TB004"


class FixedForGood(GuardRefused):
    """A change of a key, or of what may be closed once and was closed, or of anything beside it."""

    sqlstate = "TB005"


class GuardBroken(GuardRefused):
    """A guard that is not set up as it must be; nothing passes it."""

    sqlstate = "TB006"


_BY_STATE = {
    kind.sqlstate: kind
    for kind in (NoOpenAct, ActMisplaced, OtherOperator, NeverChanged, FixedForGood, GuardBroken)
}


def refusal_in(error: DatabaseError) -> GuardRefused | None:
    """This function will return the refusal a database error stands for, None when it is another kind of
    error.
    """
    cause = error.__cause__
    kind = _BY_STATE.get(getattr(cause, "sqlstate", None) or "")
    if kind is None:
        return None
    primary = getattr(getattr(cause, "diag", None), "message_primary", None)
    return kind(primary or str(error))


@contextmanager
def refusals_named() -> Iterator[None]:
    """This function will raise the refusal by its name where a database error stands for one."""
    try:
        yield
    except DatabaseError as error:
        refusal = refusal_in(error)
        if refusal is None:
            raise
        raise refusal from error

"""Makes one call of ours fail: the n-th statement to the database, the n-th look at the clock, the n-th file.

Beneath Django, so that whatever way a statement goes it is met; what follows the failure is as in life (a
connection that is lost stays lost).
"""

import builtins
import errno
import itertools
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from typing import Any
from unittest.mock import patch

import psycopg
from django.utils import timezone


@dataclass
class Fault:
    """A fault that was laid: how many calls came, and whether it struck."""

    at: int
    calls: int = 0
    struck: bool = False

    def due(self) -> bool:
        """This function will count one call and say whether it is the one that fails."""
        self.calls += 1
        self.struck = self.struck or self.calls == self.at
        return self.calls == self.at


def lost(connection: psycopg.Connection) -> psycopg.Error:
    """This function will end the connection and return what the driver says then."""
    connection.close()
    return psycopg.OperationalError("server closed the connection unexpectedly")


def full(_connection: psycopg.Connection) -> psycopg.Error:
    """This function will return what a server says that has no room left."""
    return psycopg.errors.DiskFull("could not extend file: No space left on device")


def locked(_connection: psycopg.Connection) -> psycopg.Error:
    """This function will return what a server says that gave one of two up."""
    return psycopg.errors.DeadlockDetected("deadlock detected")


@contextmanager
def statement_fails(at: int, how: Callable[[psycopg.Connection], psycopg.Error]) -> Iterator[Fault]:
    """This function will make the n-th statement (or commit) fail instead of being sent."""
    fault = Fault(at)

    def before(
        real: Callable[..., Any], connection_of: Callable[[Any], psycopg.Connection]
    ) -> Callable[..., Any]:
        def call(self: Any, *args: Any, **kwargs: Any) -> Any:
            if fault.due():
                raise how(connection_of(self))
            return real(self, *args, **kwargs)

        return call

    with (
        patch.object(psycopg.Cursor, "execute", before(psycopg.Cursor.execute, lambda one: one.connection)),
        patch.object(
            psycopg.Cursor, "executemany", before(psycopg.Cursor.executemany, lambda one: one.connection)
        ),
        patch.object(psycopg.Connection, "commit", before(psycopg.Connection.commit, lambda one: one)),
    ):
        yield fault


@contextmanager
def commit_is_not_answered() -> Iterator[Fault]:
    """This function will let each commit be done and the connection break before its answer is read."""
    fault, real = Fault(1), psycopg.Connection.commit

    def commit(self: psycopg.Connection) -> None:
        real(self)
        if fault.due():
            raise lost(self)

    with patch.object(psycopg.Connection, "commit", commit):
        yield fault


@contextmanager
def clock_fails(at: int) -> Iterator[Fault]:
    """This function will make the n-th look at the clock fail."""
    fault, real = Fault(at), timezone.now

    def now() -> Any:
        if fault.due():
            raise OSError(errno.EIO, "the clock cannot be read")
        return real()

    with patch.object(timezone, "now", now):
        yield fault


@contextmanager
def file_fails(at: int) -> Iterator[Fault]:
    """This function will make the n-th file that is opened have no room left."""
    fault, real = Fault(at), builtins.open

    def opened(*args: Any, **kwargs: Any) -> Any:
        if fault.due():
            raise OSError(errno.ENOSPC, "No space left on device")
        return real(*args, **kwargs)

    with patch.object(builtins, "open", opened):
        yield fault


def one_after_the_other() -> Iterator[int]:
    """This function will count the calls that fail, from the first on, without end."""
    return itertools.count(1)

"""The one door for writing: every change of every business table happens inside `with act(...)`.

    with act(LOAD_ACCEPTED, by=actor, about=f"load:{load.id}", reason=text) as entry:
        ...

PostgreSQL refuses any other write. At its end the act is sealed into the chain of its operator; nothing is
written after that.
"""

from collections.abc import Iterator
from contextlib import AbstractContextManager, contextmanager
from contextvars import ContextVar
from dataclasses import dataclass
from datetime import datetime
from functools import partial
from uuid import UUID

from django.db import connection, transaction

from records.actor import Actor
from records.figures import count_act
from records.guard.refusals import ActMisplaced, refusals_named
from records.kind import Kind
from records.prepared import rows
from records.refusal import NotAllowed

# The request an act is done in, as the switchboard names it; it is sealed with the act.
request_id: ContextVar[str] = ContextVar("request_id", default="")
# The transaction that transaction_for_acts() holds open, and which acts may join.
_joinable: ContextVar[transaction.Atomic | None] = ContextVar("joinable", default=None)

_OPEN = "SELECT act_id, opened FROM act_open(%s, %s, %s, %s, %s, %s, %s, %s, %s, %s)"
# Every deferred check, which also closes the act: the witnesses take no more rows for it. Then back to
# deferred, for the acts that may follow in the same transaction.
_CLOSE = "SET CONSTRAINTS ALL IMMEDIATE; SET CONSTRAINTS ALL DEFERRED"
# The same and then the seal, as a commit does it.
_SEAL = (
    "SET CONSTRAINTS ALL IMMEDIATE; "
    "SET CONSTRAINTS records_closing_seals IMMEDIATE; "
    "SET CONSTRAINTS ALL DEFERRED"
)


@dataclass(frozen=True, slots=True)
class Entry:
    """An open act: its number, the database's time of opening (UTC), its chain and the name of its kind."""

    id: UUID
    at: datetime
    chain: str
    kind: str


@contextmanager
def act(kind: Kind, *, by: Actor, about: str, reason: str = "") -> Iterator[Entry]:
    """This function will open an act, let the caller write, and seal the act; an exception undoes all of it.

    `about` names what it is about ("load:<uuid>", "aircraft:<id>", "person:7"). Raises NotAllowed when the
    actor may not do an act of this kind, ActMisplaced inside another act or a plain transaction, and the
    other GuardRefused for what the guards refuse.
    """
    if kind.name not in by.may:
        raise NotAllowed(
            "act-not-allowed",
            f"{by.key} ({by.capacity}) may not do this: {kind.name}.",
            next_step="Ask somebody who holds the duty, or have it granted.",
        )
    with refusals_named(), _transaction_of_an_act(kind):
        yield _open(kind, by, about, reason)
        transaction.on_commit(partial(count_act, kind.name), robust=True)


@contextmanager
def transaction_for_acts() -> Iterator[None]:
    """This function will open the durable transaction that acts done directly inside it join, one after the
    other.

    It serves what must be stored together with an act (the answer to a request). An act that fails takes it
    all back.
    """
    with refusals_named(), _sealed_transaction():
        token = _joinable.set(connection.atomic_blocks[-1])
        try:
            yield
        finally:
            _joinable.reset(token)


def _transaction_of_an_act(kind: Kind) -> AbstractContextManager[None]:
    innermost = connection.atomic_blocks[-1] if connection.atomic_blocks else None
    if innermost is None or getattr(innermost, "_from_testcase", False):
        return _sealed_transaction()
    if innermost is _joinable.get():
        return _closed_act()
    raise ActMisplaced(f"the act {kind.name} was begun inside another act or a plain transaction")


@contextmanager
def _sealed_transaction() -> Iterator[None]:
    """The durable transaction whose commit seals. The chain is locked from the seal to the commit, so the
    database does both with nothing of ours between: waiting for this process to go on, however shortly, would
    hold up every act of the operator.
    """
    committed = not connection.atomic_blocks  # a test case keeps its own transaction around everything
    with transaction.atomic(durable=True):
        yield
        if not committed:
            _run(_SEAL)


@contextmanager
def _closed_act() -> Iterator[None]:
    with transaction.atomic(savepoint=False):
        yield
        _run(_CLOSE)


def _run(statements: str) -> None:
    with connection.cursor() as cursor:
        cursor.execute(statements)


def _open(kind: Kind, by: Actor, about: str, reason: str) -> Entry:
    values = (
        by.chain,
        kind.name,
        by.kind,
        by.key,
        by.name,
        by.capacity,
        about,
        reason,
        by.caused_by,
        request_id.get(),
    )
    ((number, opened),) = rows(_OPEN, values)
    return Entry(id=number, at=opened, chain=by.chain, kind=kind.name)

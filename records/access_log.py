"""Writing, sealing and judging the log of sign-ins, of failures to sign in, and of the use of tokens.

Nothing of it is an act, since strangers write it. What was typed, and the address it came from, stand there
as keyed digests: alike where they were alike, and told by nobody without the service's own key.
"""

from collections.abc import Iterator
from itertools import groupby
from typing import Any, Final

from django.db import IntegrityError, connection, connections
from django.utils.crypto import salted_hmac

from records.access_chain import AccessRow, faults_of_log
from records.act import act, request_id
from records.actor import HOUSE, Actor
from records.acts import SEAL_ACCESS_LOG
from records.chain import Finding
from records.models.access import AccessSeal

_DIGITS: Final = 32
_UNSEALED: Final = """
SELECT a.chain, a.number, a.digest FROM (
    SELECT DISTINCT ON (chain) chain, number, digest FROM records_access ORDER BY chain, number DESC) a
WHERE a.number > coalesce((SELECT max(s.number) FROM records_accessseal s WHERE s.operator_id = a.chain), 0)
ORDER BY a.chain
"""
_ROWS: Final = (
    "SELECT chain, number, at, what, key, typed, origin, request, previous, digest "
    'FROM records_access ORDER BY chain COLLATE "C", number'
)
_BATCH: Final = 500


def note(what: str, *, operator: str | None, key: str = "", typed: str = "", address: str = "") -> int | None:
    """This function will write one event and return its number, or None when it is not listed.

    Not listed: the use of a token within five minutes of the last, and what goes beyond the allowance of
    its bearer. `typed` and `address` are kept as keyed digests only. A failure must stay noted although the
    work it happened in is undone, so call it outside that work's transaction.
    """
    values = (
        operator or HOUSE,
        what,
        key,
        _keyed("typed", typed),
        _keyed("address", address),
        request_id.get(),
    )
    with connection.cursor() as cursor:
        cursor.execute("SELECT access_note(%s, %s, %s, %s, %s, %s)", values)
        (number,) = cursor.fetchone()
    return None if number is None else int(number)


def seal_log() -> int:
    """This function will seal the last digest of every chain's log that grew, each in an act of its own, and
    return how many those were.
    """
    with connection.cursor() as cursor:
        cursor.execute(_UNSEALED)
        grown = cursor.fetchall()
    return sum(_sealed(chain, number, digest) for chain, number, digest in grown)


def broken_rows(using: str = "default") -> Iterator[Finding]:
    """This function will name every row of the log that was changed or is gone."""
    sealed: dict[str, dict[int, str]] = {}
    for chain, number, digest in AccessSeal.objects.using(using).values_list(
        "operator_id", "number", "digest"
    ):
        sealed.setdefault(chain, {})[number] = digest
    with connections[using].chunked_cursor() as cursor:
        cursor.execute(_ROWS)
        for chain, rows in groupby(_rows(cursor), key=lambda row: row.chain):
            yield from faults_of_log(chain, rows, sealed.pop(chain, {}))
    for chain, digests in sorted(sealed.items()):
        yield from faults_of_log(chain, (), digests)


def _sealed(chain: str, number: int, digest: str) -> bool:
    by = Actor(
        operator=None if chain == HOUSE else chain,
        kind="service",
        key="service:scheduler",
        name="",
        capacity="scheduler",
        may=frozenset({SEAL_ACCESS_LOG.name}),
    )
    try:
        with act(SEAL_ACCESS_LOG, by=by, about=f"access-log:{chain}"):
            AccessSeal.objects.create(operator_id=chain, number=number, digest=digest)
    except IntegrityError:
        return False  # another scheduler sealed this place at the same moment
    return True


def _keyed(kind: str, text: str) -> str:
    """This function will return a digest that only somebody with the service's key can look for."""
    if not text:
        return ""
    clean = text.encode("utf-8", "surrogatepass")
    return salted_hmac(f"records.access.{kind}", clean, algorithm="sha256").hexdigest()[:_DIGITS]


def _rows(cursor: Any) -> Iterator[AccessRow]:
    while rows := cursor.fetchmany(_BATCH):
        for row in rows:
            yield AccessRow(*row)

"""Stored loads computed again: each with its verdict now, the first limit it breaks, or why it has none.

Nothing is stored here and nothing filed is touched. No load is left out: one that cannot be computed comes
out as such, with its reason.
"""

import json
import logging
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from functools import lru_cache
from typing import Any, Final, Literal, NamedTuple
from uuid import UUID

from django.db import connection

from fleet.basis_reading import basis_from_text
from fleet.models import EmptyWeight, LoadingBasis
from fleet.queries.provisions import NO_PROVISIONS
from loads.balance.bulk.deciding import OUTSIDE, WITHIN, decide
from loads.balance.bulk.known import Known, known_of
from loads.balance.bulk.reading import Reading
from loads.balance.declared import read_outline
from loads.balance.engine import ENGINE_VERSION
from loads.balance.result import Check, Result
from loads.models import Recheck
from loads.queries.computation import assessed_with
from loads.queries.figures import empty_figures
from loads.queries.recheck_versions import Assessed, OtherFit, Versions
from records.refusal import Refused
from records.strict_json import read

log = logging.getLogger(__name__)

Now = Literal["within", "outside", "unresolved", "not computed", "other fit"]
GONE: Final = ("superseded", "withdrawn")
_BATCH: Final = 500
# What a last-minute change made of a load is what was assessed, so its body counts. The configuration stands
# in the body, too: that saves the row of the load.
_ROWS: Final = """
SELECT p.load_id, p.assessment_id, p.verdict, s.engine, convert_from(coalesce(c.body, d.body), 'UTF8'),
       p.aircraft_id, (p.departure AT TIME ZONE 'UTC')::text || '+00:00', s.loading_basis_id,
       s.empty_weight_id, s.provisions, (s.assessed_at AT TIME ZONE 'UTC')::text || '+00:00'
FROM loads_present p
JOIN loads_assessment s ON s.id = p.assessment_id
JOIN loads_declaration d ON d.load_id = p.load_id
LEFT JOIN loads_latechange c ON s.number > 1 AND c.assessment_id = s.id
WHERE p.load_id = ANY (%s) AND p.state NOT IN ('superseded', 'withdrawn')
"""
LONGEST_LIMIT, LONGEST_EXCESS = 300, 500
_WORDS: Final[dict[int, Literal["within", "outside"]]] = {WITHIN: "within", OUTSIDE: "outside"}
_Key = tuple[UUID, UUID, str]


class Stored(NamedTuple):
    """A load as it is stored: what was declared, and the verdict of the assessment in use."""

    load: UUID
    assessment: UUID
    verdict: str
    engine: str
    assessed: Assessed
    body: str


Read = tuple[Stored, Any]  # a stored load, and its document as JSON reads it


@dataclass(frozen=True, slots=True)
class Outcome:
    """What came out for a load now. `code`, `limit` and `excess` tell of the first limit that is broken or
    could not be checked; of a load that could not be computed `excess` tells why.
    """

    stored: Stored
    now: Now
    code: str = ""
    limit: str = ""
    excess: str = ""
    exactly: bool = True


@dataclass(frozen=True, slots=True)
class _Group:
    """Loads of one basis, empty weight and configuration, each with its turn."""

    known: Known
    reading: Reading
    members: list[tuple[int, Stored]]


def stored_loads(loads: list[UUID]) -> Iterator[Read]:
    """This function will yield the loads of these numbers, in any order, but for those that were replaced or
    withdrawn, each with its document as it is read quickly. They are read through a cursor of the server, a
    few hundred at a time.
    """
    with connection.chunked_cursor() as cursor:
        with connection.cursor() as setting:
            # A part is few of many rows, whatever the planner holds of a list of some thousand numbers: whole
            # tables read for each part would cost with the square of all that is stored.
            setting.execute("SET LOCAL enable_seqscan = off")
        cursor.execute(_ROWS, [loads])
        while rows := cursor.fetchmany(_BATCH):
            for row in rows:
                yield _stored(row)


def recompute(recheck: Recheck, loads: Iterable[Read]) -> list[Outcome]:
    """This function will return what comes out for each load, in their order.

    Loads that this very engine assessed and whose basis the bulk sums know are decided in bulk; where that
    leaves a doubt, or the verdict comes out otherwise, the exact assessment says what is so.
    """
    versions = Versions(recheck)
    found: dict[int, Outcome] = {}
    groups: dict[_Key, _Group] = {}
    for turn, (one, document) in enumerate(loads):
        if not _added(one, document, turn, versions, groups):
            found[turn] = exact_outcome(one, versions)
    for group in groups.values():
        decision = decide(group.known, group.reading.batch())
        for (turn, one), verdict in zip(group.members, decision.verdict.tolist(), strict=True):
            word = _WORDS.get(verdict)
            found[turn] = (
                Outcome(one, word, exactly=False)
                if word is not None and word == one.verdict
                else exact_outcome(one, versions)
            )
    return [found[turn] for turn in sorted(found)]


def _added(one: Stored, document: Any, turn: int, versions: Versions, groups: dict[_Key, _Group]) -> bool:
    """This function will add a load to the batch it belongs to; False when it must be computed exactly."""
    if one.engine != ENGINE_VERSION:  # the bulk reading asks less of what this engine has read before
        return False
    try:
        used = versions.of(one.assessed)
    except OtherFit:
        return False
    if used.basis is None or used.empty_weight is None or used.provisions != NO_PROVISIONS:
        return False
    key = (used.basis.id, used.empty_weight.id, one.assessed.configuration)
    group = groups.get(key)
    if group is None:
        known = _known(*key)
        if known is None:
            return False
        group = groups[key] = _Group(known, Reading(known), [])
    if not group.reading.add(document):
        return False
    group.members.append((turn, one))
    return True


@lru_cache(maxsize=512)
def _known(basis: UUID, empty_weight: UUID, configuration: str) -> Known | None:
    document = LoadingBasis.objects.values_list("document", flat=True).get(id=basis)
    weight = EmptyWeight.objects.values_list("document", flat=True).get(id=empty_weight)
    return known_of(basis_from_text(document), configuration, empty_figures(weight, document))


def exact_outcome(one: Stored, versions: Versions) -> Outcome:
    """This function will return what the whole assessment says of a load."""
    try:
        return _outcome(one, _assessed(one, versions))
    except OtherFit:
        return Outcome(one, "other fit")
    except Refused as refusal:
        return Outcome(one, "not computed", refusal.code, "not computed", refusal.detail[:LONGEST_EXCESS])
    except Exception as problem:  # noqa: BLE001  # one load must not keep the others from being computed
        log.warning("load %s could not be computed again: %s", one.load, type(problem).__name__)
        words = f"the computation failed: {type(problem).__name__}"
        return Outcome(one, "not computed", "failed", "not computed", words)


def _assessed(one: Stored, versions: Versions) -> Result:
    document: Any = read(one.body.encode())
    used, known = versions.of(one.assessed), versions.known(one.assessed)
    return assessed_with(document, read_outline(document), used, known, advised=False)[1]


def _outcome(one: Stored, result: Result) -> Outcome:
    wanted = {"outside": "fail", "unresolved": "unresolved"}.get(result.verdict)
    broken = [check for check in result.checks if check.outcome == wanted]
    if not broken:
        return Outcome(one, result.verdict)
    first = broken[0]
    more = f" (and {len(broken) - 1} more)" if broken[1:] else ""
    limit = f"{first.title}{more}"[:LONGEST_LIMIT]
    return Outcome(one, result.verdict, first.code, limit, _excess(first)[:LONGEST_EXCESS])


def _excess(check: Check) -> str:
    limits = [
        f"{bound} {check.unit or ''}".strip() for bound in (check.low, check.limit) if bound is not None
    ]
    if check.actual is None or not limits:
        return check.margin_text
    return f"{check.margin_text} ({check.actual} against {' to '.join(limits)})"


def _stored(row: tuple[Any, ...]) -> Read:
    load, assessment, verdict, engine, body, aircraft, departure, basis, weight, provisions, known = row
    document = json.loads(body)
    used = (basis, weight, tuple(provisions), known)
    assessed = Assessed(aircraft, document["configuration"], departure, *used)
    return Stored(load, assessment, verdict, engine, assessed, body), document

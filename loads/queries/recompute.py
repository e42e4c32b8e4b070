"""Stored loads computed again: each with its verdict now, the first limit it breaks, or why it has none.

Nothing is stored here and nothing filed is touched. No load is left out: one that cannot be computed comes
out as such, with its reason.
"""

import json
import logging
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field
from datetime import datetime
from functools import lru_cache
from typing import Any, Final, Literal
from uuid import UUID

from fleet.basis_reading import basis_from_text
from fleet.models import EmptyWeight, LoadingBasis
from fleet.queries.provisions import NO_PROVISIONS
from loads.balance.bulk.deciding import OUTSIDE, WITHIN, decide
from loads.balance.bulk.known import Known, known_of
from loads.balance.bulk.reading import Reading
from loads.balance.declared import read_outline
from loads.balance.engine import ENGINE_VERSION
from loads.balance.result import Check, verdict_of
from loads.models import Recheck
from loads.queries.computation import checked_with
from loads.queries.figures import empty_figures
from loads.queries.recheck_versions import Assessed, OtherFit, Versions
from loads.queries.stored_loads import Stored, rows_for_bulk, rows_in_full
from records.refusal import Refused
from records.strict_json import read

log = logging.getLogger(__name__)

Now = Literal["within", "outside", "unresolved", "not computed", "other fit"]
LONGEST_LIMIT, LONGEST_EXCESS = 300, 500
_WORDS: Final = {WITHIN: "within", OUTSIDE: "outside"}
_read_quickly = json.JSONDecoder().raw_decode


@dataclass(frozen=True, slots=True)
class Outcome:
    """What came out for a load that was computed exactly. `code`, `limit` and `excess` tell of the first
    limit that is broken or could not be checked; of a load that could not be computed `excess` tells why.
    """

    stored: Stored
    now: Now
    code: str = ""
    limit: str = ""
    excess: str = ""


@dataclass(frozen=True, slots=True)
class Recomputed:
    """What came out for the loads of a part: how many the bulk sums left with the verdict they had, and the
    others one by one, in their order.
    """

    same_in_bulk: int
    exactly: Iterator[Outcome]


@dataclass(frozen=True, slots=True)
class _Group:
    """Loads of one basis, empty weight and configuration, each with its turn and the verdict it had."""

    known: Known
    reading: Reading
    turns: list[int] = field(default_factory=list)
    verdicts: list[str] = field(default_factory=list)


class _Groups:
    """The groups of one part; what loads share is worked out for the first of them."""

    def __init__(self, versions: Versions) -> None:
        self._versions = versions
        self._seen: dict[tuple[object, ...], _Group | None] = {}
        self._found: dict[tuple[UUID, UUID, str], _Group] = {}

    def of(self, configuration: str, departure: str, texts: list[str]) -> _Group | None:
        """The group of a load by its versions as `BULK_COLUMNS` has them, None for one to compute exactly."""
        key = (configuration, self._versions.span(texts[1], departure), *texts)
        try:
            return self._seen[key]
        except KeyError:
            found = self._seen[key] = self._worked_out(configuration, departure, texts)
            return found

    def all(self) -> Iterable[_Group]:
        """Every group there is."""
        return self._found.values()

    def _worked_out(self, configuration: str, departure: str, texts: list[str]) -> _Group | None:
        engine, aircraft, basis, weight, provisions = texts
        if engine != ENGINE_VERSION:  # the bulk reading asks less of what this engine has read before
            return None
        before = Assessed(
            UUID(aircraft),
            configuration,
            datetime.fromisoformat(departure),
            UUID(basis) if basis else None,
            UUID(weight) if weight else None,
            tuple(UUID(one) for one in provisions.strip("{}").split(",") if one),
        )
        try:
            used = self._versions.of(before)
        except OtherFit:
            return None
        if used.basis is None or used.empty_weight is None or used.provisions != NO_PROVISIONS:
            return None
        known = _known(used.basis.id, used.empty_weight.id, configuration)
        if known is None:
            return None
        key = (used.basis.id, used.empty_weight.id, configuration)
        return self._found.setdefault(key, _Group(known, Reading(known)))


def recompute(recheck: Recheck, part: int) -> Recomputed:
    """This function will compute the loads of a part, by the number of its row.

    Loads that this very engine assessed and whose basis the bulk sums know are decided in bulk; where that
    leaves a doubt, or the verdict comes out otherwise, the exact assessment says what is so.
    """
    versions = Versions(recheck)
    groups = _Groups(versions)
    left = _read_into(groups, rows_for_bulk(part))
    same = 0
    for group in groups.all():
        decision = decide(group.known, group.reading.batch())
        for turn, had, verdict in zip(group.turns, group.verdicts, decision.verdict.tolist(), strict=True):
            if _WORDS.get(verdict) == had:
                same += 1
            else:
                left.append(turn)
    stored = rows_in_full(part, left) if left else iter(())
    return Recomputed(same, (exact_outcome(one, versions) for one in stored))


def _read_into(groups: _Groups, rows: Iterable[tuple[Any, ...]]) -> list[int]:
    """Put the loads into their groups; return the turns of those the bulk sums do not know."""
    left = []
    for turn, verdict, body, departure, *texts in rows:
        document, _ = _read_quickly(body)
        group = groups.of(document["configuration"], departure, texts)
        if group is not None and group.reading.add(document):
            group.turns.append(turn)
            group.verdicts.append(verdict)
        else:
            left.append(turn)
    return left


@lru_cache(maxsize=512)
def _known(basis: UUID, empty_weight: UUID, configuration: str) -> Known | None:
    document = LoadingBasis.objects.values_list("document", flat=True).get(id=basis)
    weight = EmptyWeight.objects.values_list("document", flat=True).get(id=empty_weight)
    return known_of(basis_from_text(document), configuration, empty_figures(weight, document))


def exact_outcome(one: Stored, versions: Versions) -> Outcome:
    """This function will return what the whole assessment says of a load."""
    try:
        return _outcome(one, _checks(one, versions))
    except OtherFit:
        return Outcome(one, "other fit")
    except Refused as refusal:
        return Outcome(one, "not computed", refusal.code, "not computed", refusal.detail[:LONGEST_EXCESS])
    except Exception as problem:  # noqa: BLE001  # one load must not keep the others from being computed
        log.warning("load %s could not be computed again: %s", one.load, type(problem).__name__)
        words = f"the computation failed: {type(problem).__name__}"
        return Outcome(one, "not computed", "failed", "not computed", words)


def _checks(one: Stored, versions: Versions) -> tuple[Check, ...]:
    document: Any = read(one.body.encode())
    outline = read_outline(document)
    before = Assessed(
        one.aircraft,
        outline.configuration,
        one.departure,
        one.loading_basis,
        one.empty_weight,
        tuple(one.provisions),
    )
    return checked_with(document, outline, versions.of(before), versions.known(one.assessed))


def _outcome(one: Stored, checks: tuple[Check, ...]) -> Outcome:
    verdict = verdict_of(checks)
    wanted = {"outside": "fail", "unresolved": "unresolved"}.get(verdict)
    broken = [check for check in checks if check.outcome == wanted]
    if not broken:
        return Outcome(one, verdict)
    first = broken[0]
    more = f" (and {len(broken) - 1} more)" if broken[1:] else ""
    limit = f"{first.title}{more}"[:LONGEST_LIMIT]
    return Outcome(one, verdict, first.code, limit, _excess(first)[:LONGEST_EXCESS])


def _excess(check: Check) -> str:
    limits = [
        f"{bound} {check.unit or ''}".strip() for bound in (check.low, check.limit) if bound is not None
    ]
    if check.actual is None or not limits:
        return check.margin_text
    return f"{check.margin_text} ({check.actual} against {' to '.join(limits)})"

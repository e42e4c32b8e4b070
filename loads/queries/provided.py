"""What the operator laid down for the time of a flight, put to use in a load: tables, rules, restrictions,
permits.
"""

from collections.abc import Sequence
from dataclasses import replace
from datetime import datetime
from typing import Final

from fleet.basis import Basis
from fleet.models import Provision
from fleet.provisions import PERMIT, RESTRICTION, RULES, STANDARD_WEIGHTS
from fleet.queries.in_force import InForce
from fleet.queries.provisions import Provisions, used_provisions
from fleet.queries.settings import settings_at
from fleet.restriction_reading import paper_from_text
from fleet.restrictions import Paper, Ruled, apply
from fleet.standard_weights import StandardWeights
from fleet.standard_weights_reading import standard_weights_from_text
from loads.balance.aboard import Declared, Outline
from loads.balance.circumstances import PLAIN, Applied
from loads.balance.declared import read_load
from loads.balance.over_flight import coming_people
from loads.balance.trapped import with_trapped
from loads.queries.current import Current
from loads.queries.weighing_due import asks_for_weighing, weighing_due
from records.strict_json import JSON

# What each kind is called in the statement, one version of it or a list.
_ONE: Final = {STANDARD_WEIGHTS: "standard_weights", RULES: "rules"}
_MANY: Final = {RESTRICTION: "restrictions", PERMIT: "permits"}


def ruled_for(basis: Basis, held: Provisions, outline: Outline) -> Ruled:
    """This function will return the basis with the restrictions and permits that hold for a flight."""
    if not held.restrictions and not held.permits:
        return Ruled(basis)
    return apply(basis, tuple(paper for _, paper in _papers(held, outline.flight.operation)))


def basis_under(basis: Basis, used: Sequence[Provision]) -> Basis:
    """This function will return a basis as the restrictions and permits left it that an assessment used."""
    papers = tuple(_paper(row) for row in used if row.kind in _MANY)
    return apply(basis, papers).basis


def declared_under(document: dict[str, JSON], used: InForce, ruled: Ruled, known: datetime) -> Declared:
    """This function will read a load document against a basis, with what the operator laid down for the time
    of its departure. Raises Invalid with every fault.
    """
    declared = read_load(document, ruled.basis, table_of(used.provisions))
    if ruled.trapped:
        declared = with_trapped(declared, ruled)
    about = PLAIN
    if _estimated(declared):
        about = replace(about, estimates=_estimates(used, declared, known))
    if ruled.lines:
        papers = _papers(used.provisions, declared.outline.flight.operation)
        applied = (_applied(paper, lines) for (_, paper), lines in zip(papers, ruled.lines, strict=True))
        about = replace(about, applied=tuple(applied), unmet=ruled.unmet)
    if used.provisions.rules is not None:
        about = replace(about, weighing=weighing_due(used, ruled.basis, declared.outline.flight))
    return declared if about == PLAIN else replace(declared, circumstances=about)


def used_of(held: Provisions, declared: Declared) -> tuple[Provision, ...]:
    """This function will return what a load used of what held, in the order of the statement."""
    table = held.standard_weights if declared.standards is not None else None
    rules = held.rules if declared.circumstances.weighing is not None else None
    papers = _papers(held, declared.outline.flight.operation)
    first = tuple(one for one in (table, rules) if one is not None)
    return (*first, *(row for row, _ in papers))


def _papers(held: Provisions, operation: str) -> list[tuple[Provision, Paper]]:
    """Return the restrictions, then the permits that are for an operation, each with its row."""
    rows = (*held.restrictions, *held.permits)
    found = [(row, _paper(row)) for row in rows]
    return [(row, paper) for row, paper in found if not paper.operations or operation in paper.operations]


def _paper(row: Provision) -> Paper:
    return paper_from_text(row.document, "permit" if row.kind == PERMIT else "restriction")


def _applied(paper: Paper, lines: tuple[str, ...]) -> Applied:
    return Applied(
        kind=paper.kind,
        number=paper.number,
        what=paper.what,
        authority=paper.authority,
        lines=(*lines, *paper.conditions),
        since=paper.since,
        until=paper.until,
        source=str(paper.source),
    )


def provided_versions(used: Sequence[Provision]) -> dict[str, object]:
    """This function will return ids and digests of what was used, by kind, as the statement holds them."""
    found: dict[str, object] = {
        _ONE[one.kind]: {"id": str(one.id), "digest": one.digest} for one in used if one.kind in _ONE
    }
    for kind, name in _MANY.items():
        listed = [{"id": str(one.id), "digest": one.digest} for one in used if one.kind == kind]
        if listed:
            found[name] = listed
    return found


def provisions_changed(current: Current, now: Provisions) -> tuple[str, ...]:
    """This function will name what differs between what an assessment used and what holds now."""
    used = used_provisions(current.assessment.provisions)
    changed = []
    if _table_changed(current, used, now):
        changed.append(STANDARD_WEIGHTS)
    if _rules_changed(current, used, now):
        changed.append(RULES)
    holds = {row.id: row.kind for row, _ in _papers(now, current.load.operation)}
    for kind, name in _MANY.items():
        before = {one.id for one in used if one.kind == kind}
        if before != {version for version, of in holds.items() if of == kind}:
            changed.append(name)
    return tuple(changed)


def table_of(held: Provisions) -> StandardWeights | None:
    """This function will return the table that holds, if one does."""
    version = held.standard_weights
    if version is None:
        return None
    return standard_weights_from_text(version.document, version.number)


# Whoever comes aboard in flight stands in a line of the sequence. So does what leaves: told once too often.
CARRIED = ("passengers", "sequence")


def _table_changed(current: Current, used: Sequence[Provision], now: Provisions) -> bool:
    """This function will say whether another table counts for this load: one replaced the one it used, or
    there is one now and it has people whom it concerns.
    """
    before = next((one.id for one in used if one.kind == STANDARD_WEIGHTS), None)
    table = now.standard_weights
    if before is not None:
        return table is None or table.id != before
    if table is None:
        return False
    adds = (found := table_of(now)) is not None and found.declared is not None
    lines = current.result().get("sumsheet")
    people = [
        line for line in (lines if isinstance(lines, list) else []) if line["group"] in {"crew", *CARRIED}
    ]
    return any(
        line["how"] == "standard" or (adds and line["how"] == "declared" and line["group"] in CARRIED)
        for line in people
    )


def _rules_changed(current: Current, used: Sequence[Provision], now: Provisions) -> bool:
    """This function will say whether other rules bind this load: those it used were replaced, or there are
    some now that ask for a weighing.
    """
    before = next((one.id for one in used if one.kind == RULES), None)
    if now.rules is None or now.rules.id == before:
        return before is not None and now.rules is None
    return before is not None or asks_for_weighing(now.rules, current.load)


def _estimated(declared: Declared) -> bool:
    return any(
        one.how == "estimated" or (one.lap_infant is not None and one.lap_infant.how == "estimated")
        for one in (*declared.crew, *declared.passengers, *coming_people(declared))
    )


def _estimates(used: InForce, declared: Declared, known: datetime) -> str:
    """This function will name the settings that let estimates be signed, "" when they do not."""
    if used.basis is None:
        return ""
    held = settings_at(used.basis.operator_id, declared.outline.flight.departure, known)
    if not held.estimates_may_be_signed:
        return ""
    return f"settings No. {held.number}" if held.number else "the operator's settings as first entered"

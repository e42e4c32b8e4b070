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
from fleet.standard_weights import StandardWeights
from fleet.standard_weights_reading import standard_weights_from_text
from loads.balance.aboard import Declared
from loads.balance.circumstances import PLAIN
from loads.balance.declared import read_load
from loads.queries.current import Current
from records.strict_json import JSON

# What each kind is called in the statement, one version of it or a list.
_ONE: Final = {STANDARD_WEIGHTS: "standard_weights", RULES: "rules"}
_MANY: Final = {RESTRICTION: "restrictions", PERMIT: "permits"}


def declared_under(document: dict[str, JSON], used: InForce, basis: Basis, known: datetime) -> Declared:
    """This function will read a load document against a basis, with what the operator laid down for the time
    of its departure. Raises Invalid with every fault.
    """
    declared = read_load(document, basis, table_of(used.provisions))
    about = replace(PLAIN, estimates=_estimates(used, declared, known)) if _estimated(declared) else PLAIN
    return declared if about == PLAIN else replace(declared, circumstances=about)


def used_of(held: Provisions, declared: Declared) -> tuple[Provision, ...]:
    """This function will return what a load used of what held, in the order of the statement."""
    table = held.standard_weights if declared.standards is not None else None
    return (*((table,) if table is not None else ()), *held.restrictions, *held.permits)


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
    for kind, name, holds in (
        (RESTRICTION, "restrictions", now.restrictions),
        (PERMIT, "permits", now.permits),
    ):
        if {one.id for one in used if one.kind == kind} != {one.id for one in holds}:
            changed.append(name)
    return tuple(changed)


def table_of(held: Provisions) -> StandardWeights | None:
    """This function will return the table that holds, if one does."""
    version = held.standard_weights
    if version is None:
        return None
    return standard_weights_from_text(version.document, version.number)


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
        line for line in (lines if isinstance(lines, list) else []) if line["group"] in {"crew", "passengers"}
    ]
    return any(
        line["how"] == "standard" or (adds and line["how"] == "declared" and line["group"] == "passengers")
        for line in people
    )


def _estimated(declared: Declared) -> bool:
    return any(
        one.how == "estimated" or (one.lap_infant is not None and one.lap_infant.how == "estimated")
        for one in (*declared.crew, *declared.passengers)
    )


def _estimates(used: InForce, declared: Declared, known: datetime) -> str:
    """This function will name the settings that let estimates be signed, "" when they do not."""
    if used.basis is None:
        return ""
    held = settings_at(used.basis.operator_id, declared.outline.flight.departure, known)
    if not held.estimates_may_be_signed:
        return ""
    return f"settings No. {held.number}" if held.number else "the operator's settings as first entered"

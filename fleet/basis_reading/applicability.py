"""Reads what a limit holds for: configurations, certification categories, states of moving parts. Two limits
of one kind that overlap are refused, and so is a state of the aircraft that has none.
"""

from collections.abc import Iterator
from itertools import product
from typing import Any

from fleet.basis_reading.findings import Findings
from fleet.positions import CARRIED, EXTERNAL_LOAD, NOT_CARRIED

FIELD = "external_load"
Case = tuple[str, ...]  # configuration, category ("" where there is none), then a state of each deciding part


def read_applicability(findings: Findings, at: str, entry: dict[str, Any]) -> dict[str, Any]:
    """Return the fields `configurations` and `categories` of a limit, () for all; unknown ones are faults."""
    found: dict[str, Any] = {}
    for field, of, what in (
        ("configurations", "configurations", "configuration"),
        ("categories", "certification_categories", "certification category"),
    ):
        ids = entry.get(field, [])
        findings.known(ids, findings.named(of), f"{at}/{field}", what)
        found[field] = tuple(ids)
    return found


def read_held(findings: Findings, at: str, entry: dict[str, Any]) -> dict[str, Any]:
    """Return these fields and `positions`, the states of moving parts a limit holds in, with or without an
    external load.
    """
    positions = (*_positions(findings, at, entry), *_external(findings, at, entry))
    return {**read_applicability(findings, at, entry), "positions": positions}


def combinations(findings: Findings, entry: dict[str, Any]) -> set[Case]:
    """Return the cases a limit holds for."""
    configurations = entry.get("configurations") or findings.named("configurations") or [""]
    categories = entry.get("categories") or findings.named("certification_categories") or [""]
    named = {each["part"]: each["states"] for each in entry.get("positions", ())}
    if FIELD in entry:
        named[EXTERNAL_LOAD] = [entry[FIELD]]
    parts = [
        [f"{part} {state}" for state in named.get(part, states)]
        for part, states in _deciding(findings).items()
    ]
    return set(product(configurations, categories, *parts))


def everything(findings: Findings) -> set[Case]:
    """Return all cases a load can be flown in."""
    return combinations(findings, {})


def in_words(case: Case) -> str:
    """Return a case as a fault names it."""
    configuration, category, *parts = case
    words = [f"configuration {configuration}", f"category {category}" if category else "", *parts]
    return ", ".join(filter(None, words))


def _positions(findings: Findings, at: str, entry: dict[str, Any]) -> Iterator[tuple[str, tuple[str, ...]]]:
    named, known = findings.named("positions"), _states(findings)
    seen: set[str] = set()
    for row, each in enumerate(entry.get("positions", ())):
        here, part = f"{at}/positions/{row}", each["part"]
        if part not in named:
            findings.fault(f"{here}/part", "unknown-id", f"{part} is no moving part; correct or enter it")
        elif part in seen:
            findings.fault(f"{here}/part", "duplicate", f"{part} stands here twice; name its states once")
        elif part in known:
            findings.known(each["states"], frozenset(known[part]), f"{here}/states", f"state of {part}")
        seen.add(part)
        yield part, tuple(each["states"])


def _external(findings: Findings, at: str, entry: dict[str, Any]) -> Iterator[tuple[str, tuple[str, ...]]]:
    """Yield the condition of an external load; without a place outside there is none to carry."""
    if FIELD not in entry:
        return
    if not any(place.get("external") for _, place in findings.entries("places")):
        detail = "no place is external, so no external load is ever carried; enter the hook or hoist"
        findings.fault(f"{at}/{FIELD}", "no-external-place", detail)
    yield EXTERNAL_LOAD, (entry[FIELD],)


def _deciding(findings: Findings) -> dict[str, list[str]]:
    """Return the states of the moving parts that some limit names."""
    limits = [entry for field in ("envelopes", "lateral_by_cg") for _, entry in findings.entries(field)]
    named = {each["part"] for entry in limits for each in entry.get("positions", ())}
    found = {part: states for part, states in _states(findings).items() if part in named}
    if any(FIELD in entry for entry in limits):
        found[EXTERNAL_LOAD] = [NOT_CARRIED, CARRIED]
    return found


def _states(findings: Findings) -> dict[str, list[str]]:
    return {
        entry["id"]: [state["id"] for state in entry["states"]] for _, entry in findings.entries("positions")
    }

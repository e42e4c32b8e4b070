"""Reads which configurations and certification categories a limit holds for, and refuses two that overlap."""

from typing import Any

from fleet.basis_reading.findings import Findings

Kept = tuple[frozenset[str], frozenset[str]]


def read_applicability(findings: Findings, at: str, entry: dict[str, Any]) -> dict[str, tuple[str, ...]]:
    """Return the fields `configurations` and `categories` of a limit, () for all; unknown ones are faults."""
    found = {}
    for field, of, what in (
        ("configurations", "configurations", "configuration"),
        ("categories", "certification_categories", "certification category"),
    ):
        ids = entry.get(field, [])
        findings.known(ids, findings.named(of), f"{at}/{field}", what)
        found[field] = tuple(ids)
    return found


def combinations(findings: Findings, entry: dict[str, Any]) -> set[tuple[str, str]]:
    """Return the pairs of configuration and category a limit holds for; "" where the basis has none."""
    configurations = entry.get("configurations") or findings.named("configurations") or [""]
    categories = entry.get("categories") or findings.named("certification_categories") or [""]
    return {(one, other) for one in configurations for other in categories}


def everything(findings: Findings) -> set[tuple[str, str]]:
    """Return all pairs of configuration and category a load can be declared in."""
    return combinations(findings, {})


def in_words(pair: tuple[str, str]) -> str:
    """Return a pair as a fault names it."""
    configuration, category = pair
    return f"configuration {configuration}" + (f", category {category}" if category else "")

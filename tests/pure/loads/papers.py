"""Restrictions and permits for the tests, and loads of the invented twin under them."""

from typing import Any

from fleet.restriction_reading import read_paper
from fleet.restrictions import Paper, Ruled, apply
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.result import Result
from loads.balance.trapped import with_trapped
from tests.pure.loads.making import load, twin, twin_empty


def lb(value: str) -> dict[str, str]:
    return {"value": value, "unit": "lb"}


def restriction_document(*effects: dict[str, Any], **changes: Any) -> dict[str, Any]:
    return {
        "schema": "tarebook.restriction/1",
        "number": "DD-14",
        "what": "item inoperative",
        "true_from": "2026-11-30T00:00:00Z",
        "source": {"document": "MEL", "revision": "7", "page": "25-3"},
        "effects": list(effects),
    } | changes


def permit_document(*effects: dict[str, Any], **changes: Any) -> dict[str, Any]:
    return {
        "schema": "tarebook.permit/1",
        "number": "SFP-88",
        "what": "ferry overweight to base",
        "authority": "Civil Aviation Office, Nalden",
        "true_from": "2026-11-30T00:00:00Z",
        "true_until": "2026-12-03T00:00:00Z",
        "source": {"document": "Permit SFP-88", "page": "1"},
        "effects": list(effects),
    } | changes


def restriction(*effects: dict[str, Any], **changes: Any) -> Paper:
    return read_paper(restriction_document(*effects, **changes), "restriction")


def permit(*effects: dict[str, Any], **changes: Any) -> Paper:
    return read_paper(permit_document(*effects, **changes), "permit")


def ruled(*papers: Paper) -> Ruled:
    return apply(twin(), papers)


def result_under(*papers: Paper, document: dict[str, Any] | None = None) -> Result:
    """The sound load of the twin, or another, assessed under these papers."""
    under = ruled(*papers)
    declared = with_trapped(read_load(document or load(), under.basis), under)
    return assess(declared, under.basis, twin_empty())

"""Reads whether a load must state the weights its performance allows."""

from typing import Any

from fleet.basis_reading.findings import Findings
from fleet.flight_rules import PerformanceRule
from records.strict_json import pointer_step


def read_performance(findings: Findings, given: Any, at: str) -> tuple[PerformanceRule, ...]:
    """Return the rules of a list; two for one operation at one phase, and kinds with no need, are faults."""
    entries = given if isinstance(given, list) else []
    found = []
    taken: set[tuple[str, str]] = set()
    for number, entry in enumerate(entries):
        here = f"{at}/{number}"
        if not findings.sound(here):
            continue
        required = entry["rule"] == "required"
        if not required and "kinds" in entry:
            findings.fault(
                f"{here}{pointer_step('kinds')}",
                "kinds-not-required",
                "nothing needs to be stated where structural limits are enough; leave the kinds out",
            )
        operations = tuple(entry.get("operations", ()))
        for row, operation in enumerate(operations or ("",)):
            key = (entry["at"], operation.casefold())
            if key in taken:
                findings.fault(
                    f"{here}/operations/{row}" if operation else here,
                    "rule-twice",
                    f"another rule for {entry['at']} holds for the same operation; keep the one that holds",
                )
            taken.add(key)
        kinds, source = tuple(entry.get("kinds", ())), findings.source(entry["source"])
        found.append(PerformanceRule(entry["at"], required, kinds, operations, source))
    return tuple(found)

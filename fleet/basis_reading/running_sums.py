"""Reads cumulative limits, and the conditions under which another maximum holds."""

from fractions import Fraction
from typing import Any

from fleet.basis_reading.findings import Findings, exact
from fleet.stations import Condition, Conditional, Cumulative, CumulativeStep


def read_conditions(findings: Findings) -> tuple[Condition, ...]:
    """Return the conditions; one that no maximum depends on is a fault, since declaring it would do
    nothing.
    """
    findings.once(("conditions",))
    used = {
        name
        for field in ("seats", "places", "zones")
        for _, entry in findings.entries(field)
        for each in entry.get("conditional", ())
        for name in each["when"]
    }
    found = []
    for at, entry in findings.entries("conditions"):
        if entry["id"] not in used and all(map(findings.sound, ("/seats", "/places", "/zones"))):
            findings.fault(
                f"{at}/id", "condition-unused", f"no maximum depends on {entry['id']}; enter one or remove it"
            )
        found.append(Condition(entry["id"], entry["name"], findings.source(entry["source"])))
    return tuple(found)


def read_conditional(findings: Findings, at: str, given: list[dict[str, Any]]) -> tuple[Conditional, ...]:
    """Return the conditional maxima of a seat, place or zone; a condition nobody named is a fault."""
    known = findings.named("conditions")
    found: list[Conditional] = []
    for number, each in enumerate(given):
        here = f"{at}/conditional/{number}"
        findings.known(each["when"], known, f"{here}/when", "condition")
        when = frozenset(each["when"])
        if any(when == earlier.when for earlier in found):
            findings.fault(
                f"{here}/when", "duplicate", "a maximum for these very conditions is already here; keep one"
            )
        maximum = findings.limit(each["maximum"], f"{here}/maximum")
        if maximum is not None:
            found.append(Conditional(when, maximum))
    return tuple(found)


def read_cumulative(findings: Findings) -> tuple[Cumulative, ...]:
    """Return the running sums; a member that is unknown, stands twice or lies before an earlier station is a
    fault.
    """
    findings.once(("cumulative",))
    return tuple(_cumulative(findings, at, entry) for at, entry in findings.entries("cumulative"))


def _cumulative(findings: Findings, at: str, entry: dict[str, Any]) -> Cumulative:
    arms = {
        station["id"]: exact(station["arm"], findings.length)
        for field in ("seats", "places")
        for _, station in findings.entries(field)
    }
    known = findings.named("seats") | findings.named("places")
    seen: set[str] = set()
    reached: Fraction | None = None
    steps = []
    for number, step in enumerate(entry["steps"]):
        here = f"{at}/steps/{number}"
        findings.known(step["members"], known, f"{here}/members", "seat or place")
        for row, member in enumerate(step["members"]):
            if member in seen:
                findings.fault(
                    f"{here}/members/{row}", "duplicate", f"{member} stands at an earlier station; keep one"
                )
        seen.update(step["members"])
        sign = 1 if entry["from"] == "nose" else -1
        ways = [sign * arms[member] for member in step["members"] if member in arms]
        if ways and reached is not None and min(ways) < reached:
            findings.fault(
                f"{here}/members",
                "out-of-order",
                f"lies before an earlier station, counted from the {entry['from']}; put them in order",
            )
        reached = max(ways + ([] if reached is None else [reached]), default=None)
        maximum = findings.limit(step.get("maximum"), f"{here}/maximum")
        steps.append(CumulativeStep(step["name"], tuple(step["members"]), maximum))
    return Cumulative(entry["id"], entry["name"], entry["from"], tuple(steps))

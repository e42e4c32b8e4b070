"""Reads the parts that move and shift the moment: landing gear, flaps."""

from typing import Any

from fleet.basis_reading.findings import Findings, exact
from fleet.positions import MOST_SETTINGS, MovingPart, PartState, count_of_settings


def read_positions(findings: Findings) -> tuple[MovingPart, ...]:
    """Return the moving parts of the basis; () when the section is left out."""
    if "positions" not in findings.document:
        return ()
    findings.once(("positions",))
    parts = tuple(_part(findings, at, entry) for at, entry in findings.entries("positions"))
    if count_of_settings(parts) > MOST_SETTINGS:
        detail = f"the states go together in more than {MOST_SETTINGS} ways; enter those that shift most"
        findings.fault("/positions", "too-many-positions", detail)
    return parts


def _part(findings: Findings, at: str, entry: dict[str, Any]) -> MovingPart:
    states = tuple(
        PartState(
            id=state["id"],
            name=state["name"],
            moment_change=exact(state["moment_change"], findings.moment),
            holds=tuple(state["holds"]),
            source=findings.source(state["source"]),
        )
        for state in entry["states"]
    )
    seen: set[str] = set()
    for number, state in enumerate(states):
        if state.id in seen:
            detail = f"{state.id} stands twice among the states of {entry['id']}; keep one"
            findings.fault(f"{at}/states/{number}/id", "duplicate-id", detail)
        seen.add(state.id)
    _demand_as_weighed(findings, at, entry["as_weighed"], states)
    return MovingPart(entry["id"], entry["name"], entry["as_weighed"], states)


def _demand_as_weighed(findings: Findings, at: str, wanted: str, states: tuple[PartState, ...]) -> None:
    """Note a state as weighed that is none of the states, or does not hold on the ground, or shifts
    anything.
    """
    number, found = next(((n, s) for n, s in enumerate(states) if s.id == wanted), (None, None))
    if found is None:
        known = ", ".join(state.id for state in states)
        findings.fault(f"{at}/as_weighed", "unknown-state", f"no such state; use one of {known}")
        return
    if "ground" not in found.holds:
        detail = "the aircraft is weighed on the ground; name the state that holds there"
        findings.fault(f"{at}/as_weighed", "not-on-ground", detail)
    if found.moment_change:
        detail = (
            "the empty weight was taken in this state, so it changes nothing; enter 0 here, and the other "
            "states as changes from it"
        )
        findings.fault(f"{at}/states/{number}/moment_change", "change-as-weighed", detail)

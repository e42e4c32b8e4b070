"""Reads seats, places and zones."""

from typing import Any

from fleet.basis import Place, Seat, Zone
from fleet.basis_reading.findings import Findings, exact
from fleet.basis_reading.floors import read_floor
from fleet.basis_reading.running_sums import read_conditional
from fleet.stations import Rail, Setting


def read_seats(findings: Findings) -> tuple[Seat, ...]:
    """Return the seats; an id used twice among seats and places is a fault."""
    findings.once(("seats", "places"))
    return tuple(
        Seat(
            serves=entry["for"],
            rail=_rail(findings, at, entry),
            **_station(findings, at, entry),
            **_suits(entry),
        )
        for at, entry in findings.entries("seats")
    )


def read_places(findings: Findings) -> tuple[Place, ...]:
    """Return the places."""
    return tuple(
        Place(
            **_station(findings, at, entry),
            floor=read_floor(findings, f"{at}/floor", entry.get("floor")),
            external=entry.get("external", False),
        )
        for at, entry in findings.entries("places")
    )


def read_zones(findings: Findings) -> tuple[Zone, ...]:
    """Return the zones; a member that is no seat or place, or stands twice, is a fault."""
    findings.once(("zones",))
    known = findings.named("seats") | findings.named("places")
    zones = []
    for at, entry in findings.entries("zones"):
        findings.known(entry["members"], known, f"{at}/members", "seat or place")
        maximum = findings.limit(entry.get("maximum"), f"{at}/maximum")
        conditional = read_conditional(findings, at, entry.get("conditional", []))
        zones.append(Zone(entry["id"], entry["name"], tuple(entry["members"]), maximum, conditional))
    return tuple(zones)


def _suits(entry: dict[str, Any]) -> dict[str, Any]:
    """Return whom a seat suits, as far as it is stated."""
    return {
        "row": entry.get("row"),
        "exit_row": entry.get("exit_row", False),
        "infant_restraint": entry.get("infant_restraint"),
        "attendant": entry.get("attendant", False),
    }


def _rail(findings: Findings, at: str, entry: dict[str, Any]) -> Rail | None:
    """Return the rail of a seat; ends turned round, and an arm or setting beyond them, are faults."""
    given = entry.get("rail")
    if given is None:
        return None
    forward, aft = (exact(given[end], findings.length) for end in ("forward", "aft"))
    settings: list[Setting] = []
    if forward >= aft:
        findings.fault(f"{at}/rail/aft", "rail-ends", "does not lie aft of the forward end; correct one")
    beyond = "lies beyond an end of the rail; correct it, or the end"
    if not forward <= exact(entry["arm"], findings.length) <= aft:
        findings.fault(f"{at}/arm", "off-the-rail", beyond)
    for number, each in enumerate(given.get("settings", ())):
        here = f"{at}/rail/settings/{number}"
        arm = exact(each["arm"], findings.length)
        if not forward <= arm <= aft:
            findings.fault(f"{here}/arm", "off-the-rail", beyond)
        if any(each["setting"] == earlier.name for earlier in settings):
            findings.fault(f"{here}/setting", "duplicate", "this setting is already given; name it otherwise")
        settings.append(Setting(each["setting"], arm))
    return Rail(forward, aft, tuple(settings), findings.source(given["source"]))


def _station(findings: Findings, at: str, entry: dict[str, Any]) -> dict[str, Any]:
    return {
        "id": entry["id"],
        "name": entry["name"],
        "arm": exact(entry["arm"], findings.length),
        "lateral_arm": exact(entry["lateral_arm"], findings.length),
        "maximum": findings.limit(entry.get("maximum"), f"{at}/maximum"),
        "source": findings.source(entry["source"]),
        "conditional": read_conditional(findings, at, entry.get("conditional", [])),
    }

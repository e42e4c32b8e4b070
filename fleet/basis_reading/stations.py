"""Reads seats, places and zones."""

from typing import Any

from fleet.basis import Place, Seat, Zone
from fleet.basis_reading.findings import Findings, exact


def read_seats(findings: Findings) -> tuple[Seat, ...]:
    """Return the seats; an id used twice among seats and places is a fault."""
    findings.once(("seats", "places"))
    return tuple(
        Seat(serves=entry["for"], **_station(findings, at, entry), **_suits(entry))
        for at, entry in findings.entries("seats")
    )


def read_places(findings: Findings) -> tuple[Place, ...]:
    """Return the places."""
    return tuple(Place(**_station(findings, at, entry)) for at, entry in findings.entries("places"))


def read_zones(findings: Findings) -> tuple[Zone, ...]:
    """Return the zones; a member that is no seat or place, or stands twice, is a fault."""
    findings.once(("zones",))
    known = findings.named("seats") | findings.named("places")
    zones = []
    for at, entry in findings.entries("zones"):
        findings.known(entry["members"], known, f"{at}/members", "seat or place")
        maximum = findings.limit(entry.get("maximum"), f"{at}/maximum")
        zones.append(Zone(entry["id"], entry["name"], tuple(entry["members"]), maximum))
    return tuple(zones)


def _suits(entry: dict[str, Any]) -> dict[str, Any]:
    """Return whom a seat suits, as far as it is stated."""
    return {
        "row": entry.get("row"),
        "exit_row": entry.get("exit_row", False),
        "infant_restraint": entry.get("infant_restraint"),
        "attendant": entry.get("attendant", False),
    }


def _station(findings: Findings, at: str, entry: dict[str, Any]) -> dict[str, Any]:
    return {
        "id": entry["id"],
        "name": entry["name"],
        "arm": exact(entry["arm"], findings.length),
        "lateral_arm": exact(entry["lateral_arm"], findings.length),
        "maximum": findings.limit(entry.get("maximum"), f"{at}/maximum"),
        "source": findings.source(entry["source"]),
    }

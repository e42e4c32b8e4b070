"""Reads the datums that other papers of an aircraft count arms from."""

from collections.abc import Iterator

from fleet.basis import OtherDatum
from fleet.basis_reading.findings import Findings, exact


def read_other_datums(findings: Findings) -> tuple[OtherDatum, ...]:
    """Return them with their offsets. One that is named twice, or is the basis's own, is a fault."""
    return tuple(_datums(findings))


def _datums(findings: Findings) -> Iterator[OtherDatum]:
    own = findings.document["datum"]["name"] if findings.sound("/datum") else None
    seen: set[str] = set()
    for at, entry in findings.entries("other_datums"):
        name = entry["name"]
        if name == own:
            findings.fault(f"{at}/name", "datum-own", "this is the datum of the basis itself; leave it out")
        elif name in seen:
            findings.fault(f"{at}/name", "duplicate", "this datum stands here twice; keep one offset")
        seen.add(name)
        yield OtherDatum(name, exact(entry["offset"], findings.length), findings.source(entry["source"]))

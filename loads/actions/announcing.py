"""What subscribers are told of a load, inside the act that makes it so. No payload names a person."""

from collections.abc import Collection
from typing import Final

from loads.events import LOAD_ACCEPTED, LOAD_REJECTED, LOAD_STALE, MANIFEST_FILED
from loads.models import Assessment, Load, Paper
from records.act import Entry
from records.webhooks.announce import announce

# As many failed checks as tell what is wrong; the load itself has them all.
MOST_CHECKS: Final = 20
_PASSED: Final = frozenset({"pass", "advisory"})


def announce_rejected(entry: Entry, load: Load, assessment: Assessment, result: dict[str, object]) -> None:
    """This function will tell that a load is outside its limits or unresolved, and which checks say so."""
    checks = result.get("checks")
    failed = [
        {name: check.get(name) for name in ("code", "result", "margin_text")}
        for check in (checks if isinstance(checks, list) else [])
        if check.get("result") not in _PASSED
    ]
    payload = _load(entry, load, assessment) | {"checks": failed[:MOST_CHECKS]}
    announce(entry, LOAD_REJECTED, f"load:{load.id}", payload)


def announce_accepted(
    entry: Entry, load: Load, assessment: Assessment, paper: Paper, *, issue: int = 1
) -> None:
    """This function will tell that the pilot in command signed a load, and the number of its manifest.

    `issue` is above 1 for a last-minute change.
    """
    payload = _load(entry, load, assessment) | {"manifest": _manifest(paper, issue)}
    announce(entry, LOAD_ACCEPTED, f"load:{load.id}", payload)


def announce_filed(entry: Entry, paper: Paper, digest: str, *, issue: int = 1) -> None:
    """This function will tell that an issue of a load's manifest is filed, and the digest of its bytes."""
    payload = _flight(paper.load) | {"manifest": _manifest(paper, issue) | {"digest": digest}}
    announce(entry, MANIFEST_FILED, f"load:{paper.load_id}", payload)


def announce_stale(entry: Entry, load: Load, assessment: Assessment, changed: Collection[str]) -> None:
    """This function will tell that what an accepted load rests on changed: "empty weight" and the like."""
    payload = _load(entry, load, assessment) | {"changed": sorted(changed)}
    announce(entry, LOAD_STALE, f"load:{load.id}", payload)


def _load(entry: Entry, load: Load, assessment: Assessment) -> dict[str, object]:
    return _flight(load) | {
        "verdict": assessment.verdict,
        "digest": assessment.digest,
        "act": entry.kind,
        "replaces": str(load.replaces_id) if load.replaces_id else None,
    }


def _flight(load: Load) -> dict[str, object]:
    return {
        "load": str(load.id),
        "href": f"/api/v1/loads/{load.id}",
        "aircraft": load.aircraft.registration,
        "reference": load.reference,
        "leg": load.leg,
        "departure": load.departure_text,
    }


def _manifest(paper: Paper, issue: int) -> dict[str, object]:
    href = f"/api/v1/loads/{paper.load_id}/manifest?issue={issue}"
    return {"number": paper.number, "issue": issue, "href": href}

"""Which flight a load is of, as the lists of the desk show it."""

from datetime import UTC
from typing import Any
from zoneinfo import ZoneInfo

from loads.models import Load
from loads.queries.current import Current
from loads.web.shown import verdict_words


def leg_of(load: Load, zone: ZoneInfo) -> dict[str, Any]:
    """This function will return which flight a load is of, and when it departs."""
    return {
        "registration": load.aircraft.registration,
        "reference": load.reference,
        "leg": load.leg,
        "origin": load.origin,
        "destination": load.destination,
        "local": load.departure.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "utc": load.departure.astimezone(UTC).strftime("%H:%M"),
    }


def flight_of(current: Current, zone: ZoneInfo) -> dict[str, Any]:
    """This function will return which flight a load is of, when it departs, and how it stands."""
    verdict = current.assessment.verdict
    return {
        "id": current.load.id,
        **leg_of(current.load, zone),
        "verdict": verdict,
        "verdict_words": verdict_words(verdict),
        "state": current.state,
        "reason": current.step.reason,
    }

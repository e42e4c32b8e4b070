"""The way from a load to the declaring of the leg after it."""

from typing import Any
from urllib.parse import urlencode

from loads.acts import SUBMIT_LOAD
from loads.lifecycle import GONE
from loads.queries.current import Current
from records.actor import Actor

CARRIED = ("follows", "leg", "reference", "origin")  # what the first page passes on to the desk


def next_leg(current: Current, legs: dict[str, Any], actor: Actor) -> str:
    """This function will return what to ask the declare page for, to declare the leg after a load; "" where
    there is one already, where the load cannot depart as it stands or counts no more, or where this actor
    declares none.
    """
    load = current.load
    cannot = current.state in GONE or current.assessment.verdict != "within"
    if legs.get("followed_by") or cannot or SUBMIT_LOAD.name not in actor.may:
        return ""
    known = {"aircraft": load.aircraft.registration, "follows": load.id, "leg": load.leg + 1}
    return urlencode(known | {"reference": load.reference, "origin": load.destination})

"""Makes what tests of last-minute changes need: a bound in the settings, and changes."""

from typing import Any

from django.utils import timezone

from fleet.actions.change_settings import change_settings
from fleet.queries.settings import last_number
from fleet.settings_reading import read_settings
from loads.actions.change_late import change_late
from loads.actions.signing import Signing
from loads.queries.current import Current, load_of
from loads.queries.late_change import Proposal, propose
from tests.cast import Cast, actor
from tests.makers import q

BAG = {
    "change": "item-on",
    "kind": "baggage",
    "what": "bag at the door",
    "place": "NOSE-HOLD",
    "weight": q("20", "lb"),
    "how": "weighed",
}


def bounded(people: Cast, weight: str = "200", unit: str = "lb", persons: int = 1) -> None:
    """This function will have the operator's settings state a bound on last-minute changes."""
    change = read_settings(
        {
            "reason": "manual revised",
            "last_minute_bound": {"weight": q(weight, unit), "persons": persons},
            "operations_mail": ["ops@kestrel.example"],
        }
    )
    change_settings(actor(people.manager), change, seen=str(last_number(people.operator.code)))


def change_of(*lines: dict[str, Any], persons: int = 3) -> dict[str, Any]:
    """This function will write a change of these lines."""
    return {"lines": list(lines), "persons_on_board": persons}


def proposed(current: Current, change: dict[str, Any]) -> Proposal:
    """This function will work a change out as it is shown before it is signed."""
    return propose(current, change, timezone.now())


def changed(people: Cast, current: Current, change: dict[str, Any]) -> Current:
    """This function will show the pilot a change and have it signed."""
    shown = proposed(current, change)
    return change_late(
        current.load.id,
        change,
        Signing(shown.computation.digest, "127.0.0.1"),
        seen=str(current.step.number),
        by=actor(people.pilot),
    )


def again(current: Current) -> Current:
    """This function will read a load again."""
    return load_of(current.load.operator_id, current.load.id)

"""What subscribers are told of the fleet, inside the act that makes it so."""

from datetime import datetime

from fleet.events import FALLING_DUE
from records.act import Entry
from records.webhooks.announce import announce


def announce_falling_due(
    entry: Entry, about: str, *, what: str, due: datetime, registration: str = ""
) -> None:
    """This function will tell that something lapses: `about` names it ("aircraft:<id>"), `what` in words.

    `what` must name no person.
    """
    payload: dict[str, object] = {"what": what, "due": due.isoformat(), "aircraft": registration or None}
    announce(entry, FALLING_DUE, about, payload)

"""The logins a load document names in its crew, and the people behind them."""

from collections.abc import Mapping

from fleet.queries.logins import active_people
from loads.balance.aboard import PILOT_IN_COMMAND
from records.refusal import Fault, Invalid


def pilot_in(operator: str, document: Mapping[str, object]) -> int | None:
    """This function will return the number of the person who is pilot in command, None when no login is
    named.

    Raises Invalid for a login that no active person of the operator has: it would never be able to sign.
    """
    named = _named(document)
    if not named:
        return None
    known = active_people(operator, {login.lower() for _, login, _ in named})
    faults = tuple(
        Fault(pointer, "unknown-person", "nobody here has this login; correct it, or leave it out")
        for pointer, login, _ in named
        if login.lower() not in known
    )
    if faults:
        raise Invalid(*faults)
    return next((known[login.lower()] for _, login, pilot in named if pilot), None)


def _named(document: Mapping[str, object]) -> list[tuple[str, str, bool]]:
    crew = document.get("crew")
    lines = crew if isinstance(crew, list) else []
    return [
        (f"/crew/{place}/person", line["person"], line.get("position") == PILOT_IN_COMMAND)
        for place, line in enumerate(lines)
        if isinstance(line, dict) and isinstance(line.get("person"), str)
    ]

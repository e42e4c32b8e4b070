"""The parts of a result that only some loads have: the table of standard weights that was used, restrictions
and permits that hold, the weighing that a rule asks for.
"""

from loads.balance.aboard import Declared
from loads.balance.circumstances import PLAIN
from loads.balance.over_flight import coming_people
from loads.balance.result import Json


def told_besides(declared: Declared) -> Json:
    """Return these parts by name; nothing at all for a load that has none of them."""
    found: Json = {}
    if declared.standards is not None:
        people = (*declared.crew, *declared.passengers, *coming_people(declared))
        counts = {how: sum(one.how == how for one in people) for how in ("weighed", "declared", "estimated")}
        found["standard_weights"] = {**declared.standards.as_document(), **counts}
    about = declared.circumstances
    if about is PLAIN:
        return found
    if about.applied:
        found["restrictions_and_permits"] = [one.as_document() for one in about.applied]
    if about.weighing is not None:
        due = about.weighing
        found["weighing"] = {
            "weighed_on": due.weighed_on or None,
            "lapses": due.lapses,
            "overdue": due.overdue,
            "rule": due.rule,
        }
    return found

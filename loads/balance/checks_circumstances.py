"""Checks of what bears on a load besides its figures: restrictions and permits that cannot be followed, and a
weighing that is past due.
"""

from loads.balance.circumstances import PLAIN, Circumstances, WeighingDue
from loads.balance.result import Check


def circumstance_checks(about: Circumstances) -> list[Check]:
    """Return the checks; none where nothing bears on the load."""
    if about is PLAIN:
        return []
    found = []
    if about.unmet:
        found.append(
            Check(
                "standing.restrictions",
                "restrictions and permits can be followed",
                "unresolved",
                margin_text="; ".join(about.unmet),
                what_next="Enter them again as the loading basis in force names things, then assess again.",
            )
        )
    if about.weighing is not None:
        found.append(_weighing(about.weighing))
    return found


def _weighing(due: WeighingDue) -> Check:
    """Return whether the weighing is recent enough for the rule that binds this operation."""
    code, title = "standing.weighing", "weighing within the interval"
    if due.lapses is None:
        return Check(
            code,
            title,
            "unresolved",
            limit=None,
            margin_text=f"no weighing is known, and {due.rule} asks for one",
            source=due.source,
            what_next="Weigh the aircraft and have the weighing approved, then assess again.",
        )
    if due.overdue:
        return Check(
            code,
            title,
            "fail",
            margin_text=f"weighed on {due.weighed_on}, "
            f"which was good to the end of {due.lapses} ({due.rule})",
            source=due.source,
            what_next="Weigh the aircraft and have the weighing approved before it flies this operation.",
        )
    return Check(
        code,
        title,
        "pass",
        margin_text=f"weighed on {due.weighed_on}, good to the end of {due.lapses} ({due.rule})",
        source=due.source,
    )

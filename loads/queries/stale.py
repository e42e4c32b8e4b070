"""Whether what an assessment rests on still is what is in force."""

from datetime import datetime

from fleet.queries.in_force import in_force_for
from loads.balance.engine import ENGINE_VERSION
from loads.queries.current import Current
from loads.queries.provided import provisions_changed


def stale_parts(current: Current, known: datetime) -> tuple[str, ...]:
    """This function will name what changed since the assessment: "loading basis", "empty weight", "engine",
    "standard weights", "rules", "restrictions", "permits".

    Compared are the versions in force at the planned departure, as known at `known`, with those it used;
    empty when nothing changed.
    """
    load, used = current.load, current.assessment
    now = in_force_for(load.aircraft, load.departure, known, load.configuration)
    changed = []
    if (now.basis.id if now.basis else None) != used.loading_basis_id:
        changed.append("loading basis")
    if (now.empty_weight.id if now.empty_weight else None) != used.empty_weight_id:
        changed.append("empty weight")
    changed += provisions_changed(current, now.provisions)
    # A newer program moves no figure of a load that is accepted; anybody else assesses again with it.
    if used.engine != ENGINE_VERSION and current.state != "accepted":
        changed.append("engine")
    return tuple(changed)

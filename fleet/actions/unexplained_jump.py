"""A large step of the empty weight is not taken silently: beyond the threshold it needs a cause."""

from datetime import datetime

from fleet.basis import Basis
from fleet.empty_weight_reading import read_as_recorded
from fleet.jump import jump_of
from fleet.models import Aircraft, EmptyWeight
from fleet.queries.figures import basis_of
from fleet.queries.in_force import in_force
from fleet.queries.settings import settings_at
from fleet.weighing import EmptyFigures
from records.refusal import StepRefused
from records.strict_json import read

_SHOWN = "{:.1f}"


def refuse_unexplained_jump(aircraft: Aircraft, empty_weight: EmptyWeight, known: datetime) -> None:
    """This function will raise StepRefused when the version is beyond the threshold away from the one that is
    in force at its beginning; do nothing where no threshold is set, or nothing was in force.
    """
    percent = settings_at(aircraft.operator_id, known, known).weighing_threshold_percent
    if percent is None:
        return
    held = in_force(aircraft, empty_weight.true_from, known, empty_weight.fit)
    if held.basis is None or held.empty_weight is None:
        return
    basis = basis_of(held.basis)
    jump = jump_of(_figures(held.empty_weight, basis), _figures(empty_weight, basis), percent, basis)
    if not jump.needs_cause:
        return
    unit = basis.weight_unit.value
    shown = [
        f"{_SHOWN.format(float(figure))} {unit}" for figure in (jump.before, jump.after, jump.difference)
    ]
    most = "" if jump.most is None else f", more than {_SHOWN.format(float(jump.most))} {unit} ({percent} %)"
    raise StepRefused(
        "cause-needed",
        f"The empty weight goes from {shown[0]} to {shown[1]}, by {shown[2]}{most}.",
        next_step="Say what caused it in the reason, and approve it with that; or enter it corrected.",
    )


def _figures(version: EmptyWeight, basis: Basis) -> EmptyFigures:
    return read_as_recorded(read(version.document.encode()), basis)

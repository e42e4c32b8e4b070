"""The working of a seating variation in printed figures, line by line, so that it can be redone by hand."""

from fractions import Fraction

from fleet.conversion import moment_unit
from fleet.quantities import Unit
from fleet.seating import Filling, SeatingVariation, Taken
from loads.balance.result import Json
from loads.balance.rounding import LENGTH_PLACES, MOMENT_PLACES, WEIGHT_PLACES, printed

METHOD = (
    "Seats are taken at the windows first, then at the aisles, then what remains, from the front and from "
    "the rear; after each passenger the moment of the seats taken is compared with that of everybody at the "
    "assumed arm. The greatest difference of each section forward, and aft, is kept; those of several "
    "sections add up."
)


def seating_document(found: SeatingVariation, weight_unit: Unit, length_unit: Unit) -> Json:
    """Return the margin and its working. The margin is rounded up, the lines to the nearest last digit."""
    moments, unit = MOMENT_PLACES[length_unit], moment_unit(weight_unit, length_unit).value
    margin = {
        side: {"value": printed(moment, moments, "up"), "unit": unit}
        for side, moment in (("forward", found.forward), ("aft", found.aft))
        if moment
    }
    return {
        "schema": "tarebook.seating-variation-found/1",
        "method": METHOD,
        "units": {"weight": weight_unit.value, "length": length_unit.value, "moment": unit},
        "weight": printed(found.weight, WEIGHT_PLACES),
        "amounts": margin,
        "working": [_filling(each, length_unit) for each in found.fillings],
    }


def _filling(filling: Filling, length_unit: Unit) -> Json:
    return {
        "section": filling.section,
        "order": filling.order,
        "assumed_arm": printed(filling.assumed_arm, LENGTH_PLACES[length_unit]),
        "forward_at": _number(filling.forward),
        "aft_at": _number(filling.aft),
        "lines": [_line(line, length_unit) for line in filling.lines],
    }


def _number(line: Taken | None) -> int | None:
    return None if line is None else line.number


def _line(line: Taken, length_unit: Unit) -> Json:
    def moment(value: Fraction) -> str:
        return printed(value, MOMENT_PLACES[length_unit])

    return {
        "passenger": line.number,
        "row": line.row,
        "seat": line.choice,
        "arm": printed(line.arm, LENGTH_PLACES[length_unit]),
        "moment": moment(line.moment),
        "assumed": moment(line.assumed),
        "difference": moment(line.difference),
    }

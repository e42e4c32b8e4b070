"""Moments as the manual shows them, beside the moments themselves: index units, divided by a round number.

Only shown: it is made from exact figures, printed, and never read again. A basis without a presentation adds
nothing to a result.
"""

from fractions import Fraction

from loads.balance.prepared import Prepared
from loads.balance.result import Json
from loads.balance.rounding import WEIGHT_PLACES, printed

PLACES = 2  # of an index, and of a divided moment


def presented(
    weight: Fraction | None, moment: Fraction | None, ready: Prepared, *, total: bool = True
) -> dict[str, str | None]:
    """Return the index and the divided moment of a line or, `total`, of a whole aircraft; {} for a basis
    without a presentation, None for what is not known.
    """
    presentation = ready.basis.presentation
    if presentation is None:
        return {}
    found: dict[str, str | None] = {}
    if presentation.index is not None:
        of = presentation.index.of_total if total else presentation.index.of_line
        found["index"] = None
        if weight is not None and moment is not None:
            found["index"] = printed(of(weight, moment), PLACES)
    if presentation.divided is not None:
        divisor = presentation.divided.divisor
        found["moment_divided"] = None if moment is None else printed(moment / divisor, PLACES)
    return found


def presentation_document(ready: Prepared) -> Json:
    """Return how the moments of a result are shown, in words and figures; {} without a presentation."""
    presentation = ready.basis.presentation
    if presentation is None:
        return {}
    found: Json = {}
    index, divided = presentation.index, presentation.divided
    if index is not None:
        arm = printed(index.reference_arm, ready.length_places)
        divisor = printed(index.divisor, ready.moment_places)
        found["index"] = {
            "reference_arm": arm,
            "divisor": divisor,
            "constant": printed(index.constant, PLACES),
            "text": f"index = weight x (arm - {arm} {ready.length}) / {divisor} {ready.moment}"
            f"{_added(index.constant)}",
            "source": str(index.source),
        }
    if divided is not None:
        found["moment_divided"] = {
            "divisor": printed(divided.divisor, WEIGHT_PLACES),
            "source": str(divided.source),
        }
    return {"presentation": found}


def _added(constant: Fraction) -> str:
    if not constant:
        return ""
    sign = "+" if constant > 0 else "-"
    return f" {sign} {printed(abs(constant), PLACES)} (added to the empty weight and to totals)"

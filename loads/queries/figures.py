"""The figures in a stored empty weight, in the units of the loading basis it is used with."""

from functools import lru_cache

from fleet.basis_reading import basis_from_text
from fleet.empty_weight_reading import read_as_recorded
from fleet.weighing import EmptyFigures
from records.strict_json import read


@lru_cache(maxsize=256)
def empty_figures(text: str, basis_text: str) -> EmptyFigures:
    """This function will return the figures of a stored empty weight; texts already read are remembered.

    They keep their own datum, unless the basis states how far it lies away, and their own fit. When these are
    not the basis's, the assessment says so and leaves the load unresolved: that is nothing the submitter
    could correct in the load.
    """
    return read_as_recorded(read(text.encode()), basis_from_text(basis_text))

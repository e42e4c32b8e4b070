"""Inputs the rules of a basis ask for: the certification category, and what a stated limit comes from."""

from fleet.basis import Basis
from fleet.flight_rules import PERFORMANCE_KINDS
from loads.web.inputs import Choices, Field, Maker

CATEGORY = "certification_category"
KINDS: Choices = (("", "not said"), *((kind, kind) for kind in PERFORMANCE_KINDS))


def category_inputs(make: Maker, basis: Basis) -> list[Field]:
    """This function will return the list of categories where the basis has them, or where one was typed."""
    known = basis.certification_categories
    if not known and not make.typed.get(CATEGORY):
        return []
    choices: Choices = (("", "choose"), *((one.id, one.name) for one in known))
    return [make.choice(CATEGORY, "Certification category", choices)]


def kind_input(make: Maker, row: int) -> Field:
    """This function will return the list of what a limit of the flight comes from."""
    return make.choice(f"limit:{row}:kind", f"What limit {row + 1} comes from", KINDS)

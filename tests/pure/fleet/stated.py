"""What tests of a basis that has everything (`everything.py`) write down again and again."""

from fractions import Fraction

from fleet.basis_reading.findings import Findings
from fleet.sourced import Limit, Source
from tests.pure.fleet.everything import everything

F = Fraction
LB = F("0.45359237")  # kg
KG_M = 1 / (LB * F("0.0254"))  # lb in
OTHER = Source("OK62-S7", "2", "3")


def of(page):
    """The page of the manual of that basis."""
    return Source("OK62-FM", "D", page)


PAGE = of("7-1")


def most(value, source=PAGE):
    """A maximum, in the unit of the basis."""
    return Limit(F(value), source)


def findings() -> Findings:
    """What a reader of one section is given."""
    return Findings(everything(), [])

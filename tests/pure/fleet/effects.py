"""Effects of restrictions and permits on the invented twin, and what their papers are called."""

from fractions import Fraction

from fleet.sourced import Source
from tests.pure.loads.making import twin
from tests.pure.loads.papers import lb

F = Fraction
MEL = Source("restriction DD-14, MEL", "7", "25-3")
FERRY = Source("permit SFP-88, Permit SFP-88", "", "1")
CORNERS = [["112", "4000"], ["112", "6000"], ["120", "6000"], ["120", "4000"]]


def limit_of(name, value):
    """Another limit of the flight."""
    return {"effect": "limit", "limit": name, "weight": lb(value)}


def maximum_of(name, value):
    """Another maximum of a seat, a place or a zone."""
    return {"effect": "maximum", "of": name, "weight": lb(value)}


def fuel(name, value, unit="US gal"):
    """Another capacity of a tank."""
    return {"effect": "fuel", "of": name, "volume": {"value": value, "unit": unit}}


def envelope(points=CORNERS, **more):
    """Other corners of the first envelope."""
    own = {"effect": "envelope", "of": twin().envelopes[0].id, "unit": "in", "weight_unit": "lb"}
    return {**own, "points": points, **more}

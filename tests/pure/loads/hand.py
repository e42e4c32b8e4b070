"""A plain aircraft with round figures, to be reckoned again by hand: 1,000 lb empty at 100 in.

Two tanks of 50 US gal, one 40 in to the left and one 40 in to the right, both at 100 in, at 6 lb/US gal.
"""

from dataclasses import replace
from fractions import Fraction

from fleet.basis import BurnStage
from fleet.lateral import LateralByCg
from fleet.sourced import Source
from loads.balance.assess import assess
from tests.reference.plain_aircraft import FuelTank, PlainAircraft

F = Fraction
PAGE = Source("HAND", "A", "6-9")


def plain(left=20, right=20, *, lateral_moment=0, lines=(), trip=0, weight=1000, arm=100):
    """The aircraft; `lines` are (weight, arm, lateral arm)."""
    tanks = [FuelTank(left, [(0, 100), (50, 100)], -40), FuelTank(right, [(0, 100), (50, 100)], 40)]
    return PlainAircraft(
        weight, weight * F(arm), lateral_moment, lines=list(lines), tanks=tanks, density=6, trip=trip
    )


def one_after_the_other(basis):
    """The left tank feeds first, the right one after it."""
    order = (BurnStage(("T0",)), BurnStage(("T1",)))
    return replace(basis, burn_order=order, taxi_order=order)


def result_with(made, change=lambda basis: basis, declare=lambda declared: declared):
    """Assess it on its basis as changed, declared as changed."""
    basis = change(made.basis())
    return assess(declare(made.declared(basis)), basis, made.empty())


def by_cg(*corners, gives="arm", phases=("ramp", "take-off", "landing", "minimum at landing")):
    exact = tuple((F(x), F(y)) for x, y in corners)
    return LateralByCg("LAT", phases, gives, exact, PAGE)

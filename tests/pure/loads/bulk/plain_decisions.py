"""A plain load on the small basis and what the bulk sums decide of it and of loads like it:

empty 2015, at 200900 along and -595 across; LEFT 185 at 80: 2200 in all, moment 215700
ramp      MAIN 60, AUX 20 US gal at 6 lb: 2680, moment 215700 + 36000 + 14400 = 266100
take-off  2 gal less of MAIN: 2668, 264900
landing   30 gal less, 20 of AUX and 10 of MAIN: 2488, 244500
minimum   10 gal left, all in MAIN: 2260, 221700
zero fuel 2200, 215700
"""

from dataclasses import replace

import numpy as np

from loads.balance.bulk.deciding import UNDECIDED, WITHIN, decide
from loads.balance.bulk.known import Bounds
from loads.balance.bulk.outline import Outline
from loads.balance.bulk.reading import Batch
from tests.pure.loads.bulk.plain_basis import plain_basis, plainly_known

INFINITE = float("inf")
WEIGHT = {"ramp": 2680, "take-off": 2668, "zero fuel": 2200, "landing": 2488, "minimum at landing": 2260}
MOMENT = {
    "ramp": 266100,
    "take-off": 264900,
    "zero fuel": 215700,
    "landing": 244500,
    "minimum at landing": 221700,
}
# -595 - 12 * 185 = -2815, then -40 a pound in MAIN and 30 in AUX.
ACROSS = {
    "ramp": -2815 - 360 * 40 + 120 * 30,
    "take-off": -2815 - 348 * 40 + 120 * 30,
    "zero fuel": -2815,
    "landing": -2815 - 288 * 40,
    "minimum at landing": -2815 - 60 * 40,
}
# The bound on the error of a weight, by the docstring: N = 6 spots + 16 * (2 tanks + 1) * (1 + 2 * 2 stages
# + 1) + 64 = 358, and 8 * N * 2**-53 * 2680 lb.
ERROR = 8 * 358 * 2.0**-53 * 2680


def batch_of(**changes):
    """The plain load, or with other columns; a list of rows for several loads."""
    plain = {
        "held": [185.0, 0, 0, 0, 0, 0],
        "usable": [60.0, 20.0],
        "density": 6.0,
        "taxi": 2.0,
        "trip": 30.0,
        "least": 10.0,
        "take_off": INFINITE,
        "landing": INFINITE,
    }
    return Batch(**{name: np.array([value], dtype=np.float64) for name, value in (plain | changes).items()})


def held(**weights):
    """What seats and places hold, beside 185 in LEFT."""
    names = ("LEFT", "RIGHT", "BACK", "SPARE", "HOLD", "SHELF")
    return [float(weights.get(name, 185 if name == "LEFT" else 0)) for name in names]


KNOWN = replace(plainly_known(replace(plain_basis(), zones=())), unknown=())


def found(batch=None, **changes):
    """The verdict of one load, the limit broken and by how much, on what is known with these changes."""
    decision = decide(replace(KNOWN, **changes), batch or batch_of())
    (verdict,), (name,), (excess,) = decision.verdict.tolist(), decision.limit, decision.excess.tolist()
    return verdict, name, excess


NOTHING = (WITHIN, "", 0.0)
OPEN = (UNDECIDED, "", 0.0)


def box(
    low,
    high,
    phases,
    *,
    axis="longitudinal",
    legs=(),
    inner=(),
    bent=0.0,
    levels=(1000.0, 4000.0),
    size=440000.0,
):
    """An envelope between two edges of (e0, e1, e2), the same at every weight, for what is known."""
    edges = [np.array([edge] * (len(levels) - 1), dtype=np.float64) for edge in (low, high)]
    outline = Outline(np.array(levels), *edges, inner, bent, 110.0, size)
    word = "cg" if axis == "longitudinal" else "lateral"
    codes = tuple(f"{word}.{phase.replace(' ', '-')}" for phase in phases)
    return {"bounds": (Bounds(axis, outline, phases, legs, codes),)}


FAR = 1e9

"""Tanks of odd shapes against an independent geometry library (trimesh): the centre of the filled part.

The library is given the solid as a closed mesh and cuts it at the level of the fuel; the volume and centre of
what lies below are its own surface integrals, in doubles. The same tank is tabulated as a manual would, at a
few quantities, and read by our table at others. Shapes are invented; every figure here is computed. Lengths
in inches, the aircraft level, x aft of the datum, z up; 231 cubic inches to the US gallon.
"""

from fractions import Fraction
from typing import Any

import numpy as np
import pytest

from fleet.basis import TankTable
from tests.reference.plain_aircraft import FuelTank, PlainAircraft

trimesh: Any = pytest.importorskip("trimesh", reason="the geometry library is a test dependency")

GALLON = 231
F = Fraction
DOUBLES = 1e-9  # relative: what surface integrals in doubles may be off
# Inches of arm, at their share of the full tank: what twelve points leave between two (0.010 and 0.031).
BETWEEN_POINTS = {"arm": 0.02, "moment": 0.04}
QUADS = {
    "bottom": (0, 3, 2, 1),
    "top": (4, 5, 6, 7),
    "front": (0, 4, 7, 3),
    "rear": (1, 2, 6, 5),
    "left": (0, 1, 5, 4),
    "right": (3, 7, 6, 2),
}


def block(bottom, top, low, high):
    """A solid between two level rectangles (x from, x to, y from, y to), as a closed mesh."""
    corners = [
        (x, y, z)
        for (x1, x2, y1, y2), z in ((bottom, low), (top, high))
        for x, y in ((x1, y1), (x2, y1), (x2, y2), (x1, y2))
    ]
    faces = [
        face for quad in QUADS.values() for face in ((quad[0], quad[1], quad[2]), (quad[0], quad[2], quad[3]))
    ]
    return trimesh.Trimesh(vertices=np.array(corners, dtype=float), faces=faces, process=False)


def l_shaped():
    """A floor 40 in long and 5 in high, with a leg of 15 in at its forward end up to 20 in: 10 in wide."""
    floor = (100, 140, 0, 10)
    leg = (100, 115, 0, 10)
    return trimesh.util.concatenate([block(floor, floor, 0, 5), block(leg, leg, 5, 20)]), 20.0


def tapered():
    """A swept and tapered tank: below it is shorter and lies farther forward than above."""
    return block((100, 140, 0, 20), (96, 188, 0, 34), 0, 12), 12.0


def filled(solid, level):
    """Volume in US gal and arm of what lies below a level.

    The cut is left open and laid into the plane z = 0: a lid there adds nothing to the integrals.
    """
    below = trimesh.intersections.slice_faces_plane(solid.vertices, solid.faces, (0, 0, -1), (0, 0, level))
    corners, faces = below[:2]
    triangles = (corners - (0, 0, level))[faces]
    found = trimesh.triangles.mass_properties(triangles, skip_inertia=True)
    return float(found["volume"]) / GALLON, float(found["center_mass"][0])


def tabulated(solid, levels, straight):
    """A table of arms against volume at these levels, from the library, exact in the doubles it gave."""
    rows = [filled(solid, level) for level in levels]
    points = tuple((F(volume), F(arm)) for volume, arm in rows)
    return TankTable("volume", "arm", straight, None, points)


def test_the_library_gives_the_volume_of_a_box_and_the_centre_of_a_wedge():
    """10 * 10 * 10 in are 1000/231 US gal, its centre half way. A wedge has it two thirds along."""
    square = (0, 10, 0, 10)
    assert filled(block(square, square, 0, 10), 10.0) == pytest.approx((1000 / GALLON, 5.0), rel=DOUBLES)
    wedge = block((0, 0, 0, 10), (0, 30, 0, 10), 0, 10)
    assert filled(wedge, 10.0)[1] == pytest.approx(10.0, rel=DOUBLES)


def test_an_l_shaped_tank_follows_its_three_points_along_the_moment_all_the_way():
    """The floor holds 2,000 cubic inches at 120 in, each inch of the leg 150 more at 107.5: the moment is
    straight on either side of the corner, so three points make the whole tank.
    """
    solid, top = l_shaped()
    table = tabulated(solid, (0.5, 5.0, top), "moment")

    for level in np.linspace(0.6, top, 60):
        volume, arm = filled(solid, float(level))
        assert float(table.curve.arm(min(F(volume), table.curve.last))) == pytest.approx(arm, rel=DOUBLES)
    full = (2000 * 120 + 2250 * F("107.5")) / 4250
    assert float(table.curve.arm(table.curve.last)) == pytest.approx(float(full), rel=DOUBLES)


def test_the_same_tank_without_a_point_at_its_corner_is_seen_to_be_wrong():
    """What a printed table leaves out cannot be read from it: off by more than half an inch here."""
    solid, top = l_shaped()
    table = tabulated(solid, (0.5, top), "moment")

    worst = max(
        abs(float(table.curve.arm(F(volume))) - arm)
        for volume, arm in (filled(solid, float(level)) for level in np.linspace(1, top - 1, 40))
    )
    assert worst > 0.5


def off_by(solid, top, count, straight):
    """How far a table of so many points is off at most: inches of arm, at their share of the full tank."""
    levels = [float(level) for level in np.linspace(top / 12, top, count)]
    table = tabulated(solid, levels, straight)
    worst = 0.0
    for level in np.linspace(top / 12, top, 97):
        volume, arm = filled(solid, float(level))
        volume = min(F(volume), table.curve.last)
        worst = max(worst, abs(float(table.curve.arm(volume)) - arm) * float(volume / table.curve.last))
    for level in levels:
        volume, arm = filled(solid, level)
        assert float(table.curve.arm(F(volume))) == pytest.approx(arm, rel=DOUBLES)
    return worst


@pytest.mark.parametrize("straight", ["arm", "moment"])
def test_a_tapered_tank_lies_closer_the_more_points_its_table_has(straight):
    """Exact at every point; in between off by hundredths of an inch with twelve of them, and four times
    less with about twice as many, as anything straight between points of a smooth curve is.
    """
    solid, top = tapered()

    twelve, twenty_three = off_by(solid, top, 12, straight), off_by(solid, top, 23, straight)

    assert twelve < BETWEEN_POINTS[straight]
    assert twelve / twenty_three == pytest.approx(4, rel=0.15)


def test_one_arm_for_all_of_the_tapered_tank_would_be_inches_off():
    """Why tanks carry points: the arm of the full tank is far from that of a quarter of it."""
    solid, top = tapered()

    full, quarter = filled(solid, top)[1], filled(solid, top / 4)[1]

    assert full - quarter > 4


@pytest.mark.parametrize("make", [l_shaped, tapered])
def test_what_was_burned_has_the_moment_before_less_the_moment_after(make):
    """Through the whole assessment: filled to the top, burned down to where a third of its height is left."""
    solid, top = make()
    levels = sorted({float(level) for level in np.linspace(top / 12, top, 12)} | {5.0})
    rows = [filled(solid, level) for level in levels]
    (before, full_arm), (after, left_arm) = rows[-1], filled(solid, top / 3)
    density = 6
    tank = FuelTank(F(before), [(F(volume), F(arm)) for volume, arm in rows])
    trip = (F(before) - F(after)) * density

    result = PlainAircraft(3000, 300_000, tanks=[tank], density=density, trip=trip).result()

    burned = next(line for line in result.lines if line.group == "trip")
    assert burned.moment is not None
    wanted = density * (before * full_arm - after * left_arm)
    assert float(-burned.moment) == pytest.approx(wanted, rel=1e-3)
    landing = result.state("landing")
    assert float(landing.moment) == pytest.approx(300_000 + density * after * left_arm, rel=1e-4)

"""Weight and centre of gravity against an independent flight-dynamics library (JSBSim), as shipped and loaded
at random.

Its aircraft are read from where it is installed and none of its data is kept here; they are no real
aircraft's figures. Some of its models overwrite what is set, so what the library holds is read back before
both are compared. Compared are weight and the CG along and across; the CG's height is not computed here. How
much each tank still holds while they drain is found by `drawn_down`, which shares no code with the engine.
"""

import os
import random
from dataclasses import dataclass
from fractions import Fraction
from pathlib import Path
from typing import Any
from xml.etree import ElementTree as ET

import pytest

from loads.balance.fuel import fuel_states
from loads.balance.path import burn_path
from loads.balance.prepared import prepared
from tests.pure.loads.naive_path import drawn_down
from tests.reference.plain_aircraft import FuelTank, PlainAircraft

os.environ["JSBSIM_DEBUG"] = "0"  # read when the library is imported
jsbsim: Any = pytest.importorskip("jsbsim", reason="the flight-dynamics library is a test dependency")

MODELS = ("c172x", "c310", "DHC6", "787-8", "ah1s", "Concorde")
RANDOM_LOADS = 20
DRAIN_STEPS = 60
RELATIVE = 1e-6  # the library computes in doubles, through slugs
NOTHING = 1e-9  # inches, where both lie on the centreline
INCHES = {"IN": Fraction(1), "FT": Fraction(12), "M": 1 / Fraction("0.0254")}
POUNDS = {"LBS": Fraction(1), "KG": 1 / Fraction("0.45359237")}
DENSITY = 6  # both sides are given weights; the volume is made from the weight, so any density serves


@dataclass
class Model:
    """One model of the library and what its installed file says about arms and tanks."""

    name: str
    library: Any
    empty: tuple[Fraction, Fraction, Fraction]  # weight in lb, CG along and across in inches
    points: list[tuple[Fraction, Fraction]]
    tanks: list[tuple[Fraction, Fraction, Fraction]]  # along, across, capacity in lb

    def held(self, name: str, number: int) -> Fraction:
        return Fraction(self.library[f"{name.replace('[i]', f'[{number}]')}"])

    def same_in_our_engine(self) -> PlainAircraft:
        """The aircraft as the library now holds it."""
        weight, along, across = self.empty
        lines = [
            (self.held("inertia/pointmass-weight-lbs[i]", number), *arms)
            for number, arms in enumerate(self.points)
        ]
        tanks = []
        for number, (arm, lateral, capacity) in enumerate(self.tanks):
            volume = self.held("propulsion/tank[i]/contents-lbs", number) / DENSITY
            most = max(volume, capacity / DENSITY, Fraction(1))
            tanks.append(FuelTank(volume, [(0, arm), (most, arm)], lateral))
        return PlainAircraft(weight, weight * along, weight * across, lines, tanks, DENSITY)


@pytest.fixture(autouse=True)
def _away_from_the_house(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """The library writes the outputs its models ask for into the working folder."""
    monkeypatch.chdir(tmp_path)


def length(element: ET.Element, axis: str) -> Fraction:
    return Fraction(element.findtext(axis, "0").strip()) * INCHES[element.get("unit", "IN")]


def weight(element: ET.Element, name: str) -> Fraction:
    found = element.find(name)
    assert found is not None
    return Fraction((found.text or "").strip()) * POUNDS[found.get("unit", "LBS")]


def model(name: str) -> Model:
    library = jsbsim.FGFDMExec(None)
    library.set_debug_level(0)
    assert library.load_model(name)
    assert library.run_ic()
    file = Path(jsbsim.get_default_root_dir()) / "aircraft" / name / f"{name}.xml"
    root = ET.parse(file).getroot()  # noqa: S314  a file of an installed package
    balance = root.find("mass_balance")
    assert balance is not None
    centre = next(spot for spot in balance.findall("location") if spot.get("name") == "CG")
    points = [point.find("location") for point in balance.findall("pointmass")]
    tanks = [(tank.find("location"), weight(tank, "capacity")) for tank in root.findall("propulsion/tank")]
    return Model(
        name,
        library,
        (weight(balance, "emptywt"), length(centre, "x"), length(centre, "y")),
        [(length(spot, "x"), length(spot, "y")) for spot in points if spot is not None],
        [(length(spot, "x"), length(spot, "y"), most) for spot, most in tanks if spot is not None],
    )


def assert_same(flown: Model) -> None:
    state = flown.same_in_our_engine().result().state("ramp")
    for ours, name in (
        (state.weight, "inertia/weight-lbs"),
        (state.arm, "inertia/cg-x-in"),
        (state.lateral_arm, "inertia/cg-y-in"),
    ):
        assert float(ours) == pytest.approx(flown.library[name], rel=RELATIVE, abs=NOTHING), (
            flown.name,
            name,
        )


@pytest.mark.parametrize("name", MODELS)
def test_as_shipped_both_give_the_same_weight_and_cg(name):
    flown = model(name)

    assert flown.tanks
    assert_same(flown)


@pytest.mark.parametrize("name", MODELS)
def test_loaded_at_random_both_give_the_same_weight_and_cg(name):
    flown = model(name)
    chance = random.Random(name)
    weights = set()

    for _ in range(RANDOM_LOADS):
        for number in range(len(flown.points)):
            flown.library[f"inertia/pointmass-weight-lbs[{number}]"] = chance.uniform(0, 400)
        for number, (_, _, capacity) in enumerate(flown.tanks):
            flown.library[f"propulsion/tank[{number}]/contents-lbs"] = chance.uniform(0, float(capacity))
        assert flown.library.run_ic()
        assert_same(flown)
        weights.add(flown.library["inertia/weight-lbs"])

    assert len(weights) == RANDOM_LOADS


@pytest.mark.parametrize("name", MODELS)
def test_draining_the_tanks_step_by_step_both_follow_the_same_path(name):
    """Filled unevenly, so that the tanks run dry one after another. The library is given what each holds."""
    flown = model(name)
    for number, (_, _, capacity) in enumerate(flown.tanks):
        flown.library[f"propulsion/tank[{number}]/contents-lbs"] = float(capacity) * (number + 1) / 20
    assert flown.library.run_ic()
    ours = flown.same_in_our_engine()
    on_board = sum((Fraction(tank.held) for tank in ours.tanks), Fraction(0)) * DENSITY
    ours.trip = on_board * 9 / 10
    basis = ours.basis()
    declared, result = ours.declared(basis), ours.result()
    states = {state.phase: state for state in result.states}
    path = burn_path(declared.fuel, fuel_states(declared.fuel, prepared(basis)), states)
    assert len(path.stretches) > 1

    start = states["take-off"].weight
    for step in range(DRAIN_STEPS + 1):
        burned = ours.trip * step / DRAIN_STEPS
        left = drawn_down(
            {held.tank.id: held.usable for held in declared.fuel.tanks}, basis.burn_order, burned / DENSITY
        )
        for number, volume in enumerate(left.values()):
            flown.library[f"propulsion/tank[{number}]/contents-lbs"] = float(volume * DENSITY)
        assert flown.library.run_ic()
        weight = start - burned
        on_it = next(each for each in path.stretches if each.end.weight <= weight <= each.start.weight)
        at = on_it.at(weight)
        for figure, read in (
            (weight, "inertia/weight-lbs"),
            (at.moment / weight, "inertia/cg-x-in"),
            (at.lateral_moment / weight, "inertia/cg-y-in"),
        ):
            assert float(figure) == pytest.approx(flown.library[read], rel=RELATIVE, abs=NOTHING), (
                step,
                read,
            )

"""Published weighings, changes between them and a pallet's tare, through the sums of a worksheet or a load.

Which examples they are, where they stand, and whether their figures were read, computed or remembered, is in
worked_examples.json.
"""

from collections.abc import Callable
from fractions import Fraction
from typing import Any

from fleet.weight_changes import Bracket, must_revise, negligible_weight, part_of, running
from fleet.worksheet import SignedLine, Sums, WeighingPoint, weighed
from loads.balance.declared import read_load
from tests.pure.loads.making import load, twin

F = Fraction
Figures = dict[str, Any]
Runner = Callable[[Figures, Figures], Figures]


def three_scales(inputs: Figures, _: Figures) -> Figures:
    """Tare off each point; all the fuel off at its arm, the unusable part back on at its own."""
    points = [
        WeighingPoint(one["name"], F(one["scale_lb"]), F(one["tare_lb"]), F(one["arm_in"]))
        for one in inputs["points"]
    ]
    fuel = F(inputs["fuel_on_board_gal"]) * F(inputs["fuel_density_lb_gal"])
    corrections = [
        SignedLine("fuel on board", -fuel, F(inputs["fuel_arm_in"])),
        SignedLine("unusable fuel", F(inputs["unusable_fuel_lb"]), F(inputs["unusable_arm_in"])),
    ]
    found = weighed(points, corrections)
    return {
        "as_weighed_lb": found.as_weighed.weight,
        "as_weighed_moment": found.as_weighed.moment,
        "empty_lb": found.empty.weight,
        "empty_moment": found.empty.moment,
        "empty_cg_in": found.empty.arm,
    }


def _two_points(total: Any, third: Any, mains: Fraction, third_arm: Fraction) -> Fraction:
    """The centre of gravity of an aircraft on its main wheels and one wheel more, from the datum."""
    points = [
        WeighingPoint("main wheels", F(total) - F(third), F(0), mains),
        WeighingPoint("nose or tail wheel", F(third), F(0), third_arm),
    ]
    return weighed(points).empty.arm


def from_the_mains(inputs: Figures, _: Figures) -> Figures:
    arm = _two_points(inputs["total_lb"], inputs["nose_lb"], F(0), F(inputs["nose_from_mains_in"]))
    return {"cg_from_mains_in": arm}


def nose_wheel(sign: int) -> Runner:
    """The datum `D` ahead (1) of the main wheels or behind (-1) them, the nose wheel `L` ahead of them."""

    def run(inputs: Figures, _: Figures) -> Figures:
        mains = sign * F(inputs["D_in"])
        return {"cg_in": _two_points(inputs["W_lb"], inputs["F_lb"], mains, mains - F(inputs["L_in"]))}

    return run


def tail_wheel(sign: int) -> Runner:
    """The same with the tail wheel `L` behind the main wheels."""

    def run(inputs: Figures, _: Figures) -> Figures:
        mains = sign * F(inputs["D_in"])
        return {"cg_in": _two_points(inputs["W_lb"], inputs["R_lb"], mains, mains + F(inputs["L_in"]))}

    return run


def negligible(inputs: Figures, _: Figures) -> Figures:
    first, second, third = inputs["thresholds_lb"]
    assert first["empty_below"] == second["empty_from"]
    assert second["empty_to"] == third["empty_above"]
    brackets = [
        Bracket(F(first["empty_below"]), False, F(first["lb"])),
        Bracket(F(second["empty_to"]), True, F(second["lb"])),
        Bracket(None, False, F(third["lb"])),
    ]
    return {
        "threshold_lb": [negligible_weight(brackets, F(case["empty_lb"])) for case in inputs["cases"]],
        "cg_in": part_of(F(inputs["cg_percent_mac"]), F(inputs["mac_in"])),
    }


def revise(inputs: Figures, _: Figures) -> Figures:
    """Each cumulative change is made by lines whose running sum has that weight and that shift."""
    mass = part_of(F("0.5"), F(inputs["max_landing_kg"]))
    chord = part_of(F("0.5"), F(inputs["mac_mm"]))
    before = Sums(F(3500), F(3500 * 4000))
    revised = []
    for change in inputs["cumulative"]:
        weight, shift = F(change["kg"]), F(change["cg_mm"])
        moment = (before.weight + weight) * (before.arm + shift) - before.moment
        half = SignedLine("one change", weight / 2, moment / weight)
        step = running(before, [half, half])[-1]
        assert (step.changed.weight, step.shift) == (weight, shift)
        revised.append(must_revise(step.changed.weight, step.shift, most_weight=mass, most_shift=chord))
    return {"mass_threshold_kg": mass, "cg_threshold_mm": chord, "revise": revised}


def pallet(inputs: Figures, _: Figures) -> Figures:
    """What the floor bears beyond the load itself: the item's line counts its pallet and its nets."""
    document = load()
    item = document["items"][0]
    item |= {
        "pallet": {"weight": {"value": inputs["pallet_lb"], "unit": "lb"}},
        "net": {"weight": {"value": inputs["nets_lb"], "unit": "lb"}},
    }
    gross = read_load(document, twin()).items[0].weight
    assert gross is not None
    return {"tare_lb": gross - F(item["weight"]["value"])}


WEIGHINGS: dict[str, Runner] = {
    "AMTG-4-20": three_scales,
    "WBH-NOSE": from_the_mains,
    "WBH-NOSE-DATUM-FWD": nose_wheel(1),
    "WBH-NOSE-DATUM-AFT": nose_wheel(-1),
    "WBH-TAIL-DATUM-FWD": tail_wheel(1),
    "WBH-TAIL-DATUM-AFT": tail_wheel(-1),
    "NEGLIGIBLE": negligible,
    "REVISE-05": revise,
    "PALLET-TARE": pallet,
}

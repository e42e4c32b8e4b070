"""Invented rejects in round figures, one for each way out and some for none, and loads with room.

The aircraft: empty 2,000 lb at 100 in, the pilot 200 lb at 90 in, two seats at 100 in (row 1) and two at 120
in (row 2), a nose hold at 50 in, a rear one at 150 in, two tanks at 100 in, 50 in left and right; fuel at 6
lb/US gal, 30 US gal in each, 12 lb for taxi, 120 lb for the trip, 60 lb wanted at landing. The CG may lie
from 98 to 102 in, so counted from 100 in (as all moments here are) a moment may be twice the weight.
"""

from collections.abc import Callable
from dataclasses import replace
from typing import Any

from fleet.basis import Basis, BurnStage, TankTable, Zone
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from loads.balance.remedies.question import Question
from loads.balance.result import Result
from tests.pure.loads.making import F, envelope, limit, seat, tank
from tests.pure.loads.remedies.cabins import cabin, empty_of, seated
from tests.pure.loads.round_figures import box, q

EMPTY = empty_of(2000, 100)
WEIGHTS: dict[str, Any] = {
    "ramp": 4000,
    "take_off": 3950,
    "zero_fuel": 3600,
    "landing": 3900,
    "minimum_flying": 1500,
}
NARROW = envelope((F(-1, 2), 1000), (F(-1, 2), 5000), (F(1, 2), 5000), (F(1, 2), 1000), axis="lateral")
INFANT = {
    "category": "adult",
    "lap_infant": {"name": "I. Moss", "weight": q(20), "how": "declared"},
}
PHASES = ("ramp", "take-off", "landing")
Asked = tuple[dict[str, Any], Basis]


def aircraft(weights: dict[str, Any] | None = None, *, lateral: bool = False, **changes: Any) -> Basis:
    """The aircraft; `weights` are limits beside its own, `lateral` limits of 1.5 in either way."""
    rows = (("S1", 100, -10, 300), ("S2", 100, 10, 190), ("S3", 120, -10, 300), ("S4", 120, 10, 300))
    made = cabin(
        [
            seat("P", 90, 0, "crew"),
            *(
                replace(seat(name, arm, across, "passenger", most), row="1" if arm == 100 else "2")
                for name, arm, across, most in rows
            ),
        ],
        holds=(("NOSE", 50, 100), ("REAR", 150, 200)),
        tanks=(("LEFT", 100, 50, -50), ("RIGHT", 100, 50, 50)),
        edges=((98, 1000), (98, 5000), (102, 5000), (102, 1000)),
        weights=WEIGHTS | (weights or {}),
        lateral=((F(-3, 2), 1000), (F(-3, 2), 5000), (F(3, 2), 5000), (F(3, 2), 1000)) if lateral else (),
    )
    return replace(made, **changes)


def loaded(people: dict[str, Any], *items: tuple[str, Any], **fuel: Any) -> dict[str, Any]:
    """A load of the aircraft: people by seat, items as (place, pounds); `fuel` changes its fuel."""
    document = seated(people, {}, crew={"P": 200}, trip=120, minimum=60)
    document["items"] = [line(place, q(weight)) for place, weight in items]
    document["fuel"] |= {
        "density": {"value": "6", "unit": "lb/US gal", "source": "delivery note 12"},
        "at_engine_start": {name: q(30, "US gal") for name in ("LEFT", "RIGHT")},
        "taxi": q(12),
    }
    document["fuel"] |= fuel
    return document


def line(place: str, weight: dict[str, Any], kind: str = "baggage", **more: Any) -> dict[str, Any]:
    return {"kind": kind, "what": "things", "place": place, "weight": weight, "how": "weighed"} | more


def gallons(left: Any, right: Any) -> dict[str, Any]:
    return {"LEFT": q(left, "US gal"), "RIGHT": q(right, "US gal")}


def too_far_aft() -> Asked:
    """2,600 lb at zero fuel may have a moment of 5,200; it is -2,000 + 4,000 + 2,000 + 5,000 = 9,000, 3,800
    too much. The 200 lb in row 2 forward: -4,000. From rear to nose 100 a pound: 38 lb. Left behind 50 - 2 a
    pound: 79.2 lb. Ballast in the nose 50 + 2 a pound: 73.1 lb.
    """
    return loaded({"S3": 200, "S4": 100}, ("REAR", 100)), aircraft()


def too_heavy_to_take_off() -> Asked:
    """3,018 lb where 2,990 are allowed: 28 lb of bags, or 4.7 US gal of one tank, 28.2 lb."""
    document = loaded({"S1": 200, "S3": 150}, ("REAR", 60))
    document["items"] += [line("NOSE", q(30), "equipment"), line("NOSE", q(30), "equipment")]
    return document, aircraft({"take_off": 2990})


def too_heavy_and_both_tanks_alike() -> Asked:
    """The same, nothing to leave behind: 2,892 lb where 2,860 are allowed, but one tank that holds 5 US gal
    less would be 1,500 lb in off, 0.52 in where 0.5 is all: so 2.7 of either.
    """
    made = aircraft({"take_off": 2860})
    return loaded({"S1": 172, "S2": 172}), replace(made, envelopes=(*made.envelopes, NARROW))


def too_far_left() -> Asked:
    """20 US gal more on the left: 120 lb at 50 in, 6,000 lb in with the passenger's 2,000 more: 8,000 where
    1.5 in of 2,748 lb at take-off are 4,122.
    """
    return loaded({"S1": 200}, at_engine_start=gallons(40, 20)), aircraft(lateral=True)


def neither_people_nor_bags_alone() -> Asked:
    """2,990 lb at zero fuel may have 5,980; it is -2,000 + 4,000 + 3,600 + 9,000 - 3,500 = 11,100, so 5,120
    too much. Row 1 has one free seat: at most -4,000; the nose takes 30 lb more: -3,000.
    """
    people = {"S2": 160, "S3": 200, "S4": 180}
    return loaded(people, ("REAR", 180), ("NOSE", 70)), aircraft()


def somebody_stays() -> Asked:
    """3,248 lb at take-off where 3,070 are allowed, no fuel to spare: 178 lb; row 1 has nobody so heavy."""
    people = {"S1": 170, "S2": 150, "S3": 180, "S4": 200}
    return loaded(people, minimum_at_landing=q(228)), aircraft({"take_off": 3070})


def two_stay() -> Asked:
    """3,268 lb where 2,930 are allowed: 338 lb. Whoever has an infant on the lap is not asked, and of the
    others 150 and 180 lb are too little, 150 and 200 suffice.
    """
    document, _ = somebody_stays()
    document["passengers"][0] |= INFANT
    document["persons_on_board"] += 1
    return document, aircraft({"take_off": 2930})


def another_configuration() -> Asked:
    """3,058 lb where 3,000 are allowed, but 3,100 with strakes; with floats it would be another aircraft."""
    basis = aircraft({"take_off": 3000})
    (own,) = basis.configurations
    heavier = replace(own.limits, take_off=limit(3100))
    others = (
        replace(own, id="floats", name="on floats", fit="floats", limits=heavier),
        replace(own, id="one row", name="one row", seats=("P", "S1"), limits=heavier),
        replace(own, id="two pilots", name="two pilots", minimum_crew=2, limits=heavier),
        replace(own, id="no hold", name="no hold", places=("NOSE",), limits=heavier),
        replace(own, id="bare", name="bare"),
        replace(own, id="strakes", name="with strakes", limits=heavier),
    )
    document = loaded({"S1": 200, "S2": 180}, minimum_at_landing=q(228))
    document["items"] = [line("NOSE", q(70), "equipment"), line("REAR", q(60), "equipment")]
    return document, replace(basis, configurations=(own, *others))


def two_change_seats() -> Asked:
    """2,830 lb at zero fuel may have 5,660; it is -2,000 + 4,000 + 3,600 + 2,000 = 7,600: 1,940 too much, and
    100 lb more or less in front are 2,000.
    """
    return loaded({"S1": 100, "S2": 110, "S3": 200, "S4": 180}, ("REAR", 40)), aircraft()


def an_infant_goes_along() -> Asked:
    """2,609 lb at zero fuel may have 5,218; it is -2,000 + 3,400 + 3,200 + 3,950 = 8,550: 3,332 too much. The
    160 lb in row 2 forward are 3,200; 150 lb with an infant of 20 lb are 3,400, where a seat is for both.
    """
    document, basis = loaded({"S3": 150, "S4": 160}, ("REAR", 79)), aircraft()
    document["passengers"][0] |= INFANT
    document["persons_on_board"] += 1
    seats = tuple(replace(one, infant_restraint=True) if one.id == "S1" else one for one in basis.seats)
    return document, replace(basis, seats=seats)


def bags_in_other_units() -> Asked:
    """40 and 20.5 kg in the rear: 88.2 and 45.2 lb. 2,733.4 lb at zero fuel may have 5,466.8; it is -2,000 +
    4,000 + 6,669 = 8,669: 3,202.6 too much.
    """
    document = loaded({"S1": 200, "S3": 200})
    document["items"] = [line("REAR", q(40, "kg")), line("REAR", q("20.5", "kg"), "cargo")]
    return document, aircraft()


def a_crate_goes_whole() -> Asked:
    """2,660 lb at zero fuel may have 5,320; it is -2,000 + 4,000 + 8,000 - 2,000 = 8,000, 2,680 too much: the
    crate of 30 lb is 3,000. Nobody may take the seats in front.
    """
    basis = aircraft()
    seats = tuple(replace(one, maximum=limit(100)) if one.row == "1" else one for one in basis.seats)
    document = loaded({"S3": 200}, ("NOSE", 40))
    document["items"] += [line("REAR", q(30), "equipment"), line("REAR", q(130), "equipment")]
    return document, replace(basis, seats=seats)


def fuel_typed_otherwise() -> Asked:
    """Tanks filled by litres and kilograms, with a stroke in a name: 2,929.5 lb where 2,900 are allowed, and
    no tank alone may hold 30 lb less, 1,500 lb in off, where 0.5 in is all.
    """
    basis = aircraft({"take_off": 2900})
    tanks = tuple(replace(one, id=name) for one, name in zip(basis.tanks, ("L/1", "R~1"), strict=True))
    stages = (BurnStage(("L/1", "R~1")),)
    document = loaded({"S1": 190, "S2": 190})
    document["fuel"]["at_engine_start"] = {"L/1": q(114, "l"), "R~1": q(82, "kg")}
    envelopes = (*basis.envelopes, NARROW)
    changed = replace(basis, tanks=tanks, burn_order=stages, taxi_order=stages, envelopes=envelopes)
    return document, changed


def a_notch_between() -> Asked:
    """The envelope is open from above, down to 2,500 lb at 100.3 in: at take-off, 2,956 lb, from 100.15 to
    100.52 in, and 900 lb in put it at 100.30. Either side of that is inside.
    """
    edges = ((97, 1000), (97, 5000), (F(199, 2), 5000), (F(1003, 10), 2500), (F(203, 2), 5000))
    notched = envelope(*edges, (103, 5000), (103, 1000))
    return loaded({"S1": 200, "S3": 190}, ("NOSE", 18)), aircraft(envelopes=(notched,))


def slanting_sides() -> Asked:
    """The aft limit runs forward with the weight, the forward one aft, as far as 3,400 lb."""
    edges = ((96, 1500), (99, 3400), (100, 3400), (104, 1500))
    document = loaded({"S3": 200, "S4": 180}, ("REAR", 60), ("NOSE", 20))
    return document, aircraft(envelopes=(envelope(*edges),))


def too_light() -> Asked:
    """2,260 lb with the least fuel at landing where 2,300 must be flown: 40 lb, and not in the nose, where
    they would be 2,000 more than the pilot's 2,000, and 99 in is the forward limit.
    """
    document = loaded({}, trip=q(120), minimum_at_landing=q(60), at_engine_start=gallons(16, 16))
    return document, aircraft({"minimum_flying": 2300}, envelopes=(box(99, 102),))


def a_full_floor() -> Asked:
    """2,220 lb at zero fuel may have -4,440; the pilot at 70 in and the nose are -7,000. The rear floor bears
    10 lb, where 20 lb from the nose are 2,000.
    """
    made = aircraft()
    seats = tuple(replace(one, arm=F(70)) if one.id == "P" else one for one in made.seats)
    floor = Zone("FLOOR", "rear floor", ("S3", "S4", "REAR"), limit(10))
    return loaded({}, ("NOSE", 20)), replace(made, seats=seats, zones=(floor,))


def a_place_too_full() -> Asked:
    """230 lb in a hold for 200: 30 lb to the nose, or left behind."""
    return loaded({"S1": 200}, ("REAR", 230), ("NOSE", 60)), aircraft()


def somebody_too_heavy_for_a_seat() -> Asked:
    """195 lb in a seat for 190, and nobody in the one beside it."""
    return loaded({"S2": 195}, ("REAR", 40)), aircraft()


def whoever_leaves_in_flight_keeps_the_seat() -> Asked:
    """Too far aft by the same 3,800, but an event names the 200 lb in row 2."""
    document, basis = too_far_aft()
    document["sequence"] = [{"after_burning": q(30), "leave": [{"seat": "S3"}]}]
    return document, basis


def from_the_middle_to_both_wings() -> Asked:
    """A third tank 20 in behind, 40 US gal of 40: 4,800 lb in and 2,020 more, where 2,749 lb at the ramp may
    have 5,498. It is the last to burn.
    """
    return _three_tanks(
        {"S3": 100, "S4": 101}, gallons(9, 9) | {"MIDDLE": q(40, "US gal")}
    ), _with_a_third_tank(20)


def from_both_wings_to_the_middle() -> Asked:
    """The pilot alone, 25 US gal in each wing and the third tank 20 in behind: -2,000 where 2,500 lb at the
    ramp may have -1,750 with a forward limit of 99.3 in, 250 too much, 120 a US gal.
    """
    made = replace(_with_a_third_tank(20), envelopes=(box(F("99.3"), 102, phases=PHASES), NARROW))
    return _three_tanks({}, gallons(25, 25) | {"MIDDLE": q(0, "US gal")}), made


def _with_a_third_tank(behind: int) -> Basis:
    basis = aircraft()
    stages = (BurnStage(("LEFT", "RIGHT")), BurnStage(("MIDDLE",)))
    tanks = (*basis.tanks, tank("MIDDLE", 100 + behind, 40))
    return replace(
        basis, tanks=tanks, burn_order=stages, taxi_order=stages, envelopes=(*basis.envelopes, NARROW)
    )


def _three_tanks(people: dict[str, Any], start: dict[str, Any]) -> dict[str, Any]:
    return loaded(people, at_engine_start=start, trip=q(60), minimum_at_landing=q(180))


def a_hump_between_two_points() -> Asked:
    """Fuel at 120 in less a third of an inch a US gal in one tank: v US gal have 120 v - 2 v**2, so of all
    points of the burn the one with 27 US gal is the worst: 418 lb in too much. 8.8 lb to leave behind, at 48
    in a pound, 4.2 lb to move, 8.1 lb of ballast in the nose.
    """
    table = TankTable("volume", "arm", "arm", None, ((F(0), F(120)), (F(60), F(100))))
    made = aircraft()
    (left, _), stages = made.tanks, (BurnStage(("LEFT",)),)
    only = replace(left, table=table, capacity=F(60), lateral_arm=F(0))
    start = {"LEFT": q(60, "US gal")}
    document = loaded({"S1": 200}, ("REAR", 120), at_engine_start=start)
    return document, replace(made, tanks=(only,), burn_order=stages, taxi_order=stages)


def no_single_kind_helps() -> Asked:
    """2,240 lb without fuel where 1,600 are allowed, and 40 lb of it are bags."""
    return loaded({}, ("REAR", 40)), aircraft({"zero_fuel": 1600})


def something_could_not_be_checked() -> Asked:
    """Too far aft, and something in a hold whose limit was not entered."""
    document, basis = too_far_aft()
    places = tuple(replace(one, maximum=None) if one.id == "NOSE" else one for one in basis.places)
    document["items"].append(line("NOSE", q(5)))
    return document, replace(basis, places=places)


def nothing_is_outside() -> Asked:
    return loaded({"S1": 200, "S3": 100}, ("REAR", 40), ("NOSE", 40)), aircraft()


REJECTS: tuple[Callable[[], Asked], ...] = (
    too_far_aft,
    too_heavy_to_take_off,
    too_heavy_and_both_tanks_alike,
    too_far_left,
    neither_people_nor_bags_alone,
    somebody_stays,
    two_stay,
    another_configuration,
    two_change_seats,
    an_infant_goes_along,
    bags_in_other_units,
    a_crate_goes_whole,
    fuel_typed_otherwise,
    a_notch_between,
    slanting_sides,
    too_light,
    a_full_floor,
    a_place_too_full,
    somebody_too_heavy_for_a_seat,
    whoever_leaves_in_flight_keeps_the_seat,
    from_the_middle_to_both_wings,
    from_both_wings_to_the_middle,
    a_hump_between_two_points,
    no_single_kind_helps,
    something_could_not_be_checked,
    nothing_is_outside,
)


def question_of(asked: Asked, empty: EmptyFigures = EMPTY) -> Question:
    """The question about a load, with a clock that stands: nothing depends on how long it takes."""
    document, basis = asked
    declared = read_load(document, basis)

    def judge(changed: Declared) -> Result:
        return assess(changed, basis, empty, advised=False)

    return Question(declared, judge(declared), prepared(basis), judge, lambda: 0.0, 60.0)

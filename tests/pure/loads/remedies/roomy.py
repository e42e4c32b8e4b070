"""Invented loads with room, each stopped by another limit: the aircraft of `rejects`, in round figures."""

from collections.abc import Callable
from dataclasses import replace

from fleet.basis import Zone
from fleet.fuel_balance import FuelBalance
from fleet.trim import Trim, TrimLine, TrimTable
from tests.pure.loads.making import SOURCE, F, envelope, limit
from tests.pure.loads.remedies.rejects import INFANT, Asked, aircraft, gallons, line, loaded
from tests.pure.loads.round_figures import q


def stopped_by_weight() -> Asked:
    """2,928 lb at take-off where 2,945 are allowed: 17 lb, 2.83 US gal; of 200 lb of people two share 8.5 lb,
    8.5 %. The nose bears 10 lb more than its 90: 11.1 %; the fuel of 360 lb may be 4.7 % heavier.
    """
    return loaded({"S1": 100, "S2": 100}, ("REAR", 90), ("NOSE", 90)), aircraft({"take_off": 2945})


def stopped_by_the_centre_of_gravity() -> Asked:
    """2,580 lb at zero fuel may have 5,160; it is -2,000 + 4,000 + 3,000 - 0 = 5,000, 160 left: in the rear
    50 - 2 a pound, 3.3 lb, in row 2 20 - 2 a pound, 8.8 lb; in the nose no end but its own 100 lb.
    """
    return loaded({"S3": 200, "S1": 120}, ("REAR", 60)), aircraft()


def stopped_by_a_zone_a_seat_and_a_place() -> Asked:
    """The rear floor bears 110 lb and has 100; row 1 has one seat for 190 lb; the nose no limit."""
    made = aircraft()
    places = tuple(replace(one, maximum=limit(None)) if one.id == "NOSE" else one for one in made.places)
    floor = Zone("FLOOR", "rear floor", ("S3", "S4", "REAR"), limit(110))
    known = replace(made, zones=(floor,), places=places)
    return loaded({"S1": 200, "S3": 80}, ("REAR", 20), ("NOSE", 10)), known


def stopped_across() -> Asked:
    """Lateral limits of 1.5 in: 2,480 lb with the least fuel at landing may have 3,720; the passengers on the
    left are 2,000, 3 US gal more on the left 900: 820 are left, 300 a US gal. A seat has no row, a hold no
    limit that was entered, and an attendant's seat is no passenger's.
    """
    made = aircraft(lateral=True)
    seats = tuple(
        replace(one, row=None) if one.id == "S2" else replace(one, attendant=one.id == "S4")
        for one in made.seats
    )
    places = tuple(replace(one, maximum=None) if one.id == "NOSE" else one for one in made.places)
    document = loaded({"S1": 120, "S3": 80}, ("REAR", 20), at_engine_start=gallons(33, 30))
    return document, replace(made, seats=seats, places=places)


def everybody_weighed_and_an_infant() -> Asked:
    """Nobody's weight may be wrong, though an infant's was declared; the tanks are full, and one trapped."""
    document = loaded(
        {"S1": 180, "S2": 170}, at_engine_start=gallons(50, 48), not_usable={"RIGHT": q(2, "US gal")}
    )
    document["passengers"][0] |= INFANT
    document["persons_on_board"] += 1
    for one in document["passengers"]:
        one["how"] = "weighed"
    return document, aircraft()


def in_and_out_of_a_slit() -> Asked:
    """A slit in the envelope from 99.55 to 99.65 in at 5,000 lb, down to 2,900 lb at 99.6: at take-off, 2,908
    lb and 99.31 in, the load is forward of it, and comes to it with some 17 lb more in the rear.
    """
    edges = ((98, 1000), (98, 5000), (F("99.55"), 5000), (F("99.6"), 2900), (F("99.65"), 5000))
    slit = envelope(*edges, (102, 5000), (102, 1000))
    return loaded({"S1": 200, "S2": 150}, ("REAR", 5), ("NOSE", 5)), aircraft(envelopes=(slit,))


def stopped_by_trim_and_the_balance_of_fuel() -> Asked:
    """The setting falls by one unit an inch, 5 at 100 in, from 4 to 6.2; and the left may hold 4 US gal more
    than the right, where it holds 2.
    """
    table = TrimTable(None, (TrimLine(None, ((F(97), F(8)), (F(103), F(2))), SOURCE),))
    trim = Trim("arm", "units", F(1, 10), F(4), F("6.2"), SOURCE, (table,))
    balance = FuelBalance(
        "WINGS",
        "left and right wing",
        ("LEFT",),
        ("RIGHT",),
        "volume",
        F(4),
        (),
        ("ramp", "take-off"),
        SOURCE,
    )
    document = loaded({"S1": 200, "S2": 160}, ("REAR", 50), ("NOSE", 50), at_engine_start=gallons(31, 29))
    return document, aircraft(trim=trim, fuel_balance=(balance,))


def things_in_two_lines() -> Asked:
    """20 lb and 10 kg in the rear, a child with a restraint; 2,942 lb at take-off where 3,010 are allowed."""
    document = loaded({"S1": 200, "S4": 60}, ("REAR", 20))
    document["items"] += [line("REAR", q(10, "kg"), "cargo"), line("NOSE", q(80))]
    document["passengers"][1] |= {"category": "child", "restraint": q(12)}
    return document, aircraft({"take_off": 3010})


ROOMY_LOADS: tuple[Callable[[], Asked], ...] = (
    stopped_by_weight,
    stopped_by_the_centre_of_gravity,
    stopped_by_a_zone_a_seat_and_a_place,
    stopped_across,
    everybody_weighed_and_an_infant,
    in_and_out_of_a_slit,
    stopped_by_trim_and_the_balance_of_fuel,
    things_in_two_lines,
)

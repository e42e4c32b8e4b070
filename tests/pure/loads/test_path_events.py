"""The whole path of a flight with events, worked by hand on the aircraft of `round_figures`."""

from dataclasses import replace

from fleet.basis import BurnStage, TankTable
from fleet.positions import MovingPart, PartState
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.flown import fly, path_of
from loads.balance.path import Gap, Knot, Path, Stretch, Turn
from loads.balance.prepared import prepared
from tests.pure.loads.making import SOURCE, F, tank
from tests.pure.loads.round_figures import EMPTY, q, round_basis, round_load

MAIN = ("MAIN",)
UP, DOWN = (("GEAR", "UP"),), (("GEAR", "DOWN"),)


def gear(up=-2560):
    """A gear that is weighed down and may be up in flight."""
    states = (
        PartState("DOWN", "down", F(0), ("ground", "flight"), SOURCE),
        PartState("UP", "up", F(up), ("flight",), SOURCE),
    )
    return MovingPart("GEAR", "gear", "DOWN", states)


def path(document, basis):
    declared, ready = read_load(document, basis), prepared(basis)
    states = {state.phase: state for state in assess(declared, basis, EMPTY).states}
    return path_of(declared, fly(declared, EMPTY, ready), states, ready)


def knot(weight, moment, lateral=0, phase=None):
    return Knot(F(weight), F(moment), F(lateral), phase)


def burned(leg, ends, held, dry, parts=()):
    contents = {"MAIN": F(held)} if isinstance(held, int) else {name: F(each) for name, each in held.items()}
    return Stretch(leg, MAIN, *ends, F(0), (contents, F(0)), F(dry), "", parts)


def side(where, at, held, dry, parts=()):
    contents = {"MAIN": F(held)} if isinstance(held, int) else {name: F(each) for name, each in held.items()}
    return Turn("flight", where, ((at, contents),), False, F(dry), "", parts)


def zero(where, at, parts=()):
    return Turn("flight", where, ((at, {}),), False, at.weight, "", parts)


def test_somebody_leaves_and_the_gear_comes_up_and_down_again():
    # At the ramp 2,760 lb: 2,000 at 100 in, the pilot, 200 lb at 110 in, 360 lb of fuel at 100 in.
    steps = [
        {"after_burning": q(30), "leave": [{"seat": "S1"}]},
        {"after_burning": q(60), "position": {"GEAR": "UP"}},
        {"after_burning": q(90), "position": {"GEAR": "DOWN"}},
    ]

    found = path(round_load(1, sequence=steps, fuel={"taxi": q(30)}), round_basis(positions=(gear(),)))

    ramp, take_off = knot(2760, 276_000, 0, "ramp"), knot(2730, 273_000, 0, "take-off")
    before_1, after_1 = knot(2700, 270_000), knot(2500, 248_000)
    before_2, after_2 = knot(2470, 245_000), knot(2470, 242_440)
    before_3, after_3 = knot(2440, 239_440), knot(2440, 242_000)
    landing, least = knot(2410, 239_000, 0, "landing"), knot(2260, 224_000, 0, "minimum at landing")
    assert found == Path(
        (
            burned("taxi", (ramp, take_off), 60, 2400),
            burned("flight", (take_off, before_1), 55, 2400),
            burned("flight", (after_1, before_2), 50, 2200),
            burned("flight", (after_2, before_3), 45, 2200, UP),
            burned("flight", (after_3, landing), 40, 2200, DOWN),
            burned("reserve", (landing, least), 35, 2200, DOWN),
        ),
        (),
        F(6),
        (
            side("just before event 1", before_1, 50, 2400),
            side("just after event 1", after_1, 50, 2200),
            side("just before event 2", before_2, 45, 2200),
            side("just after event 2", after_2, 45, 2200, UP),
            side("just before event 3", before_3, 40, 2200, UP),
            side("just after event 3", after_3, 40, 2200, DOWN),
        ),
        (),
        (
            zero("at zero fuel", knot(2400, 240_000)),
            zero("at zero fuel after event 1", knot(2200, 218_000)),
            zero("at zero fuel after event 2", knot(2200, 215_440), UP),
            zero("at zero fuel after event 3", knot(2200, 218_000), DOWN),
        ),
    )


def two_tanks(**more):
    """A main tank 10 in left, and a rear one 20 in right at 150 in that feeds nothing."""
    feeding = (BurnStage(MAIN),)
    tanks = (tank("MAIN", 100, 100, -10), tank("REAR", 150, 100, 20))
    return round_basis(tanks=tanks, burn_order=feeding, taxi_order=feeding, **more)


TRANSFER = {"transfer": {"from": "REAR", "to": "MAIN", "quantity": q(10, "US gal")}}
START = {"MAIN": q(40, "US gal"), "REAR": q(20, "US gal")}


def test_fuel_that_is_moved_sweeps_the_moments_between_both_sides():
    # 2,320 lb without what feeds; 240 lb at 10 in left, 120 lb at 20 in right; 60 lb go forward 50 in.
    found = path(round_load(sequence=[{"after_burning": q(30)} | TRANSFER], start=START), two_tanks())

    take_off, landing = knot(2560, 260_000, 0, "take-off"), knot(2440, 245_000, -600, "landing")
    before, after = knot(2530, 257_000, 300), knot(2530, 254_000, -1500)
    least = knot(2260, 227_000, 1200, "minimum at landing")
    held, left = {"MAIN": 35, "REAR": 20}, {"MAIN": 45, "REAR": 10}
    half = knot(2530, 255_500, -600), {"MAIN": F(40), "REAR": F(15)}
    assert found == Path(
        (
            burned("flight", (take_off, before), {"MAIN": 40, "REAR": 20}, 2320),
            burned("flight", (after, landing), left, 2320),
            burned("reserve", (landing, least), {"MAIN": 30, "REAR": 10}, 2320),
        ),
        (),
        F(6),
        (
            side("just before event 1", before, held, 2320),
            side("just after event 1", after, left, 2320),
            Turn(
                "flight",
                "during the transfer of event 1",
                ((before, held), half, (after, left)),
                True,
                F(2320),
            ),
        ),
        (),
        (
            zero("at zero fuel", knot(2320, 236_000, 2400)),
            zero("at zero fuel after event 1", knot(2320, 236_000, 2400)),
        ),
    )


def moments_of_transfer(table, quantity=10):
    """The moment of a transfer at each of its points, and the gaps, with this table of the rear tank."""
    basis = two_tanks()
    basis = replace(basis, tanks=(basis.tanks[0], replace(basis.tanks[1], table=table)))
    step = {"transfer": {"from": "REAR", "to": "MAIN", "quantity": q(quantity, "US gal")}}
    found = path(round_load(sequence=[{"after_burning": q(30)} | step], start=START), basis)
    (swept,) = (turn for turn in found.turns if turn.swept)
    without = [knot.moment - 200_000 - 18_000 - held["MAIN"] * 600 for knot, held in swept.knots]
    return list(zip([held["REAR"] for _, held in swept.knots], without, strict=True)), found.gaps


def arms(*points):
    exact = tuple((F(volume), F(arm)) for volume, arm in points)
    return TankTable("volume", "arm", "arm", None, exact)


def test_a_transfer_is_told_at_the_points_of_its_tables_and_half_way_between():
    # 150 in up to 15 gal, then 160 in at 25 gal: bent above 15 gal, where its extreme lies beyond the ends.
    told, gaps = moments_of_transfer(arms((0, 150), (15, 150), (25, 160)))

    # By hand: 6 lb/gal times the volume times the arm, 155, 152.5 and 150 in, then 150 in.
    assert told == [
        (20, 6 * 20 * 155),
        (F(35, 2), 6 * F(35, 2) * F("152.5")),
        (15, 6 * 15 * 150),
        (F(25, 2), 6 * F(25, 2) * 150),
        (10, 6 * 10 * 150),
    ]
    assert gaps == ()


def test_an_extreme_within_a_transfer_is_a_point_of_it():
    # The arm 200 - 4 V: V (200 - 4 V) less what the main tank gets, 100 in a gallon, turns at 12.5 gal.
    told, _ = moments_of_transfer(arms((0, 200), (50, 0)))

    assert [volume for volume, _ in told] == [20, F(65, 4), F(25, 2), F(45, 4), 10]
    assert told[2] == (F(25, 2), 6 * F(25, 2) * 150)


def test_a_transfer_through_the_gap_of_a_table_is_known_in_part():
    told, gaps = moments_of_transfer(arms((15, 150), (25, 150)), quantity=20)

    assert told == [(20, 18_000), (F(35, 2), 15_750), (15, 13_500), (0, 0)]
    assert set(gaps) == {Gap("flight", "REAR", F(15))}


def test_settings_of_the_gear_are_flown_where_they_may_hold_and_no_event_states_them():
    steps = [{"after_burning": q(30), "leave": [{"seat": "S1"}]}]
    basis = round_basis(positions=(gear(),))

    found = path(round_load(1, sequence=steps, fuel={"taxi": q(30)}), basis)

    def shifted(at):
        return at._replace(moment=at.moment - 2560, phase=None)

    flight = found.stretches[1:]
    assert [each.leg for each in flight] == ["flight", "flight", "reserve"]
    assert found.settings == tuple(
        each._replace(start=shifted(each.start), end=shifted(each.end), setting="gear up") for each in flight
    )
    as_flown = [side("just before event 1", knot(2700, 270_000), 50, 2400)]
    as_flown.append(side("just after event 1", knot(2500, 248_000), 50, 2200))
    assert found.turns == (
        *as_flown,
        *(
            turn._replace(
                where=f"{turn.where}, with gear up",
                setting="gear up",
                knots=tuple((shifted(at), held) for at, held in turn.knots),
            )
            for turn in as_flown
        ),
    )
    assert [(turn.where, turn.setting, turn.knots[0][0].moment) for turn in found.zero_fuel] == [
        ("at zero fuel", "", 240_000),
        ("at zero fuel, with gear up", "gear up", 237_440),
        ("at zero fuel after event 1", "", 218_000),
        ("at zero fuel after event 1, with gear up", "gear up", 215_440),
    ]


def test_a_plain_load_has_stretches_alone_and_one_phase_at_zero_fuel():
    found = path(round_load(fuel={"taxi": q(30)}), round_basis())

    take_off, landing = knot(2530, 251_000, 0, "take-off"), knot(2410, 239_000, 0, "landing")
    assert found == Path(
        (
            burned("taxi", (knot(2560, 254_000, 0, "ramp"), take_off), 60, 0)._replace(dry=None),
            burned("flight", (take_off, landing), 55, 0)._replace(dry=None),
            burned("reserve", (landing, knot(2260, 224_000, 0, "minimum at landing")), 35, 0)._replace(
                dry=None
            ),
        ),
        (),
        F(6),
    )

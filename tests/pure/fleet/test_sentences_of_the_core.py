"""What small pure parts of the room say when they refuse, and their figures at the very bounds, in full."""

from datetime import UTC, date, datetime, timedelta
from decimal import Decimal
from fractions import Fraction
from uuid import UUID

import pytest

from fleet.conversion import UnitsDoNotMix, converted, length_under, volume_of_weight, weight_of_volume
from fleet.fuel_balance import FuelBalance
from fleet.jump import Jump
from fleet.lateral import Across
from fleet.positions import MovingPart, PartState, Setting, count_of_settings, settings
from fleet.quantities import Dimension, Quantity, Unit, number_or_fault, quantity_or_fault
from fleet.rational import rational
from fleet.rules import Interval
from fleet.sourced import Source
from fleet.stations import Conditional, Limit, maximum_under
from fleet.timeline import Placing, Span, place
from fleet.trim import OffTrimTable, Trim, TrimLine, TrimTable
from fleet.weight_changes import running
from fleet.worksheet import NotWeighed, SignedLine, Sums, WeighingPoint, weighed
from records.refusal import Fault

F = Fraction
PAGE = Source("FM", "A", "1")


@pytest.mark.parametrize(
    ("points", "corrections", "code", "point", "detail"),
    [
        ((), (), "no-points", None, "a weighing has at least one point; enter what the scales read"),
        (
            ((10, 0), (10, -1)),
            (),
            "tare-negative",
            1,
            "a tare is zero or more; enter what stood on the scale",
        ),
        (((10, 11),), (), "reading-below-tare", 0, "the scale read less than its tare; check both figures"),
        (
            ((10, 0),),
            (-10,),
            "nothing-left",
            None,
            "the corrections take off all that was weighed; check their signs",
        ),
    ],
)
def test_readings_that_make_no_empty_weight_are_refused_with_what_to_do(
    points, corrections, code, point, detail
):
    with pytest.raises(NotWeighed) as refused:
        weighed(
            [WeighingPoint("scale", F(reading), F(tare), F(1)) for reading, tare in points],
            [SignedLine("fuel", F(weight), F(1)) for weight in corrections],
        )
    assert (refused.value.code, refused.value.point, str(refused.value)) == (code, point, detail)


def test_a_scale_may_read_its_tare_alone_and_little_may_be_left():
    found = weighed(
        [WeighingPoint("nose", F(5), F(5), F(1)), WeighingPoint("main", F(3), F(0), F(100), F(2))],
        [SignedLine("fuel", F("-2.5"), F(100), F(4))],
    )
    assert found.nets == (Sums(F(0), F(0), F(0)), Sums(F(3), F(300), F(6)))
    assert found.empty == Sums(F("0.5"), F(50), F(-4))
    assert (found.empty.arm, found.empty.lateral_arm) == (100, -8)


def test_more_taken_off_than_there_is_names_the_line():
    empty = Sums(F(10), F(100), F(0))
    with pytest.raises(ValueError, match=r"^wing: more is taken off than the aircraft weighs$"):
        running(empty, [SignedLine("door", F(-9), F(1)), SignedLine("wing", F(-1), F(1))])
    assert running(empty, [SignedLine("wing", F("-9.5"), F(1))])[0].empty.weight == F("0.5")


@pytest.mark.parametrize(
    ("before", "after", "most", "needs"),
    [(100, 105, 5, False), (100, 95, 5, False), (100, "105.1", 5, True), (1, "1.5", None, True)],
)
def test_a_jump_beyond_the_most_needs_a_cause(before, after, most, needs):
    jump = Jump(F(before), F(after), None if most is None else F(most))
    assert jump.needs_cause is needs
    assert jump.difference == F(after) - F(before)


def shown(given, **more):
    return quantity_or_fault(given, "/w", Dimension.WEIGHT, **more)


KG_OR_LB = "use one of kg, lb"
PLAINLY = "write a plain decimal number: digits, one point, a minus; no exponent, blank or comma"


@pytest.mark.parametrize(
    ("given", "fault"),
    [
        (
            7,
            Fault("/w", "quantity-form", 'a quantity is an object {"value": ..., "unit": ...}; write it so'),
        ),
        (
            {"value": 1, "unit": "kg", "b": 1, "a": 1},
            Fault("/w/a", "unknown-field", "not a field of a quantity; remove it"),
        ),
        (
            {"unit": "kg"},
            Fault("/w/value", "missing", "the number is missing; give it, or omit the quantity"),
        ),
        (
            {"value": 1},
            Fault("/w/unit", "unit-missing", f"the unit is missing, and none is inferred; {KG_OR_LB}"),
        ),
        ({"value": 1, "unit": "st"}, Fault("/w/unit", "unit-unknown", f"not a known unit; {KG_OR_LB}")),
        ({"value": 1, "unit": 5}, Fault("/w/unit", "unit-unknown", f"not a known unit; {KG_OR_LB}")),
        (
            {"value": 1, "unit": "in"},
            Fault("/w/unit", "unit-dimension", f"in is no unit of weight; {KG_OR_LB}"),
        ),
        ({"value": "1,5", "unit": "kg"}, Fault("/w/value", "number-form", PLAINLY)),
    ],
)
def test_a_quantity_is_refused_with_what_to_do(given, fault):
    assert shown(given) == fault


def test_of_several_dimensions_every_unit_is_offered_and_both_are_named():
    fault = quantity_or_fault({"value": 1, "unit": "in"}, "", (Dimension.WEIGHT, Dimension.VOLUME))
    assert fault == Fault(
        "/unit",
        "unit-dimension",
        "in is no unit of weight or volume; use one of kg, lb, l, US gal, imp gal",
    )
    given = {"value": 1, "unit": "kg", "source": "note"}
    assert isinstance(shown(given, also=frozenset({"source"})), Quantity)
    assert shown(given, also=frozenset({"page"})).pointer == "/w/source"


@pytest.mark.parametrize(
    ("typed", "code", "detail"),
    [
        (True, "number-form", "not a number; write a JSON number or a decimal string"),
        (1.5, "number-form", "not a number; write a JSON number or a decimal string"),
        ("1e3", "number-form", PLAINLY),
        (10**15, "number-digits", "more than 15 digits; round it as the source does"),
        ("-1234567.123456789", "number-digits", "more than 15 digits; round it as the source does"),
    ],
)
def test_a_number_is_refused_with_what_to_do(typed, code, detail):
    assert number_or_fault(typed, "/n") == Fault("/n", code, detail)


@pytest.mark.parametrize("typed", ["-1234567.12345678", "123456789012345", 10**15 - 1, -(10**15) + 1])
def test_fifteen_digits_are_a_number_with_a_minus_and_a_point_besides(typed):
    assert F(number_or_fault(typed, "")) == F(typed)
    assert number_or_fault(Decimal(5), "") == 5


def test_units_that_do_not_mix_are_a_fault_of_the_program_told_by_name():
    for asked, words in (
        (lambda: converted(F(1), Unit.KG, Unit.IN), "kg cannot be expressed in in"),
        (lambda: length_under(Unit.KG), "kg is no unit of what a floor bears"),
        (
            lambda: weight_of_volume(Quantity(1, Unit.KG), Quantity(1, Unit.KG_PER_L), Unit.KG),
            "kg is no unit of volume",
        ),
        (
            lambda: weight_of_volume(Quantity(1, Unit.L), Quantity(1, Unit.KG), Unit.KG),
            "kg is no unit of density",
        ),
        (
            lambda: volume_of_weight(Quantity(1, Unit.L), Quantity(1, Unit.KG_PER_L), Unit.L),
            "l is no unit of weight",
        ),
        (
            lambda: volume_of_weight(Quantity(1, Unit.KG), Quantity(1, Unit.L), Unit.L),
            "l is no unit of density",
        ),
    ):
        with pytest.raises(UnitsDoNotMix) as refused:
            asked()
        assert str(refused.value) == words


def test_a_rational_with_nothing_below_is_refused():
    with pytest.raises(ZeroDivisionError, match=r"^a rational has no 0 below$"):
        rational(1, 0)
    assert (rational(6, -4), rational(0, -3), rational(-6, 4)) == (F(-3, 2), F(0), F(-3, 2))
    assert rational(6, -4).denominator == 2


def line(*points, weight=None):
    return TrimLine(weight, tuple((F(x), F(y)) for x, y in points), PAGE)


def test_off_a_trim_table_says_of_what_where_and_between_which_ends():
    table = TrimTable(
        None, (line((0, 1), (10, 2), (20, 4), weight=F(100)), line((0, 1), (20, 2), weight=F(200)))
    )
    for cg, weight, words in (
        (21, 100, "CG 21 lies off the table, 0 to 20"),
        (5, 99, "weight 99 lies off the table, 100 to 200"),
        ("-0.5", 150, "CG -0.5 lies off the table, 0 to 20"),
    ):
        with pytest.raises(OffTrimTable) as off:
            table.setting(F(cg), F(weight))
        assert str(off.value) == words
        assert off.value.at == F(cg if words.startswith("CG") else weight)


def test_a_trim_table_of_three_weights_is_straight_between_neighbours():
    lines = [line((0, level), (10, level), weight=F(at)) for at, level in ((100, 0), (200, 8), (400, 20))]
    table = TrimTable("up", tuple(lines))
    assert [table.setting(F(5), F(weight)) for weight in (100, 150, 200, 300, 400)] == [0, 4, 8, 14, 20]
    assert TrimTable(None, (lines[0],)).setting(F(5), F(100)) == 0
    with pytest.raises(OffTrimTable):
        TrimTable(None, (lines[0],)).setting(F(5), F(101))


def test_a_setting_of_nothing_and_one_below_zero_go_to_the_nearest_step():
    trim = Trim("arm", "units", F("0.5"), None, None, None, ())
    assert [trim.stepped(F(value)) for value in ("0", "-0.24", "-0.76", "1.2", "-1.25")] == [
        0,
        0,
        F("-1"),
        F(1),
        F("-1.5"),
    ]


def test_a_lateral_polygon_is_decided_in_arms_below_zero_too():
    """A trapezoid: at -10 from -4 to 4, at 10 from -2 to 2."""
    limit = Across([(F(-10), F(-4)), (F(-10), F(4)), (F(10), F(2)), (F(10), F(-2))])
    assert limit.levels == (-10, 10)
    # The left edge is -3 + x/10 and the right one 3 - x/10: inside where lateral - x/10 + 3 is 0 or more.
    assert limit.sides == ((((1, F(-1, 10), 3), (-1, F(-1, 10), 3)),),)
    assert limit.holds(F(-10), F(-4)) is True
    assert limit.holds(F(-10), F("-4.01")) is False
    assert limit.holds(F("-10.01"), F(0)) is False
    assert limit.holds(F(-12), F(0)) is limit.holds(F(-11), F(0)) is False
    assert limit.stretches(F(-10)) == ((F(-4), F(4)),)
    assert limit.stretches(F(-12)) == limit.stretches(F(-11)) == limit.stretches(F("10.01")) == ()
    assert limit.section(F(-12), F(0)) is None
    assert limit.section(F(-10), F(5)).margin == -1
    assert limit.section(F(10), F("-1.5")).low == -2


def test_a_lateral_polygon_between_fractions_of_a_unit():
    limit = Across([(F(1, 3), F(-1)), (F(1, 3), F(1)), (F(5, 2), F(0))])
    assert limit.levels == (F(1, 3), F(5, 2))
    assert limit.stretches(F(17, 12)) == ((F("-0.5"), F("0.5")),)  # half way


def test_the_most_the_sides_may_differ_is_one_figure_or_straight_between_two_points():
    def balance(maximum, *points):
        exact = tuple((F(aboard), F(most)) for aboard, most in points)
        return FuelBalance("B", "b", ("L",), ("R",), "weight", maximum, exact, ("ramp",), PAGE)

    assert balance(F(10)).allowed(F(5000)) == 10
    table = balance(None, (100, 200), (600, 90), (1000, 0))
    assert [table.allowed(F(aboard)) for aboard in (100, 350, 600, 800, 1000)] == [200, 145, 90, 45, 0]
    assert table.allowed(F(99)) is table.allowed(F(1001)) is None


def state(name, change, *holds):
    return PartState(name, name.lower(), F(change), holds, PAGE)


def test_parts_told_count_by_their_state_even_where_nothing_shifts():
    gear = MovingPart("GEAR", "gear", "DOWN", (state("DOWN", 0, "ground"), state("UP", 0, "flight")))
    flaps = MovingPart("FLAPS", "flaps", "IN", (state("IN", 0, "ground"), state("OUT", 5, "flight")))
    assert count_of_settings((gear, flaps)) == 4
    assert count_of_settings(()) == 1
    assert settings((gear, flaps), "flight") == (Setting("flaps out", F(5)),)
    assert settings((gear, flaps), "ground") == ()
    assert settings((gear, flaps), "flight", ("GEAR",)) == (
        Setting("flaps out", F(5), (("GEAR", "DOWN"),)),
        Setting("gear up", F(0), (("GEAR", "UP"),)),
        Setting("gear up, flaps out", F(5), (("GEAR", "UP"),)),
    )
    assert gear.state("UP").name == "up"
    with pytest.raises(KeyError, match="HALF"):
        gear.state("HALF")


def test_of_two_settings_that_shift_as_much_the_first_is_told():
    one = MovingPart("A", "one", "IN", (state("IN", 0, "flight"), state("OUT", 5, "flight")))
    other = MovingPart("B", "other", "IN", (state("IN", 0, "flight"), state("OUT", 5, "flight")))
    assert settings((one, other), "flight") == (
        Setting("other out", F(5)),
        Setting("one out, other out", F(10)),
    )


def test_a_source_in_words_with_and_without_a_revision():
    assert str(PAGE) == "FM rev A p. 1"
    assert str(Source("FM", "", "1")) == "FM p. 1"


def test_of_maxima_that_hold_the_one_for_more_conditions_counts_and_of_several_the_least():
    def under(*holding):
        most = [
            Conditional(frozenset("A"), Limit(F(10), PAGE)),
            Conditional(frozenset("B"), Limit(None, PAGE)),
            Conditional(frozenset("AC"), Limit(F(0), PAGE)),
        ]
        found, because = maximum_under(Limit(F(5), PAGE), tuple(most), frozenset(holding))
        return found.value, because

    assert under() == (5, frozenset())
    assert under("A") == (10, frozenset("A"))
    assert under("B") == (None, frozenset("B"))
    assert under("A", "B") == (10, frozenset("A"))
    assert under("A", "B", "C") == (0, frozenset("AC"))
    assert maximum_under(None, (), frozenset()) == (None, frozenset())
    half, nothing = (
        Conditional(frozenset(name), Limit(F(most), PAGE)) for name, most in (("D", "0.5"), ("E", 0))
    )
    for both in ((half, nothing), (nothing, half)):
        assert maximum_under(None, both, frozenset("DE")) == (nothing.maximum, frozenset("E"))


START = datetime(2026, 3, 1, tzinfo=UTC)


def span(number, start, end=None):
    days = [None if each is None else START + timedelta(days=each) for each in (start, end)]
    return Span(UUID(int=number), *days)


def test_placing_a_version_before_within_and_at_the_beginning_of_others():
    current = (span(1, 5, 9), span(2, 9))
    new = UUID(int=3)
    assert place((), new, START) == Placing(None, (span(3, 0),))
    assert place(current, new, START) == Placing(None, (span(3, 0, 5),))
    assert place(current, new, START + timedelta(days=5)) == Placing(current[0], (span(3, 5, 9),))
    assert place(current, new, START + timedelta(days=7)) == Placing(
        current[0], (span(1, 5, 7), span(3, 7, 9))
    )
    assert place(current, new, START + timedelta(days=9)) == Placing(current[1], (span(3, 9),))
    later = (span(2, 9), span(1, 5, 9))
    assert place(later, new, START) == Placing(None, (span(3, 0, 5),))


@pytest.mark.parametrize(
    ("count", "unit", "done", "good", "words"),
    [
        (1, "days", date(9999, 12, 30), date(9999, 12, 31), "1 day"),
        (2, "days", date(9999, 12, 30), date(9999, 12, 31), "2 days"),
        (1, "months", date(9999, 12, 1), date(9999, 12, 31), "1 month"),
        (11, "months", date(9999, 1, 5), date(9999, 12, 5), "11 months"),
        (12, "months", date(2026, 12, 5), date(2027, 12, 5), "12 months"),
        (1, "calendar months", date(2026, 11, 5), date(2026, 12, 31), "1 calendar month"),
        (2, "years", date(9997, 6, 30), date(9999, 6, 30), "2 years"),
    ],
)
def test_an_interval_to_the_day_and_to_the_end_of_the_calendar(count, unit, done, good, words):
    assert (Interval(count, unit).good_until(done), str(Interval(count, unit))) == (good, words)

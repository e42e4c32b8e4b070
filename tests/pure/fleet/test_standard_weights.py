"""Tables of standard weights: which row is taken, for whom a category is, when declared weights count."""

from datetime import date

from fleet.quantities import Quantity, Unit
from fleet.standard_weights import Category, CrewKind, DeclaredRule, MonthDay, Row, Season, StandardWeights


def test_ages_and_seats_in_words():
    assert [
        Category("c", "c", low, high).ages() for low, high in ((None, None), (None, 2), (12, None), (2, 12))
    ] == ["", "under 2 years", "12 years and over", "2 to under 12 years"]
    rows = ((1, 1), (2, 2), (1, 5), (20, None))
    assert [Row(1, low, high, None, (), (), {}, "s").seats() for low, high in rows] == [
        "1 seat",
        "2 seats",
        "1 to 5 seats",
        "20 seats or more",
    ]


def test_a_season_holds_its_first_and_last_day_over_the_end_of_the_year_too():
    summer = Season("s", "summer", MonthDay(5, 1), MonthDay(10, 31))
    winter = Season("w", "winter", MonthDay(11, 1), MonthDay(4, 30))
    one_day = Season("d", "day", MonthDay(5, 1), MonthDay(5, 1))
    days = [date(2026, 4, 30), date(2026, 5, 1), date(2026, 10, 31), date(2026, 11, 1)]
    assert [summer.holds(day) for day in days] == [False, True, True, False]
    assert [winter.holds(day) for day in days] == [True, False, False, True]
    assert [one_day.holds(day) for day in days] == [False, True, False, False]


def test_a_row_is_the_first_that_fits_in_every_way():
    summer = Season("s", "summer", MonthDay(5, 1), MonthDay(10, 31))

    def row(number, low, high, season=None, **only):
        return Row(number, low, high, season, only.get("operations", ()), only.get("routes", ()), {}, "s")

    rows = (
        row(1, 5, 9, "s"),
        row(2, 1, 4, operations=("ferry",)),
        row(3, 1, 4, routes=(("A", "B"),)),
        row(4, 1, None),
    )
    kind = CrewKind("flight", "flight crew", ("pilot",), Quantity(1, Unit.KG), "s")
    table = StandardWeights("T", "s", (Category("adult", "adult"),), (summer,), rows, None, (kind,))

    def number(seats, month=6, operation="charter", origin="A", destination="C"):
        found = table.row_for(
            seats=seats,
            day=date(2026, month, 1),
            operation=operation,
            origin=origin,
            destination=destination,
        )
        return None if found is None else found.number

    assert [number(seats) for seats in (0, 1, 4, 5, 9, 10)] == [None, 4, 4, 1, 1, 4]
    assert number(5, month=12) == 4
    assert number(4, operation="ferry") == 2
    assert number(4, destination="B") == 3
    assert number(4, origin="B", destination="A") == 4
    assert table.season_on(date(2026, 12, 1)) is None
    assert table.season_on(date(2026, 6, 1)) is summer
    assert table.category("adult").name == "adult"
    assert table.category("dog") is None
    assert table.crew_kind("flight", None) is kind
    assert table.crew_kind("cabin", "pilot") is None
    assert table.crew_kind(None, "pilot") is kind
    assert table.crew_kind(None, "purser") is None


def test_declared_weights_are_allowed_below_so_many_seats():
    assert [DeclaredRule(True, 10, (), "s").allows(seats) for seats in (9, 10, 11)] == [True, False, False]
    assert DeclaredRule(True, None, (), "s").allows(400) is True
    assert DeclaredRule(False, None, (), "s").allows(1) is False
    assert DeclaredRule(False, 10, (), "s").allows(1) is False

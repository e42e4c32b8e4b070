"""Where polynomials with rational coefficients are nothing: made from their roots, so these are known."""

from fractions import Fraction

from hypothesis import given
from hypothesis import strategies as st

from loads.balance.far import far_from_nothing
from loads.balance.polynomial import BITS, Root, add, multiply, roots_between, scale, through, value

F = Fraction
LOW, HIGH = F(-3), F(7)
NUMBERS = st.integers(-40, 80).map(lambda number: F(number, 8))


def made_of(roots: list[Fraction], factor: Fraction) -> tuple[Fraction, ...]:
    found: tuple[Fraction, ...] = (factor,)
    for root in roots:
        found = multiply(found, (-root, F(1)))
    return found


@given(st.lists(NUMBERS, max_size=4), NUMBERS.filter(bool))
def test_every_root_between_the_ends_is_told_and_no_other(roots: list[Fraction], factor: Fraction) -> None:
    told = roots_between(made_of(roots, factor), LOW, HIGH)
    inside = {root for root in roots if LOW <= root <= HIGH}
    for root in inside:
        assert any(each.low <= root <= each.high for each in told)
    for each in told:
        assert each.high - each.low <= F(1, 1 << BITS)
        assert any(each.low <= root <= each.high for root in roots)


@given(NUMBERS, NUMBERS, st.integers(1, 90).map(F))
def test_roots_that_are_no_rationals_lie_between_what_is_told(
    a: Fraction, b: Fraction, under: Fraction
) -> None:
    square = (a * a - under, 2 * a, F(1))  # (x + a)**2 = under
    for part in (square, multiply(square, (-b, F(1)))):
        for each in roots_between(part, F(-100), F(100)):
            assert each.high - each.low <= F(1, 1 << BITS)
            ends = value(square, each.low) * value(square, each.high)
            assert ends <= 0 or each.low <= b <= each.high
    assert len(roots_between(square, F(-100), F(100))) == 2


def test_a_rational_root_of_a_square_or_a_line_is_told_exactly() -> None:
    assert roots_between((F(-6), F(1), F(1)), F(-10), F(10)) == [Root(F(-3), F(-3)), Root(F(2), F(2))]
    assert roots_between((F(-7), F(4)), F(0), F(2)) == [Root(F(7, 4), F(7, 4))]
    assert roots_between((F(-7), F(4)), F(2), F(3)) == []
    assert roots_between((F(5),), F(0), F(1)) == roots_between((F(0), F(0)), F(0), F(1)) == []
    assert roots_between((F(0), F(0), F(1)), F(0), F(1))[0] == Root(F(0), F(0))  # at an end, and only touched


@given(st.lists(NUMBERS, min_size=1, max_size=4), st.lists(NUMBERS, min_size=1, max_size=4), NUMBERS)
def test_sums_and_products_are_those_of_the_values(
    one: list[Fraction], other: list[Fraction], at: Fraction
) -> None:
    assert value(add(one, other), at) == value(one, at) + value(other, at)
    assert value(multiply(one, other), at) == value(one, at) * value(other, at)
    assert value(scale(one, F(3, 7)), at) == value(one, at) * F(3, 7)


@given(st.lists(NUMBERS, min_size=3, max_size=3), NUMBERS)
def test_the_polynomial_through_points_passes_them(part: list[Fraction], at: Fraction) -> None:
    points = [(x, value(part, x)) for x in (F(-1), F(0), F(5, 3))]
    assert value(through(points), at) == value(part, at)


@given(st.lists(st.lists(NUMBERS, min_size=1, max_size=3), min_size=1, max_size=3), NUMBERS, NUMBERS)
def test_what_is_told_to_be_far_from_nothing_is_so_all_over_the_rectangle(
    rows: list[list[Fraction]], x: Fraction, t: Fraction
) -> None:
    floats = [[float(each) for each in row] for row in rows]
    ends, reach = (F(-5), F(10)), (F(-5), F(10))
    if far_from_nothing(floats, ends, reach):
        signs = set()
        for a, b in ((x, t), (t, x), (ends[0], reach[1]), (ends[1], reach[0])):
            at = sum((value(row, a) * b**power for power, row in enumerate(rows)), F(0))
            assert at
            signs.add(at > 0)
        assert len(signs) == 1


def test_a_margin_that_stays_above_nothing_is_told_to_be_far_from_it() -> None:
    assert far_from_nothing([[9.0, 1.0], [1.0], [0.5]], (F(0), F(4)), (F(0), F(3)))
    assert far_from_nothing([[-9.0, -1.0, -2.0]], (F(0), F(4)), (F(0), F(3)))
    assert not far_from_nothing([[-9.0, 3.0]], (F(0), F(4)), (F(0), F(3)))
    assert not far_from_nothing([[0.0], [1.0]], (F(0), F(4)), (F(0), F(3)))

"""Polynomials by hand, and where they are nothing: at an end, twice at one place, nowhere, irrationally."""

from fractions import Fraction

import pytest

from loads.balance import polynomial
from loads.balance.polynomial import Root, add, multiply, roots_between, scale, through, value
from tests.pure.loads.test_far import of_parts

F = Fraction
FINE = F(1, 2**80)


def poly(*parts):
    return tuple(map(F, parts))


def of_roots(*roots):
    found = poly(1)
    for each in roots:
        found = multiply(found, (-F(each), F(1)))
    return found


def test_polynomials_are_added_scaled_multiplied_and_told_at_a_place():
    one, other = poly(1, 2, 3), poly(-1, 4)

    assert add(one, other, poly(0, 0, 0, 5)) == poly(0, 6, 3, 5)
    assert add(one) == one
    assert scale(one, F(-1, 2)) == poly(F(-1, 2), -1, F(-3, 2))
    assert scale(one, 3) == poly(3, 6, 9)
    assert multiply(one, other) == poly(-1, 2, 5, 12)
    assert multiply(poly(0, 2), other) == poly(0, -2, 8)
    assert value(one, F(-2)) == 9
    assert value((), F(7)) == 0


@pytest.mark.parametrize(
    ("points", "made"),
    [
        ([(3, 7)], poly(7)),
        ([(1, 2), (3, 8)], poly(-1, 3)),
        ([(0, 1), (1, 6), (2, 17)], poly(1, 2, 3)),
        ([(-1, 1), (0, 0), (1, 1), (2, 10)], poly(0, -1, 1, 1)),  # x**3 + x**2 - x
    ],
)
def test_through_so_many_points_goes_one_polynomial(points, made):
    assert through([(F(x), F(y)) for x, y in points]) == made


def test_a_root_at_nothing_comes_out_of_points_too():
    # The points of x * (x - 1): the constant is nothing, and all three are met.
    made = through([(F(0), F(0)), (F(1), F(0)), (F(2), F(2))])

    assert made == poly(0, -1, 1)


@pytest.mark.parametrize(
    ("part", "found"),
    [
        ((), []),
        ((0,), []),
        ((0, 0, 0), []),  # nothing all over
        ((5,), []),
        ((-3, 2), [F(3, 2)]),
        ((-3, 2, 0, 0), [F(3, 2)]),
        ((0, 1), [0]),  # at the one end
        ((-10, 1), [10]),  # at the other
        ((1, 1), []),
        ((-101, 10), []),
        ((6, -5, 1), [2, 3]),
        ((-6, 5, -1), [2, 3]),
        ((-33, 8, 1), [3]),  # 3 and -11
        ((0, -10, 1), [0, 10]),
        ((9, -6, 1), [3, 3]),  # it touches nothing
        ((10, -6, 1), []),
        ((22, -13, 1), [2]),  # 2 and 11
        ((F(-9, 4), 0, 1), [F(3, 2)]),
    ],
)
def test_straight_and_square_ones_with_rational_roots_are_told_exactly(part, found):
    assert roots_between(poly(*part), F(0), F(10)) == [Root(F(each), F(each)) for each in found]


def told(part, low=0, high=10):
    """Each root within its bounds, the bounds close."""
    found = roots_between(part, F(low), F(high))
    assert all(0 <= root.high - root.low <= FINE for root in found)
    assert found == sorted(found)
    return found


def test_an_irrational_root_of_a_square_lies_between_two_close_rationals():
    # x**2 - 3: sqrt 3; and 2 - 4 x + x**2: 2 - sqrt 2 and 2 + sqrt 2.
    (root,) = told(poly(-3, 0, 1))
    assert root.low**2 < 3 < root.high**2
    one, other = told(poly(2, -4, 1))
    assert (2 - one.high) ** 2 < 2 < (2 - one.low) ** 2
    assert (other.low - 2) ** 2 < 2 < (other.high - 2) ** 2


@pytest.mark.parametrize(
    "roots",
    [(1, 2, 3), (1, 1, 4), (0, 5, 10), (F(1, 3), F(10, 3), 7), (2, 2, 2), (1, 2, 3, 4), (3, 3, 6, 6)],
)
@pytest.mark.parametrize("sign", [1, -1])
def test_every_root_of_a_higher_degree_is_found(roots, sign):
    found = told(scale(of_roots(*roots), sign))

    for each in roots:
        assert any(root.low <= each <= root.high for root in found)
    for root in found:  # and nothing that is none
        assert any(abs(root.low - each) < F(1, 2**30) for each in roots)


def test_roots_beyond_the_ends_are_left_out():
    part = of_roots(-2, 4, 13)

    (found,) = told(part)

    assert found.low <= 4 <= found.high
    assert told(part, 5, 12) == []
    assert [root.low <= 13 <= root.high for root in told(part, 5, 13)] == [True]


def test_the_root_of_a_cube_that_is_irrational():
    (root,) = told(poly(-2, 0, 0, 1))

    assert root.low**3 < 2 < root.high**3


def test_a_touch_at_an_irrational_place_counts_and_one_that_is_missed_by_far_does_not():
    touch = multiply(poly(-2, 0, 1), poly(-2, 0, 1))  # (x**2 - 2)**2

    assert any(root.low**2 <= 2 <= root.high**2 for root in told(touch))
    assert told(add(touch, poly(F(1, 1000)))) == []
    assert told(add(multiply(touch, poly(1, 1)), poly(1))) == []


def test_a_touch_missed_by_a_hair_may_count_and_a_crossing_by_a_hair_must():
    touch = of_roots(3, 3, 20)
    crossed = told(add(touch, poly(F(1, 10**6))))

    assert len([root for root in crossed if abs(root.low - 3) < F(1, 100)]) == 2


def test_where_floats_are_not_sure_the_root_is_found_all_the_same():
    # 10**-12 of what the parts are: (x - 5)**2 * (x + 1) less next to nothing.
    hair = F(1, 10**14)
    part = add(multiply(of_roots(5, 5), poly(1, 1)), poly(-hair))

    found = told(part)

    assert len(found) == 2
    assert all(abs(root.low - 5) < F(1, 10**6) for root in found)


@pytest.mark.parametrize("by", [F(1, 10**6), F(-1, 10**6), F(10**6), F(-(10**6))])
@pytest.mark.parametrize("roots", [(1, 3, 5), (F(1, 3), 4, 12), (2, F(22, 7), 5, 9)])
def test_a_polynomial_times_a_number_has_the_same_roots(roots, by):
    part = add(of_roots(*roots), poly(F(1, 1000)))

    assert told(scale(part, by)) == told(part) != []


@pytest.mark.parametrize("sign", [1, -1])
@pytest.mark.parametrize("at", [5, F(5, 2), F(15, 4), F(5, 8)])
def test_a_root_met_when_halving_is_told_exactly(at, sign):
    # The cube of x less that of the root: from 0 to 10 it only rises, or falls.
    assert told(scale(poly(-(F(at) ** 3), 0, 0, 1), sign)) == [Root(F(at), F(at))]


@pytest.mark.parametrize("sign", [1, -1])
def test_halving_goes_on_until_the_ends_are_close_and_no_further(sign):
    (root,) = told(scale(poly(-2, 0, 0, 1), sign))

    assert FINE / 2 < root.high - root.low <= FINE


@pytest.mark.parametrize("sign", [1, -1])
@pytest.mark.parametrize(("low", "high"), [(5, 10), (0, 5), (5, 5)])
def test_a_root_at_an_end_is_told_once(low, high, sign):
    assert told(scale(poly(-125, 0, 0, 1), sign), low, high) == [Root(F(5), F(5))]


@pytest.mark.parametrize("sign", [1, -1])
def test_a_touch_missed_by_less_than_a_bound_counts(sign):
    # (x**2 - 2)**2 and a hair: the largest of its coefficients is 4, and 4 / 2**40 the bound.
    touch = multiply(poly(-2, 0, 1), poly(-2, 0, 1))

    def missed_by(hair):
        return told(scale(add(touch, poly(F(4, 2**40) * F(hair))), sign))

    (root,) = missed_by("0.99")
    assert root.low**2 < 2 < root.high**2
    assert missed_by("1.01") == []


class _LookedCloser(Exception):
    """Somebody looked for roots where floats could have told that there is none."""


@pytest.fixture
def closely(monkeypatch):
    """So that a look that needs more than floats is seen."""

    def looked(*_):
        raise _LookedCloser

    monkeypatch.setattr(polynomial, "_bisected", looked)
    monkeypatch.setattr(polynomial, "_of_square", looked)


@pytest.mark.parametrize("sign", [1, -1])
@pytest.mark.parametrize("ends", [(F(2), F(4)), (F(-3), F(-1)), (F(0), F(1)), (F(-5, 2), F(5, 2))])
@pytest.mark.parametrize("parts", [(5, 1, 4), (2, 7, 1, 4), (1, 6, 3, 1, 2), (3, 1, 4, 1, 5, 2)])
def test_where_all_parts_are_of_one_sign_floats_tell_that_there_is_no_root(closely, parts, ends, sign):
    assert roots_between(scale(of_parts(parts, ends), sign), *ends) == []

    for at in range(len(parts)):
        for other in -1, 0, F(1, 10**13):
            near = of_parts([other if at == place else each for place, each in enumerate(parts)], ends)
            with pytest.raises(_LookedCloser):
                roots_between(scale(near, sign), *ends)


def test_what_is_small_against_the_parts_of_the_sum_needs_a_closer_look(closely):
    # x**2 - 2000 x + 10**6 and a little, about 1000: the parts of the sum are a million, so 0.001 is little.
    ends = F(1000), F(1001)
    square = poly(10**6, -2000, 1)

    assert roots_between(add(square, poly(F(1, 100))), *ends) == []
    with pytest.raises(_LookedCloser):
        roots_between(add(square, poly(F(1, 2000))), *ends)
    backwards = poly(10**6, 2000, 1)
    assert roots_between(add(backwards, poly(F(1, 100))), F(-1001), F(-1000)) == []
    with pytest.raises(_LookedCloser):
        roots_between(add(backwards, poly(F(1, 2000))), F(-1001), F(-1000))

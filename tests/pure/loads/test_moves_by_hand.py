"""The one move that is named to bring a centre of gravity back, by hand, on the invented aircraft of
`round_figures`: 2,200 lb with its pilot, 218,000 lb in, fuel at 100 in: 360, 360, 240, 60 lb and none.
"""

from dataclasses import replace

import pytest

from fleet.basis import Zone
from loads.balance.assess import assess
from loads.balance.declared import read_load
from tests.pure.loads.hand import by_cg
from tests.pure.loads.making import F, limit, place, seat
from tests.pure.loads.round_figures import EMPTY, box, flown, q, round_basis, round_load

ALONE = "no single move does it alone."


def with_places(*arms, aft="100.5", forward=80, **changes):
    """The aircraft with a door at 140 in and other places; nothing farther aft than `aft`."""
    places = (place("DOOR", 140, None), *(place(f"P{at}", arm, None) for at, arm in enumerate(arms)))
    basis = round_basis(box(forward, aft), places=places, **changes)
    one = replace(basis.configurations[0], places=tuple(one.id for one in places))
    return replace(basis, configurations=(one,))


def advice(document, basis):
    return flown(document, basis).check("cg.take-off").what_next


def crate(weight=100, where="DOOR"):
    """An item of cargo, 100 lb at 140 in: without fuel 2,300 lb at 232,000 lb in, 850 too far aft."""
    item = {"kind": "cargo", "what": "crate", "place": where, "weight": q(weight), "how": "weighed"}
    return round_load() | {"items": [item]}


def test_what_is_moved_is_the_least_weight_in_tenths():
    """850 lb in at 10 in are 85 lb; at 60 in 14.1667 lb, rounded up."""
    told = "Move at least 85 lb of cargo from door to p0: a moment of at least 850 lb in, forward."
    assert advice(crate(), with_places(130)) == told

    told = "Move at least 14.2 lb of cargo from door to p1: a moment of at least 850 lb in, forward."
    assert advice(crate(), with_places(130, 80)) == told
    assert advice(crate(), with_places(80, 130)) == told.replace("p1", "p0")


def test_an_item_may_be_moved_whole_and_no_more_than_that():
    """850 lb in at 8.5 in are just 100 lb; at 8.4 in they would be more."""
    told = "Move at least 100 lb of cargo from door to p0: a moment of at least 850 lb in, forward."
    assert advice(crate(), with_places("131.5")) == told

    assert (
        advice(crate(), with_places("131.6")) == f"Change the moment by at least 850 lb in, forward; {ALONE}"
    )


def test_a_weight_of_less_than_a_tenth_is_moved_as_it_is():
    """100.04 lb at 140 in are 0.04 * 39.5 = 1.58 lb in more: 851.58 at 8.5125 in are 100.0387 of them."""
    told = "Move at least 100.1 lb of cargo from door to p0: a moment of at least 851.6 lb in, forward."
    assert advice(crate("100.04"), with_places("131.4875")) == told


def test_of_equal_moves_the_first_is_named():
    told = "Move at least 85 lb of cargo from door to p0: a moment of at least 850 lb in, forward."
    assert advice(crate(), with_places(130, 130)) == told


def test_a_place_at_the_same_arm_or_farther_aft_does_not_help():
    assert advice(crate(), with_places(140)) == f"Change the moment by at least 850 lb in, forward; {ALONE}"
    assert advice(crate(), with_places(150)) == f"Change the moment by at least 850 lb in, forward; {ALONE}"


def test_a_load_too_far_forward_is_moved_aft():
    """100 lb at 80 in: 226,000 lb in without fuel, at 2,300 lb; at 98.8 in, as far forward as may be, 227,240
    and 1,240 more. At take-off only 808 are wanting.
    """
    basis = with_places(80, 100, forward="98.8", aft=120)

    told = "Move at least 20.7 lb of cargo from p0 to door: a moment of at least 1240 lb in, aft."
    assert advice(crate(where="P0"), basis) == told
    only = with_places(80, 80, 70, forward="98.8", aft=120)
    only = replace(only, places=only.places[1:], configurations=(_without_door(only),))
    assert advice(crate(where="P0"), only) == f"Change the moment by at least 1240 lb in, aft; {ALONE}"


def _without_door(basis):
    one = basis.configurations[0]
    return replace(one, places=one.places[1:])


def reseated(arm, *, forward=80, aft="99.5"):
    """One passenger of 200 lb at 110 in, 276,000 lb in at 2,760 lb, 100 in at every fuel; one other seat."""
    basis = round_basis(box(forward, aft))
    seats = (basis.seats[0], seat("S1", 110), seat("S2", arm))
    one = replace(basis.configurations[0], seats=("P", "S1", "S2"))
    return advice(round_load(1), replace(basis, seats=seats, configurations=(one,)))


def test_a_person_is_reseated_where_that_is_just_enough():
    """1,380 lb in are too much with all fuel: 6.9 in at 200 lb."""
    told = "Reseat the passenger from s1 to s2: a moment of at least 1380 lb in, forward."
    assert reseated("103.1") == told
    assert reseated(100) == told
    assert reseated("103.2") == f"Change the moment by at least 1380 lb in, forward; {ALONE}"


@pytest.mark.parametrize(("arm", "named"), [(98, True), ("97.9", False)])
def test_a_person_is_not_reseated_so_far_that_the_other_side_is_broken(arm, named):
    """Without fuel 2,400 lb must stay at 237,600 lb in, 99 in, at least: 2,400 less."""
    assert reseated(arm, forward=99).startswith("Reseat the passenger") is named


@pytest.mark.parametrize(
    ("most", "named"),
    [(85, True), ("84.9", False), (None, True), ("absent", False)],
)
def test_a_place_takes_no_more_than_its_limit(most, named):
    basis = with_places(130)
    places = (basis.places[0], place("P0", 130, most))

    found = advice(crate(), replace(basis, places=places))
    assert found.startswith("Move at least 85 lb") is named


@pytest.mark.parametrize(("most", "named"), [("36.1", True), (36, False)])
def test_what_a_place_holds_already_counts(most, named):
    """15 lb in P0 at 100 in are 7.5 lb in less: 842.5 at 40 in are 21.1 lb more there."""
    basis = with_places(100)
    basis = replace(basis, places=(basis.places[0], place("P0", 100, most)))
    document = crate()
    bag = {"kind": "baggage", "what": "bag", "place": "P0", "weight": q(15), "how": "weighed"}
    document["items"].append(bag)

    found = advice(document, basis)
    assert found.startswith("Move at least 21.1 lb of cargo from door to p0") is named


@pytest.mark.parametrize(
    ("members", "most", "named"),
    [
        (("P0", "P1"), 105, True),
        (("P0", "P1"), "104.9", False),
        (("P0", "P2"), 85, True),
        (("P0", "P2"), "84.9", False),
        (("P1",), 1, True),  # where the item goes is not in it
        (("DOOR", "P0"), 100, True),  # nor is anything added to it by a move within it
        (("P0", "P1"), None, True),
        (("P0", "P1"), "not entered", False),
    ],
)
def test_a_zone_takes_no_more_than_its_limit(members, most, named):
    """20 lb lie in P1, which takes no more, at the aft limit: 85 lb are to be moved, all the same."""
    maximum = None if most == "not entered" else limit(most)
    zone = Zone("FRONT", "front", members, maximum)
    basis = with_places(130, "100.5", 139, zones=(Zone("OTHER", "other", ("P2",), limit(900)), zone))
    full = tuple(place("P1", "100.5", 20) if one.id == "P1" else one for one in basis.places)
    basis = replace(basis, places=full)
    document = crate()
    item = {"kind": "baggage", "what": "bag", "place": "P1", "weight": q(20), "how": "weighed"}
    document["items"].append(item)

    assert advice(document, basis).startswith("Move at least 85 lb of cargo from door to p0") is named


@pytest.mark.parametrize(
    ("start", "end", "named"),
    [(0, 20, False), (0, 13, True), (0, -20, True), (20, 20, True), (12, 14, False)],
)
@pytest.mark.parametrize("limit_of", ["envelope", "by CG"])
def test_a_move_must_leave_the_load_within_its_lateral_limits(start, end, named, limit_of):
    """From 1 in left to 1/2 in right at 2,300 lb without fuel: 85 lb at 20 in are 1,700 lb in, 0.74 in; at
    13 in 0.48. From 20 in to 20 in nothing goes across; there up to 1 in right, for the 100 lb at 0.87 in.
    What lies at 0.52 in already goes no farther.
    """
    basis = with_places(130)
    across = ("-1", F(1, 2)) if start != 20 else (-1, 1)
    places = place("DOOR", 140, None, start), place("P0", 130, None, end)
    if limit_of == "envelope":
        more = {"envelopes": (*basis.envelopes, box(*across, axis="lateral"))}
    else:
        corners = (80, across[0]), (80, across[1]), (120, across[1]), (120, across[0])
        more = {"lateral_by_cg": (by_cg(*corners),)}

    found = advice(crate(), replace(basis, places=places, **more))
    assert found.startswith("Move at least 85 lb of cargo from door to p0") is named


def test_what_hangs_outside_is_not_moved_and_nothing_is_moved_there_or_where_there_is_no_place():
    basis = with_places(130)
    door, hold = basis.places
    alone = f"Change the moment by at least 850 lb in, forward; {ALONE}"

    assert advice(crate(), replace(basis, places=(replace(door, external=True), hold))) == alone
    assert advice(crate(), replace(basis, places=(door, replace(hold, external=True)))) == alone
    without = replace(basis.configurations[0], places=("DOOR",))
    assert advice(crate(), replace(basis, configurations=(without,))) == alone


@pytest.mark.parametrize(("serves", "named"), [("passenger", True), ("either", True), ("crew", False)])
def test_a_passenger_is_reseated_where_the_seat_serves_one(serves, named):
    basis = round_basis(box(80, "99.5"))
    seats = (basis.seats[0], seat("S1", 110), seat("S2", 100, serves=serves))
    one = replace(basis.configurations[0], seats=("P", "S1", "S2"))

    found = advice(round_load(1), replace(basis, seats=seats, configurations=(one,)))
    assert found.startswith("Reseat the passenger from s1 to s2") is named


def test_a_passenger_is_not_reseated_where_somebody_sits():
    basis = round_basis(box(80, "99.5"))
    seats = seat("P", 90), seat("S1", 110)
    one = replace(basis.configurations[0], seats=("P", "S1"))

    assert advice(round_load(1), replace(basis, seats=seats, configurations=(one,))).endswith(ALONE)


def test_a_restraint_goes_with_its_person():
    """220 lb at 110 in: 278,200 lb in at 2,780 lb, 1,590 too many; 7.3 in at 220 lb are 1,606."""
    basis = round_basis(box(80, "99.5"))
    seats = (basis.seats[0], seat("S1", 110), seat("S2", "102.7"))
    one = replace(basis.configurations[0], seats=("P", "S1", "S2"))
    basis = replace(basis, seats=seats, configurations=(one,))
    declared = read_load(round_load(1), basis)
    people = (replace(declared.passengers[0], restraint=F(20)),)

    found = assess(replace(declared, passengers=people), basis, EMPTY).check("cg.take-off").what_next
    assert found == "Reseat the passenger from s1 to s2: a moment of at least 1590 lb in, forward."


def test_the_least_of_moments_and_of_ways_is_enough():
    """At 226,000 lb in and 2,300 lb, half a lb in too far forward; from 80 to 80.5 in that is one pound."""
    basis = with_places(80, "80.5", forward=F(452001, 4600), aft=120)
    last = replace(basis, places=basis.places[1:], configurations=(_without_door(basis),))

    result = flown(crate(where="P0"), last)
    assert result.check("cg.zero-fuel").what_next == (
        "Move at least 1 lb of cargo from p0 to p1: a moment of at least 0.5 lb in, aft."
    )

"""Of several states of a load the worst check counts: over the flight, and at both ends of rails."""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.stations import Rail
from loads.balance.declared import read_load
from loads.balance.flown import along_rails, at_ends_of_rails, states_aboard, worst_of_each
from loads.balance.over_flight import after, as_seat, coming_items, coming_people, over_flight
from loads.balance.rails import RailEnd, rail_ends, worse_of
from loads.balance.result import Check
from tests.pure.loads.making import SOURCE
from tests.pure.loads.round_figures import q, round_basis, round_load

F = Fraction


def check(outcome, room=None, code="weight.test", text="", **more):
    return Check(code, "a check", outcome, margin_text=text, room=None if room is None else F(room), **more)


# Rising: each is worse than all that follow.
WORST_FIRST = [
    check("fail"),
    check("fail", -7),
    check("fail", -2),
    check("unresolved", -1),
    check("unresolved", 4),
    check("unresolved"),
    check("pass", 0),
    check("pass", 3),
    check("pass"),
    check("advisory", 1),
    check("advisory"),
]


@pytest.mark.parametrize("place", range(len(WORST_FIRST) - 1))
def test_of_two_states_the_worse_check_counts_whichever_comes_first(place):
    worse, better = WORST_FIRST[place], WORST_FIRST[place + 1]

    for runs in ([("", [worse]), ("", [better])], [("", [better]), ("", [worse])]):
        assert worst_of_each(runs) == [worse]


def test_the_worst_check_says_when_and_of_equals_the_first_is_kept():
    at_start = [check("pass", 3, text="3 lb below"), check("pass", 1, "tank.a", "1 gal left")]
    later = [check("pass", 2, "tank.a"), check("pass", 3, text="later"), check("fail", -1, "new", "1 lb")]

    found = worst_of_each([("", at_start), ("after event 1", later), ("after event 2", at_start)])

    assert found == [*at_start, check("fail", -1, "new", "1 lb, after event 1")]
    assert worst_of_each([("after event 1", [check("pass", 5)])]) == [check("pass", 5, text="after event 1")]


FORE, AFT = RailEnd("forward", F(-100), F(0)), RailEnd("aft", F(300), F(1))
HALF = RailEnd("between forward and aft", F(100), F(1, 2))


def at_ends(fore, aft, told=None, between=(), *, apart=False):
    """The one check told of both ends, and of what is between."""
    inside = [(HALF, [each]) for each in between]
    (found,) = worse_of([told or fore], [(FORE, [fore]), (AFT, [aft])], inside, apart=apart)
    return found


@pytest.mark.parametrize(
    "code",
    ["cg.landing", "path.longitudinal", "path.zero-fuel", "lateral-by-cg.landing", "path.lateral-by-cg"],
)
def test_of_both_ends_of_the_rails_the_worse_counts_and_is_named(code):
    near, far = check("pass", 1, code, "1 in left"), check("pass", 4, code, "4 in left")
    broken = check("fail", -1, code, "1 in beyond")

    assert at_ends(near, far) == near._replace(margin_text="1 in left, seats on rails forward")
    assert at_ends(far, near) == near._replace(margin_text="1 in left, seats on rails aft")
    assert at_ends(near, near).margin_text == "1 in left, seats on rails forward"
    assert at_ends(near, broken) == broken._replace(margin_text="1 in beyond, seats on rails aft")
    assert at_ends(check("unresolved", None, code), near).outcome == "unresolved"
    assert at_ends(near, check("pass", None, code, "no figure")).margin_text.startswith("no figure, seats")


@pytest.mark.parametrize("told", [check("pass", 1, "weight.landing"), check("advisory", 1, "cg.landing")])
def test_what_no_seat_moves_is_told_as_it_was(told):
    other = check("fail", -5, told.code)

    assert at_ends(other, other, told) == told


@pytest.mark.parametrize("code", ["lateral-by-cg.landing", "path.lateral-by-cg"])
def test_a_limit_kept_at_both_ends_and_broken_between_is_broken(code):
    kept, broken = check("pass", 4, code, "kept"), check("fail", -1, code, "1 in beyond", what_next="Fix.")

    found = at_ends(kept, kept, between=[kept, broken])

    assert found == broken._replace(
        margin_text="1 in beyond, seats on rails between forward and aft",
        what_next="State where the seats on rails stand.",
    )
    assert at_ends(kept, kept, between=[kept, kept]).margin_text == "kept, seats on rails forward"
    assert at_ends(kept, broken, between=[broken]).what_next == "Fix."
    along = check("pass", 4, "cg.landing", "kept")
    assert at_ends(along, along, between=[check("fail", -1, "cg.landing")]).outcome == "pass"


def test_both_ends_in_different_parts_of_an_envelope_are_not_resolved():
    one = check("pass", 1, "cg.landing", "1 in left", low="100", limit="104")
    other = check("pass", 2, "cg.landing", "2 in left", low="108", limit="112")

    apart = at_ends(one, other)

    assert apart == one._replace(
        outcome="unresolved",
        what_next="State where the seats on rails stand.",
        margin_text="forward and aft lie in different parts of the envelope, seats on rails forward",
    )
    assert at_ends(one, one).outcome == "pass"
    assert at_ends(one, other._replace(low="100")).outcome == "unresolved"
    assert at_ends(one._replace(outcome="fail"), other).margin_text == "1 in left, seats on rails forward"
    across = [each._replace(code="lateral-by-cg.landing") for each in (one, other)]
    assert at_ends(*across).outcome == "pass"


def test_along_the_burn_it_is_told_whether_the_ends_lie_apart():
    one = check("pass", 1, "path.longitudinal", "1 in left", low="100")
    other = one._replace(low="108")

    assert at_ends(one, other).outcome == "pass"
    assert at_ends(one, one, apart=True).outcome == "unresolved"
    cg = one._replace(code="cg.landing")
    assert at_ends(cg, cg, apart=True).outcome == "pass"


def railed(jumpers=2, sequence=None):
    """A load whose first seat can stand from 104 in to 120 in; nobody stated where."""
    basis = round_basis()
    seats = tuple(
        replace(seat, rail=Rail(F(104), F(120), (), SOURCE)) if seat.id == "S1" else seat
        for seat in basis.seats
    )
    basis = replace(basis, seats=seats)
    more = {} if sequence is None else {"sequence": sequence}
    return read_load(round_load(jumpers, **more), basis)


def test_the_ends_of_the_rails_are_told_by_what_they_add_to_the_moment():
    # 200 lb at 110 in: 6 in forward, 10 in aft.
    assert rail_ends(railed()) == (RailEnd("forward", F(-1200), F(0)), RailEnd("aft", F(2000), F(1)))
    assert rail_ends(read_load(round_load(2), round_basis())) == ()


@pytest.mark.parametrize(("share", "arm"), [(F(0), 104), (F(1, 4), 108), (F(1), 120)])
def test_seats_on_rails_are_moved_by_a_share_of_the_way_and_no_others(share, arm):
    declared = railed()

    moved = along_rails(declared, share)

    assert [person.seat.arm for person in (*moved.crew, *moved.passengers)] == [90, arm, 110]
    assert replace(moved, passengers=declared.passengers) == declared


def test_both_ends_are_shares_of_nothing_and_of_all():
    declared = railed()

    assert at_ends_of_rails(declared, "forward") == along_rails(declared, F(0))
    assert at_ends_of_rails(declared, "aft") == along_rails(declared, F(1))


def test_a_load_is_told_in_each_state_it_has_over_the_flight_once():
    steps = [
        {"after_burning": q(10), "leave": [{"seat": "S1"}]},
        {"after_burning": q(20), "move": [{"seat": "S2", "to": "S3"}]},
    ]
    declared = read_load(round_load(2, sequence=steps), round_basis())

    told = states_aboard(declared)

    assert [when for when, _ in told] == ["", "after event 1", "after event 2"]
    assert [[one.seat.id for one in aboard.passengers] for _, aboard in told] == [
        ["S1", "S2"],
        ["S2"],
        ["S3"],
    ]
    assert told[0][1] is declared
    assert over_flight(declared) == tuple(aboard for _, aboard in told)
    plain = read_load(round_load(2), round_basis())
    assert states_aboard(plain) == [("", plain)]


def test_of_an_item_some_may_leave_all_may_leave_and_it_may_be_moved():
    bags = {"place": "HOLD", "what": "bags"}
    steps = [
        {"after_burning": q(10), "leave": [bags | {"weight": q(30)}]},
        {"after_burning": q(20), "move": [bags | {"to": "DOOR"}]},
        {"after_burning": q(30), "leave": [bags]},
    ]
    declared = read_load(
        round_load(items=[("bags", "HOLD", 100), ("net", "HOOK", 40)], sequence=steps), round_basis()
    )

    told = [[(one.what, one.place.id, one.weight) for one in each.items] for each in over_flight(declared)]

    net = ("net", "HOOK", 40)
    assert told == [
        [("bags", "HOLD", 100), net],
        [("bags", "HOLD", 70), net],
        [("bags", "DOOR", 70), net],
        [net],
    ]
    assert (coming_people(declared), coming_items(declared)) == ((), ())


def test_an_event_that_moves_nobody_leaves_the_load_the_very_same():
    steps = [{"after_burning": q(10), "leave": [{"seat": "S1"}]}]
    declared = read_load(round_load(1, sequence=steps), round_basis())
    nothing = replace(declared.sequence[0], leaving=())

    assert after(declared, nothing) is declared


def test_a_place_is_a_seat_for_somebody_who_stands_there():
    basis = round_basis()
    door, seat = basis.places[0], basis.seats[1]

    assert as_seat(seat) is seat
    stood = as_seat(replace(door, lateral_arm=F(7)))
    assert (stood.id, stood.name, stood.serves, stood.arm, stood.lateral_arm) == (
        "DOOR",
        "door",
        "either",
        140,
        7,
    )
    assert (stood.maximum, stood.source, stood.rail) == (door.maximum, SOURCE, None)

"""Seats on rails: an occupant's arm is a range. The setting is stated, or both ends of the rail are checked
at every phase and along the whole burn, and the worse verdict counts. Common practice of flight manuals that
print a range of arms for a seat; reckoned by hand on the invented twin.
"""

from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fleet.basis import Basis, Seat
from fleet.lateral import LateralByCg
from fleet.stations import Rail, Setting
from loads.balance.declared import read_load
from loads.balance.result import Result
from records.refusal import Invalid
from tests.pure.loads.making import SOURCE, F, envelope, load, result_of, twin

RAIL = Rail(F(118), F(130), (Setting("3", F(121)), Setting("7", F(127))), SOURCE)
ON_RAILS = ("ROW1-L", "ROW1-R")


def railed(basis: Basis | None = None, rail: Rail = RAIL, seats: tuple[str, ...] = ON_RAILS) -> Basis:
    """The twin with row 1 (arm 124) on rails from 118 to 130 in."""
    basis = basis or twin()

    def on_rail(seat: Seat) -> Seat:
        return replace(seat, rail=rail, row="1") if seat.id in seats else seat

    return replace(basis, seats=tuple(map(on_rail, basis.seats)))


def fixed(arm: Any, basis: Basis | None = None) -> Basis:
    """The twin with row 1 bolted at one arm: the plain way to ask the same."""
    basis = basis or twin()
    return replace(
        basis,
        seats=tuple(replace(seat, arm=F(arm)) if seat.id in ON_RAILS else seat for seat in basis.seats),
    )


def tight(front: Any, rear: Any) -> Basis:
    """The twin between two arms, whatever the weight, from 4000 to 7000 lb."""
    box = envelope((front, 4000), (front, 7000), (rear, 7000), (rear, 4000))
    return replace(twin(), envelopes=(box,))


def two(weight: int = 200) -> dict[str, Any]:
    """Two passengers of one weight in row 1, no items."""
    pounds = {"value": weight, "unit": "lb"}
    passengers = [
        {"name": f"P. {seat}", "seat": seat, "weight": pounds, "how": "weighed"} for seat in ON_RAILS
    ]
    return load(persons_on_board=3, passengers=passengers, items=[])


def stated(*lines: dict[str, str]) -> dict[str, Any]:
    return {**two(), "seat_settings": list(lines)}


def cg(result: Result) -> dict[str, tuple[Any, ...]]:
    """Outcome, actual and exact room of every check of the centre of gravity along the aircraft."""
    return {
        check.code: (check.outcome, check.actual, check.room)
        for check in result.checks
        if check.code.startswith("cg.") or check.code == "path.longitudinal"
    }


def test_a_stated_setting_is_the_same_as_a_seat_bolted_there() -> None:
    document = stated({"seat": "ROW1-L", "setting": "7"}, {"seat": "ROW1-R", "setting": "7"})

    assert cg(result_of(document, railed())) == cg(result_of(two(), fixed(127)))
    lines = {
        line.what: line.arm for line in result_of(document, railed()).lines if line.group == "passengers"
    }
    assert set(lines.values()) == {F(127)}


def test_a_row_is_set_by_one_line() -> None:
    row = stated({"row": "1", "setting": "3"})

    assert cg(result_of(row, railed())) == cg(result_of(two(), fixed(121)))
    assert "seats on rails: row1 l at 3, row1 r at 3" in result_of(row, railed()).as_document()["advisories"]


@pytest.mark.parametrize("envelope_of", [tight("116", "123"), tight("110", "118.5"), twin()])
def test_without_a_setting_every_check_is_the_worse_of_both_ends(envelope_of: Basis) -> None:
    open_ended = cg(result_of(two(), railed(envelope_of)))
    forward, aft = (cg(result_of(two(), fixed(arm, envelope_of))) for arm in (118, 130))

    for code, (outcome, _, room) in open_ended.items():
        rooms = [end[code][2] for end in (forward, aft)]
        assert room == min(rooms), code
        assert (outcome == "fail") == (room < 0), code


def test_the_answer_says_which_end_was_worse() -> None:
    # Two of 200 lb, 12 in of rail: 400 x 6 = 2400 lb in each way of the arm entered.
    aft = result_of(two(), railed(tight("110", "118.5"))).check("cg.take-off")
    forward = result_of(two(), railed(tight("116", "123"))).check("cg.take-off")

    assert aft.margin_text.endswith("seats on rails aft")
    assert aft.edge == "aft"
    assert forward.margin_text.endswith("seats on rails forward")
    assert forward.edge == "forward"
    told = result_of(two(), railed()).as_document()
    assert (
        "both ends of the rail checked, no setting stated: row1 l 118 to 130, row1 r 118 to 130 in"
        in told["advisories"]
    )


def test_a_load_that_is_within_where_the_seats_are_entered_and_outside_at_an_end_is_outside() -> None:
    # The aft edge half way between the arm entered and the aft end, at the aftmost phase: 1200 of 2400 lb in.
    aftmost = max(result_of(two()).states, key=lambda state: state.arm)
    basis = tight("110", (aftmost.moment + 1200) / aftmost.weight)

    assert result_of(two(), basis).verdict == "within"
    assert result_of(two(), railed(basis)).verdict == "outside"
    # Stated two thirds forward, it is within again.
    assert result_of(stated({"row": "1", "setting": "3"}), railed(basis)).verdict == "within"


def test_some_seats_stated_leave_only_the_others_open() -> None:
    half = result_of(stated({"seat": "ROW1-L", "setting": "3"}), railed())
    one_open = railed(
        replace(twin(), seats=tuple(replace(s, arm=F(121)) if s.id == "ROW1-L" else s for s in twin().seats)),
        seats=("ROW1-R",),
    )

    assert cg(half) == cg(result_of(two(), one_open))


def test_an_infant_and_a_restraint_move_with_the_seat() -> None:
    document = two()
    document["passengers"][0] |= {
        "lap_infant": {"name": "I. One", "weight": {"value": 20, "unit": "lb"}, "how": "weighed"},
        "restraint": {"value": 8, "unit": "lb"},
    }
    document["persons_on_board"] = 4
    basis = tight("110", "118.5")

    assert cg(result_of(document, railed(basis))) == cg(result_of(document, fixed(130, basis)))


def test_an_empty_seat_on_rails_changes_nothing() -> None:
    document = load(persons_on_board=1, passengers=[], items=[])

    assert result_of(document, railed()).as_document() == result_of(document).as_document()


def test_the_advice_for_a_reject_holds_at_both_ends() -> None:
    document = two()
    bags = {"kind": "baggage", "what": "bags", "how": "weighed", "weight": {"value": 200, "unit": "lb"}}
    document["items"] = [bags | {"place": "AFT-HOLD"}]
    landing = result_of(document).state("minimum at landing")
    # Forward is free; aft of where it is now by 1000 lb in: 1400 lb in too much at the aft end.
    basis = tight("100", (landing.moment + 1000) / landing.weight)

    check = result_of(document, railed(basis)).check("cg.minimum-at-landing")

    # 1400 lb in over the 45 in from the aft hold (190) to the wing locker (145): 31.2 lb.
    assert check.outcome == "fail"
    assert check.what_next.startswith("Move at least ")
    moved = check.what_next.split()[3]
    amended = [
        bags | {"place": "AFT-HOLD", "weight": {"value": str(200 - float(moved)), "unit": "lb"}},
        bags | {"place": _end_of(check.what_next), "weight": {"value": moved, "unit": "lb"}},
    ]
    again = result_of({**document, "items": amended}, railed(basis))
    assert all(outcome == "pass" for outcome, _, _ in cg(again).values())


def _end_of(advice: str) -> str:
    return advice.partition(" to ")[2].partition(":")[0].replace(" ", "-").upper()


def test_different_parts_of_a_notched_envelope_at_both_ends_are_not_taken_for_within() -> None:
    # At the landing weights two parts lie apart; the way from one to the other leads outside.
    state = result_of(two()).state("landing")
    middle, half = state.arm, F(150) / state.weight
    notched = envelope(
        (100, 3000), (100, 7000), (140, 7000), (140, 3000),
        (middle + half, 3000), (middle + half, 6990), (middle - half, 6990), (middle - half, 3000),
    )  # fmt: skip
    check = result_of(two(), railed(replace(twin(), envelopes=(notched,)))).check("cg.landing")

    assert check.outcome == "unresolved"
    assert check.what_next == "State where the seats on rails stand."


@pytest.mark.parametrize(("half", "outcome"), [("0.3", "unresolved"), (None, "pass")])
def test_a_notch_between_the_two_paths_is_noticed_though_no_phase_lies_beside_it(
    half: str | None, outcome: str
) -> None:
    # An envelope for take-off alone, split from below up to half way between take-off and landing, where the
    # envelope for landing is wide. 2400 lb in, so some 0.45 in of arm, lie between the notch and each path.
    take_off, landing = (result_of(two()).state(phase) for phase in ("take-off", "landing"))
    tip = (landing.arm, (take_off.weight + landing.weight) / 2)
    notch = [(landing.arm + F(half), 4000), tip, (landing.arm - F(half), 4000)] if half else []
    box = ((100, 4000), (100, 7000), (140, 7000), (140, 4000))
    split = envelope(*box, *notch, phases=("take-off",))
    wide = envelope((90, 3000), (90, 7500), (150, 7500), (150, 3000), phases=("ramp", "landing", "zero fuel"))
    result = result_of(two(), railed(replace(twin(), envelopes=(split, replace(wide, id="wide")))))

    assert result.check("path.longitudinal").outcome == outcome
    assert all(one.outcome == "pass" for one in result.checks if one.code.startswith("cg."))


@given(
    weights=st.tuples(st.integers(60, 280), st.integers(60, 280)),
    places=st.tuples(st.integers(118, 130), st.integers(118, 130)),
)
def test_no_position_between_the_ends_is_worse_than_the_worse_end(
    weights: tuple[int, int], places: tuple[int, int]
) -> None:
    document = two()
    for passenger, weight in zip(document["passengers"], weights, strict=True):
        passenger["weight"] = {"value": weight, "unit": "lb"}
    arms = dict(zip(ON_RAILS, places, strict=True))
    basis = tight("112", "121")
    bolted = replace(
        basis, seats=tuple(replace(s, arm=F(arms[s.id])) if s.id in arms else s for s in basis.seats)
    )
    worst, somewhere = cg(result_of(document, railed(basis))), cg(result_of(document, bolted))

    assert all(worst[code][2] <= somewhere[code][2] for code in worst)


SHORT = (("trip", 60), ("minimum_at_landing", 690))  # so that the CG stays where it is


def notched_by_cg(tip: Any, half: Any, middle: Any) -> Basis:
    """The twin with a lateral limit of 3 in either way, but for a notch down to a tip."""
    corners = [
        (100, -3),
        (140, -3),
        (140, 3),
        (middle + half, 3),
        (middle, tip),
        (middle - half, 3),
        (100, 3),
    ]
    exact = tuple((F(x), F(y)) for x, y in corners)
    limit = LateralByCg("NOTCH", ("ramp", "take-off", "landing"), "arm", exact, SOURCE)
    return replace(
        twin(),
        envelopes=(envelope((100, 4000), (100, 7000), (140, 7000), (140, 4000)),),
        lateral_by_cg=(limit,),
    )


@pytest.mark.parametrize(("tip", "outcome"), [("-1", "fail"), ("2.9", "pass")])
def test_a_lateral_limit_kept_at_both_ends_of_the_rail_and_broken_between_is_found(
    tip: str, outcome: str
) -> None:
    # 2 x 200 lb x 12 in of rail are 4800 lb in, so 0.8 in of arm at some 5900 lb. The notch is 0.02 in wide
    # either way and lies half way between both ends at take-off; the limit holds for take-off alone.
    document = two()
    document["fuel"] |= {name: {"value": weight, "unit": "lb"} for name, weight in SHORT}
    take_off = result_of(document).state("take-off")
    basis = notched_by_cg(tip, F("0.02"), take_off.arm)
    basis = replace(basis, lateral_by_cg=(replace(basis.lateral_by_cg[0], phases=("take-off",)),))
    for arm in (118, 130):
        at_end = result_of(document, fixed(arm, basis))
        assert all(one.outcome != "fail" for one in at_end.checks if "lateral-by-cg" in one.code), (
            "at the ends"
        )
    half_way = result_of(document, fixed(124, basis))
    assert half_way.check("lateral-by-cg.take-off").outcome == outcome

    found = result_of(document, railed(basis))

    assert found.check("lateral-by-cg.take-off").outcome == outcome
    assert found.check("path.lateral-by-cg").outcome == outcome
    if outcome == "fail":
        check = found.check("lateral-by-cg.take-off")
        assert check.margin_text.endswith("seats on rails between forward and aft")
        assert check.what_next == "State where the seats on rails stand."


@settings(max_examples=25, deadline=None)
@given(st.integers(-30, 30), st.integers(1, 12), st.integers(-29, 20), st.integers(0, 24))
def test_no_place_between_the_ends_is_outside_a_lateral_limit_unless_it_is_told(
    shift: int, half: int, tip: int, place: int
) -> None:
    arm = result_of(two()).state("take-off").arm + F(shift, 60)
    basis = notched_by_cg(F(tip, 10), F(half, 50), arm)
    open_, stated_ = result_of(two(), railed(basis)), result_of(two(), fixed(F(118) + F(place, 2), basis))

    broken = {one.code for one in stated_.checks if "lateral-by-cg" in one.code and one.outcome == "fail"}
    assert broken <= {one.code for one in open_.checks if one.outcome == "fail"}


@pytest.mark.parametrize(
    ("line", "pointer", "code"),
    [
        ({"seat": "ROW9-L", "setting": "3"}, "/seat_settings/0/seat", "unknown-seat"),
        ({"row": "9", "setting": "3"}, "/seat_settings/0/row", "unknown-row"),
        ({"seat": "ROW1-L", "setting": "12"}, "/seat_settings/0/setting", "unknown-setting"),
        ({"seat": "ROW2-L", "setting": "3"}, "/seat_settings/0/seat", "not-on-a-rail"),
        ({"seat": "ROW1-L", "row": "1", "setting": "3"}, "/seat_settings/0/seat", "seat-or-row"),
        ({"setting": "3"}, "/seat_settings/0/seat", "seat-or-row"),
        ({"seat": "ROW1-L"}, "/seat_settings/0/setting", "missing"),
        ({"seat": "ROW1-L", "setting": 3}, "/seat_settings/0/setting", "text-form"),
        ({"seat": "ROW1-L", "setting": "3", "arm": 121}, "/seat_settings/0/arm", "unknown-field"),
    ],
)
def test_a_setting_that_cannot_be_is_refused_with_its_field(line: Any, pointer: str, code: str) -> None:
    with pytest.raises(Invalid) as refused:
        read_load(stated(line), railed())

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_a_seat_set_twice_is_refused() -> None:
    with pytest.raises(Invalid) as refused:
        read_load(stated({"row": "1", "setting": "3"}, {"seat": "ROW1-R", "setting": "7"}), railed())

    assert [(fault.pointer, fault.code) for fault in refused.value.faults] == [
        ("/seat_settings/1/seat", "setting-twice")
    ]

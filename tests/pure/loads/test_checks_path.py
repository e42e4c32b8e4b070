"""The checks along the burn, told in full: where the worst point is, in words, in figures, with what the
tanks hold.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Chord
from loads.balance.checks_path import held_at, path_checks, path_document, where_words
from loads.balance.path import Gap, Knot, Path, Stretch, Turn
from loads.balance.path_worst import burn_of
from loads.balance.prepared import Prepared, prepared
from loads.balance.result import Check, State
from tests.pure.loads.making import SOURCE, F, tank
from tests.pure.loads.round_figures import box, round_basis

PAGE = "VP2-FM rev B p. 6-4"
ALONG, ACROSS = "path.longitudinal", "path.lateral"
TITLE, TITLE_ACROSS = "centre of gravity along the burn", "lateral centre of gravity along the burn"
FLIGHT = ("take-off", "landing")
# 1,000 lb without fuel; the leading edge of a chord of 40 in at 90 in.
DRY = State("zero fuel", F(1000), F(100_000), F(0), F(100), F(0), F(0))


def state(phase: Any, weight: Any, arm: Any, lateral: Any = 0) -> State:
    return State(phase, F(weight), weight * F(arm), weight * F(lateral), F(arm), F(lateral), F(0))


TAKE_OFF, LANDING = state("take-off", 1060, 102, 1), state("landing", 1030, 104, -1)
STATES: dict[Any, State] = {"zero fuel": DRY, "take-off": TAKE_OFF, "landing": LANDING}


def knot(weight: Any, arm: Any, lateral: Any = 0, phase: Any = None) -> Knot:
    return Knot(F(weight), weight * F(arm), weight * F(lateral), phase)


# 60 lb of fuel, 6 lb a gallon: 10 gallons, of which both tanks give 2.5; in between 101 in.
FIRST = Stretch(
    "flight",
    ("LEFT", "RIGHT"),
    knot(1060, 102, 1, "take-off"),
    knot(1042, F("101.123"), F("0.5")),
    F(0),
    ({"LEFT": F(5), "RIGHT": F(4), "REAR": F(1)}, F(0)),
)
SECOND = Stretch(
    "flight",
    ("RIGHT",),
    knot(1042, F("101.123"), F("0.5")),
    knot(1030, 104, -1, "landing"),
    F(0),
    ({"LEFT": F(5), "RIGHT": F(4), "REAR": F(1)}, F(3, 2)),
)
PATH = Path((FIRST, SECOND), (), F(6))


def ready_with(*envelopes: Any, **more: Any) -> Prepared:
    tanks = (tank("LEFT", 100, 50), tank("RIGHT", 100, 50), tank("REAR", 150, 20))
    basis = round_basis(*envelopes, tanks=tanks, chord=Chord(F(90), F(40), SOURCE))
    return prepared(replace(basis, **more))


def fix() -> str:
    return "Do something."


def checks_of(path: Path, ready: Prepared) -> list[Check]:
    return path_checks(burn_of(path, ready), STATES, ready, fix)


AT_KINK = {
    "point": "between take-off and landing",
    "weight": "1042",
    "moment": "105370.2",
    "arm": "101.12",
    "lateral_arm": "0.5",
    "percent_chord": "27.8",
    "fuel": "42",
    "feeding": ["LEFT", "RIGHT"],
    "tanks": {"LEFT": "3.5", "RIGHT": "2.5", "REAR": "1"},
}
AT_LANDING = {
    "point": "landing",
    "weight": "1030",
    "moment": "107120",
    "arm": "104",
    "lateral_arm": "-1",
    "percent_chord": "35",
    "fuel": "30",
    "feeding": ["RIGHT"],
    "tanks": {"LEFT": "5", "RIGHT": "0.5", "REAR": "1"},
}
KINK_WORDS = "between take-off and landing, at 1042 lb with 42 lb of fuel"


def along(outcome: Any, figures: tuple[str, str, str], margin: str, words: str, **more: Any) -> Check:
    """The check along the aircraft; `figures` are the actual and the two ends it must lie between."""
    actual, low, high = figures
    return Check(ALONG, TITLE, outcome, None, actual, high, low, "in", margin, words, PAGE, **more)


def test_a_worst_point_between_phases_is_told_with_all_that_is_known_there() -> None:
    (check,) = checks_of(PATH, ready_with(box(101, 108)))

    words = f"0.12 in from the forward limit, {KINK_WORDS}"
    room = F("0.123")
    assert check == along(
        "pass", ("101.12", "101", "108"), "0.12", words, room=room, edge="forward", at=AT_KINK
    )


def test_a_broken_limit_says_what_to_do_and_on_the_limit_is_said_so() -> None:
    (broken,) = checks_of(PATH, ready_with(box("101.2", 108)))
    (on,) = checks_of(PATH, ready_with(box("101.123", 108)))

    words = f"0.08 in beyond the forward limit, {KINK_WORDS}"
    more: dict[str, Any] = {"what_next": "Do something.", "room": F("-0.077")}
    assert broken == along(
        "fail", ("101.12", "101.2", "108"), "-0.08", words, edge="forward", at=AT_KINK, **more
    )
    assert (on.outcome, on.room, on.what_next) == ("pass", 0, "")
    assert on.margin_text == f"on the forward limit, {KINK_WORDS}"


def test_at_a_phase_the_phase_is_named_and_its_own_figures_told() -> None:
    (check,) = checks_of(PATH, ready_with(box(90, 105)))

    words = "1 in from the aft limit, at landing"
    expected = along("pass", ("104", "90", "105"), "1", words, room=F(1), edge="aft", at=AT_LANDING)
    assert check == expected._replace(phase="landing")


def test_where_the_envelope_has_no_part_at_a_weight_no_limit_is_told() -> None:
    (check,) = checks_of(PATH, ready_with(box(90, 120, high=1050)))

    assert check == Check(
        ALONG,
        TITLE,
        "fail",
        "take-off",
        "102",
        unit="in",
        margin_text="no part of the envelope lies at this weight, at take-off",
        source=PAGE,
        what_next="Do something.",
        at=check.at,
    )


def test_across_the_aircraft_sides_are_left_and_right() -> None:
    lateral = box(-2, 2, axis="lateral", phases=FLIGHT)
    _, check = checks_of(PATH, ready_with(box(90, 120), lateral))

    assert (check.code, check.title, check.outcome) == (ACROSS, TITLE_ACROSS, "pass")
    assert (check.actual, check.low, check.limit, check.edge) == ("1", "-2", "2", "right")
    assert check.margin_text == "1 in from the right limit, at take-off"
    _, left = checks_of(PATH, ready_with(box(90, 120), box("-1.5", 9, axis="lateral", phases=FLIGHT)))
    assert left.margin_text == "0.5 in from the left limit, at landing"


def test_without_an_envelope_for_take_off_the_burn_is_not_judged() -> None:
    (check,) = checks_of(PATH, ready_with(box(90, 120, phases=("landing",))))

    assert check == Check(
        ALONG,
        TITLE,
        "unresolved",
        margin_text="no envelope is entered for take-off",
        what_next="Enter the envelope of this phase in the loading basis.",
    )


def test_a_lateral_envelope_for_the_landing_alone_leaves_the_burn_across_unjudged() -> None:
    reserve = replace(PATH, stretches=(*PATH.stretches, SECOND._replace(leg="reserve")))
    lateral = box(-2, 2, axis="lateral", phases=("landing",))

    found = checks_of(reserve, ready_with(box(90, 120), lateral))

    assert [(each.code, each.outcome) for each in found] == [(ALONG, "pass"), (ACROSS, "unresolved")]
    assert found[1].margin_text == "no envelope is entered for take-off"
    broken = checks_of(reserve, ready_with(box(90, 120), box(0, 2, axis="lateral", phases=("landing",))))
    assert [each.outcome for each in broken] == ["pass", "fail"]


def test_a_path_that_burns_nothing_passes_with_that_said() -> None:
    empty = Path((), (), F(6))

    assert checks_of(empty, ready_with(box(90, 120))) == [
        Check(ALONG, TITLE, "pass", margin_text="nothing is burned in flight")
    ]
    lateral = box(-2, 2, axis="lateral", phases=FLIGHT)
    assert [each.code for each in checks_of(empty, ready_with(box(90, 120), lateral))] == [ALONG, ACROSS]


@pytest.mark.parametrize(
    ("leg", "where"),
    [
        ("taxi", "while taxiing"),
        ("flight", "between take-off and landing"),
        ("reserve", "between landing and the least fuel at landing"),
    ],
)
def test_a_gap_in_a_table_leaves_what_is_not_broken_unjudged(leg: Any, where: str) -> None:
    gapped = replace(PATH, gaps=(Gap(leg, "RIGHT", F("2.25")), Gap("taxi", "LEFT", F(9))))

    (check,) = checks_of(gapped, ready_with(box(90, 120)))

    assert check == Check(
        ALONG,
        TITLE,
        "unresolved",
        margin_text=f"{where} right holds less than 2.3 US gal, where its table begins",
        what_next="Change the fuel of right, or enter the rest of its table in the loading basis.",
    )
    assert checks_of(gapped, ready_with(box("101.2", 108)))[0].outcome == "fail"


def test_zero_fuel_over_the_flight_is_told_for_each_axis_that_has_a_limit() -> None:
    knots = ((knot(1000, 95, -2), {}),), ((knot(900, 99, -1), {}),)
    turns = tuple(
        Turn("flight", where, each, False, each[0][0].weight)
        for where, each in zip(("at zero fuel", "at zero fuel after event 1"), knots, strict=True)
    )
    zero = box(94, 110, phases=("zero fuel",)), box(-2, 2, axis="lateral", phases=("zero fuel",), low=500)
    ready = ready_with(box(90, 120, phases=FLIGHT), zero[0], zero[1])

    found = checks_of(replace(PATH, zero_fuel=turns), ready)

    assert [(each.code, each.title) for each in found[1:]] == [
        ("path.zero-fuel", "centre of gravity at zero fuel over the flight"),
        ("path.zero-fuel-lateral", "lateral centre of gravity at zero fuel over the flight"),
    ]
    beyond, across = found[1:]
    assert (beyond.outcome, beyond.room, beyond.what_next) == ("fail", None, "Do something.")
    assert beyond.margin_text == (
        "no part of the envelope lies at this weight, at zero fuel after event 1, at 900 lb with 0 lb of fuel"
    )
    assert (across.outcome, across.room, across.edge) == ("pass", 0, "left")
    assert across.margin_text == "on the left limit, at zero fuel, at 1000 lb with 0 lb of fuel"
    assert across.at is not None
    assert (across.at["feeding"], across.at["tanks"]) == ([], {})


def test_an_event_is_told_with_the_fuel_it_has_and_the_weight_without() -> None:
    jump = Turn("flight", "just after event 1", ((knot(1042, 118), {"LEFT": F("3.46")}),), False, F(1001))

    (check,) = checks_of(replace(PATH, turns=(jump,)), ready_with(box(90, 120)))

    assert check.margin_text == "2 in from the aft limit, just after event 1, at 1042 lb with 41 lb of fuel"
    assert check.at == {
        "point": "just after event 1",
        "weight": "1042",
        "moment": "122956",
        "arm": "118",
        "lateral_arm": "0",
        "percent_chord": "70",
        "fuel": "41",
        "feeding": [],
        "tanks": {"LEFT": "3.5"},
    }


def test_the_words_for_where_a_point_is() -> None:
    assert where_words(FIRST) == "between take-off and landing"
    assert where_words(FIRST._replace(leg="taxi", setting="gear up")) == "while taxiing, with gear up"
    assert where_words(FIRST._replace(feeding=(), setting="just after event 2")) == "just after event 2"
    assert where_words(FIRST._replace(feeding=())) == "between take-off and landing"


def test_what_each_tank_holds_at_a_point_of_a_stretch() -> None:
    # 9 lb burned are 1.5 gallons, from two tanks 0.75 each.
    assert held_at(FIRST, knot(1051, 100), F(6)) == {"LEFT": F("4.25"), "RIGHT": F("3.25"), "REAR": F(1)}
    assert held_at(SECOND, knot(1036, 100), F(6)) == {"LEFT": F(5), "RIGHT": F("1.5"), "REAR": F(1)}
    still = FIRST._replace(feeding=())
    assert held_at(still, knot(1051, 100), F(6)) == {"LEFT": F(5), "RIGHT": F(4), "REAR": F(1)}


KINK = {"weight": "1042", "moment": "105370.2", "arm": "101.12", "lateral_arm": "0.5"}
START = {"weight": "1060", "moment": "108120", "arm": "102", "lateral_arm": "1"}
END = {"weight": "1030", "moment": "107120", "arm": "104", "lateral_arm": "-1"}


def test_the_path_is_told_by_its_kinks_between_phases_and_its_worst_points() -> None:
    lateral = box(-2, 2, axis="lateral", phases=FLIGHT)
    ready = ready_with(box(101, 108), lateral)
    burn = burn_of(PATH, ready)
    checks = path_checks(burn, STATES, ready, fix)

    told = path_document(burn, checks, ready)

    at_take_off = checks[1].at
    assert at_take_off is not None
    assert told == {
        "points": [KINK],
        "worst": [{"axis": "longitudinal", **AT_KINK}, {"axis": "lateral", **at_take_off}],
    }
    told["worst"][0]["tanks"]["LEFT"] = "changed"
    told["worst"][0]["feeding"].append("changed")
    assert checks[0].at == AT_KINK


def test_in_a_bent_stretch_the_middle_is_told_too() -> None:
    bent = FIRST._replace(bend=F(1, 10))
    ready = ready_with(box(80, 120))
    burn = burn_of(replace(PATH, stretches=(bent, SECOND)), ready)

    told = path_document(burn, [], ready)

    # At 1051 lb: half way, (108120 + 105370.166) / 2, less a tenth of 9 * 9.
    assert told["worst"] == []
    assert [point["weight"] for point in told["points"]] == ["1051", "1042"]
    assert told["points"][0]["moment"] == "106737"


def test_a_path_with_events_is_told_run_by_run() -> None:
    jump = knot(1042, 101, 0)
    later = SECOND._replace(start=jump, bend=F(1, 10))
    turn = Turn("flight", "just after event 1", ((jump, {}),), False, F(1000))
    ready = ready_with(box(80, 120))

    def runs(*stretches: Stretch) -> list[list[str]]:
        burn = burn_of(Path(stretches, (), F(6), (turn,)), ready)
        told = path_document(burn, [], ready)
        return [[point["weight"] for point in run] for run in told["runs"]]

    assert runs(FIRST, SECOND) == [["1060", "1042", "1030"]]
    assert runs(FIRST, later) == [["1060", "1042"], ["1042", "1036", "1030"]]
    burn = burn_of(Path((FIRST, SECOND), (), F(6), (turn,)), ready)
    assert path_document(burn, [], ready)["runs"] == [[START, KINK, END]]
    assert "runs" not in path_document(burn_of(PATH, ready), [], ready)


def test_a_lateral_limit_by_cg_is_unjudged_too_where_the_path_is_not_known() -> None:
    from tests.pure.loads.hand import by_cg  # noqa: PLC0415  # beside its one use

    limit = by_cg((80, -3), (80, 3), (120, 3), (120, -3))
    ready = ready_with(box(90, 120), lateral_by_cg=(limit,))

    found = checks_of(replace(PATH, gaps=(Gap("flight", "LEFT", F(2)),)), ready)
    known = checks_of(PATH, ready)

    assert [(each.code, each.outcome) for each in found] == [
        (ALONG, "unresolved"),
        ("path.lateral-by-cg", "unresolved"),
    ]
    assert found[1].margin_text == found[0].margin_text
    assert found[1].what_next == found[0].what_next
    assert [(each.code, each.outcome, each.room) for each in known[1:]] == [("path.lateral-by-cg", "pass", 2)]
    assert known[1].margin_text.endswith("at take-off")
    narrow = by_cg((80, -3), (80, F(1, 2)), (120, F(1, 2)), (120, -3))
    broken = ready_with(box(90, 120), lateral_by_cg=(narrow,))
    gapped = checks_of(replace(PATH, gaps=(Gap("flight", "LEFT", F(2)),)), broken)
    assert gapped[1].outcome == "fail"
    told = path_document(burn_of(PATH, ready), known, ready)
    assert [each["axis"] for each in told["worst"]] == ["longitudinal", "lateral by CG"]

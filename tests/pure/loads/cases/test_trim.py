"""The take-off trim setting from the manual's table: interpolated as the manual says, never extrapolated.

Common practice (flight manuals print the setting against CG, by flaps and weight). Figures invented, worked
by hand beside each case: 1,240 lb at 100 in.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Chord
from fleet.positions import MovingPart, PartState
from fleet.trim import Trim, TrimLine, TrimTable
from loads.balance.events import Event
from tests.pure.loads.hand import PAGE, plain, result_with

F = Fraction


def line(*points, weight=None):
    exact = tuple((F(x), F(y)) for x, y in points)
    return TrimLine(None if weight is None else F(weight), exact, PAGE)


def trim(*tables, against="arm", step="0.1", lowest=None, highest=None):
    ends = (None if lowest is None else F(lowest), None if highest is None else F(highest))
    source = None if lowest is None else PAGE
    return Trim(against, "units nose up", F(step), *ends, source, tables)


def of(table, made=None):
    return result_with(made or plain(), lambda basis: replace(basis, trim=table))


def test_straight_between_two_points_printed_to_the_manuals_step():
    """At 95 in 6.0, at 107 in 2.4: at 100 in 6 - 3.6 * 5 / 12 = 4.5."""
    result = of(trim(TrimTable(None, (line((95, 6), (107, "2.4")),))))
    check = result.check("trim.take-off")
    assert (check.outcome, check.actual, check.unit, check.source) == (
        "pass",
        "4.5",
        "units nose up",
        "HAND rev A p. 6-9",
    )
    assert result.document["trim"] == {
        "unit": "units nose up",
        "settings": [{"flap": None, "setting": "4.5", "why": "", "source": "HAND rev A p. 6-9"}],
    }


@pytest.mark.parametrize(("step", "printed"), [("1", "4"), ("0.5", "4.5"), ("0.25", "4.25"), ("0.1", "4.3")])
def test_a_step_is_the_nearest_one(step, printed):
    """4.3 is nearer to 4 than to 5, to 4.5 than to 4, to 4.25 than to 4.5."""
    result = of(trim(TrimTable(None, (line((90, "4.3"), (110, "4.3")),)), step=step))
    assert result.check("trim.take-off").actual == printed


def test_straight_between_two_weights():
    """At 1,200 lb 4.0 and at 1,300 lb 5.0, whatever the CG: at 1,240 lb 4.4."""
    table = TrimTable(None, (line((90, 4), (110, 4), weight=1200), line((90, 5), (110, 5), weight=1300)))
    assert of(trim(table)).check("trim.take-off").actual == "4.4"


def test_percent_of_the_chord():
    """A chord of 50 in from 90 in: 100 in is 20 %, where the table says 3."""
    table = trim(TrimTable(None, (line((10, 5), (20, 3), (30, 2)),)), against="chord")
    result = result_with(plain(), lambda basis: replace(basis, trim=table, chord=Chord(F(90), F(50), PAGE)))
    assert result.check("trim.take-off").actual == "3"


def test_every_flap_setting_has_its_own():
    tables = (TrimTable("up", (line((90, 4), (110, 4)),)), TrimTable("10", (line((90, 5), (110, 5)),)))
    result = of(trim(*tables))
    assert result.check("trim.take-off").margin_text == (
        "flaps up: 4 units nose up; flaps 10: 5 units nose up"
    )
    assert [one["flap"] for one in result.document["trim"]["settings"]] == ["up", "10"]


def flapped(*settings, leg="taxi", ids=("S0", "S1")):
    """A load whose sequence puts the flaps so, one after the other, on a basis with tables for up and 10."""
    states = [PartState("S0", "up", F(0), ("ground", "flight"), PAGE)]
    states += [PartState(ids[1], name, F(0), ("ground", "flight"), PAGE) for name in ("10",)]
    states.append(PartState("S2", "30", F(0), ("ground", "flight"), PAGE))
    part = MovingPart("FLAPS", "flaps", "S0", tuple(states))
    tables = (TrimTable("up", (line((90, 4), (110, 4)),)), TrimTable("10", (line((90, 5), (110, 5)),)))
    table = trim(*tables, lowest=1, highest="4.5")
    named = {state.name: state for state in states}
    events = tuple(
        Event(number, leg, F(0), f"/sequence/{number - 1}", positions=((part, named[name]),))
        for number, name in enumerate(settings, 1)
    )
    return result_with(
        plain(),
        lambda basis: replace(basis, trim=table, positions=(part,)),
        lambda declared: replace(declared, sequence=events),
    )


def test_the_flap_setting_the_load_states_for_take_off_is_the_one_that_counts():
    """Flaps 10 want 5, and 4.5 is the most allowed: the setting for flaps up does not save it."""
    result = flapped("up", "10")
    check = result.check("trim.take-off")
    assert (check.outcome, check.actual) == ("fail", "5")
    assert [one["flap"] for one in result.document["trim"]["settings"]] == ["10"]
    assert flapped("10", "up").check("trim.take-off").margin_text == "flaps up: 4 units nose up"


def test_a_state_may_be_named_in_the_table_by_its_id():
    assert flapped("10", ids=("S0", "10")).check("trim.take-off").actual == "5"


def test_a_flap_setting_without_a_table_has_no_trim_setting():
    result = flapped("30")
    check = result.check("trim.take-off")
    assert (check.outcome, check.actual, result.verdict) == ("unresolved", None, "unresolved")
    assert check.margin_text == "flaps 30: the table has settings for flaps up, 10 only"
    assert result.document["trim"]["settings"][0]["setting"] is None


def test_what_happens_to_the_flaps_after_take_off_changes_no_trim_setting():
    settings = flapped("10", leg="flight").document["trim"]["settings"]
    assert [one["flap"] for one in settings] == ["up", "10"]


def test_outside_the_table_nothing_is_extrapolated():
    result = of(trim(TrimTable(None, (line((101, 6), (107, 3)),))))
    check = result.check("trim.take-off")
    assert (check.outcome, check.actual, result.verdict) == ("unresolved", None, "unresolved")
    assert check.margin_text == "the CG of 100 in is outside the table, 101 to 107 in"


def test_at_the_very_end_of_the_table_is_inside_it():
    assert of(trim(TrimTable(None, (line((100, 6), (107, 3)),)))).check("trim.take-off").actual == "6"


def test_a_weight_outside_the_table_is_named():
    table = TrimTable(None, (line((90, 4), (110, 4), weight=1241), line((90, 5), (110, 5), weight=1300)))
    text = of(trim(table)).check("trim.take-off").margin_text
    assert text == "the weight of 1240 lb is outside the table, 1241 to 1300 lb"


def test_one_flap_setting_off_its_table_does_not_stop_the_other():
    tables = (TrimTable("up", (line((90, 4), (110, 4)),)), TrimTable("10", (line((105, 5), (110, 5)),)))
    check = of(trim(*tables)).check("trim.take-off")
    assert (check.outcome, check.actual) == ("pass", "4")
    assert "flaps 10: the CG of 100 in is outside the table" in check.margin_text


def test_a_setting_outside_those_allowed_for_take_off_fails_by_the_exact_figure():
    """4.04 is printed as 4.0, but 4.0 is the most that is allowed: it fails, and shows by how much."""
    table = trim(TrimTable(None, (line((90, "4.04"), (110, "4.04")),)), lowest=1, highest=4)
    check = of(table).check("trim.take-off")
    assert (check.outcome, check.actual, check.limit, check.low) == ("fail", "4.04", "4", "1")


def test_without_a_table_there_is_no_check_and_no_block():
    result = result_with(plain())
    assert "trim" not in result.document
    assert not [check for check in result.checks if check.code == "trim.take-off"]

"""Envelopes by gear position: with the gear down one holds, with it up another, each wherever it may be so.

Common practice (flight manuals of aeroplanes with retractable gear give limits for both). By hand: 1,240 lb
at 100 in, weighed with the gear down; the gear up shifts the moment by 2,480 lb in, which are 2 in aft.
"""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import Envelope
from fleet.basis_reading import read_basis
from fleet.positions import MovingPart, PartState
from loads.balance.events import Event
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in
from tests.pure.loads.hand import PAGE, by_cg, plain, result_with

F = Fraction
PHASES = ("ramp", "take-off", "landing", "minimum at landing")
DOWN = PartState("DOWN", "down", F(0), ("ground", "flight"), PAGE)
UP = PartState("UP", "up", F(2480), ("flight",), PAGE)
GEAR = MovingPart("GEAR", "gear", "DOWN", (DOWN, UP))


def envelope(name, aft, states):
    points = ((F(90), F(500)), (F(90), F(3000)), (F(aft), F(3000)), (F(aft), F(500)))
    return Envelope(
        name, "longitudinal", PHASES, "arm", points, PAGE, positions=(("GEAR", states),) if states else ()
    )


def with_gear(*limits, **more):
    return lambda basis: replace(basis, positions=(GEAR,), envelopes=limits, **more)


def flown(down, up):
    """The aircraft with an aft limit for each position."""
    both = (envelope("down", down, ("DOWN",)), envelope("up", up, ("UP",)))
    return result_with(plain(trip=60), with_gear(*both))


def test_each_position_is_judged_by_its_own_envelope():
    """At 100 in down and 102 in up; 60 lb burned at 100 in, it is 2,480 / 1,180 = 2.10 in further."""
    result = flown(down=100, up=103)
    assert (result.check("cg.take-off").outcome, result.check("cg.take-off").room) == ("pass", 0)
    assert result.check("path.longitudinal").outcome == "pass"


def test_an_envelope_for_the_gear_down_does_not_bind_with_the_gear_up():
    """One envelope for both would fail: with the gear up the CG lies behind 100 in."""
    for_both = result_with(plain(trip=60), with_gear(envelope("both", 100, ())))
    assert for_both.check("path.longitudinal").outcome == "fail"
    assert flown(down=100, up=103).check("path.longitudinal").outcome == "pass"


def test_the_gear_up_is_outside_its_own_envelope_though_every_phase_is_inside():
    result = flown(down=103, up=102)
    assert all(result.check(f"cg.{phase}").outcome == "pass" for phase in ("ramp", "take-off", "landing"))
    worst = result.check("path.longitudinal")
    assert (worst.outcome, worst.edge) == ("fail", "aft")
    assert worst.room == 102 - (100 + F(2480, 1180))


def test_a_sequence_says_when_the_gear_is_up():
    """Up from the take-off on: the envelope for the gear down holds on the ground alone."""

    def declare(declared):
        return replace(declared, sequence=(Event(1, "flight", F(0), "", positions=((GEAR, UP),)),))

    both = (envelope("down", 100, ("DOWN",)), envelope("up", 103, ("UP",)))
    result = result_with(plain(trip=60), with_gear(*both), declare)
    landing = result.check("cg.landing")
    assert (landing.outcome, landing.limit) == ("pass", "103")
    assert result.check("path.longitudinal").outcome == "pass"


def test_a_position_without_an_envelope_is_unresolved():
    only_up = result_with(plain(), with_gear(envelope("up", 103, ("UP",))))
    assert only_up.check("cg.take-off").outcome == "unresolved"


def test_a_lateral_limit_against_the_cg_may_depend_on_it_too():
    """With the gear up 0.5 in to the side is all that is allowed, and 1 in is flown."""
    narrow = replace(
        by_cg((90, "-0.5"), (110, "-0.5"), (110, "0.5"), (90, "0.5")), positions=(("GEAR", ("UP",)),)
    )
    wide = replace(by_cg((90, -3), (110, -3), (110, 3), (90, 3)), id="W", positions=(("GEAR", ("DOWN",)),))
    made = plain(trip=60, lateral_moment=1240)
    result = result_with(made, with_gear(envelope("both", 110, ()), lateral_by_cg=(narrow, wide)))
    assert result.check("lateral-by-cg.take-off").outcome == "pass"
    assert result.check("path.lateral-by-cg").outcome == "fail"


def document():
    """The invented twin with its gear, and every envelope given for the gear down and up."""
    whole = changed(
        basis_document("twin"),
        "/positions",
        [
            {
                "id": "GEAR",
                "name": "gear",
                "as_weighed": "DOWN",
                "states": [
                    {
                        "id": state,
                        "name": state.lower(),
                        "moment_change": {"value": change, "unit": "lb in"},
                        "holds": ["ground", "flight"] if state == "DOWN" else ["flight"],
                        "source": {"page": "6-9"},
                    }
                    for state, change in (("DOWN", 0), ("UP", 1500))
                ],
            }
        ],
    )
    envelopes = [
        dict(one, id=f"{one['id']}-{state}"[:24], positions=[{"part": "GEAR", "states": [state]}])
        for one in whole["envelopes"]
        for state in ("DOWN", "UP")
    ]
    return changed(whole, "/envelopes", envelopes)


def test_it_is_read_from_the_document():
    basis = read_basis(document())
    assert [one.positions for one in basis.envelopes[:2]] == [(("GEAR", ("DOWN",)),), (("GEAR", ("UP",)),)]


@pytest.mark.parametrize(
    ("pointer", "value", "fault"),
    [
        ("/envelopes/0/positions/0/part", "SKIDS", ("/envelopes/0/positions/0/part", "unknown-id")),
        ("/envelopes/0/positions/0/states", ["HALF"], ("/envelopes/0/positions/0/states/0", "unknown-id")),
        ("/envelopes/0/positions/0/states", ["DOWN", "UP"], ("/envelopes/1/phases/0", "envelope-twice")),
        ("/envelopes/1/positions/0/states", ["DOWN"], ("/envelopes", "envelope-missing")),
    ],
)
def test_a_position_that_is_unknown_doubled_or_left_without_an_envelope_is_a_fault(pointer, value, fault):
    with pytest.raises(Invalid) as refused:
        read_basis(changed(document(), pointer, value))
    assert fault in found_in(refused.value)

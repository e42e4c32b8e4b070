"""Every pair of states, allowed or refused, against a second list written by hand."""

from itertools import product

import pytest

from loads.lifecycle import FIRST_STATE, STATES, STEPS, step, ways_out
from records.refusal import StepRefused

ALLOWED = {
    "open": {"open", "prepared", "superseded", "withdrawn"},
    "prepared": {"open", "loaded", "accepted", "superseded", "withdrawn"},
    "loaded": {"open", "accepted", "superseded", "withdrawn"},
    "accepted": {"accepted", "departed", "superseded", "withdrawn"},
    "departed": set(),
    "superseded": set(),
    "withdrawn": set(),
}


@pytest.mark.parametrize(("start", "end"), list(product(STATES, STATES)))
def test_a_pair_is_a_step_or_is_refused_with_what_can_be_done(start, end):
    if end in ALLOWED[start]:
        found = step(start, end)
        assert (found.start, found.end) == (start, end)
        return
    with pytest.raises(StepRefused) as refused:
        step(start, end)
    assert refused.value.code == "step-not-allowed"
    assert refused.value.status == 409
    assert refused.value.next_step


@pytest.mark.parametrize("strange", ["", "Open", "flown", "accepted "])
def test_a_state_nobody_knows_is_refused(strange):
    with pytest.raises(StepRefused):
        step(strange, "open")
    with pytest.raises(StepRefused):
        step("open", strange)


def test_only_signing_steps_need_the_verdict_within_and_each_has_its_signer():
    signed = {(one.end, one.signed_by) for one in STEPS if one.needs_within}

    assert signed == {
        ("prepared", "load preparer"),
        ("loaded", "loading supervisor"),
        ("accepted", "pilot in command"),
    }
    assert all(one.signed_by is None for one in STEPS if not one.needs_within)


def test_every_state_is_reached_from_the_first_and_no_pair_stands_twice():
    reached = {FIRST_STATE}
    while more := {end for state in reached for end in ways_out(state)} - reached:
        reached |= more

    assert reached == set(STATES)
    assert len({(one.start, one.end) for one in STEPS}) == len(STEPS)


def test_after_departure_nothing_replaces_or_withdraws_a_load():
    assert ways_out("departed") == ()
    with pytest.raises(StepRefused) as refused:
        step("departed", "superseded")
    assert "stays as it is" in refused.value.next_step


def test_an_accepted_load_is_accepted_again_only_by_a_last_minute_change():
    assert step("accepted", "accepted", "change-load-late").signed_by == "pilot in command"
    with pytest.raises(StepRefused) as refused:
        step("accepted", "accepted", "accept-load")
    assert refused.value.next_step == "From accepted a load can become departed, superseded, withdrawn."

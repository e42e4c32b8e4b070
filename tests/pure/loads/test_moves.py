"""What to do about a failing CG: a move is only named after it was tried, and it is the least one."""

import re
from dataclasses import replace
from fractions import Fraction

from loads.balance.assess import assess
from loads.balance.declared import read_load
from tests.pure.loads.making import envelope, load, place, twin, twin_empty

F = Fraction

BAG = {"kind": "baggage", "what": "bags", "place": "AFT-HOLD", "how": "weighed"}


def tail_heavy(bags=290, aft="119.8", **changes):
    basis = twin()
    shape = envelope((110, 4000), (110, 6800), (aft, 6800), (aft, 4000))
    basis = replace(basis, envelopes=(shape,), **changes)
    document = load(items=[{**BAG, "weight": {"value": bags, "unit": "lb"}}])
    return document, basis


def assessed(document, basis):
    return assess(read_load(document, basis), basis, twin_empty())


def test_the_move_that_is_named_works_and_a_little_less_does_not():
    document, basis = tail_heavy()
    failed = assessed(document, basis)
    advice = failed.check("cg.take-off").what_next
    amount = F(re.search(r"at least ([\d.]+) lb of baggage from aft hold to nose hold", advice)[1])  # type: ignore[index] # fails if it is absent

    def moved(weight):
        rest = {"value": str(float(290 - weight)), "unit": "lb"}
        gone = {"value": str(float(weight)), "unit": "lb"}
        return assessed(
            load(
                items=[
                    {**BAG, "weight": rest},
                    {**BAG, "what": "moved", "place": "NOSE-HOLD", "weight": gone},
                ]
            ),
            basis,
        )

    assert failed.verdict == "outside"
    assert moved(amount).verdict == "within"
    assert moved(amount - F("0.1")).verdict == "outside"


def test_a_move_into_a_place_that_cannot_take_it_is_not_named():
    document, basis = tail_heavy()
    full = tuple(place(one.id, one.arm, 5) if one.id == "NOSE-HOLD" else one for one in basis.places)
    advice = assessed(document, replace(basis, places=full)).check("cg.take-off").what_next

    assert "nose hold" not in advice


def test_where_no_single_move_does_it_the_moment_is_named():
    document, basis = tail_heavy(bags=60, aft="115")
    advice = assessed(document, basis).check("cg.take-off").what_next

    assert re.fullmatch(r"Change the moment by at least [\d.]+ lb in, forward; no single move .*", advice)


def test_phases_that_cannot_be_mended_together_are_said_to_be_so():
    document, basis = tail_heavy()
    forward = envelope((110, 4000), (110, 6800), (112, 6800), (112, 4000), phases=("take-off",))
    rear = envelope((120, 4000), (120, 6800), (128, 6800), (128, 4000), phases=("landing",))
    advice = assessed(document, replace(basis, envelopes=(forward, rear))).check("cg.take-off").what_next

    assert advice.startswith("No shift at this weight mends every phase at once")


def test_a_weight_off_the_envelope_is_mended_first():
    document, basis = tail_heavy()
    low = envelope((110, 4000), (110, 5500), (128, 5500), (128, 4000))
    check = assessed(document, replace(basis, envelopes=(low,))).check("cg.take-off")

    assert check.outcome == "fail"
    assert check.what_next == "Bring the weight within the envelope first, then assess again."
    assert "above the envelope at the same arm" in check.margin_text


def test_a_move_that_would_break_the_lateral_limit_is_not_named():
    document, basis = tail_heavy()
    aside = tuple(place("NOSE-HOLD", 30, 250, 60) if one.id == "NOSE-HOLD" else one for one in basis.places)
    across = envelope((-1, 4000), (-1, 7000), ("0.05", 7000), ("0.05", 4000), axis="lateral")
    free = replace(basis, places=aside)
    tied = replace(free, envelopes=(*basis.envelopes, across))

    assert "nose hold" in assessed(document, free).check("cg.take-off").what_next
    assert "nose hold" not in assessed(document, tied).check("cg.take-off").what_next
    assert assessed(document, tied).check("lateral.take-off").outcome == "pass"


def test_a_passenger_is_only_reseated_whole_and_into_a_free_seat_that_serves():
    document, basis = tail_heavy(bags=1, aft="119.3")
    document = {**document, "passengers": [
        {**document["passengers"][0], "seat": "ROW2-L", "weight": {"value": 240, "unit": "lb"}},
        {**document["passengers"][1], "seat": "ROW2-R"},
    ]}  # fmt: skip
    advice = assessed(document, basis).check("cg.take-off").what_next
    reseated = {**document, "passengers": [{**document["passengers"][0], "seat": "COCKPIT-R"}]}
    reseated["passengers"].append(document["passengers"][1])

    told = "Reseat the passenger from row2 l to cockpit r: a moment of at least 1804.7 lb in, forward."
    assert advice == told
    assert assessed(reseated, basis).verdict == "within"

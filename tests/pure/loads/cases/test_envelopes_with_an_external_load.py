"""An envelope that holds only while something hangs outside, or only while nothing does.

Common practice of flight manuals with a hook or a hoist. Reckoned by hand on the invented aircraft of
`round_figures`: 2,560 lb at 254,000 lb in take off; with 400 lb on the hook at 80 in 2,960 lb at 286,000.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.basis_reading import read_basis
from fleet.positions import CARRIED, EXTERNAL_LOAD, NOT_CARRIED
from fleet.web.rules_shown import rule_rows
from loads.balance.aboard import Declared
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from loads.balance.remedies.more import how_much_more
from loads.balance.remedies.question import Question
from loads.balance.result import Result
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.cases.test_sling_load import RELEASE, hook_basis, slung
from tests.pure.loads.hand import by_cg
from tests.pure.loads.remedies.test_room import lines
from tests.pure.loads.round_figures import EMPTY, box, flown, round_load

AT = "/envelopes/0/external_load"


def held(envelope: Any, condition: str) -> Any:
    return replace(envelope, id=f"{envelope.id}-{condition}", positions=((EXTERNAL_LOAD, (condition,)),))


def both(with_load: Any, without: Any) -> Basis:
    return hook_basis(held(with_load, CARRIED), held(without, NOT_CARRIED))


def path_of(result: Result) -> str:
    return result.check("path.longitudinal").outcome


def test_each_envelope_judges_only_the_loads_it_is_for() -> None:
    basis = both(box(96, 100), box(99, 120))
    slung_load, plain_load = flown(slung(), basis), flown(round_load(), basis)

    assert slung_load.check("cg.take-off").low == "96"
    for code in ("cg.take-off", "path.longitudinal"):
        assert slung_load.check(code).margin_text.endswith(", in the envelope with an external load")
        assert plain_load.check(code).margin_text.endswith(", in the envelope without an external load")
    assert (slung_load.check("cg.take-off").outcome, path_of(slung_load)) == ("pass", "pass")
    assert plain_load.check("cg.take-off").low == "99"
    assert (plain_load.check("cg.take-off").outcome, path_of(plain_load)) == ("pass", "pass")


def test_on_the_hook_a_load_is_outside_an_envelope_for_flights_with_one() -> None:
    result = flown(slung(), both(box(97, 120), box(90, 120)))
    assert result.check("cg.take-off").outcome == "fail"
    assert path_of(result) == "fail"


def test_from_the_release_on_the_envelope_without_an_external_load_holds() -> None:
    # 60 lb burned at 100 in, then the drum is gone: 2,500 lb at 248,000, so 99.2 in, where 99.5 is the least
    released = slung(event(60, leave=[RELEASE]))
    basis = both(box(96, 120), box("99.5", 120))
    result = flown(released, basis)

    assert result.check("cg.take-off").outcome == "pass"
    assert result.check("cg.landing").outcome == "fail"
    assert path_of(result) == "fail"
    assert flown(released, both(box(96, 120), box(99, 120))).verdict == "within"


def test_with_no_envelope_for_a_flight_with_an_external_load_it_is_unresolved() -> None:
    only = hook_basis(held(box(80, 120), NOT_CARRIED))
    result = flown(slung(), only)
    assert result.check("cg.take-off").outcome == "unresolved"
    check = result.check("path.longitudinal")
    assert check.outcome == "unresolved"
    assert "with an external load" in check.margin_text
    assert flown(round_load(), only).verdict == "within"


def test_what_is_hooked_on_in_flight_without_an_envelope_for_it_is_unresolved_between() -> None:
    # Nothing hangs outside at any phase: hooked on and let go again in flight.
    only = hook_basis(held(box(80, 120), NOT_CARRIED))
    drum = {"kind": "cargo", "what": "drum", "place": "HOOK", "weight": {"value": 30, "unit": "lb"}}
    document = round_load(
        sequence=[event(30, come_aboard=[drum | {"how": "weighed"}]), event(60, leave=[RELEASE])]
    )
    result = flown(document, only)
    assert result.check("cg.take-off").outcome == result.check("cg.landing").outcome == "pass"
    assert path_of(result) == "unresolved"
    assert result.verdict == "unresolved"


def test_somebody_on_a_hoist_hangs_outside_too() -> None:
    basis = both(box(97, 120), box(90, 120))
    hung = event(60, move=[{"seat": "S1", "to": "HOOK"}])
    back = event(90, move=[{"seat": "S1", "to": "S1"}])
    result = flown(round_load(1, sequence=[hung, back]), both(box(99, 120), box(90, 120)))
    assert path_of(result) == "fail"  # 2,700 lb at 264,000 lb in with 200 lb at 80 in: 97.8 in
    assert path_of(flown(round_load(1, sequence=[hung, back]), basis)) == "pass"


def test_a_lateral_limit_against_the_cg_may_depend_on_it_too() -> None:
    narrow = held(by_cg((80, "-0.5"), (120, "-0.5"), (120, "-0.1"), (80, "-0.1")), CARRIED)
    wide = held(by_cg((80, -3), (120, -3), (120, 3), (80, 3)), NOT_CARRIED)
    basis = replace(hook_basis(box(80, 120)), lateral_by_cg=(narrow, wide))
    assert flown(round_load(), basis).check("path.lateral-by-cg").outcome == "pass"
    assert flown(slung(), basis).check("path.lateral-by-cg").outcome == "fail"


def document(first: Any, *others: Any) -> dict[str, Any]:
    """The twin's basis with a hook, its first envelopes under conditions and copies of them beside."""
    made = changed(basis_document("twin"), "/places/0/external", True)
    envelopes = made["envelopes"]
    ours = [one for one in envelopes if one["axis"] == "longitudinal" and "take-off" in one["phases"]]
    for one in ours:
        one["external_load"] = first
    for number, other in enumerate(others):
        envelopes += [one | {"id": f"{one['id']}-{number}", "external_load": other} for one in ours]
    return made


def test_a_basis_names_the_condition_and_its_page_shows_it() -> None:
    made = document("none", "carried")
    found = {one.id: dict(one.positions).get(EXTERNAL_LOAD) for one in read_basis(made).envelopes}
    assert (CARRIED,) in found.values()
    assert (NOT_CARRIED,) in found.values()
    titles = [str(row["title"]) for row in rule_rows(made)]
    assert any(title.endswith(", with an external load") for title in titles)
    assert any(title.endswith(", without an external load") for title in titles)


@pytest.mark.parametrize(
    ("made", "pointer", "code"),
    [
        (document("carried"), "/envelopes", "envelope-missing"),
        (document("none"), "/envelopes", "envelope-missing"),
        (document("carried", "carried"), "/envelopes/1/phases/0", "envelope-twice"),
        (
            changed(basis_document("twin"), "/envelopes/0/external_load", "none"),
            "/envelopes/0/external_load",
            "no-external-place",
        ),
        (document("sometimes"), AT, "not-a-choice"),
    ],
)
def test_a_condition_that_cannot_be_is_refused_with_its_field(made: Any, pointer: str, code: str) -> None:
    with pytest.raises(Invalid) as refused:
        read_basis(made)
    assert (pointer, code) in found_in(refused.value)


def test_room_is_measured_in_the_envelope_that_holds() -> None:
    # 99.2 in without the drum, 96.6 in with it on the hook.
    # 97 x 2960 - 286000 = 1120 lb in are left aft; the hold lies 33 in behind 97: 33.93 lb, rounded down.
    basis = both(box(96, 97), box(98, 120))
    declared = read_load(slung(event(60, leave=[RELEASE])), basis)

    def judge(changed: Declared) -> Result:
        return assess(changed, basis, EMPTY, advised=False)

    question = Question(declared, judge(declared), prepared(basis), judge, lambda: 0.0, 1.0)
    assert question.result.verdict == "within"
    told = lines(how_much_more(question))["place", "HOLD"]
    assert (told["amount"], told["stopped_by"]) == ("33.9", "CG at the ramp")

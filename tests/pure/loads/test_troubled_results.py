"""What is said of loads that have a trouble of their own: each check that does not simply pass, word by word.

The figures of each are those of the case by hand it is built from; `agreed_texts/troubled_results.txt` has
what is told, with the passing checks of the same matter.
"""

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Chord
from fleet.curtailment import Inset
from fleet.presentation import IndexUnits, Presentation
from fleet.standard_weights_reading import read_standard_weights
from fleet.stations import Cumulative
from fleet.trim import TrimTable
from fleet.weighing import Restated
from loads.balance.assess import assess
from loads.balance.circumstances import Circumstances, WeighingDue
from loads.balance.declared import read_load
from loads.balance.result import Result
from tests.pure.loads.agreed import agreed, result_told
from tests.pure.loads.cases.test_children_and_infants import INFANT, adult, flown, lb, marked
from tests.pure.loads.cases.test_curtailment import curtailed, margin
from tests.pure.loads.cases.test_fuel_imbalance import balance
from tests.pure.loads.cases.test_hoist import CRATE, FOUND
from tests.pure.loads.cases.test_lateral_limits import TAPERED, with_limit
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.cases.test_performance_limited_weights import rule, with_rules
from tests.pure.loads.cases.test_sling_load import RELEASE, SLUNG, hook_basis, slung
from tests.pure.loads.cases.test_trim import flapped, line, of, trim
from tests.pure.loads.cases.test_zones import DOOR, HANDED, NET, from_nose, item, loaded, running, step
from tests.pure.loads.hand import F, by_cg, one_after_the_other, plain, result_with
from tests.pure.loads.making import (
    SOURCE,
    limit,
    load,
    result_of,
    straight,
    tank,
    twin,
    twin_empty,
    with_limits,
)
from tests.pure.loads.round_figures import EMPTY, box, q, round_basis, round_load
from tests.pure.loads.round_figures import flown as round_flown
from tests.pure.loads.standards import (
    assessed,
    document_with,
    eu_document,
    passenger,
    seasonal_document,
    standard,
)

AGREED = agreed("troubled_results")
TELLING = ("fail", "unresolved", "advisory ", "verdict", "advisories", "not_assessed", "trim", "governing")
ACROSS = by_cg(*TAPERED)


def balanced(limit: Any, **made: Any) -> Result:
    return result_with(
        plain(**made), lambda basis: replace(one_after_the_other(basis), fuel_balance=(limit,))
    )


def across(limit: Any, moment: int, **made: Any) -> Result:
    return result_with(plain(lateral_moment=moment, **made), with_limit(limit))


def inside(forward: Any, aft: Any, document: Any = None, **changes: Any) -> Result:
    """The sound load, or another, between two arms."""
    return result_of(document, replace(twin(), envelopes=(box(forward, aft, 4000, 6800),), **changes))


def with_empty(**changes: Any) -> Result:
    return result_of(empty=replace(twin_empty(), **changes))


def by_rule(**about: Any) -> Result:
    declared = replace(read_load(load(), twin()), circumstances=Circumstances(**about))
    return assess(declared, twin(), twin_empty())


def on_the_way(*events: Any, jumpers: int = 0, basis: Any = None, **more: Any) -> Result:
    return round_flown(round_load(jumpers, sequence=list(events), **more), basis or round_basis())


def short_tables() -> Result:
    tanks = tuple(
        replace(one, table=straight(121, 40)) if one.id == "LEFT-MAIN" else one for one in twin().tanks
    )
    return result_of(basis=replace(twin(), tanks=tanks))


def miscounted() -> Result:
    return assess(replace(read_load(load(), twin()), persons_on_board=7), twin(), twin_empty())


def nothing_left() -> Result:
    gone = {"kind": "equipment", "what": "all", "place": "AFT-HOLD", "how": "weighed", "removed": True}
    return result_of(load(items=[gone | {"weight": q(9000)}]))


def estimated() -> Result:
    document = load()
    document["passengers"][1] |= {"how": "estimated"}
    document["passengers"][1]["lap_infant"] |= {"how": "estimated"}
    return result_of(document)


def allowed_estimate() -> Result:
    document = load(passengers=[adult(how="estimated")], persons_on_board=2)
    about = Circumstances("company rule 4")
    return assess(replace(read_load(document, twin()), circumstances=about), twin(), twin_empty())


def too_many() -> Result:
    declared = read_load(round_load(1, sequence=[event(30, come_aboard=[FOUND])]), round_basis())
    few = replace(declared.configuration, seats=("P", "S1"))
    return assess(replace(declared, configuration=few), round_basis(), EMPTY)


def nose_hold(most: str) -> tuple[Any, ...]:
    """The places of the twin, its nose hold with another maximum."""
    return tuple(replace(p, maximum=limit(most)) if p.id == "NOSE-HOLD" else p for p in twin().places)


def beyond_the_table() -> Result:
    """The table of MAIN ends at 60 US gal, and 4 more are in it until they have burned."""
    tanks = (replace(tank("MAIN", 100, 100), table=straight(100, 60)), tank("AUX", 120, 20))
    moved = {"from": "AUX", "to": "MAIN", "quantity": q(4, "US gal")}
    return on_the_way(
        event(0, transfer=moved),
        event(60, transfer={"from": "MAIN", "to": "AUX", "quantity": q(1, "US gal")}),
        basis=round_basis(tanks=tanks),
        start={"MAIN": q(60, "US gal"), "AUX": q(4, "US gal")},
    )


GONE: dict[str, Any] = {
    "kind": "equipment",
    "what": "all",
    "place": "HOLD",
    "how": "weighed",
    "removed": True,
    "weight": q(2560),
}
WIDE = ((100, -4), (130, -4), (130, 4), (100, 4))
ENDING = (("118.6", -4), ("118.6", 4), (130, 4), (130, -4))
TAIL = running("tail", step("aft hold", 100, "AFT-HOLD"), step("row 1", 400, "ROW1-L", "ROW1-R"))
UNLIMITED = running("nose", step("nose hold", None, "NOSE-HOLD"), step("row 1", None, "ROW1-L"))
UNWEIGHED = loaded([item("NOSE-HOLD", 200)], ROW1_L=176)
del UNWEIGHED["items"][0]["weight"]
UNWEIGHED["items"][0]["how"] = "standard"
EU = read_standard_weights(eu_document())
NONE_DECLARED = read_standard_weights(eu_document(declared={"none": True, "source": {"page": "d"}}))
MASS = {"value": 82, "unit": "kg"}
NO_ROW = read_standard_weights(
    seasonal_document(rows=[{**row, "from_seats": 9} for row in seasonal_document()["rows"]])
)
KINDLESS = document_with([])
KINDLESS["crew"][0] = {k: v for k, v in KINDLESS["crew"][0].items() if k != "weight"} | {
    "how": "standard", "position": "pilot in command"}  # fmt: skip
FLAT = TrimTable(None, (line((90, "4.04"), (110, "4.04")),))
CG_OFF = TrimTable("up", (line((101, 6), (107, 3)),))
WEIGHT_OFF = TrimTable("10", (line((90, 4), (110, 4), weight=1241), line((90, 5), (110, 5), weight=1300)))
DUE = WeighingDue("2026-05-02", "2029-05-01", False, "every 36 months", "Rule 7 p. 2")
UNDER = {"place": "HOOK", "what": "drum"}

CASES: dict[str, tuple[tuple[str, ...], Callable[[], Result]]] = {
    "a running sum from the nose is exceeded": (("cum",), lambda: result_of(HANDED, from_nose(700))),
    "a running sum from the tail is exceeded": (("cum",), lambda: result_of(load(), TAIL)),
    "a running sum has no limit": (("cum",), lambda: result_of(HANDED, UNLIMITED)),
    "a running sum is kept": (("cum",), lambda: result_of(HANDED, from_nose(717))),
    "a weight in a running sum is not known": (("cum",), lambda: result_of(UNWEIGHED, from_nose(700))),
    "a limit of a running sum is not entered": (("cum",), lambda: result_of(HANDED, from_nose("absent"))),
    "one side holds too much": (("fuel-bal",), lambda: balanced(balance(119), trip=240)),
    "the other side holds too much": (
        ("fuel-bal",), lambda: balanced(balance(9, by="volume"), left=15, right=5)),
    "a balance by volume is kept": (
        ("fuel-bal",), lambda: balanced(balance(10, by="volume"), left=5, right=15)),
    "a balance at landing": (("fuel-bal",), lambda: balanced(balance(59, phases=("landing",)), trip=180)),
    "a balance off its table": (
        ("fuel-bal",), lambda: balanced(balance(points=[(0, 200), (200, 200)]), trip=240)),
    "a balance at a point of its table": (
        ("fuel-bal",),
        lambda: balanced(balance(points=[(0, 200), (120, 200), (180, 50), (240, 200)]), trip=240)),
    "too far to the right for this CG": (("lat", "path.lat"), lambda: across(ACROSS, 6000)),
    "too far to the left for this CG": (("lat", "path.lat"), lambda: across(ACROSS, -6000, trip=60)),
    "on the limit for this CG": (("lat", "path.lat"), lambda: across(ACROSS, 4960)),
    "no lateral limit for this CG": (("lat", "path.lat"), lambda: across(ACROSS, 0, arm=120)),
    "lateral moments": (("lat", "path.lat"), lambda: across(
        by_cg((90, -2000), (110, -2000), (110, 2000), (90, 2000), gives="moment"), 2001)),
    "inside the certified envelope alone": (("cg", "path"), lambda: result_of(basis=curtailed(
        margin(aft=Inset(arm=F(10)), forward=Inset(moment=F(500)))))),
    "on the certified edge": (("cg",), lambda: result_of(basis=curtailed(
        margin(aft=Inset(arm=F(1))), envelopes=(box(100, result_of().state("take-off").arm, 4000, 6800),)))),
    "outside the certified envelope, too": (("cg",), lambda: result_of(basis=curtailed(
        margin(aft=Inset(arm=F(1))), envelopes=(box(100, 118, 4000, 6800),)))),
    "somebody is reseated": (("cg.take",), lambda: inside(110, "117.2", load(items=[]))),
    "an item is moved": (("cg.take",), lambda: inside(110, "118.5")),
    "no single move does it": (("cg.take",), lambda: inside(110, 112)),
    "no shift mends every phase": (("cg.take",), lambda: inside("118.4", "118.5")),
    "it lies to one side": (("lat",), lambda: result_of(basis=replace(
        twin(), envelopes=(*twin().envelopes, box(0, 3, 4000, 6800, axis="lateral"))))),
    "a tank is off its table": (("tank",), short_tables),
    "more is taken out than there is": (("weight",), nothing_left),
    "somebody counted wrong": (("persons",), miscounted),
    "estimates of people": (("weights",), estimated),
    "estimates that may be": (("weights",), allowed_estimate),
    "fuel could be left behind": (("weight",), lambda: result_of(basis=with_limits(
        ramp=6840, take_off=5700, zero_fuel=6200, landing=5300, minimum_flying=5250))),
    "too light at one moment": (("weight",), lambda: on_the_way(
        event(90, come_aboard=[CRATE]), basis=round_basis(weights={"minimum_flying": 2471}))),
    "too light at landing": (("weight",), lambda: on_the_way(
        event(30, come_aboard=[CRATE]), event(60, leave=[{"place": "HOLD", "what": "crate"}]),
        basis=round_basis(weights={"minimum_flying": 2450}))),
    "an empty weight from elsewhere": (("standing",), lambda: with_empty(datum="firewall")),
    "an empty weight on floats": (("standing",), lambda: with_empty(fit="floats")),
    "an empty weight restated": (("standing",), lambda: with_empty(
        restated=Restated("firewall", F(420_240), F(20), SOURCE))),
    "a weighing that holds": (("standing",), lambda: by_rule(weighing=DUE)),
    "no weighing known": (("standing",), lambda: by_rule(
        weighing=replace(DUE, weighed_on="", lapses=None, overdue=True))),
    "no maximum with an external load": (
        ("weight",), lambda: round_flown(slung(), hook_basis(external=None))),
    "somebody hangs outside": (("weight",), lambda: round_flown(
        slung(event(40, move=[{"seat": "S1", "to": "HOOK"}]), event(80, leave=[RELEASE]), jumpers=1),
        hook_basis(external=3400, take_off=2800, landing=2800, ramp=2800))),
    "too heavy on the ramp without what hangs": (("weight",), lambda: round_flown(
        slung(), hook_basis(external=3000, ramp=2559))),
    "picked up beyond all": (("weight",), lambda: on_the_way(
        event(30, come_aboard=[SLUNG]), event(90, leave=[UNDER]), basis=hook_basis(external=2929))),
    "too many in flight": (("persons",), too_many),
    "an infant at an exit": (("seats",), lambda: result_of(
        flown(adult(lap_infant=INFANT)), marked(ROW1_L={"exit_row": True, "infant_restraint": True}))),
    "a child at an exit": (("seats",), lambda: result_of(
        flown(adult(category="Child", weight=lb(60))), marked(ROW1_L={"exit_row": True}))),
    "an adult at an exit, an infant without restraint": (("seats",), lambda: result_of(
        flown(adult(category="infant", weight=lb(50))), marked(ROW1_L={"infant_restraint": False}))),
    "an adult at an exit": (("seats",), lambda: result_of(flown(adult()), marked(ROW1_L={"exit_row": True}))),
    "no row of the table": (("weights",), lambda: assessed(
        document_with([standard("A", "ROW1-L", "adult")]), NO_ROW)),
    "no kind of crew": (("weights",), lambda: assessed(KINDLESS, read_standard_weights(seasonal_document()))),
    "no declared weights": (("weights",), lambda: assessed(document_with([
        passenger("A", "ROW1-L", how="declared", weight=MASS), standard("B", "ROW1-R", "female")]),
        NONE_DECLARED)),
    "declared and standard weights": (("weights",), lambda: assessed(document_with([
        passenger("A", "ROW1-L", how="declared", weight=MASS), standard("B", "ROW1-R", "female")]), EU)),
    "performance not stated": (("perf",), lambda: result_of(load(limits=[]), with_rules(
        rule(kinds=("field length", "climb")), rule(at="landing")))),
    "performance that need not be stated": (("perf",), lambda: result_of(load(limits=[]), with_rules(
        rule(required=False)))),
    "performance of another operation": (("perf",), lambda: result_of(load(limits=[]), with_rules(
        rule(operations=("ferry",))))),
    "a trim setting outside": (("trim",), lambda: of(trim(FLAT, lowest=1, highest=4))),
    "a trim setting inside": (("trim",), lambda: of(trim(FLAT, lowest=1, highest="4.04"))),
    "trim settings off every table": (("trim",), lambda: of(trim(CG_OFF, WEIGHT_OFF))),
    "a trim setting by a chord that is not there": (("trim",), lambda: of(trim(FLAT, against="chord"))),
    "a trim setting by a chord off its table": (("trim",), lambda: result_with(plain(), lambda basis: replace(
        basis, trim=trim(CG_OFF, against="chord"), chord=Chord(F(90), F(50), SOURCE)))),
    "fuel put beyond the table of a tank for a while": (("sequence", "1", "2"), beyond_the_table),
    "no fuel where its balance is asked for": (
        ("fuel-bal",), lambda: balanced(balance(9, phases=("zero fuel",)))),
    "nothing is left at all": (("weight",), lambda: round_flown(round_load() | {"items": [GONE]})),
    "an item is moved to a place it fills": (
        ("cg.take",), lambda: inside(110, "118.5", places=nose_hold("10.1"))),
    "an item is moved to a place it does not overfill": (
        ("cg.take",), lambda: inside(110, "118.5", places=nose_hold("10"))),
    "an item is moved within limits across": (
        ("cg.take", "lateral-by"), lambda: inside(110, "118.5", lateral_by_cg=(by_cg(*WIDE),))),
    "no item is moved beyond limits across": (
        ("cg.take", "lateral-by"), lambda: inside(110, "118.5", lateral_by_cg=(by_cg(*ENDING),))),
    "flaps without a table": (("trim",), lambda: flapped("30")),
    "flaps that are stated": (("trim",), lambda: flapped("up", "10")),
    "an index alone": (("presentation",), lambda: result_of(basis=replace(twin(), presentation=Presentation(
        IndexUnits(F(118), F(1000), F(0), SOURCE), None)))),
    "what is fitted": (("place", "seat"), lambda: result_of(load(conditions=["NET"]), replace(
        twin(), conditions=(NET, DOOR), cumulative=(Cumulative("FLOOR", "floor", "nose", ()),)))),
}  # fmt: skip


def told(kept: tuple[str, ...], result: Result) -> list[str]:
    starts = (*TELLING, *(f"pass {code}" for code in kept), *kept)
    return [line for line in result_told(result) if line.startswith(starts)]


@pytest.mark.parametrize("title", CASES)
def test_a_trouble_is_told_in_full(title: str) -> None:
    kept, make = CASES[title]
    assert told(kept, make()) == AGREED[title]


def test_every_agreed_trouble_is_asked_for() -> None:
    assert list(AGREED) == list(CASES)

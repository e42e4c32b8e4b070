"""Loads of the invented aircraft that between them have everything a load may have, each read and assessed.

What each of them makes is agreed upon line by line in `agreed_texts/`.
"""

from collections.abc import Callable
from dataclasses import replace
from datetime import UTC, datetime
from typing import Any

from fleet.basis import FixedItem
from fleet.basis_reading import read_basis
from fleet.curtailment import Inset
from fleet.empty_weight_reading import read_empty_weight
from fleet.standard_weights_reading import read_standard_weights
from fleet.stations import Rail, Setting
from loads.balance.assess import assess
from loads.balance.circumstances import Applied, Circumstances, WeighingDue
from loads.balance.declared import read_load
from loads.balance.outline import read_outline
from loads.balance.result import Result
from tests.pure.fleet.documents import basis_document, empty_weight_document
from tests.pure.fleet.everything import everything
from tests.pure.loads.accepted_loads import helicopter_load, turboprop_load, twin_load
from tests.pure.loads.accepted_loads import item as bags
from tests.pure.loads.accepted_loads import person as rider
from tests.pure.loads.cases.test_curtailment import margin
from tests.pure.loads.cases.test_floor import crate, hold, loaded, per_area, per_length, sides
from tests.pure.loads.cases.test_hoist import CRATE, FOUND
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.cases.test_sling_load import RELEASE, SLUNG, hook_basis
from tests.pure.loads.making import SOURCE, F, limit, load, result_of, tank, twin, twin_empty, with_limits
from tests.pure.loads.round_figures import box, flown, q, round_basis, round_load
from tests.pure.loads.standards import eu_document, seasonal_document, standard
from tests.pure.loads.test_presented import BOTH
from tests.pure.loads.test_sequencing import GEAR


def sound() -> Result:
    return result_of()


def no_empty_weight() -> Result:
    return result_of(empty=None)


def no_basis() -> Result:
    return assess(read_outline(load()), None, None)


def much_aboard() -> Result:
    """Infant and restraint, equipment taken out, estimates, fuel that cannot be used, other units."""
    document = load(persons_on_board=6)
    document["crew"].append(
        {"name": "J. Sorrel", "position": "second pilot", "seat": "COCKPIT-R", "weight": q(70, "kg")}
        | {"how": "declared", "category": "adult"}
    )
    document["passengers"].append(
        {"name": "T. Havel", "seat": "ROW2-R", "category": "child", "weight": q(66), "how": "estimated"}
        | {"restraint": q(12)}
    )
    document["items"] += [
        {"kind": "equipment", "what": "bench", "place": "WING-LOCKER", "weight": q(35), "how": "weighed"}
        | {"removed": True},
        {"kind": "ballast", "what": "shot bags", "place": "NOSE-HOLD", "weight": q(50), "how": "estimated"},
    ]
    document["fuel"]["not_usable"] = {"LEFT-AUX": q(2, "US gal"), "RIGHT-MAIN": q(10, "l")}
    document["fuel"]["taxi"] = q(4, "US gal")
    return result_of(document)


def a_weight_nobody_knows() -> Result:
    document = load()
    document["passengers"][0] |= {"category": "adult", "how": "standard"}
    del document["passengers"][0]["weight"]
    document["items"][0] |= {"how": "standard"}
    del document["items"][0]["weight"]
    return result_of(document)


def beyond_every_limit() -> Result:
    """Every greatest weight is exceeded, a stated one, too, and more fuel is wanted than there is."""
    weights = {"ramp": 5700, "take_off": 5700, "zero_fuel": 5000, "landing": 5300, "minimum_flying": 5400}
    document = load()
    document["limits"] = [
        {"at": "landing", "weight": q(5200), "source": "runway 04 wet", "kind": "field length"}
    ]
    document["fuel"]["minimum_at_landing"] = q(400)
    document["passengers"][0]["weight"] = q(310)
    document["items"][0]["weight"] = q(301)
    return result_of(document, with_limits(**weights))


def limits_not_entered() -> Result:
    """No limit of weight but shown to be none, no lateral limits, an envelope for the take-off alone."""
    basis = with_limits(ramp=None, take_off=6800)
    seats = tuple(replace(one, maximum=None) if one.id == "ROW1-L" else one for one in basis.seats)
    places = tuple(replace(one, maximum=None) if one.id == "AFT-HOLD" else one for one in basis.places)
    only = (replace(basis.envelopes[0], phases=("take-off",)),)
    basis = replace(basis, seats=seats, places=places, envelopes=only, lateral_limits_entered=False, zones=())
    return result_of(basis=basis)


def outside_forward_and_aft() -> Result:
    """Two envelopes, both of which hold; the load lies outside each, and too far left."""
    across = box(-2, "0.1", 4000, 6800, axis="lateral")
    forward, aft = box(119, 128, 4000, 6800), box(110, 118, 4000, 5000)
    return result_of(basis=replace(twin(), envelopes=(forward, aft, across)))


def with_margins_and_moments_shown() -> Result:
    margins = (
        margin(aft=Inset(moment=F("23041.9")), forward=Inset(arm=F(1))),
        margin("FUEL", "fuel use", ("take-off", "landing"), forward=Inset(moment=F(30_000))),
    )
    return result_of(basis=replace(twin(), curtailments=margins, presentation=BOTH))


def with_everything() -> Result:
    """The demonstration twin with one of everything its basis may state, in the utility category."""
    basis = read_basis(everything())
    document = twin_load(
        configuration=basis.configurations[0].id,
        certification_category="utility",
        conditions=["NET"],
        seat_settings=[{"seat": "ROW1-L", "setting": "5"}],
    )
    document["limits"][0]["kind"] = "climb"
    return assess(read_load(document, basis), basis, read_empty_weight(empty_weight_document("twin"), basis))


def demonstration(kind: str, document: dict[str, Any]) -> Result:
    basis = read_basis(basis_document(kind))
    return assess(read_load(document, basis), basis, read_empty_weight(empty_weight_document(kind), basis))


def full_turboprop() -> Result:
    return demonstration("turboprop", turboprop_load())


def helicopter() -> Result:
    return demonstration("helicopter", helicopter_load())


def heavy_helicopter() -> Result:
    document = helicopter_load(persons_on_board=3)
    document["passengers"] = [
        rider("A. Quist", "REAR-L", "122", "kg"),
        rider("B. Quist", "REAR-R", "44", "kg"),
    ]
    document["items"] = [bags("mast parts", "AFT-HOLD", q(80, "kg"), kind="cargo")]
    return demonstration("helicopter", document)


def seats_on_rails() -> Result:
    rail = Rail(F(118), F(130), (Setting("3", F(121)), Setting("7", F(127))), SOURCE)
    seats = tuple(replace(one, rail=rail) if one.id.startswith("ROW1") else one for one in twin().seats)
    return result_of(load(seat_settings=[{"seat": "ROW1-R", "setting": "7"}]), replace(twin(), seats=seats))


def standard_weights() -> Result:
    document = load(persons_on_board=5)
    document["passengers"] = [
        standard("A. Lund", "ROW1-L", "adult", lap_infant={"name": "B. Lund"}),
        standard("C. Lund", "ROW1-R", "child"),
        {"name": "D. Lund", "seat": "ROW2-L", "weight": q(176), "how": "declared"},
    ]
    basis = twin()
    table = read_standard_weights(seasonal_document())
    return assess(read_load(document, basis, table), basis, twin_empty())


def declared_with_additions() -> Result:
    basis = twin()
    table = read_standard_weights(eu_document())
    return assess(read_load(load(), basis, table), basis, twin_empty())


def circumstances() -> Result:
    """A restriction and a permit hold, one of them names what the basis has not; the weighing is overdue."""
    since = datetime(2026, 11, 30, tzinfo=UTC)
    applied = (
        Applied(
            "restriction", "DD-14", "seat torn", "", ("Row 2 r is blocked.",),
            since, None, "MEL rev 7 p. 25-3",
        ),
        Applied(
            "permit", "SFP-88", "ferry", "Civil Aviation Office, Nalden", ("Take-off up to 7480 lb.",),
            since, datetime(2026, 12, 3, tzinfo=UTC), "Permit SFP-88 p. 1",
        ),
    )  # fmt: skip
    due = WeighingDue("2023-05-02", "2026-05-01", True, "weighed at least every 36 months", "Rule 7 p. 2")
    about = Circumstances("company rule 4", applied, ("DD-14 names NOSE-POD",), due)
    document = load()
    document["passengers"][0]["how"] = "estimated"
    return assess(replace(read_load(document, twin()), circumstances=about), twin(), twin_empty())


def fixed_equipment() -> Result:
    fixed = (FixedItem("stretcher", F(44), F(150), F(-10)),)
    oil = (FixedItem("life vests", F(9), F(130), F(0)),)
    made = replace(twin().configurations[0], equipment=fixed, operating_items=oil)
    return result_of(basis=replace(twin(), configurations=(made,)))


def floors() -> Result:
    """A crate on its feet, one on a spreader, one with nothing under it, and one that needs nothing."""
    basis = hold(per_area(50), per_length(60), length=F(40), free_up_to=F(10), free_kinds=("baggage",))
    spread = {"weight": q(9), **sides(24, 30)}
    return result_of(
        loaded(
            crate(80, sides(4, 4, feet_lengthwise=2, feet_widthwise=2)),
            crate(60, sides(10, 12), what="drum", spreader=spread, net={"weight": q(2)}),
            crate(40, what="case"),
            crate(8, what="kit"),
            crate(20, what="bag", kind="baggage"),
            crate(30, sides(20, 10, "across"), what="mast", pallet={"weight": q(5)}),
        ),
        basis,
    )


def floor_side_by_side() -> Result:
    basis = hold(None, per_length(60), length=F(40))
    return result_of(loaded(crate(100, sides(24, 10)), crate(90, sides(24, 10), what="drum")), basis)


def floor_without_limit() -> Result:
    basis = hold(per_area(None), None)
    return result_of(loaded(crate(100, sides(24, 10)), crate(9, what="drum", how="estimated")), basis)


def events_of_every_kind() -> Result:
    """Taxiing: a move. In flight: a transfer, the gear, half a drop, somebody jumps, somebody is taken up."""
    tanks = (tank("MAIN", 100, 100), tank("AUX", 120, 20, 30))
    basis = round_basis(tanks=tanks, positions=(GEAR,), presentation=BOTH)
    jumper = FOUND | {
        "lap_infant": {"name": "B. Brisk", "weight": q(18), "how": "weighed"},
        "restraint": q(7),
    }
    moves = [{"seat": "S1", "to": "DOOR"}, {"place": "HOLD", "what": "bag", "to": "HOOK"}]
    run = [
        event(6, since="engine start", move=moves),
        event(0, position={"GEAR": "UP"}),
        event(12, transfer={"from": "AUX", "to": "MAIN", "quantity": q(5, "US gal")}),
        event(30, leave=[{"place": "HOLD", "what": "bag", "weight": q("12.5")}, {"seat": "S1"}]),
        event(60, come_aboard=[jumper, CRATE | {"pallet": {"weight": q(20)}}]),
        event(90, leave=[{"seat": "S2"}, {"place": "HOLD", "what": "crate"}]),
        event(100, position={"GEAR": "DOWN"}),
    ]  # fmt: skip
    document = round_load(
        1,
        items=[("bag", "HOLD", 30), ("box", "DOOR", 20)],
        start={"MAIN": q(60, "US gal"), "AUX": q(10, "US gal")},
        fuel={"taxi": q(12), "not_usable": {"AUX": q(1, "US gal")}},
        sequence=run,
    )
    return flown(document, basis)


def events_one_of_them_unknown() -> Result:
    came = {"name": "T. Brisk", "seat": "S2", "category": "adult", "how": "standard"}
    return flown(
        round_load(
            1, sequence=[event(30, move=[{"seat": "S1", "to": "DOOR"}]), event(60, come_aboard=[came])]
        )
    )


def too_full_in_flight() -> Result:
    """Taken up: too much for the hold and for the landing; the box is outside then."""
    run = [event(60, come_aboard=[FOUND, CRATE | {"weight": q(700)}])]
    basis = round_basis(box(95, 104), weights={"take_off": 2600, "landing": 2600, "zero_fuel": 2500})
    places = tuple(replace(one, maximum=limit(500)) if one.id == "HOLD" else one for one in basis.places)
    return flown(round_load(sequence=run), replace(basis, places=places))


def on_the_hook() -> Result:
    document = round_load(sequence=[event(60, leave=[RELEASE])]) | {"items": [SLUNG]}
    return flown(document, hook_basis())


def picked_up_and_too_heavy() -> Result:
    heavy = SLUNG | {"weight": q(600)}
    return flown(round_load(sequence=[event(60, come_aboard=[heavy])]), hook_basis())


WHOLE: tuple[Callable[[], Result], ...] = (
    sound, no_empty_weight, no_basis, much_aboard, a_weight_nobody_knows, beyond_every_limit,
    limits_not_entered, outside_forward_and_aft, with_margins_and_moments_shown, with_everything,
    full_turboprop, helicopter, heavy_helicopter, seats_on_rails, standard_weights,
    declared_with_additions, circumstances, fixed_equipment, floors, floor_side_by_side,
    floor_without_limit, events_of_every_kind, events_one_of_them_unknown, too_full_in_flight,
    on_the_hook, picked_up_and_too_heavy,
)  # fmt: skip

"""What a loading basis is refused for: each fault by pointer and code, all of them in one answer."""

from fractions import Fraction
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.basis_reading import basis_from_text, read_basis
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from records.refusal import Invalid
from tests.pure.fleet.documents import (
    NAMES,
    ROOT,
    basis_document,
    changed,
    found_in,
    is_a_sentence_with_a_next_step,
)

Q = {"value": "1", "unit": "lb"}
PAGE = {"page": "1-1"}


@pytest.mark.parametrize("name", NAMES)
def test_the_invented_bases_are_read(name: str) -> None:
    basis = read_basis(basis_document(name))

    assert isinstance(basis, Basis)
    assert basis_from_text((ROOT / f"service/demo/data/{name}.loading-basis.json").read_text()) == basis


def test_figures_arrive_exactly_in_the_units_of_the_basis_with_their_source() -> None:
    document = changed(basis_document("twin"), "/limits/landing/unit", "kg")
    document = changed(document, "/limits/landing/value", "2676.1")
    document = changed(document, "/seats/0/arm", {"value": "3352.8", "unit": "mm"})
    document = changed(
        document, "/limits/landing/source", {"page": "3", "document": "OK62-S1", "revision": "2"}
    )

    basis = read_basis(document)

    assert basis.limits.landing == Limit(
        Fraction("2676.1") / Fraction("0.45359237"), Source("OK62-S1", "2", "3")
    )
    assert basis.seats[0].arm == 132
    assert str(basis.seats[0].source) == "OK62-FM rev D p. 6-9"
    assert (basis.weight_unit, basis.length_unit, basis.volume_unit) == (Unit.LB, Unit.IN, Unit.US_GAL)


def test_a_limit_is_a_value_or_none_with_its_page_or_not_entered() -> None:
    basis = read_basis(changed(basis_document("twin"), "/limits/ramp", ...))

    assert basis.limits.ramp is None
    assert basis.limits.minimum_flying == Limit(None, Source("OK62-FM", "D", "2-4"))
    assert basis.limits.take_off == Limit(Fraction(6200), Source("OK62-FM", "D", "2-4"))


def test_a_configuration_carries_the_tighter_limits_and_its_base_fit() -> None:
    basis = read_basis(changed(basis_document("turboprop"), "/configurations/1/fit", ...))
    freight = basis.configurations[1]

    assert freight.limits.landing == Limit(Fraction(3800), Source("FL9-FM", "C", "6-11"))
    assert freight.limits.zero_fuel == basis.limits.zero_fuel
    assert freight.fit == "wheels"
    assert sum(item.weight for item in freight.equipment) == -36


def test_lateral_limits_are_known_by_an_envelope_or_by_a_page_that_shows_none() -> None:
    assert read_basis(basis_document("helicopter")).lateral_limits_entered
    assert read_basis(basis_document("twin")).lateral_limits_entered
    assert not read_basis(changed(basis_document("twin"), "/lateral_limits", ...)).lateral_limits_entered


def test_what_holds_at_landing_holds_down_to_the_minimum_at_landing() -> None:
    lateral = read_basis(basis_document("helicopter")).envelopes[1]

    assert lateral.phases == ("ramp", "take-off", "landing", "minimum at landing")


def test_taxi_fuel_comes_from_its_own_order_or_else_from_the_burn_order() -> None:
    twin, turboprop = (read_basis(basis_document(name)) for name in ("twin", "turboprop"))

    assert twin.taxi_order != twin.burn_order
    assert turboprop.taxi_order == turboprop.burn_order


def test_all_faults_are_named_at_once_those_of_form_and_those_of_sense() -> None:
    document = changed(basis_document("twin"), "/seats/3/arm/unit", ...)
    document = changed(document, "/zones/0/members/0", "ROW9-L")
    document = changed(document, "/limits/zero_fuel/value", 6201)
    document = changed(document, "/tanks/2/table/points/1/0", "0")

    with pytest.raises(Invalid) as refused:
        read_basis(document)

    assert found_in(refused.value) == {
        ("/seats/3/arm/unit", "unit-missing"),
        ("/zones/0/members/0", "unknown-id"),
        ("/limits/zero_fuel", "limits-contradict"),
        ("/tanks/2/table/points/1", "tank-table-not-rising"),
    }
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refused.value.faults)


TWIN_REFUSALS: list[tuple[str, Any, str, str]] = [
    ("/lateral_positive", "left", "/lateral_positive", "lateral-positive"),
    ("/schema", "tarebook.loading-basis/2", "/schema", "schema-unknown"),
    ("/units/weight", "stone", "/units/weight", "unit-unknown"),
    ("/units/length", "kg", "/units/length", "unit-dimension"),
    ("/colour", "blue", "/colour", "unknown-field"),
    ("/seats/0/colour", "blue", "/seats/0/colour", "unknown-field"),
    ("/seats/0/id", "COCKPIT_L", "/seats/0/id", "wrong-form"),
    ("/seats/0/id", "A" * 25, "/seats/0/id", "wrong-form"),
    ("/seats/0/name", "", "/seats/0/name", "empty"),
    ("/seats/0/name", " \t", "/seats/0/name", "wrong-form"),
    ("/seats/0/arm", 132, "/seats/0/arm", "wrong-type"),
    ("/seats/0/arm/value", "1e3", "/seats/0/arm/value", "number-form"),
    ("/seats/0/arm/value", True, "/seats/0/arm/value", "number-form"),
    ("/seats/0/arm/value", "132,0", "/seats/0/arm/value", "number-form"),
    ("/seats/0/arm/value", "1234567890.123456", "/seats/0/arm/value", "number-digits"),
    ("/seats/0/arm/unit", "lb", "/seats/0/arm/unit", "unit-dimension"),
    ("/seats/0/arm/unit", "yd", "/seats/0/arm/unit", "unit-unknown"),
    ("/seats/0/lateral_arm", ..., "/seats/0/lateral_arm", "missing"),
    ("/seats/0/maximum/source", ..., "/seats/0/maximum/source", "source-missing"),
    ("/seats/0/maximum/value", 0, "/seats/0/maximum/value", "not-above-zero"),
    ("/seats/0/maximum", {"none": False, "source": PAGE}, "/seats/0/maximum/none", "not-a-choice"),
    ("/seats/0/maximum", {"none": True, "value": 3, "source": PAGE},
     "/seats/0/maximum/value", "unknown-field"),
    ("/seats/1/id", "COCKPIT-L", "/seats/1/id", "duplicate-id"),
    ("/places/0/id", "COCKPIT-L", "/places/0/id", "duplicate-id"),
    ("/tanks/1/id", "LEFT-AUX", "/tanks/1/id", "duplicate-id"),
    ("/configurations/1/id", "six-seat", "/configurations/1/id", "duplicate-id"),
    ("/zones/0/members/1", "ROW2-L", "/zones/0/members/1", "duplicate"),
    ("/zones/0/members/1", "LEFT-MAIN", "/zones/0/members/1", "unknown-id"),
    ("/zones/0/members", [], "/zones/0/members", "too-few"),
    ("/configurations/0/seats/0", "ROW7-L", "/configurations/0/seats/0", "unknown-id"),
    ("/configurations/0/places/0", "ROW1-L", "/configurations/0/places/0", "unknown-id"),
    ("/configurations/0/places/0", "AFT-HOLD", "/configurations/0/places/1", "duplicate"),
    ("/configurations/0/minimum_crew", 0, "/configurations/0/minimum_crew", "too-small"),
    ("/configurations/0/minimum_crew", 3, "/configurations/0/minimum_crew", "too-few-crew-seats"),
    ("/configurations/0/seats", [], "/configurations/0/seats", "too-few"),
    ("/configurations/0/seats", ["ROW1-L"], "/configurations/0/minimum_crew", "too-few-crew-seats"),
    ("/configurations/0/fit", "skis", "/configurations/0/fit", "fit-unknown"),
    ("/configurations/1/equipment/0/weight/value", 0, "/configurations/1/equipment/0/weight", "weight-zero"),
    ("/configurations/0/limits", {"landing": {**Q, "value": 5901, "source": PAGE}},
     "/configurations/0/limits/landing", "limit-looser"),
    ("/configurations/0/limits", {"landing": {"none": True, "source": PAGE}},
     "/configurations/0/limits/landing", "limit-looser"),
    ("/configurations/0/limits", {"take_off": {**Q, "value": 5899, "source": PAGE}},
     "/configurations/0/limits/landing", "limits-contradict"),
    ("/passenger_seats_installed", 3, "/configurations/0/seats", "too-many-passenger-seats"),
    ("/fits", ["wheels", "wheels"], "/fits", "duplicate"),
    ("/limits/take_off/value", 6241, "/limits/take_off", "limits-contradict"),
    ("/limits/landing/value", 6201, "/limits/landing", "limits-contradict"),
    ("/limits/zero_fuel/value", 6201, "/limits/zero_fuel", "limits-contradict"),
    ("/limits/minimum_flying", {**Q, "value": 6200, "source": PAGE},
     "/limits/minimum_flying", "limits-contradict"),
    ("/limits/ramp/value", -1, "/limits/ramp/value", "not-above-zero"),
    ("/limits/take_off/unit", ..., "/limits/take_off/unit", "unit-missing"),
    ("/tanks/0/table/density", {"value": 6, "unit": "lb/US gal"},
     "/tanks/0/table/density", "tank-table-density-unused"),
    ("/tanks/0/table/against_unit", "lb", "/tanks/0/table/against_unit", "unit-dimension"),
    ("/tanks/0/table/gives_unit", "lb in", "/tanks/0/table/gives_unit", "unit-dimension"),
    ("/tanks/0/table/points", [["0", "1"]], "/tanks/0/table/points", "too-few"),
    ("/tanks/0/table/points/1", ["40"], "/tanks/0/table/points/1", "too-few"),
    ("/tanks/0/table/points/1/0", "-1", "/tanks/0/table/points/1", "tank-table-not-rising"),
    ("/tanks/0/capacity/value", "40.1", "/tanks/0/capacity", "capacity-beyond-table"),
    ("/tanks/0/capacity/value", "0", "/tanks/0/capacity/value", "not-above-zero"),
    ("/burn_order/0/tanks", ["LEFT-AUX"], "/tanks/1/id", "tank-never-burned"),
    ("/burn_order/1/tanks/2", "LEFT-AUX", "/burn_order/1/tanks/2", "tank-burned-twice"),
    ("/burn_order/1/tanks/0", "CENTRE", "/burn_order/1/tanks/0", "unknown-id"),
    ("/taxi_order/0/tanks/0", "CENTRE", "/taxi_order/0/tanks/0", "unknown-id"),
    ("/burn_order_source", ..., "/burn_order_source", "missing"),
    ("/envelopes/0/points/0", ["6240", "158"], "/envelopes/0/points", "envelope-crosses-itself"),
    ("/envelopes/0/points/6", ["3700", "150.5"], "/envelopes/0/points", "envelope-repeated-point"),
    ("/envelopes/0/unit", "lb in", "/envelopes/0/unit", "unit-dimension"),
    ("/envelopes/0/plane", "moment", "/envelopes/0/unit", "unit-dimension"),
    ("/envelopes/0/plane", ..., "/envelopes/0/plane", "missing"),
    ("/envelopes/0/weight_unit", "kg", "/envelopes/0/points", "envelope-above-limits"),
    ("/envelopes/0/phases", ["ramp", "take-off", "zero-fuel"], "/envelopes", "envelope-missing"),
    ("/limits/ramp/value", 6241, "/envelopes/0/phases/0", "envelope-below-limit"),
    ("/limits/zero_fuel/value", 3700, "/envelopes/0/phases/3", "envelope-outside-limits"),
    ("/chord/length/value", 0, "/chord/length/value", "not-above-zero"),
    ("/chord", "none", "/chord", "wrong-type"),
    ("/sample_loads", [], "/sample_loads", "too-few"),
    ("/sample_loads/0/tolerance_moment/value", 50000, "/sample_loads/0/tolerance_moment", "tolerance"),
    ("/sample_loads/0/weights/0/moment", {"value": 1, "unit": "lb in"},
     "/sample_loads/0/weights/0", "one-of"),
    ("/sample_loads/0/weights/0/weight/value", 0, "/sample_loads/0/weights/0/weight", "weight-zero"),
]  # fmt: skip


@pytest.mark.parametrize(
    ("at", "value", "pointer", "code"),
    TWIN_REFUSALS,
    ids=lambda value: value if isinstance(value, str) else "-",
)
def test_a_faulty_basis_is_refused_by_field_and_code(at: str, value: Any, pointer: str, code: str) -> None:
    with pytest.raises(Invalid) as refused:
        read_basis(changed(basis_document("twin"), at, value))

    assert (pointer, code) in found_in(refused.value)
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refused.value.faults)


@pytest.mark.parametrize(
    ("name", "at", "value", "pointer", "code"),
    [
        ("turboprop", "/tanks/0/table/density", ..., "/tanks/0/table/density", "tank-table-no-density"),
        ("helicopter", "/tanks/0/table/density", ..., "/tanks/0/table/density", "tank-table-no-density"),
        ("turboprop", "/tanks/0/table/density/value", 0, "/tanks/0/table/density", "tank-table-density"),
        (
            "helicopter",
            "/lateral_limits",
            {"none": True, "source": PAGE},
            "/lateral_limits",
            "limits-contradict",
        ),
        ("helicopter", "/envelopes/1/axis", "longitudinal", "/envelopes/1/phases/0", "envelope-twice"),
    ],
)
def test_so_are_other_faults_of_other_aircraft(
    name: str, at: str, value: Any, pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        read_basis(changed(basis_document(name), at, value))

    assert (pointer, code) in found_in(refused.value)


def test_a_seat_with_a_fault_of_form_is_not_called_unknown_where_it_is_named() -> None:
    with pytest.raises(Invalid) as refused:
        read_basis(changed(basis_document("twin"), "/seats/2/arm", ...))

    assert found_in(refused.value) == {("/seats/2/arm", "missing")}


@pytest.mark.parametrize("document", [None, [], "text", 5, {}, {"schema": "tarebook.loading-basis/1"}])
def test_what_is_no_basis_at_all_is_refused(document: Any) -> None:
    with pytest.raises(Invalid) as refused:
        read_basis(document)

    assert refused.value.faults


@pytest.mark.parametrize("field", list(basis_document("twin")))
@pytest.mark.parametrize("nonsense", [None, True, -1, "", [], {}, [None], {"value": {}}])
def test_nonsense_in_any_field_is_refused_and_never_an_accident(field: str, nonsense: Any) -> None:
    if (field, nonsense) in [
        ("places", []),
        ("zones", []),
        ("limits", {}),
    ]:  # lawful: nothing there, nothing entered
        nonsense = "nonsense"

    with pytest.raises(Invalid) as refused:
        read_basis(changed(basis_document("twin"), f"/{field}", nonsense))

    assert any(fault.pointer.startswith(f"/{field}") for fault in refused.value.faults)


def test_a_flood_of_faults_is_cut_off() -> None:
    document = changed(basis_document("twin"), "/tanks/0/table/points", [["x", "y"]] * 400)

    with pytest.raises(Invalid) as refused:
        read_basis(document)

    assert len(refused.value.faults) == 200

"""Maxima under conditions, running sums, floors and rails: read from a loading basis, and refused with the
field where they contradict themselves. The figures are invented.
"""

from fractions import Fraction
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.basis_reading import read_basis
from fleet.conversion import converted
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from fleet.stations import Conditional, maximum_under
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in, is_a_sentence_with_a_next_step

PAGE = {"page": "6-11"}
SOURCE = Source("OK62-FM", "D", "6-11")


def lb(value: Any) -> dict[str, Any]:
    return {"value": value, "unit": "lb", "source": PAGE}


def inches(value: Any) -> dict[str, Any]:
    return {"value": value, "unit": "in"}


RAIL = {
    "forward": inches("162"),
    "aft": inches("174"),
    "settings": [
        {"setting": "2", "arm": inches("165")},
        {"setting": "5", "arm": {"value": "4.4", "unit": "m"}},
    ],
    "source": PAGE,
}
FLOOR = {
    "runs": "along",
    "per_area": {"value": "75", "unit": "lb/ft2", "source": PAGE},
    "per_length": {"value": "150", "unit": "kg/m", "source": PAGE},
    "length": inches("48"),
    "no_footprint": {"up_to": {"value": "25", "unit": "lb"}, "kinds": ["baggage"], "source": PAGE},
}
RUNNING = {
    "id": "AFT-RUN",
    "name": "from the tail",
    "from": "tail",
    "steps": [
        {"name": "station 236", "members": ["AFT-HOLD"], "maximum": lb("200")},
        {"name": "station 200", "members": ["ROW2-L", "ROW2-R"]},
    ],
}
NET = {"id": "NET", "name": "net fitted", "source": PAGE}


def document() -> Any:
    """The demonstration's twin with one of everything."""
    full = basis_document("twin")
    full["seats"][2] |= {"rail": RAIL, "row": "1", "exit_row": True, "infant_restraint": False}
    full["places"][2] |= {
        "floor": FLOOR,
        "conditional": [{"when": ["NET"], "maximum": lb("260")}],
    }
    full["conditions"] = [NET]
    full["cumulative"] = [RUNNING]
    return full


def refused(pointer: str, value: Any) -> set[tuple[str, str]]:
    with pytest.raises(Invalid) as refusal:
        read_basis(changed(document(), pointer, value))
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refusal.value.faults)
    return found_in(refusal.value)


def test_what_is_stated_of_stations_is_read_into_the_units_of_the_basis() -> None:
    basis = read_basis(document())
    seat, place, running = basis.seats[2], basis.places[2], basis.cumulative[0]

    assert seat.rail is not None
    assert (seat.rail.forward, seat.rail.aft, seat.rail.source) == (162, 174, SOURCE)
    assert [one.name for one in seat.rail.settings] == ["2", "5"]
    assert seat.rail.settings[1].arm == converted(Fraction("4.4"), Unit.M, Unit.IN)
    assert (seat.row, seat.exit_row, seat.infant_restraint, seat.attendant) == ("1", True, False, False)
    assert place.floor is not None
    assert place.floor.per_area is not None
    assert place.floor.per_area.value == Fraction("75") / 144
    assert place.floor.per_area.unit is Unit.LB_PER_FT2
    assert place.floor.per_length is not None
    assert place.floor.per_length.value == converted(Fraction("150"), Unit.KG_PER_M, Unit.LB_PER_IN)
    assert (place.floor.length, place.floor.free_up_to, place.floor.free_kinds) == (48, 25, ("baggage",))
    assert place.conditional == (Conditional(frozenset({"NET"}), Limit(Fraction("260"), SOURCE)),)
    assert running.start == "tail"
    assert [(one.name, one.members) for one in running.steps] == [
        ("station 236", ("AFT-HOLD",)),
        ("station 200", ("ROW2-L", "ROW2-R")),
    ]
    assert running.steps[0].maximum == Limit(Fraction("200"), SOURCE)
    assert running.steps[1].maximum is None  # not entered


def test_a_basis_that_states_none_of_it_reads_as_before() -> None:
    basis = read_basis(basis_document("twin"))

    assert (basis.conditions, basis.cumulative) == ((), ())
    assert all(seat.rail is None and not seat.exit_row for seat in basis.seats)
    assert all(place.floor is None and place.conditional == () for place in basis.places)


def test_a_floor_limit_shown_to_be_none_is_no_limit_and_one_left_out_is_not_entered() -> None:
    given_none = changed(document(), "/places/2/floor/per_area", {"none": True, "source": PAGE})
    left_out = changed(document(), "/places/2/floor/per_area", ...)

    none, absent = (read_basis(one).places[2].floor for one in (given_none, left_out))

    assert none is not None
    assert none.per_area is not None
    assert none.per_area.value is None
    assert absent is not None
    assert absent.per_area is None


@pytest.mark.parametrize(
    ("pointer", "value", "fault"),
    [
        ("/seats/2/arm", inches("161.9"), ("/seats/2/arm", "off-the-rail")),
        ("/seats/2/rail/aft", inches("162"), ("/seats/2/rail/aft", "rail-ends")),
        ("/seats/2/rail/settings/0/arm", inches("174.1"), ("/seats/2/rail/settings/0/arm", "off-the-rail")),
        ("/seats/2/rail/settings/1/setting", "2", ("/seats/2/rail/settings/1/setting", "duplicate")),
        ("/seats/2/rail/source", ..., ("/seats/2/rail/source", "source-missing")),
        ("/seats/2/exit_row", "yes", ("/seats/2/exit_row", "wrong-type")),
        ("/seats/2/row", "", ("/seats/2/row", "empty")),
        ("/places/2/floor/runs", "up", ("/places/2/floor/runs", "not-a-choice")),
        ("/places/2/floor/per_area/value", "0", ("/places/2/floor/per_area/value", "not-above-zero")),
        ("/places/2/floor/per_area/unit", "lb/ft", ("/places/2/floor/per_area/unit", "unit-dimension")),
        ("/places/2/floor/per_length/unit", "kg/m2", ("/places/2/floor/per_length/unit", "unit-dimension")),
        ("/places/2/floor/per_length/source", ..., ("/places/2/floor/per_length/source", "source-missing")),
        ("/places/2/floor/length", inches("-1"), ("/places/2/floor/length/value", "not-above-zero")),
        ("/places/2/floor/width", inches("1"), ("/places/2/floor/width", "unknown-field")),
        (
            "/places/2/floor/no_footprint/up_to",
            {"value": 0, "unit": "lb"},
            ("/places/2/floor/no_footprint/up_to/value", "not-above-zero"),
        ),
        ("/places/2/conditional/0/when/0", "SKIS", ("/places/2/conditional/0/when/0", "unknown-id")),
        ("/places/2/conditional/0/maximum", ..., ("/places/2/conditional/0/maximum", "missing")),
        (
            "/places/2/conditional/1",
            {"when": ["NET"], "maximum": lb("1")},
            ("/places/2/conditional/1/when", "duplicate"),
        ),
        ("/conditions/1", NET, ("/conditions/1/id", "duplicate-id")),
        ("/conditions/1", NET | {"id": "DOOR"}, ("/conditions/1/id", "condition-unused")),
        ("/cumulative/0/steps/1/members/0", "NOBODY", ("/cumulative/0/steps/1/members/0", "unknown-id")),
        ("/cumulative/0/steps/1/members/0", "AFT-HOLD", ("/cumulative/0/steps/1/members/0", "duplicate")),
        ("/cumulative/0/from", "nose", ("/cumulative/0/steps/1/members", "out-of-order")),
        (
            "/cumulative/0/steps/0/maximum/value",
            "-1",
            ("/cumulative/0/steps/0/maximum/value", "not-above-zero"),
        ),
        ("/cumulative/0/steps", [], ("/cumulative/0/steps", "too-few")),
    ],
)
def test_what_contradicts_itself_is_refused_with_its_field(
    pointer: str, value: Any, fault: tuple[str, str]
) -> None:
    assert fault in refused(pointer, value)


limits = st.one_of(st.none(), st.integers(1, 500))
sets = st.frozensets(st.sampled_from("ABC"), max_size=3)


@given(st.dictionaries(sets.filter(bool), limits, max_size=7), sets, limits)
def test_the_maximum_under_conditions_is_that_of_the_naive_rule(
    stated: dict[frozenset[str], int | None], holding: frozenset[str], plain: int | None
) -> None:
    conditional = tuple(Conditional(when, _limit(most)) for when, most in stated.items())

    found, because = maximum_under(_limit(plain), conditional, holding)

    # Naive: walk down from all that holds; a set counts unless a larger one that counts holds it.
    everything = {frozenset[str](): plain} | {when: most for when, most in stated.items() if when <= holding}
    counting = [when for when in everything if not any(when < other for other in everything)]
    naive = min((everything[when] for when in counting), key=lambda most: (most is None, most or 0))
    assert found is not None
    assert found.value == naive
    assert because in counting
    assert because <= holding


def _limit(most: int | None) -> Limit:
    return Limit(None if most is None else Fraction(most), SOURCE)

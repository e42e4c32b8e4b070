"""Children and infants: a lap infant is a person but no seat, weighs at that seat unless the adult's weight
is a standard one, and a restraint weighs too. Nobody young sits at an exit where the basis marks exits.

An infant on a lap inside a standard adult's mass: AMC1 CAT.POL.MAB.100(e) (read in a secondary copy). Exits
and restraints: common practice; the operator's rules decide.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from loads.balance.declared import read_load
from loads.balance.late_change import measured, said, settle
from loads.balance.late_reading import read_late_change
from records.refusal import Invalid
from tests.pure.loads.making import F, load, result_of, twin


def lb(weight: Any) -> dict[str, Any]:
    return {"value": weight, "unit": "lb"}


INFANT = {"name": "I. Sato", "weight": lb(20), "how": "weighed"}


def flown(*passengers: dict[str, Any], persons: int | None = None) -> dict[str, Any]:
    infants = sum("lap_infant" in one for one in passengers)
    count = 1 + len(passengers) + infants if persons is None else persons
    return load(persons_on_board=count, passengers=list(passengers), items=[])


def adult(**more: Any) -> dict[str, Any]:
    return {"name": "A. Sato", "seat": "ROW1-L", "weight": lb(170), "how": "weighed", **more}


def marked(**marks: dict[str, Any]) -> Basis:
    """The twin with marks on some seats, by id."""
    basis = twin()
    return replace(
        basis,
        seats=tuple(replace(one, **marks.get(one.id.replace("-", "_"), {})) for one in basis.seats),
    )


def test_a_lap_infant_weighs_at_the_seat_of_a_weighed_adult_and_counts_as_a_person() -> None:
    alone, together = result_of(flown(adult())), result_of(flown(adult(lap_infant=INFANT)))

    assert together.state("take-off").weight - alone.state("take-off").weight == 20
    assert together.state("take-off").moment - alone.state("take-off").moment == 20 * 124
    assert together.check("seat.ROW1-L").actual == "190"
    assert together.check("persons.count").actual == "3"


def test_a_restraint_weighs_at_its_seat_and_has_a_line_of_its_own() -> None:
    result = result_of(flown(adult(lap_infant=INFANT, restraint=lb(9))))
    lines = [(line.what, line.weight, line.pointer) for line in result.lines if line.group == "passengers"]

    assert result.check("seat.ROW1-L").actual == "199"  # 170 + 20 + 9
    assert lines == [
        ("row1 l, passenger", F(170), "/passengers/0"),
        ("row1 l, lap infant", F(20), "/passengers/0/lap_infant"),
        ("row1 l, restraint", F(9), "/passengers/0/restraint"),
    ]


def test_a_restraint_weighs_with_a_standard_adult_too() -> None:
    standard = {"name": "A. Sato", "seat": "ROW1-L", "category": "adult", "how": "standard"}
    lines = result_of(flown(standard | {"restraint": lb(9)})).lines

    assert F(9) in {line.weight for line in lines}


def test_a_child_in_its_own_seat_is_a_person_with_its_own_weight() -> None:
    child = {"name": "C. Sato", "seat": "ROW1-R", "category": "child", "weight": lb(40), "how": "weighed"}

    assert result_of(flown(adult(), child)).check("seat.ROW1-R").actual == "40"


@pytest.mark.parametrize(
    "passenger",
    [
        adult(lap_infant=INFANT),
        adult(category="child", weight=lb(60)),
        adult(category="infant", weight=lb(25)),
    ],
)
def test_a_child_or_infant_at_a_marked_exit_is_outside(passenger: dict[str, Any]) -> None:
    at_exit = marked(ROW1_L={"exit_row": True})
    check = result_of(flown(passenger), at_exit).check("seats.exit-row")

    assert check.outcome == "fail"
    assert check.margin_text == "seat at an exit: row1 l"
    assert check.what_next == "Give another seat to the child or infant in row1 l."
    assert check.source == "common practice; the operator's rules decide"
    # Where no exit is marked there is nothing to judge by.
    assert not [one for one in result_of(flown(passenger)).checks if one.code.startswith("seats.")]


def test_grown_people_at_an_exit_are_within_and_elsewhere_nothing_is_asked() -> None:
    at_exit = marked(ROW1_L={"exit_row": True})
    child = {"name": "C. Sato", "seat": "ROW1-R", "category": "child", "weight": lb(40), "how": "weighed"}

    assert result_of(flown(adult(), child), at_exit).check("seats.exit-row").outcome == "pass"
    elsewhere = result_of(flown(child), at_exit)
    assert not [one for one in elsewhere.checks if one.code == "seats.exit-row"]


def test_an_infant_on_a_seat_without_a_restraint_for_it_is_outside_where_that_is_stated() -> None:
    document = flown(adult(lap_infant=INFANT))

    for stated, outcome in ((False, "fail"), (True, "pass")):
        check = result_of(document, marked(ROW1_L={"infant_restraint": stated})).check(
            "seats.infant-restraint"
        )
        assert check.outcome == outcome
    # Stated for another seat only: this one is not known to be without.
    other = result_of(document, marked(ROW1_R={"infant_restraint": False}))
    assert other.check("seats.infant-restraint").outcome == "pass"


def test_a_passenger_who_leaves_at_the_last_minute_takes_infant_and_restraint_along() -> None:
    document = flown(adult(lap_infant=INFANT, restraint=lb(9)))
    off = {"lines": [{"change": "passenger-off", "seat": "ROW1-L"}], "persons_on_board": 1}

    settled = settle(document, read_late_change(off))

    assert settled.document["passengers"] == []
    moved = measured(settled.lines, document["fuel"]["density"])
    assert (moved.kilograms, moved.persons) == (F(199) * F("0.45359237"), 2)
    assert said(settled.lines[0], named=False) == (
        "passenger off, ROW1-L, 170 lb weighed, with lap infant, 20 lb, with restraint, 9 lb"
    )


def test_a_restraint_can_come_aboard_at_the_last_minute() -> None:
    line = adult(change="passenger-on", restraint=lb(9))
    settled = settle(flown(), read_late_change({"lines": [line], "persons_on_board": 2}))

    assert measured(settled.lines, {}).kilograms == F(179) * F("0.45359237")
    assert result_of(settled.document).check("seat.ROW1-L").actual == "179"


@pytest.mark.parametrize(
    ("passengers", "persons", "pointer", "code"),
    [
        ([adult(restraint=lb(0))], None, "/passengers/0/restraint/value", "zero"),
        ([adult(restraint=lb(-3))], None, "/passengers/0/restraint/value", "negative"),
        ([adult(restraint={"value": 3})], None, "/passengers/0/restraint/unit", "unit-missing"),
        ([adult(lap_infant=INFANT)], 2, "/persons_on_board", "persons-mismatch"),
        ([adult(lap_infant={"name": "I. Sato"})], None, "/passengers/0/lap_infant/how", "missing"),
        (
            [adult(lap_infant=INFANT | {"weight": lb(90)})],
            None,
            "/passengers/0/lap_infant/weight",
            "implausible",
        ),
        ([adult(), adult(seat="ROW1-R")], None, "/passengers/1/name", "person-twice"),
        ([adult(), adult(name="B. Sato")], None, "/passengers/1/seat", "seat-taken"),
        ([adult(seat="ROW7-L")], None, "/passengers/0/seat", "unknown-seat"),
        ([adult(seat="COCKPIT-L")], None, "/passengers/0/seat", "seat-serves-others"),
        (
            [adult(lap_infant=INFANT | {"name": "A. Sato"})],
            None,
            "/passengers/0/lap_infant/name",
            "person-twice",
        ),
    ],
)
def test_people_who_do_not_fit_are_refused_with_their_field(
    passengers: list[dict[str, Any]], persons: int | None, pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        read_load(flown(*passengers, persons=persons), twin())

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_a_seat_that_is_not_in_the_configuration_is_refused_with_its_field() -> None:
    with pytest.raises(Invalid) as refused:
        read_load(flown(adult()) | {"configuration": "freight"}, twin())

    assert ("/passengers/0/seat", "seat-not-in-configuration") in {
        (fault.pointer, fault.code) for fault in refused.value.faults
    }

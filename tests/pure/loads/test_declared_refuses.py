"""Bad input of a load document, one row each: what is written where, and which field gets which code.

Sources: common practice for what people mistype; the number forms are those RFC 8259 allows or a hand is
likely to type.
"""

from decimal import Decimal
from typing import Any

import pytest

from loads.balance.declared import read_load
from loads.balance.outline import read_outline
from records.refusal import Invalid, Unreadable
from records.strict_json import read
from tests.pure.loads.making import load, twin

GONE = object()
LB = {"value": 100, "unit": "lb"}
P0, P1, C0, I0 = "/passengers/0", "/passengers/1", "/crew/0", "/items/0"
START, STUCK = "/fuel/at_engine_start", "/fuel/not_usable"
LEFT = f"{START}/LEFT-MAIN"


def passenger(**changes: Any) -> dict[str, Any]:
    made = {"name": "N. Brandl", "seat": "ROW2-L", "weight": {"value": 160, "unit": "lb"}, "how": "weighed"}
    return {**made, **changes}


# where it is written, what is written, which field is named, which code
ROWS: list[tuple[str, Any, str, str]] = [
    # the document
    ("/colour", "blue", "/colour", "unknown-field"),
    ("/schema", "tarebook.load/2", "/schema", "choice"),
    ("/schema", GONE, "/schema", "missing"),
    ("/aircraft", GONE, "/aircraft", "missing"),
    ("/aircraft", "", "/aircraft", "empty"),
    ("/aircraft", " ", "/aircraft", "empty"),
    ("/aircraft", "Q9-KTB ", "/aircraft", "untrimmed"),
    ("/aircraft", "Q9\u0000KTB", "/aircraft", "control-character"),
    ("/aircraft", "Q9\nKTB", "/aircraft", "control-character"),
    ("/aircraft", "Q9\u202eKTB", "/aircraft", "control-character"),
    ("/aircraft", "Q9\u2028KTB", "/aircraft", "control-character"),
    ("/aircraft", "Q" * 65, "/aircraft", "too-long"),
    ("/aircraft", 9, "/aircraft", "text-form"),
    ("/aircraft", None, "/aircraft", "text-form"),
    ("/aircraft", ["Q9-KTB"], "/aircraft", "text-form"),
    ("/configuration", "nine-seat", "/configuration", "unknown-configuration"),
    ("/configuration", 6, "/configuration", "text-form"),
    # the flight
    ("/flight", "KT-214", "/flight", "object-form"),
    ("/flight", GONE, "/flight", "missing"),
    ("/flight/reference", GONE, "/flight/reference", "missing"),
    ("/flight/leg", 0, "/flight/leg", "out-of-range"),
    ("/flight/leg", -1, "/flight/leg", "out-of-range"),
    ("/flight/leg", 10**14, "/flight/leg", "out-of-range"),
    ("/flight/leg", "1", "/flight/leg", "number-form"),
    ("/flight/leg", True, "/flight/leg", "number-form"),
    ("/flight/leg", Decimal("1.0"), "/flight/leg", "number-form"),
    ("/flight/departure", "2026-12-01T08:30:00", "/flight/departure", "offset-missing"),
    ("/flight/departure", "2026-12-01", "/flight/departure", "time-form"),
    ("/flight/departure", "01.12.2026 08:30", "/flight/departure", "time-form"),
    ("/flight/departure", "2026-13-01T08:30:00Z", "/flight/departure", "time-form"),
    ("/flight/departure", "2026-02-30T08:30:00Z", "/flight/departure", "time-form"),
    ("/flight/departure", "2026-12-01T08:30:00+99:00", "/flight/departure", "time-form"),
    ("/flight/departure", "0226-12-01T08:30:00Z", "/flight/departure", "implausible"),
    ("/flight/departure", "\u0662026-12-01T08:30:00Z", "/flight/departure", "time-form"),
    ("/flight/departure", 1796113800, "/flight/departure", "text-form"),
    ("/flight/origin", "X" * 81, "/flight/origin", "too-long"),
    # persons
    ("/persons_on_board", 5, "/persons_on_board", "persons-mismatch"),
    ("/persons_on_board", 3, "/persons_on_board", "persons-mismatch"),
    ("/persons_on_board", 0, "/persons_on_board", "out-of-range"),
    ("/persons_on_board", "4", "/persons_on_board", "number-form"),
    ("/persons_on_board", GONE, "/persons_on_board", "missing"),
    # crew
    ("/crew", [], "/crew", "pilot-in-command-count"),
    ("/crew", [], "/crew", "too-few-crew"),
    ("/crew", {}, "/crew", "list-form"),
    ("/crew", [7], "/crew/0", "object-form"),
    ("/crew", [{}] * 61, "/crew", "too-many"),
    (f"{C0}/position", "co-pilot", "/crew", "pilot-in-command-count"),
    (f"{C0}/position", GONE, f"{C0}/position", "missing"),
    (f"{C0}/weight", GONE, f"{C0}/weight", "missing"),
    (f"{C0}/name", "X" * 121, f"{C0}/name", "too-long"),
    (f"{C0}/person", 7, f"{C0}/person", "text-form"),
    (f"{C0}/lap_infant", {"name": "B. Amani"}, f"{C0}/lap_infant", "unknown-field"),
    # who sits where
    (f"{P0}/seat", "ROW9-L", f"{P0}/seat", "unknown-seat"),
    (f"{P0}/seat", "AFT-HOLD", f"{P0}/seat", "unknown-seat"),
    (f"{P0}/seat", "row1-l", f"{P0}/seat", "unknown-seat"),
    (f"{P0}/seat", "ROW1-R", f"{P1}/seat", "seat-taken"),
    (f"{P0}/seat", "COCKPIT-L", f"{P0}/seat", "seat-serves-others"),
    (f"{C0}/seat", "ROW2-L", f"{C0}/seat", "seat-serves-others"),
    ("/configuration", "freight", f"{P0}/seat", "seat-not-in-configuration"),
    (f"{P0}/name", "R. Amani", f"{P0}/name", "person-twice"),
    (f"{P0}/name", "m.  dravo", f"{P1}/name", "person-twice"),
    (f"{P1}/lap_infant/name", "L. Osei", f"{P1}/lap_infant/name", "person-twice"),
    # how heavy
    (f"{P0}/weight", GONE, f"{P0}/weight", "missing"),
    (f"{P0}/weight", 176, f"{P0}/weight", "quantity-form"),
    (f"{P0}/weight", {"value": 176}, f"{P0}/weight/unit", "unit-missing"),
    (f"{P0}/weight", {"unit": "lb"}, f"{P0}/weight/value", "missing"),
    (f"{P0}/weight/unit", "in", f"{P0}/weight/unit", "unit-dimension"),
    (f"{P0}/weight/unit", "LB", f"{P0}/weight/unit", "unit-unknown"),
    (f"{P0}/weight/unit", "stone", f"{P0}/weight/unit", "unit-unknown"),
    (f"{P0}/weight/unit", None, f"{P0}/weight/unit", "unit-missing"),
    (f"{P0}/weight/about", True, f"{P0}/weight/about", "unknown-field"),
    (f"{P0}/weight/value", -176, f"{P0}/weight/value", "negative"),
    (f"{P0}/weight/value", 0, f"{P0}/weight/value", "zero"),
    (f"{P0}/weight/value", "-0", f"{P0}/weight/value", "zero"),
    (f"{P0}/weight/value", "176 ", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "176,5", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "1e3", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "NaN", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "Infinity", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", Decimal("NaN"), f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", Decimal("1E+3"), f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "0x10", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "\u0661\u0667\u0666", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "1_000", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", "", f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", True, f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", [], f"{P0}/weight/value", "number-form"),
    (f"{P0}/weight/value", 1234567890123456, f"{P0}/weight/value", "number-digits"),
    (f"{P0}/weight/value", "0." + "1" * 16, f"{P0}/weight/value", "number-digits"),
    (f"{P0}/weight", {"value": 1760, "unit": "lb"}, f"{P0}/weight", "implausible"),
    (f"{P0}/weight", {"value": "19.99", "unit": "kg"}, f"{P0}/weight", "implausible"),
    (f"{P0}/weight", {"value": "250.01", "unit": "kg"}, f"{P0}/weight", "implausible"),
    (f"{P0}/how", "guessed", f"{P0}/how", "choice"),
    (f"{P0}/how", GONE, f"{P0}/how", "missing"),
    (f"{P0}/how", "standard", f"{P0}/weight", "weight-with-standard"),
    (f"{P0}/how", "standard", f"{P0}/category", "missing"),
    # lap infants
    (f"{P1}/lap_infant", "I. Dravo", f"{P1}/lap_infant", "object-form"),
    (f"{P1}/lap_infant/weight", GONE, f"{P1}/lap_infant/weight", "missing"),
    (f"{P1}/lap_infant/how", GONE, f"{P1}/lap_infant/how", "missing"),
    (f"{P1}/lap_infant/how", "standard", f"{P1}/lap_infant/how", "choice"),
    (f"{P1}/lap_infant/weight/value", 90, f"{P1}/lap_infant/weight", "implausible"),
    (f"{P1}/lap_infant/seat", "ROW2-L", f"{P1}/lap_infant/seat", "unknown-field"),
    (P1, passenger(how="standard", category="adult", lap_infant={"name": "I. Dravo", "how": "weighed"}),
     f"{P1}/lap_infant/how", "weight-with-standard"),
    # items
    ("/items", GONE, "/items", "missing"),
    ("/items", "none", "/items", "list-form"),
    ("/items", [{}] * 401, "/items", "too-many"),
    (f"{I0}/kind", "luggage", f"{I0}/kind", "choice"),
    (f"{I0}/what", "", f"{I0}/what", "empty"),
    (f"{I0}/what", "x" * 121, f"{I0}/what", "too-long"),
    (f"{I0}/what", "bag\u0007", f"{I0}/what", "control-character"),
    (f"{I0}/place", "ROOF", f"{I0}/place", "unknown-place"),
    (f"{I0}/place", "ROW1-L", f"{I0}/place", "unknown-place"),
    (f"{I0}/weight", GONE, f"{I0}/weight", "missing"),
    (f"{I0}/weight/value", 0, f"{I0}/weight/value", "zero"),
    (f"{I0}/weight/value", -120, f"{I0}/weight/value", "negative"),
    (f"{I0}/how", "standard", f"{I0}/weight", "weight-with-standard"),
    (f"{I0}/removed", True, f"{I0}/removed", "removed-not-equipment"),
    (f"{I0}/removed", "yes", f"{I0}/removed", "flag-form"),
    # fuel
    ("/fuel", GONE, "/fuel", "missing"),
    ("/fuel/density", GONE, "/fuel/density", "missing"),
    ("/fuel/density/source", GONE, "/fuel/density/source", "missing"),
    ("/fuel/density/source", "", "/fuel/density/source", "empty"),
    ("/fuel/density/source", 4471, "/fuel/density/source", "text-form"),
    ("/fuel/density/unit", "lb", "/fuel/density/unit", "unit-dimension"),
    ("/fuel/density/unit", "lb/gal", "/fuel/density/unit", "unit-unknown"),
    ("/fuel/density/unit", "kg/l", "/fuel/density", "implausible"),
    ("/fuel/density/value", 0, "/fuel/density/value", "zero"),
    ("/fuel/density/value", "67", "/fuel/density", "implausible"),
    ("/fuel/at_engine_start", GONE, "/fuel/at_engine_start", "missing"),
    ("/fuel/at_engine_start", [], "/fuel/at_engine_start", "object-form"),
    (LEFT, GONE, LEFT, "missing"),
    (LEFT, 50, LEFT, "quantity-form"),
    (f"{START}/TIP", {"value": 5, "unit": "US gal"}, f"{START}/TIP", "unknown-tank"),
    (f"{STUCK}/TIP", {"value": 5, "unit": "US gal"}, f"{STUCK}/TIP", "unknown-tank"),
    (f"{STUCK}/LEFT-MAIN", {"value": "10.1", "unit": "US gal"}, f"{STUCK}/LEFT-MAIN", "over-capacity"),
    (f"{STUCK}/LEFT-MAIN", {"value": -1, "unit": "lb"}, f"{STUCK}/LEFT-MAIN/value", "negative"),
    (f"{LEFT}/value", "60.001", LEFT, "over-capacity"),
    (LEFT, {"value": 361, "unit": "lb"}, LEFT, "over-capacity"),
    (f"{LEFT}/value", -1, f"{LEFT}/value", "negative"),
    (f"{LEFT}/unit", "gal", f"{LEFT}/unit", "unit-unknown"),
    (f"{LEFT}/unit", "in", f"{LEFT}/unit", "unit-dimension"),
    ("/fuel/taxi", GONE, "/fuel/taxi", "missing"),
    ("/fuel/taxi/value", -1, "/fuel/taxi/value", "negative"),
    ("/fuel/taxi/value", 601, "/fuel/taxi", "burn-exceeds-fuel"),
    ("/fuel/trip/value", 0, "/fuel/trip/value", "zero"),
    ("/fuel/trip/value", "756.001", "/fuel/trip", "burn-exceeds-fuel"),
    ("/fuel/trip", {"value": 127, "unit": "US gal"}, "/fuel/trip", "burn-exceeds-fuel"),
    ("/fuel/minimum_at_landing", GONE, "/fuel/minimum_at_landing", "missing"),
    ("/fuel/minimum_at_landing/value", 0, "/fuel/minimum_at_landing/value", "zero"),
    ("/fuel/reserve", LB, "/fuel/reserve", "unknown-field"),
    # stated limits
    ("/limits", [{}] * 21, "/limits", "too-many"),
    ("/limits/0/at", "ramp", "/limits/0/at", "choice"),
    ("/limits/0/source", GONE, "/limits/0/source", "missing"),
    ("/limits/0/weight/value", 0, "/limits/0/weight/value", "zero"),
    ("/limits/0/weight/unit", "US gal", "/limits/0/weight/unit", "unit-dimension"),
]  # fmt: skip


def written(path: str, value: Any) -> dict[str, Any]:
    """A sound load with one thing written at a path, or taken out."""
    document = load()
    *way, last = path.strip("/").split("/")
    spot: Any = document
    for part in way:
        spot = spot[int(part)] if isinstance(spot, list) else spot[part]
    key = int(last) if isinstance(spot, list) else last
    if value is GONE:
        del spot[key]
    else:
        spot[key] = value
    return document


@pytest.mark.parametrize(("path", "value", "pointer", "code"), ROWS)
def test_a_fault_is_named_with_its_field_and_its_code(path, value, pointer, code):
    document = written(path, value)

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    found = {(fault.pointer, fault.code) for fault in refused.value.faults}
    assert (pointer, code) in found
    assert all(fault.detail for fault in refused.value.faults)


def test_a_sound_load_is_read_and_the_table_changes_nothing_else():
    read_load(load(), twin())
    changed = [path for path, *_ in ROWS]

    assert len(changed) > 140


@pytest.mark.parametrize("document", [None, [], "load", 7, True])
def test_what_is_no_object_is_refused_as_a_whole(document):
    with pytest.raises(Invalid) as refused:
        read_load(document, twin())
    assert refused.value.faults[0].pointer == ""
    with pytest.raises(Invalid):
        read_outline(document)


def test_all_faults_are_named_at_once():
    document = written(f"{P0}/weight/unit", "in")
    document["fuel"]["taxi"]["value"] = "NaN"
    document["flight"]["departure"] = "tomorrow"
    del document["items"][0]["how"]

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    assert {fault.pointer for fault in refused.value.faults} == {
        f"{P0}/weight/unit",
        "/fuel/taxi/value",
        "/flight/departure",
        f"{I0}/how",
    }


def test_a_flood_of_faults_is_cut():
    document = load(items=[{"strange": 1}] * 400)

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    assert len(refused.value.faults) == 100


def test_a_flood_of_names_is_not_sent_back():
    document = load(**{"x" * 100_000: 1})

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    assert len(refused.value.faults[0].pointer) < 200


def test_no_personal_name_stands_in_a_fault():
    document = load()
    document["passengers"][0]["name"] = "M. Dravo"
    document["passengers"][0]["seat"] = "ROW1-R"

    with pytest.raises(Invalid) as refused:
        read_load(document, twin())

    assert len(refused.value.faults) == 2
    assert not any("Dravo" in fault.detail for fault in refused.value.faults)


@pytest.mark.parametrize("body", [b'{"value": 1e9999999}', b'{"value": NaN}', b'{"a": 1, "a": 2}'])
def test_what_no_strict_reader_takes_never_reaches_the_load(body):
    with pytest.raises(Unreadable):
        read(body)

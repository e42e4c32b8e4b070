"""Odd input over the API: each thing is refused with the field it stands in and a next step; nothing is
stored.

What people and programs send by mistake is common knowledge; the forms of numbers are those RFC 8259 allows,
or that a hand is likely to type. The twin has two tanks of 120 US gal; at engine start each holds 100, which
is 1,340 lb in all, of which 40 lb burn while taxiing and 640 lb on the trip.
"""

import copy
import json
from collections.abc import Callable
from typing import Any

import pytest
from django.http import HttpResponse

from fleet.models import LoadingBasis
from records.models import Act
from tests.cast import Cast, api, cast, post
from tests.loads.api.test_loads_api import answer, rows, send
from tests.loads.making import load_document
from tests.makers import basis_document, q, ready_aircraft

pytestmark = pytest.mark.django_db
Change = Callable[[dict[str, Any]], Any]
WEIGHT = "/passengers/0/weight/value"


@pytest.fixture(scope="module")
def people(own_database: str, django_db_blocker: object) -> Cast:
    """An operator with one ready twin, entered once for all that is refused."""
    with django_db_blocker.unblock():  # type: ignore[attr-defined] # a fixture without a type
        made = cast()
        ready_aircraft(made)
    return made


def _weight(value: object) -> Change:
    return lambda load: load["passengers"][0]["weight"].update(value=value)


def _passenger(number: int, **fields: object) -> Change:
    return lambda load: load["passengers"][number].update(fields)


def _fuel(**fields: object) -> Change:
    return lambda load: load["fuel"].update(fields)


def _tank(tank: str, volume: str) -> Change:
    return lambda load: load["fuel"]["at_engine_start"].update({tank: q(volume, "US gal")})


def _events(*events: dict[str, Any]) -> Change:
    return lambda load: load.update(sequence=list(events))


def _at(burned: str, **what: Any) -> dict[str, Any]:
    return {"after_burning": q(burned, "lb"), **what}


def _second_pilot(load: dict[str, Any]) -> None:
    """The login of the pilot in command on a second line, under another name."""
    load["crew"].append(load["crew"][0] | {"name": "A. Other", "seat": "COCKPIT-R", "position": "co-pilot"})
    load["persons_on_board"] = 4


# the thing, how it is put into a sound load, the field named, the code
ODD: list[tuple[str, Change, str, str]] = [
    ("NaN", _weight("NaN"), WEIGHT, "number-form"),
    ("infinity", _weight("Infinity"), WEIGHT, "number-form"),
    ("negative infinity", _weight("-Infinity"), WEIGHT, "number-form"),
    ("negative", _weight("-176"), WEIGHT, "negative"),
    ("a negative JSON number", _weight(-176), WEIGHT, "negative"),
    ("1e3", _weight("1e3"), WEIGHT, "number-form"),
    ("a trailing space", _weight("176 "), WEIGHT, "number-form"),
    ("a trailing space in a seat", _passenger(0, seat="ROW1-L "), "/passengers/0/seat", "untrimmed"),
    ("a decimal comma", _weight("176,5"), WEIGHT, "number-form"),
    ("a person in two seats", _passenger(1, name="L. Osei"), "/passengers/1/name", "person-twice"),
    ("a login in two seats", _second_pilot, "/crew/1/person", "person-twice"),
    ("two people in one seat", _passenger(1, seat="ROW1-L"), "/passengers/1/seat", "seat-taken"),
    ("a seat no aircraft has", _passenger(0, seat="ROW9-L"), "/passengers/0/seat", "unknown-seat"),
    ("more fuel than the tank", _tank("LEFT", "121"), "/fuel/at_engine_start/LEFT", "over-capacity"),
    ("fuel in no tank", _tank("MIDDLE", "1"), "/fuel/at_engine_start/MIDDLE", "unknown-tank"),
    ("a burn greater than the fuel", _fuel(trip=q("1301", "lb")), "/fuel/trip", "burn-exceeds-fuel"),
    ("taxiing on more than the fuel", _fuel(taxi=q("1341", "lb")), "/fuel/taxi", "burn-exceeds-fuel"),
    (
        "a sequence that burns more than is on board",
        _events(_at("1301", leave=[{"seat": "ROW1-L"}])),
        "/sequence/0/after_burning",
        "burn-exceeds-fuel",
    ),
    (
        "a sequence that burns more than the trip",
        _events(_at("641", leave=[{"seat": "ROW1-L"}])),
        "/sequence/0/after_burning",
        "event-after-landing",
    ),
    (
        "an event at an unknown seat",
        _events(_at("60", leave=[{"seat": "ROW9-L"}])),
        "/sequence/0/leave/0/seat",
        "unknown-seat",
    ),
    (
        "an event at a seat nobody has",
        _events(_at("60", leave=[{"seat": "ROW2-L"}])),
        "/sequence/0/leave/0/seat",
        "nobody-there",
    ),
    (
        "an event at an unknown place",
        _events(_at("60", leave=[{"place": "HOOK", "what": "drum"}])),
        "/sequence/0/leave/0/place",
        "unknown-place",
    ),
    (
        "an event with an unknown item",
        _events(_at("60", leave=[{"place": "AFT-HOLD", "what": "drum"}])),
        "/sequence/0/leave/0/what",
        "no-such-item",
    ),
    (
        "a move to an unknown seat or place",
        _events(_at("60", move=[{"seat": "ROW1-L", "to": "DOOR"}])),
        "/sequence/0/move/0/to",
        "unknown-place",
    ),
    (
        "somebody who comes to an unknown seat",
        _events(_at("60", come_aboard=[{"name": "T. Ash", "seat": "ROW9-L", "how": "declared",
                                        "weight": q("170", "lb")}])),
        "/sequence/0/come_aboard/0/seat",
        "unknown-seat",
    ),
    (
        "a transfer from an unknown tank",
        _events(_at("60", transfer={"from": "TIP", "to": "LEFT", "quantity": q("1", "US gal")})),
        "/sequence/0/transfer/from",
        "unknown-tank",
    ),
    (
        "a transfer to an unknown tank",
        _events(_at("60", transfer={"from": "LEFT", "to": "TIP", "quantity": q("1", "US gal")})),
        "/sequence/0/transfer/to",
        "unknown-tank",
    ),
    (
        "a transfer of more than is in the tank",
        _events(_at("60", transfer={"from": "LEFT", "to": "RIGHT", "quantity": q("101", "US gal")})),
        "/sequence/0/transfer/quantity",
        "transfer-exceeds-fuel",
    ),
]  # fmt: skip


@pytest.mark.parametrize(("change", "pointer", "code"), [each[1:] for each in ODD], ids=[e[0] for e in ODD])
@pytest.mark.parametrize("path", ["/loads", "/assessments"])
def test_it_is_refused_by_its_field_and_nothing_is_stored(
    people: Cast, path: str, change: Change, pointer: str, code: str
) -> None:
    document = load_document(people)
    assert send(people.preparer, "/assessments", document).status_code == 200
    change(document)
    before = rows()

    refused = send(people.preparer, path, document)

    assert refused.status_code == 422, refused.content
    told = {fault["pointer"]: fault for fault in answer(refused)["errors"]}
    assert told[pointer]["code"] == code, told
    assert _says_what_next(told[pointer]["detail"])
    assert rows() == before


def test_a_seat_that_is_not_in_this_configuration_is_refused_by_its_field(people: Cast) -> None:
    # the third row stands in the basis and in one of its configurations, not in the other
    basis = basis_document()
    for one in basis["configurations"]:
        one["seats"] = one["seats"][:5]
    ready_aircraft(people, "Q9-FIV", basis)
    document = load_document(people, aircraft="Q9-FIV")
    document["passengers"][0]["seat"] = "ROW2-R"

    refused = send(people.preparer, "/loads", document)

    (fault,) = [one for one in answer(refused)["errors"] if one["pointer"] == "/passengers/0/seat"]
    assert (refused.status_code, fault["code"]) == (422, "seat-not-in-configuration")
    assert "four-seat" in fault["detail"]


@pytest.mark.parametrize(
    ("written", "pointer"),
    [
        ("NaN", "/fuel/trip/value"),
        ("Infinity", "/fuel/trip/value"),
        ("1e3", "/fuel/trip/value"),
        ('1, "value": 2', "/fuel/trip/value"),
    ],
    ids=["NaN", "infinity", "1e3", "a figure stated twice"],
)
def test_a_number_json_does_not_know_is_refused_by_its_field(
    people: Cast, written: str, pointer: str
) -> None:
    body = json.dumps(load_document(people, fuel=load_document(people)["fuel"] | {"trip": q("@", "lb")}))
    before = rows()

    refused = send(people.preparer, "/loads", body.replace('"@"', written).encode())

    assert refused.status_code == 400, refused.content
    assert [fault["pointer"] for fault in answer(refused)["errors"]] == [pointer]
    assert rows() == before


def _twice(part: str) -> Change:
    return lambda basis: basis[part].append(copy.deepcopy(basis[part][0]))


def _curtailed(*amounts: dict[str, Any]) -> Change:
    margin = {
        "id": "FUEL",
        "for": "fuel",
        "phases": ["take-off", "landing"],
        "amounts": list(amounts),
        "source": {"document": "OM-A", "page": "8-12"},
    }
    return lambda basis: basis.update(curtailments=[margin])


# the envelope of the twin is 12 to 18 in wide
BASES: list[tuple[str, Change, str, str]] = [
    ("a seat stated twice", _twice("seats"), "/seats/6/id", "duplicate-id"),
    ("a place stated twice", _twice("places"), "/places/2/id", "duplicate-id"),
    ("a tank stated twice", _twice("tanks"), "/tanks/2/id", "duplicate-id"),
    ("a zone stated twice", _twice("zones"), "/zones/1/id", "duplicate-id"),
    (
        "a seat and a place of one name",
        lambda basis: basis["places"][0].update(id="ROW1-L"),
        "/places/0/id",
        "duplicate-id",
    ),
    (
        "a curtailment larger than the envelope",
        _curtailed({"forward": q("10", "in"), "aft": q("10", "in")}),
        "/curtailments/0/amounts",
        "curtailment-too-large",
    ),
    (
        "a curtailment in moments larger than the envelope",
        _curtailed({"aft": q("160000", "lb in")}),
        "/curtailments/0/amounts",
        "curtailment-too-large",
    ),
    (
        "a curtailment of nothing",
        _curtailed({"forward": q("0", "in")}),
        "/curtailments/0/amounts/0/forward/value",
        "not-above-zero",
    ),
]


@pytest.mark.parametrize(
    ("change", "pointer", "code"), [each[1:] for each in BASES], ids=[each[0] for each in BASES]
)
def test_a_loading_basis_with_it_is_refused_by_its_field_and_nothing_is_stored(
    people: Cast, change: Change, pointer: str, code: str
) -> None:
    document = basis_document()
    change(document)
    before = (LoadingBasis.objects.count(), Act.objects.count())

    refused: HttpResponse = post(api(people.maintenance), "/aircraft/Q9-KTB/loading-bases", document)

    assert refused.status_code == 422, refused.content
    told = {fault["pointer"]: fault for fault in answer(refused)["errors"]}
    assert told[pointer]["code"] == code, told
    assert _says_what_next(told[pointer]["detail"])
    assert (LoadingBasis.objects.count(), Act.objects.count()) == before


def _says_what_next(detail: str) -> bool:
    """Whether a refusal says what is wrong and, behind a semicolon, what to do or what there is instead."""
    wrong, _, then = detail.partition("; ")
    return len(wrong.split()) > 1 and len(then.split()) > 1

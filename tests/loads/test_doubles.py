"""What looks doubled is stored all the same, with a warning that leads to the other load."""

from datetime import timedelta

import pytest

from loads.actions.revise_load import revise_load
from loads.actions.withdraw_load import withdraw_load
from loads.queries.answer import answer_of
from loads.queries.doubles import doubles_of
from tests.cast import actor, cast
from tests.loads.late import again
from tests.loads.making import DEPARTURE_AT, load_document, submitted
from tests.makers import q, ready_aircraft

pytestmark = pytest.mark.django_db
OTHER_CREW = [
    {
        "name": "S. Vey",
        "position": "pilot in command",
        "seat": "COCKPIT-L",
        "weight": q("170", "lb"),
        "how": "weighed",
    }
]
OTHERS = [{"name": "A. Brand", "seat": "ROW1-L", "weight": q("160", "lb"), "how": "declared"}]


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    ready_aircraft(made, "Q9-KTC")
    return made


def _at(people, minutes, reference="KT-215", **changes):
    departure = (DEPARTURE_AT + timedelta(minutes=minutes)).isoformat()
    flight = load_document(people)["flight"] | {"departure": departure, "reference": reference}
    return submitted(people, flight=flight, **changes)


def _other_people(people, minutes, **changes):
    changes = {"crew": OTHER_CREW, "passengers": OTHERS, "persons_on_board": 2} | changes
    return _at(people, minutes, **changes)


def _codes(current):
    return [(one.code, one.pointer) for one in doubles_of(current, reach=None)]


def test_one_aircraft_on_two_loads_of_the_same_hour_is_told_at_submission(people) -> None:
    first = submitted(people)

    second = _other_people(people, 40)

    (told,) = answer_of(second, reach=None)["warnings"]
    assert (told["code"], told["load"], told["href"]) == (
        "same-aircraft",
        first.load.id,
        f"/api/v1/loads/{first.load.id}",
    )
    assert "Q9-KTB KT-214, XNAL to XKOR" in told["detail"]


def test_the_first_load_tells_it_too_when_it_is_read(people) -> None:
    first = submitted(people)
    assert _codes(first) == []

    second = _other_people(people, 40)

    assert [one.load for one in doubles_of(again(first), reach=None)] == [second.load.id]


@pytest.mark.parametrize(("minutes", "told"), [(59, True), (60, False), (-59, True), (-60, False)])
def test_departures_an_hour_apart_do_not_overlap(people, minutes: int, told: bool) -> None:
    submitted(people)

    assert (_codes(_other_people(people, minutes)) == [("same-aircraft", "/aircraft")]) is told


def test_one_person_on_two_loads_is_told_by_where_the_line_stands_not_by_name(people) -> None:
    submitted(people)
    passengers = [OTHERS[0], load_document(people)["passengers"][1]]

    second = _at(people, 20, aircraft="Q9-KTC", crew=OTHER_CREW, passengers=passengers, persons_on_board=3)

    assert _codes(second) == [("same-person", "/passengers/1")]
    assert "Dravo" not in str(answer_of(second, reach=None))


def test_a_login_marks_one_of_the_crew_whatever_name_was_typed(people) -> None:
    submitted(people)
    crew = [load_document(people)["crew"][0] | {"name": "Amani, R."}]

    second = _at(people, 20, aircraft="Q9-KTC", crew=crew, passengers=OTHERS, persons_on_board=2)

    assert _codes(second) == [("same-person", "/crew/0")]


def test_names_are_compared_as_people_write_them(people) -> None:
    submitted(people)
    passengers = [load_document(people)["passengers"][0] | {"name": "l.  OSEI"}]

    second = _at(people, 20, aircraft="Q9-KTC", crew=OTHER_CREW, passengers=passengers, persons_on_board=2)

    assert _codes(second) == [("same-person", "/passengers/0")]


def test_a_revision_is_no_double_of_what_it_replaces(people) -> None:
    first = submitted(people)

    second = revise_load(
        first.load.id, load_document(people), reason="bags", seen="1", by=actor(people.preparer)
    )

    assert _codes(second) == []
    assert _codes(again(first)) == []


def test_the_warning_goes_with_its_cause(people) -> None:
    first, second = submitted(people), _other_people(people, 10)
    assert _codes(second)

    withdraw_load(first.load.id, reason="cancelled", seen="1", by=actor(people.preparer))

    assert _codes(second) == []


def test_another_operators_loads_are_never_looked_at(people) -> None:
    made = cast("third-test")
    ready_aircraft(made, "Q9-KTD")
    submitted(made, aircraft="Q9-KTD")

    assert _codes(submitted(people)) == []


def test_who_comes_aboard_in_flight_is_told_where_the_same_name_flies_elsewhere(people) -> None:
    submitted(people)
    comes = {"name": "L. Osei", "seat": "ROW2-L", "weight": {"value": "170", "unit": "lb"}, "how": "declared"}
    hoisted = [{"after_burning": {"value": "100", "unit": "lb"}, "come_aboard": [comes]}]

    second = _other_people(people, 40, aircraft="Q9-KTC", sequence=hoisted)

    assert ("same-person", "/sequence/0/come_aboard/0") in _codes(second)

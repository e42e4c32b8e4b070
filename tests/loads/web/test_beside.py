"""What looks doubled is told once for each other load, whatever the number of people on both."""

from uuid import UUID

from loads.queries.doubles import Double
from loads.web.beside import doubles_shown

FIRST, SECOND = UUID(int=1), UUID(int=2)


def test_people_on_the_same_other_load_are_counted_behind_its_first_line() -> None:
    whole = "The same aircraft stands on another load: Q9-KTB KT-214, departs at ten."
    passenger = "A passenger of the same name is on another load: Q9-KTB KT-214, departs at ten."
    found = [
        Double("same-aircraft", whole, FIRST, "/aircraft"),
        Double("same-person", passenger, FIRST, "/passengers/0"),
        Double("same-person", passenger, FIRST, "/passengers/1"),
        Double("same-person", "One of the crew is on another load: Q9-LVN.", SECOND, "/crew/0"),
    ]

    assert doubles_shown(found) == [
        {
            "load": FIRST,
            "detail": whole,
            "besides": ["A passenger of the same name is on another load (2 of them)"],
        },
        {"load": SECOND, "detail": "One of the crew is on another load: Q9-LVN.", "besides": []},
    ]

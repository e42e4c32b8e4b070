"""What the page of an aircraft says of where things may be, as the basis states it."""

from fleet.web.stations_shown import station_rows
from tests.pure.fleet.documents import basis_document
from tests.pure.fleet.test_stations import document


def values(shown: dict[str, object] | None = None) -> dict[str, tuple[str, str]]:
    rows = station_rows(document() if shown is None else shown)
    return {row["title"]: (row["value"], row["source"]) for row in rows}


def test_every_limit_stands_with_its_page_as_it_was_typed() -> None:
    shown = values()

    assert shown["Aft hold"] == ("200 lb", "OK62-FM rev D p. 6-10")
    assert shown["Aft hold, net fitted"] == ("260 lb", "OK62-FM rev D p. 6-11")
    assert shown["Aft hold, floor on an area"] == ("75 lb/ft2", "OK62-FM rev D p. 6-11")
    assert shown["Aft hold, floor along its length (along the aircraft)"][0] == "150 kg/m"
    assert shown["Aft hold, no footprint asked"][0] == "up to 25 lb each, baggage"
    assert shown["Row 2 and aft hold together"] == ("640 lb", "OK62-FM rev D p. 6-10")
    assert shown["From the tail, tail to station 236"] == ("200 lb", "OK62-FM rev D p. 6-11")
    assert shown["From the tail, tail to station 200"] == ("not entered: loads stay unresolved", "")
    assert shown["Row 1, left, rail"][0] == "162 in to 174 in; settings 2 at 165 in, 5 at 4.4 m"
    assert shown["Seats at an exit"][0] == "row 1, left"
    assert shown["Seats without a restraint for an infant"][0] == "row 1, left"


def test_a_basis_that_states_none_of_it_shows_places_and_zones_alone() -> None:
    shown = values(basis_document("twin"))

    assert list(shown) == [
        "Nose hold",
        "Floor of row 2, seats out",
        "Aft hold",
        "Row 2 and aft hold together",
    ]


def test_a_limit_shown_to_be_none_says_none() -> None:
    plain = basis_document("twin")
    plain["places"][0]["maximum"] = {"none": True, "source": {"document": "SUP-4", "page": "2"}}

    assert values(plain)["Nose hold"] == ("none", "SUP-4 p. 2")

"""Makes loads for the tests of this room, through the real actions."""

import copy
from datetime import datetime
from typing import Any

from fleet.models import Person
from loads.actions.accept_load import accept_load
from loads.actions.prepare_load import prepare_load
from loads.actions.signing import Signing
from loads.actions.submit_load import submit_load
from loads.queries.current import Current
from tests.cast import Cast, actor
from tests.makers import q

DEPARTURE = "2026-12-01T08:30:00-06:00"
DEPARTURE_AT = datetime.fromisoformat(DEPARTURE)


def load_document(people: Cast, **changes: Any) -> dict[str, Any]:
    """This function will write a load of the ready twin that is within every limit, with fields changed."""
    document = {
        "schema": "tarebook.load/1",
        "aircraft": "Q9-KTB",
        "configuration": "four-seat",
        "flight": {
            "reference": "KT-214",
            "leg": 1,
            "departure": DEPARTURE,
            "origin": "XNAL",
            "destination": "XKOR",
            "operation": "passenger-charter",
        },
        "persons_on_board": 3,
        "crew": [
            {
                "person": people.pilot.login,
                "name": "R. Amani",
                "position": "pilot in command",
                "seat": "COCKPIT-L",
                "weight": q("181", "lb"),
                "how": "weighed",
            }
        ],
        "passengers": [
            {"name": "L. Osei", "seat": "ROW1-L", "weight": q("176", "lb"), "how": "declared"},
            {"name": "M. Dravo", "seat": "ROW1-R", "weight": q("190", "lb"), "how": "declared"},
        ],
        "items": [
            {
                "kind": "baggage",
                "what": "checked bags",
                "place": "AFT-HOLD",
                "weight": q("120", "lb"),
                "how": "weighed",
            }
        ],
        "fuel": {
            "density": {**q("6.7", "lb/US gal"), "source": "delivery note 4471"},
            "at_engine_start": {"LEFT": q("100", "US gal"), "RIGHT": q("100", "US gal")},
            "not_usable": {},
            "taxi": q("40", "lb"),
            "trip": q("640", "lb"),
            "minimum_at_landing": q("420", "lb"),
        },
        "limits": [{"at": "take-off", "weight": q("8750", "lb"), "source": "performance sheet 12"}],
    }
    return copy.deepcopy(document | changes)


def outside_document(people: Cast) -> dict[str, Any]:
    """This function will write a load that is too far aft in the cabin for its zone and its envelope."""
    heavy = [
        {"name": name, "seat": seat, "weight": q("299", "lb"), "how": "declared"}
        for name, seat in (("T. Orr", "ROW2-L"), ("U. Pell", "ROW2-R"))
    ]
    bags = [
        {"kind": "cargo", "what": "castings", "place": "AFT-HOLD", "weight": q("250", "lb"), "how": "weighed"}
    ]
    return load_document(people, passengers=heavy, items=bags)


def submitted(people: Cast, by: Person | None = None, **changes: Any) -> Current:
    """This function will submit a load of the ready twin."""
    return submit_load(load_document(people, **changes), by=actor(by or people.preparer))


def signing(current: Current) -> Signing:
    """This function will return what a signer sends who was shown the load as it stands."""
    return Signing(current.assessment.digest, "127.0.0.1")


def prepared(people: Cast, current: Current | None = None) -> Current:
    """This function will have a load prepared by the preparer."""
    current = current or submitted(people)
    return prepare_load(
        current.load.id, signing(current), seen=str(current.step.number), by=actor(people.preparer)
    )


def accepted(people: Cast, current: Current | None = None) -> Current:
    """This function will have a load prepared, and accepted by its pilot in command."""
    current = current or prepared(people)
    return accept_load(
        current.load.id, signing(current), seen=str(current.step.number), by=actor(people.pilot)
    )

"""The invented twin of the demonstration, entered for a journey, and tokens for those who go through it."""

import json
from datetime import timedelta
from pathlib import Path

from fleet.actions.issue_token import issue_token
from fleet.models import Person
from service.allowed import grantable
from tests.cast import Cast, actor
from tests.makers import LONG_AGO, make_aircraft, make_basis, make_empty_weight

DATA = Path(__file__).parents[2] / "service" / "demo" / "data"


def enter_twins(people: Cast, *registrations: str) -> None:
    """This function will enter the twin under each registration, ready to be loaded."""
    basis, weight = (
        json.loads((DATA / f"twin.{name}.json").read_text("utf-8"))
        for name in ("loading-basis", "empty-weight")
    )
    for registration in registrations:
        aircraft = make_aircraft(
            people,
            registration,
            type=basis["aircraft_type"],
            engines=basis["engines"],
            passenger_seats=basis["passenger_seats_installed"],
        )
        make_basis(people, aircraft, basis, true_from=LONG_AGO)
        make_empty_weight(people, aircraft, weight)


def token_of(people: Cast, person: Person, role: str, *scopes: str) -> str:
    """This function will issue a token; a program's is issued by the manager."""
    integration = role == "integration"
    issued = issue_token(
        actor(people.manager if integration else person),
        person,
        label="month",
        scopes=scopes,
        grantable=grantable((role,), integration=integration),
        valid_for=timedelta(days=1),
        integration=integration,
    )
    return issued.secret

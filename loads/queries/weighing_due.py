"""When the weighing a load rests on lapses, by the rule that binds its operation."""

from typing import Final

from fleet.basis import Basis
from fleet.empty_weight_reading import read_particulars
from fleet.models import Provision
from fleet.queries.in_force import InForce
from fleet.rules import Subject
from fleet.rules_reading import rules_from_text
from loads.balance.aboard import Flight
from loads.balance.circumstances import WeighingDue
from loads.models import Load
from records.strict_json import read

WEIGHING: Final = "weighing-interval"


def weighing_due(used: InForce, basis: Basis, flight: Flight) -> WeighingDue | None:
    """This function will return when the weighing lapses, told at the local date of the departure; None where
    no rule binds the operation.
    """
    if used.provisions.rules is None:
        return None
    subject = Subject(basis.category, basis.engines, basis.passenger_seats_installed)
    rule = rules_from_text(used.provisions.rules.document).for_flight(WEIGHING, subject, flight.operation)
    if rule is None or rule.interval is None:
        return None
    words = f"every {rule.interval}"
    if used.empty_weight is None:
        return WeighingDue("", None, False, words, rule.source)
    weighed = read_particulars(read(used.empty_weight.document.encode())).weighed_on
    good = rule.interval.good_until(weighed)
    return WeighingDue(
        weighed_on=weighed.isoformat(),
        lapses=good.isoformat(),
        overdue=flight.departure.date() > good,
        rule=words,
        source=rule.source,
    )


def asks_for_weighing(rules: Provision, load: Load) -> bool:
    """This function will say whether these rules ask for a weighing of a load's aircraft in its operation."""
    return _bound(rules, load, WEIGHING)


def asks_for_loading_signature(rules: Provision | None, load: Load) -> bool:
    """This function will say whether these rules ask the loading supervisor to sign a load."""
    return rules is not None and _bound(rules, load, "loading-signature")


def _bound(rules: Provision, load: Load, name: str) -> bool:
    aircraft = load.aircraft
    subject = Subject(aircraft.category, aircraft.engines, aircraft.passenger_seats)
    return rules_from_text(rules.document).for_flight(name, subject, load.operation) is not None

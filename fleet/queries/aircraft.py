"""Aircraft of one operator. Another operator's aircraft does not exist here."""

import re
from functools import lru_cache
from uuid import UUID

from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Operator
from records.prepared import columns, instance, rows, width
from records.refusal import NotKnown

REGISTRATION = re.compile(r"[A-Z0-9][A-Z0-9-]{1,11}")


def aircraft_of(operator: str, registration: str) -> Aircraft:
    """This function will return the operator's aircraft with that registration, its operator with it;
    raises NotKnown.
    """
    painted = registration.upper()
    # Whatever is in no registration (a NUL among it, which PostgreSQL's texts cannot hold) names nothing.
    known = REGISTRATION.fullmatch(painted) is not None
    found = rows(_statement(), [operator, painted]) if known else []
    if not found:
        raise NotKnown("aircraft-not-known", f"No aircraft {registration[:20]} is entered.")
    aircraft = instance(Aircraft, found[0])
    aircraft.operator = instance(Operator, found[0], width(Aircraft))
    return aircraft


@lru_cache(maxsize=1)
def _statement() -> str:
    return (
        f"SELECT {columns(Aircraft, 'a')}, {columns(Operator, 'o')} "  # noqa: S608  # names of our own only
        "FROM fleet_aircraft a JOIN fleet_operator o ON o.code = a.operator_id "
        "WHERE a.operator_id = %s AND a.registration = %s"
    )


def all_aircraft(operator: str) -> tuple[Aircraft, ...]:
    """This function will return the operator's aircraft by registration."""
    return tuple(Aircraft.objects.filter(operator_id=operator).order_by("registration"))


def loading_basis_of(aircraft: Aircraft, version: UUID) -> LoadingBasis:
    """This function will return one loading basis of the aircraft, approved or not; raises NotKnown."""
    found = (
        LoadingBasis.objects.filter(aircraft=aircraft, id=version)
        .select_related("entered_by", "approval__approved_by")
        .first()
    )
    if found is None:
        raise NotKnown(
            "loading-basis-not-known", f"{aircraft.registration} has no loading basis of this number."
        )
    return found


def empty_weight_of(aircraft: Aircraft, version: UUID) -> EmptyWeight:
    """This function will return one empty weight of the aircraft, approved or not; raises NotKnown."""
    found = (
        EmptyWeight.objects.filter(aircraft=aircraft, id=version)
        .select_related("entered_by", "approval__approved_by")
        .first()
    )
    if found is None:
        raise NotKnown(
            "empty-weight-not-known", f"{aircraft.registration} has no empty weight of this number."
        )
    return found

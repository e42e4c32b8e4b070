"""Accepted loads that went stale: which versions overtook the ones they were accepted on."""

from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Final
from uuid import UUID

from django.db import connection

from fleet.models import Aircraft, EmptyWeight, LoadingBasis
from fleet.queries.in_force import in_force_for
from fleet.queries.provisions import Provisions
from loads.models import StaleNotice
from loads.queries.current import Current, current_of, loads_present
from loads.queries.provided import provisions_changed

# A load whose departure was planned longer ago and never reported is not on the ground any more.
LATEST_DEPARTURE: Final = timedelta(days=2)


@dataclass(frozen=True, slots=True)
class Overtaken:
    """The versions in force now, and which of them differ from those of the assessment, in words."""

    loading_basis: LoadingBasis | None
    empty_weight: EmptyWeight | None
    provisions: Provisions
    changed: tuple[str, ...]


def overtaken(current: Current, known: datetime) -> Overtaken | None:
    """This function will return what overtook an accepted load, None when nothing did or it is not accepted.

    Compared at its planned departure, as known at `known`. A newer program is no reason: no figure changed.
    """
    if current.state != "accepted":
        return None
    load, used = current.load, current.assessment
    now = in_force_for(load.aircraft, load.departure, known, load.configuration)
    pairs = (
        ("loading basis", now.basis, used.loading_basis_id),
        ("empty weight", now.empty_weight, used.empty_weight_id),
    )
    changed = tuple(name for name, version, before in pairs if (version.id if version else None) != before)
    changed += provisions_changed(current, now.provisions)
    return Overtaken(now.basis, now.empty_weight, now.provisions, changed) if changed else None


def is_told(load: UUID, found: Overtaken) -> bool:
    """This function will say whether it was told already that these versions overtook the load."""
    told = StaleNotice.objects.filter(
        load_id=load,
        loading_basis=found.loading_basis,
        empty_weight=found.empty_weight,
        provisions=found.provisions.ids(),
    )
    return told.exists()


def accepted_loads(aircraft: Aircraft, now: datetime) -> tuple[Current, ...]:
    """This function will return the accepted loads of an aircraft that may still be on the ground."""
    standing = loads_present().filter(
        operator_id=aircraft.operator_id,
        aircraft=aircraft,
        departure__gte=now - LATEST_DEPARTURE,
        state="accepted",
    )
    return tuple(current_of(one) for one in standing.order_by("departure", "load_id"))


def database_time() -> datetime:
    """This function will return the database's time: versions are known from it, not from our own clock."""
    with connection.cursor() as cursor:
        cursor.execute("SELECT clock_timestamp()")
        now: datetime = cursor.fetchone()[0]
    return now

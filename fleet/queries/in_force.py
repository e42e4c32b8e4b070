"""What was in force at one instant, as known at another."""

from dataclasses import dataclass
from datetime import datetime
from functools import lru_cache
from uuid import UUID

from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Standing
from fleet.models.standing import EMPTY_WEIGHT, LOADING_BASIS
from fleet.queries.figures import basis_of, fit_of
from fleet.queries.provisions import HOLDING, NO_PROVISIONS, Provisions, holding_values, provisions_of
from records.prepared import rows

_STANDING = (
    "SELECT kind, fit, version, 0 AS turn FROM fleet_standing"  # noqa: S608  # our own texts only
    " WHERE aircraft_id = %s AND valid @> %s AND known @> %s"
    f" UNION ALL SELECT kind, '', id, turn FROM ({HOLDING}) holding ORDER BY turn"
)


@dataclass(frozen=True, slots=True)
class InForce:
    """The two versions a load rests on; None where none was in force, which leaves a verdict unresolved.

    Besides them what the operator laid down for that time.
    """

    basis: LoadingBasis | None
    empty_weight: EmptyWeight | None
    provisions: Provisions = NO_PROVISIONS


def in_force(aircraft: Aircraft, at: datetime, known: datetime, fit: str) -> InForce:
    """This function will return what held true at `at` for the base fit, as held at `known`."""
    return InForce(basis_in_force(aircraft, at, known), empty_weight_in_force(aircraft, at, known, fit))


def in_force_for(aircraft: Aircraft, at: datetime, known: datetime, configuration: str) -> InForce:
    """This function will return what held true at `at` with the base fit taken from the configuration.

    Without a basis in force, or a configuration of that name in it, no base fit is known, so no empty
    weight is.
    """
    # Asked for every load, so: one query for what stands, and rows that never change are read once.
    found = rows(
        _STANDING, [aircraft.pk, at, known, *holding_values(aircraft.operator_id, aircraft.pk, at, known)]
    )
    versions = {(kind, fit): version for kind, fit, version, _ in found}
    if (LOADING_BASIS, "") not in versions:
        return InForce(None, None)
    basis = _loading_basis(versions[LOADING_BASIS, ""])
    weight = versions.get((EMPTY_WEIGHT, fit_of(basis_of(basis), configuration) or ""))
    provisions = provisions_of([(kind, version) for kind, _, version, _ in found])
    return InForce(basis, _empty_weight(weight) if weight else None, provisions)


def basis_in_force(aircraft: Aircraft, at: datetime, known: datetime) -> LoadingBasis | None:
    """This function will return the loading basis that held true at `at`, as held at `known`."""
    version = _standing(aircraft, LOADING_BASIS, "", at, known)
    return LoadingBasis.objects.get(id=version) if version else None


def empty_weight_in_force(aircraft: Aircraft, at: datetime, known: datetime, fit: str) -> EmptyWeight | None:
    """This function will return the empty weight of a base fit that held true at `at`, as held at `known`."""
    version = _standing(aircraft, EMPTY_WEIGHT, fit, at, known)
    return EmptyWeight.objects.get(id=version) if version else None


def empty_weights_in_force(aircraft: Aircraft, at: datetime, known: datetime) -> tuple[EmptyWeight, ...]:
    """This function will return the empty weights that held true at `at`, as held at `known`, one a base
    fit.
    """
    standing = Standing.objects.filter(
        aircraft=aircraft, kind=EMPTY_WEIGHT, valid__contains=at, known__contains=known
    )
    return tuple(EmptyWeight.objects.filter(id__in=standing.values("version")).order_by("fit"))


@lru_cache(maxsize=256)
def _loading_basis(version: UUID) -> LoadingBasis:
    return LoadingBasis.objects.get(id=version)


@lru_cache(maxsize=256)
def _empty_weight(version: UUID) -> EmptyWeight:
    return EmptyWeight.objects.get(id=version)


def _standing(aircraft: Aircraft, kind: str, fit: str, at: datetime, known: datetime) -> UUID | None:
    return (
        Standing.objects.filter(
            aircraft=aircraft, kind=kind, fit=fit, valid__contains=at, known__contains=known
        )
        .values_list("version", flat=True)
        .first()
    )

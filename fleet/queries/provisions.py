"""What an operator laid down and what of it holds at one instant, as known at another."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from functools import lru_cache
from typing import Final
from uuid import UUID

from fleet.models import Aircraft, Provision
from fleet.provisions import PERMIT, RESTRICTION, RULES, STANDARD_WEIGHTS
from records.prepared import rows
from records.refusal import NotKnown

# A restriction is known from its entry, the rest from their approval. What ended, ended on both clocks. Of
# standard weights and rules every version that has begun is found; the one that counts stands last.
HOLDING: Final = """
SELECT p.kind, p.id,
       row_number() OVER (ORDER BY p.true_from, coalesce(a.known_from, p.entered_at), p.number) AS turn
FROM fleet_provision p
LEFT JOIN fleet_provisionapproval a ON a.provision_id = p.id
LEFT JOIN fleet_provisionend e ON e.provision_id = p.id
WHERE p.operator_id = %s AND (p.aircraft_id IS NULL OR p.aircraft_id = %s)
  AND p.true_from <= %s AND (p.true_until IS NULL OR p.true_until > %s)
  AND CASE p.kind WHEN 'restriction' THEN p.entered_at ELSE a.known_from END <= %s
  AND (e.id IS NULL OR e.true_from > %s OR e.known_from > %s)
"""
_HOLDING_IN_ORDER: Final = f"SELECT kind, id FROM ({HOLDING}) holding ORDER BY turn"  # noqa: S608  # our own text


@dataclass(frozen=True, slots=True)
class Provisions:
    """What holds for an aircraft: one table and one set of rules at most, restrictions and permits in the
    order in which they began.
    """

    standard_weights: Provision | None = None
    rules: Provision | None = None
    restrictions: tuple[Provision, ...] = ()
    permits: tuple[Provision, ...] = ()

    def all(self) -> tuple[Provision, ...]:
        """Every one of them, in the order of the statement."""
        first = tuple(one for one in (self.standard_weights, self.rules) if one is not None)
        return (*first, *self.restrictions, *self.permits)

    def ids(self) -> list[UUID]:
        """Their numbers, in the same order."""
        return [one.id for one in self.all()]


NO_PROVISIONS: Final = Provisions()


def holding_values(operator: str, aircraft: UUID | None, at: datetime, known: datetime) -> list[object]:
    """This function will return the values the statement `HOLDING` takes."""
    return [operator, aircraft, at, at, known, at, known]


def provisions_at(operator: str, aircraft: Aircraft | None, at: datetime, known: datetime) -> Provisions:
    """This function will return what held true at `at`, as known at `known`, for one aircraft or, without
    one, for the operator.
    """
    found = rows(_HOLDING_IN_ORDER, holding_values(operator, aircraft.pk if aircraft else None, at, known))
    return provisions_of([(kind, version) for kind, version in found])


def provisions_of(found: Sequence[tuple[str, UUID]]) -> Provisions:
    """This function will sort rows of `HOLDING`, in their order, by kind; others are left out."""
    by_kind: dict[str, list[UUID]] = {}
    for kind, version in found:
        by_kind.setdefault(kind, []).append(version)
    if not by_kind.keys() & _KINDS:
        return NO_PROVISIONS
    return Provisions(
        standard_weights=_last(by_kind.get(STANDARD_WEIGHTS)),
        rules=_last(by_kind.get(RULES)),
        restrictions=tuple(_provision(one) for one in by_kind.get(RESTRICTION, ())),
        permits=tuple(_provision(one) for one in by_kind.get(PERMIT, ())),
    )


_KINDS: Final = frozenset({STANDARD_WEIGHTS, RULES, RESTRICTION, PERMIT})


def provision_of(operator: str, kind: str, version: UUID, aircraft: Aircraft | None = None) -> Provision:
    """This function will return one version of a kind, the operator's or its aircraft's; raises NotKnown."""
    found = (
        Provision.objects.filter(operator_id=operator, aircraft=aircraft, kind=kind, id=version)
        .select_related("entered_by", "approval__approved_by", "ending__ended_by")
        .first()
    )
    if found is None:
        raise NotKnown("version-not-known", f"There are no {kind} of this number here.")
    return found


def provision_history(operator: str, kind: str, aircraft: Aircraft | None = None) -> tuple[Provision, ...]:
    """This function will return every version of a kind, the one entered last first."""
    versions = Provision.objects.filter(operator_id=operator, aircraft=aircraft, kind=kind).select_related(
        "entered_by", "approval__approved_by", "ending__ended_by"
    )
    return tuple(versions.order_by("-number"))


def _last(found: list[UUID] | None) -> Provision | None:
    return _provision(found[-1]) if found else None


@lru_cache(maxsize=512)
def _provision(version: UUID) -> Provision:
    return Provision.objects.get(id=version)


def used_provisions(versions: Sequence[UUID]) -> tuple[Provision, ...]:
    """This function will return versions by their ids, in that order."""
    return tuple(_provision(one) for one in versions)

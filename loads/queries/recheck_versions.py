"""Which versions a load is computed again with: those it was assessed with, but for the ones a recheck
names.
"""

from bisect import bisect_right
from collections.abc import Sequence
from dataclasses import replace
from datetime import datetime
from functools import lru_cache
from typing import Final, NamedTuple
from uuid import UUID

from django.db import connection

from fleet.models import Aircraft, EmptyWeight, LoadingBasis
from fleet.queries.figures import basis_of, fit_of
from fleet.queries.in_force import InForce, in_force_for
from fleet.queries.provisions import Provisions, provisions_of, used_provisions
from loads.models import Recheck

# Every instant at which something that holds for an aircraft begins or ends, as known at one time.
_TURNS: Final = """
SELECT DISTINCT turn FROM (
    SELECT unnest(ARRAY[lower(valid), upper(valid)]) FROM fleet_standing
    WHERE aircraft_id = %(aircraft)s AND known @> %(known)s::timestamptz
    UNION ALL
    SELECT unnest(ARRAY[p.true_from, p.true_until, e.true_from]) FROM fleet_provision p
    LEFT JOIN fleet_provisionend e ON e.provision_id = p.id
    WHERE p.operator_id = %(operator)s AND (p.aircraft_id IS NULL OR p.aircraft_id = %(aircraft)s)
) every (turn) WHERE turn IS NOT NULL ORDER BY turn
"""


class Assessed(NamedTuple):
    """What a stored load was assessed with, and what is needed to find what holds for it now."""

    aircraft: UUID
    configuration: str
    departure: datetime
    loading_basis: UUID | None
    empty_weight: UUID | None
    provisions: tuple[UUID, ...]


class OtherFit(Exception):
    """The load was flown on another base fit than the empty weight that is named, so it is not concerned."""


class Versions:
    """The versions of one recheck, load by load; what is asked once is remembered."""

    def __init__(self, recheck: Recheck) -> None:
        self._recheck = recheck
        named = (recheck.empty_weight_id, recheck.loading_basis_id, recheck.standard_weights_id)
        self._in_force_now = named == (None, None, None)
        self._aircraft: dict[UUID, tuple[Aircraft, Sequence[datetime]]] = {}
        self._found: dict[tuple[UUID, str, int], InForce] = {}
        self._named: dict[tuple[object, ...], InForce | OtherFit] = {}

    def known(self, assessed: datetime) -> datetime:
        """This function will return the instant on the "known" clock that counts for a load assessed then."""
        return self._recheck.asked_at if self._in_force_now else assessed

    def span(self, aircraft: str, departure: str) -> int:
        """This function will return the number of the span of time in which nothing that counts begins or
        ends for an aircraft; with versions named all times are one.
        """
        if not self._in_force_now:
            return 0
        return bisect_right(self._turns(UUID(aircraft))[1], datetime.fromisoformat(departure))

    def of(self, one: Assessed) -> InForce:
        """This function will return what a load is computed with; raises OtherFit."""
        if self._in_force_now:
            return self._now(one)
        # All loads that used the same versions come to the same, so it is worked out once.
        key = (one.loading_basis, one.empty_weight, one.configuration, *one.provisions)
        found = self._named.get(key)
        if found is None:
            found = self._named[key] = self._replaced(one)
        if isinstance(found, OtherFit):
            raise found
        return found

    def _replaced(self, one: Assessed) -> InForce | OtherFit:
        recheck = self._recheck
        basis_id = recheck.loading_basis_id or one.loading_basis
        weight_id = recheck.empty_weight_id or one.empty_weight
        basis = _basis(basis_id) if basis_id else None
        weight = _weight(weight_id) if weight_id else None
        if recheck.empty_weight_id and basis is not None and weight is not None:
            fit = fit_of(basis_of(basis), one.configuration)
            if fit is not None and fit != weight.fit:
                return OtherFit()
        return InForce(basis, weight, self._provisions(one))

    def _provisions(self, one: Assessed) -> Provisions:
        used = used_provisions(one.provisions)
        held = provisions_of([(each.kind, each.id) for each in used])
        table = self._recheck.standard_weights
        return held if table is None else replace(held, standard_weights=table)

    def _now(self, one: Assessed) -> InForce:
        aircraft, turns = self._turns(one.aircraft)
        # Between two turns nothing begins or ends, so one load stands for all of them.
        key = (one.aircraft, one.configuration, bisect_right(turns, one.departure))
        if key not in self._found:
            known = self._recheck.asked_at
            self._found[key] = in_force_for(aircraft, one.departure, known, one.configuration)
        return self._found[key]

    def _turns(self, number: UUID) -> tuple[Aircraft, Sequence[datetime]]:
        if number not in self._aircraft:
            aircraft = Aircraft.objects.get(id=number)
            values: dict[str, UUID | str | datetime] = {
                "aircraft": number,
                "operator": aircraft.operator_id,
                "known": self._recheck.asked_at,
            }
            with connection.cursor() as cursor:
                cursor.execute(_TURNS, values)
                self._aircraft[number] = aircraft, [turn for (turn,) in cursor.fetchall()]
        return self._aircraft[number]


@lru_cache(maxsize=256)
def _basis(version: UUID) -> LoadingBasis:
    return LoadingBasis.objects.get(id=version)


@lru_cache(maxsize=256)
def _weight(version: UUID) -> EmptyWeight:
    return EmptyWeight.objects.get(id=version)

"""Asking for loads to be computed again against a later figure."""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from typing import Final
from uuid import UUID

from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Provision
from fleet.provisions import STANDARD_WEIGHTS
from fleet.queries.aircraft import aircraft_of, empty_weight_of, loading_basis_of
from fleet.queries.provisions import provision_of
from loads.acts import RECHECK_LOADS
from loads.balance.engine import ENGINE_VERSION
from loads.balance.fields import fault_of_text
from loads.models import Recheck
from loads.queries.rechecks import RECHECKING
from records import outbox
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed, NotKnown
from records.strict_json import JSON

FIELDS: Final = ("aircraft", "empty_weight", "loading_basis", "standard_weights", "from", "to", "reason")
LONGEST_REASON: Final = 500
EARLIEST_YEAR, LATEST_YEAR = 1950, 2150


@dataclass(frozen=True, slots=True)
class Asked:
    """A recheck as it was asked for, each version found."""

    aircraft: Aircraft | None
    empty_weight: EmptyWeight | None
    loading_basis: LoadingBasis | None
    standard_weights: Provision | None
    since: datetime | None
    until: datetime | None
    reason: str


def ask_recheck(document: Mapping[str, JSON], *, by: Actor) -> Recheck:
    """This function will keep what is asked, and promise the work.

    `aircraft` (a registration) may be left out, which means the whole operator; `empty_weight`,
    `loading_basis` and `standard_weights` are ids of versions, approved or not; `from` (included) and `to`
    (not) bound the planned departures. Raises Invalid with every fault, NotAllowed.
    """
    operator = by.operator
    if operator is None:
        raise NotAllowed("no-operator", "This needs somebody who belongs to an operator.")
    asked = read_recheck(document, operator)
    about = f"aircraft:{asked.aircraft.pk}" if asked.aircraft else f"operator:{operator}"
    with act(RECHECK_LOADS, by=by, about=about, reason=asked.reason) as entry:
        recheck = Recheck.objects.create(
            operator_id=entry.chain,
            aircraft=asked.aircraft,
            empty_weight=asked.empty_weight,
            loading_basis=asked.loading_basis,
            standard_weights=asked.standard_weights,
            since=asked.since,
            until=asked.until,
            reason=asked.reason,
            engine=ENGINE_VERSION,
            asked_by_id=by.person,
            asked_at=entry.at,
            act=entry.id,
        )
        outbox.put(entry, RECHECKING, str(recheck.id))
        return recheck


def read_recheck(document: Mapping[str, JSON], operator: str) -> Asked:
    """This function will read what is asked; raises Invalid with every fault."""
    faults = [
        Fault(f"/{name}", "unknown-field", f"the fields here are {', '.join(FIELDS)}")
        for name in document
        if name not in FIELDS
    ][:20]
    reading = _Reading(document, operator, faults)
    aircraft = reading.aircraft()
    found = Asked(
        aircraft,
        reading.empty_weight(aircraft),
        reading.loading_basis(aircraft),
        reading.standard_weights(),
        reading.instant("from"),
        reading.instant("to"),
        reading.reason(),
    )
    if found.since and found.until and found.until <= found.since:
        faults.append(Fault("/to", "out-of-range", "must be later than from; correct one of them"))
    if faults:
        raise Invalid(*faults)
    return found


class _Reading:
    """The fields of one document, their faults noted in the list that was given."""

    def __init__(self, document: Mapping[str, JSON], operator: str, faults: list[Fault]) -> None:
        self._document, self._operator, self._faults = document, operator, faults

    def aircraft(self) -> Aircraft | None:
        """The aircraft named, None for the whole operator."""
        name = self._text("aircraft")
        if name is None:
            return None
        try:
            return aircraft_of(self._operator, name)
        except NotKnown:
            self._note(
                "aircraft", "unknown-aircraft", "no such aircraft is entered; correct the registration"
            )
            return None

    def empty_weight(self, aircraft: Aircraft | None) -> EmptyWeight | None:
        """The empty weight named, one of the aircraft."""
        version = self._version("empty_weight", aircraft, needs_aircraft=True)
        try:
            return empty_weight_of(aircraft, version) if aircraft and version else None
        except NotKnown:
            self._note("empty_weight", "unknown-version", "this aircraft has no empty weight of this id")
            return None

    def loading_basis(self, aircraft: Aircraft | None) -> LoadingBasis | None:
        """The loading basis named, one of the aircraft."""
        version = self._version("loading_basis", aircraft, needs_aircraft=True)
        try:
            return loading_basis_of(aircraft, version) if aircraft and version else None
        except NotKnown:
            self._note("loading_basis", "unknown-version", "this aircraft has no loading basis of this id")
            return None

    def standard_weights(self) -> Provision | None:
        """The table of standard weights named, one of the operator."""
        version = self._version("standard_weights", None, needs_aircraft=False)
        try:
            return provision_of(self._operator, STANDARD_WEIGHTS, version) if version else None
        except NotKnown:
            self._note("standard_weights", "unknown-version", "there is no table of this id")
            return None

    def instant(self, name: str) -> datetime | None:
        """The instant in a field, with its offset."""
        text = self._text(name)
        if text is None:
            return None
        try:
            found = datetime.fromisoformat(text)
        except ValueError:
            found = None
        if found is None or found.tzinfo is None or not EARLIEST_YEAR <= found.year <= LATEST_YEAR:
            detail = "write date, time and offset, like 2026-12-01T08:30:00-06:00"
            self._note(name, "instant-malformed", detail)
            return None
        return found

    def reason(self) -> str:
        """Why it is asked; may be left out."""
        text = self._text("reason") or ""
        fault = fault_of_text(text, LONGEST_REASON) if text else None
        if fault is not None:
            self._note("reason", *fault)
        return text

    def _version(self, name: str, aircraft: Aircraft | None, *, needs_aircraft: bool) -> UUID | None:
        text = self._text(name)
        if text is None:
            return None
        if needs_aircraft and aircraft is None:
            if "aircraft" not in self._document:
                self._note(name, "aircraft-needed", "a version is one aircraft's; name the aircraft, too")
            return None
        try:
            return UUID(text)
        except ValueError:
            self._note(
                name, "id-form", "write the id of a version, as the API and the aircraft's page give it"
            )
            return None

    def _text(self, name: str) -> str | None:
        given = self._document.get(name)
        if name not in self._document:
            return None
        if not isinstance(given, str) or not given:
            self._note(name, "text-form", "a text is needed here; leave the field out for none")
            return None
        return given

    def _note(self, name: str, code: str, detail: str) -> None:
        self._faults.append(Fault(f"/{name}", code, detail))

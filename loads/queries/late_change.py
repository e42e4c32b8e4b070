"""A last-minute change of an accepted load, worked out with nothing stored: the same for looking and for
signing.
"""

import json
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from decimal import Decimal
from fractions import Fraction
from typing import Any, Final

from fleet.conversion import in_unit
from fleet.models import OperatorSettings
from fleet.quantities import Quantity, Unit
from fleet.queries.figures import basis_of
from fleet.queries.in_force import in_force_for
from fleet.queries.settings import settings_at
from loads import lifecycle
from loads.balance.engine import ENGINE_VERSION
from loads.balance.late_change import (
    NOTHING,
    Line,
    Moved,
    faults_in_the_change,
    measured,
    said,
    settle,
)
from loads.balance.late_reading import LateChange as Asked
from loads.balance.late_reading import read_late_change
from loads.balance.rounding import printed
from loads.models import LateChange, Load
from loads.queries.computation import Computation, compute, versions_of
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.provided import table_of
from loads.queries.signable import SIGNER
from loads.queries.stale import stale_parts
from loads.statement import signing_text, statement
from records.canonical import canonical, decimal_text
from records.refusal import Invalid, StepRefused
from records.strict_json import JSON, read

REVISE: Final = "Revise the load: it is prepared and accepted anew."
PRINTED_PLACES: Final = 1


@dataclass(frozen=True, slots=True)
class Bound:
    """The most that may change on one load at the last minute, by one version of the settings."""

    weight: Decimal
    unit: Unit
    persons: int
    settings_number: int

    @property
    def kilograms(self) -> Fraction:
        """The weight in kilograms, exactly."""
        return in_unit(Quantity(self.weight, self.unit), Unit.KG)

    def words(self) -> str:
        """The bound as people read it."""
        return f"{self.weight} {self.unit.value} and {_persons(self.persons)}"

    def said(self, moved: Moved) -> str:
        """What moved, in the unit of the bound; rounded up, since it is held against a bound."""
        per_unit = in_unit(Quantity(Decimal(1), self.unit), Unit.KG)
        weight = printed(moved.kilograms / per_unit, PRINTED_PLACES, "up")
        return f"{weight} {self.unit.value} and {_persons(moved.persons)}"


@dataclass(frozen=True, slots=True)
class Proposal:
    """A change within its bound: its number on this load, its settled lines, what moved on the load by now,
    and the changed load as computed, whatever its verdict.
    """

    number: int
    lines: tuple[Line, ...]
    moved: Moved
    bound: Bound
    computation: Computation

    @property
    def issue(self) -> int:
        """The issue of the manifest that will show it."""
        return self.number + 1


def propose(current: Current, change: Mapping[str, object], known: datetime) -> Proposal:
    """This function will work out a change `{lines, persons_on_board}` of an accepted load at `known`.

    Raises StepRefused: `step-not-allowed` (not accepted, or departed), `no-last-minute-bound`, `stale`,
    `beyond-the-bound` (counted with the changes before it); Invalid with every fault of the change.
    """
    lifecycle.step(current.state, "accepted", "change-load-late")
    bound = bound_at(current.load.operator_id, known)
    moved_on = [part for part in stale_parts(current, known) if part != "engine"]
    if moved_on:
        raise StepRefused("stale", f"Changed since it was accepted: {', '.join(moved_on)}.", next_step=REVISE)
    declared: dict[str, Any] = dict(declared_now(current))
    # Numbers as texts from here on, as everything stored has them.
    asked = read_late_change(_as_stored(change))
    settled = settle(declared, asked, _additions(current, asked, known))
    before = changes_of(current.load)
    moved = moved_by(before, declared) + measured(settled.lines, declared["fuel"]["density"])
    if moved.kilograms > bound.kilograms or moved.persons > bound.persons:
        raise StepRefused(
            "beyond-the-bound",
            f"Last-minute changes of this load would come to {bound.said(moved)}; "
            f"{bound.words()} is the most.",
            next_step=REVISE,
        )
    try:
        computation = compute(current.load.operator_id, settled.document, known)
    except Invalid as refused:
        raise Invalid(*faults_in_the_change(refused.faults, settled.origins)) from refused
    return Proposal(len(before) + 1, settled.lines, moved, bound, computation)


def _additions(current: Current, asked: Asked, known: datetime) -> tuple[Line, ...]:
    """This function will return what the table in force adds to a declared passenger of this aircraft; () for
    a change in which nobody goes on or off.
    """
    if not any(str(line["change"]).startswith("passenger") for line in asked.lines):
        return ()
    load = current.load
    used = in_force_for(load.aircraft, load.departure, known, load.configuration)
    table = table_of(used.provisions)
    if table is None or table.declared is None or used.basis is None:
        return ()
    if not table.declared.allows(basis_of(used.basis).passenger_seats_installed):
        return ()
    return tuple(
        {"what": one.what, "value": decimal_text(one.weight.value), "unit": one.weight.unit.value}
        for one in table.declared.additions
    )


def bound_at(operator: str, known: datetime) -> Bound:
    """This function will return the bound in force; raises StepRefused when the settings state none."""
    now = settings_at(operator, known, known)
    weight, unit, persons = (
        now.last_minute_bound_weight,
        now.last_minute_bound_unit,
        now.last_minute_bound_persons,
    )
    if weight is None or unit is None or persons is None:
        raise StepRefused(
            "no-last-minute-bound",
            "The operator's settings state no bound on last-minute changes, so none is possible.",
            next_step=f"{REVISE} Or have the bound of your procedures entered in the settings.",
        )
    return Bound(weight, Unit(unit), persons, now.number)


def bound_of(change: LateChange) -> Bound:
    """This function will return the bound a stored change kept, as the settings of that time stated it."""
    row = OperatorSettings.objects.get(operator_id=change.operator_id, number=change.settings_number)
    return Bound(
        Decimal(row.last_minute_weight),
        Unit(row.last_minute_unit),
        change.persons_bound,
        change.settings_number,
    )


def changes_of(load: Load) -> tuple[LateChange, ...]:
    """This function will return the last-minute changes of a load, the first one first."""
    return tuple(LateChange.objects.filter(load=load).order_by("number"))


def lines_of(change: LateChange) -> tuple[Line, ...]:
    """This function will return the settled lines of a stored change."""
    return tuple(json.loads(change.lines))


def moved_by(changes: tuple[LateChange, ...], declared: Mapping[str, Any]) -> Moved:
    """This function will return what stored changes of one load moved, exactly."""
    density = declared["fuel"]["density"]
    return sum((measured(lines_of(one), density) for one in changes), NOTHING)


def words_to_sign_late(current: Current, proposal: Proposal, number: int) -> str:
    """This function will return exactly what the pilot signs: the change, then the changed load; no names.

    `number` is that of the manifest.
    """
    made = proposal.computation
    stated = statement(
        _object(made.inputs),
        versions_of(made.basis, made.empty_weight, made.provisions),
        ENGINE_VERSION,
        made.result,
    )
    lines = [f"{place}. {said(line, named=False)}." for place, line in enumerate(proposal.lines, 1)]
    words = signing_text(
        stated,
        name=SIGNER,
        capacity=lifecycle.step(current.state, "accepted").signed_by or "",
        meaning="accepted",
    )
    head = f"Last-minute change {proposal.number}, for issue {proposal.issue} of manifest {number}:"
    counted = (
        f"All changes since issue 1: {proposal.bound.said(proposal.moved)}, "
        f"of {proposal.bound.words()} allowed."
    )
    return "\n".join([head, *lines, counted, words])


def _as_stored(change: Mapping[str, object]) -> dict[str, JSON]:
    return _object(canonical(change))


def _object(text: bytes) -> dict[str, JSON]:
    document = read(text)
    if not isinstance(document, dict):
        raise TypeError("the text of an object was given")
    return document


def _persons(count: int) -> str:
    return f"{count} person{'' if count == 1 else 's'}"

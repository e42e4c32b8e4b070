"""What a recheck can be asked against: the versions an operator has entered, in words."""

import json
from dataclasses import dataclass
from datetime import datetime
from typing import Any
from uuid import UUID
from zoneinfo import ZoneInfo

from fleet.models import EmptyWeight, LoadingBasis, Provision
from fleet.provisions import STANDARD_WEIGHTS
from loads.models import Recheck


@dataclass(frozen=True, slots=True)
class Choice:
    """One version: its id, and what people call it."""

    id: UUID
    words: str


@dataclass(frozen=True, slots=True)
class Choices:
    """The versions of every aircraft of an operator, the newest of each aircraft first, and its tables."""

    empty_weights: tuple[Choice, ...]
    loading_bases: tuple[Choice, ...]
    standard_weights: tuple[Choice, ...]


def choices_of(operator: str, zone: ZoneInfo) -> Choices:
    """This function will return all versions of an operator, approved or not."""
    weights = EmptyWeight.objects.filter(operator_id=operator).select_related("aircraft")
    bases = LoadingBasis.objects.filter(operator_id=operator).select_related("aircraft").defer("document")
    tables = Provision.objects.filter(operator_id=operator, kind=STANDARD_WEIGHTS).defer("document")
    by_aircraft = ("aircraft__registration", "-entered_at")
    return Choices(
        tuple(Choice(one.id, _weight(one, zone)) for one in weights.order_by(*by_aircraft)),
        tuple(Choice(one.id, _basis(one, zone)) for one in bases.order_by(*by_aircraft)),
        tuple(Choice(one.id, _table(one, zone)) for one in tables.order_by("-number")),
    )


def against(recheck: Recheck, zone: ZoneInfo) -> list[str]:
    """This function will say in words what a recheck computes with."""
    found = []
    if recheck.empty_weight is not None:
        found.append(f"empty weight: {_weight(recheck.empty_weight, zone)}")
    if recheck.loading_basis is not None:
        found.append(f"loading basis: {_basis(recheck.loading_basis, zone)}")
    if recheck.standard_weights is not None:
        found.append(f"standard weights: {_table(recheck.standard_weights, zone)}")
    return found or ["what is in force now at each departure"]


def _weight(one: EmptyWeight, zone: ZoneInfo) -> str:
    weight: dict[str, Any] = json.loads(one.document)["weight"]
    figure = f"{weight['value']} {weight['unit']}"
    return (
        f"{one.aircraft.registration}, {one.fit}: {figure}, true from {_day(one.true_from, zone)}, "
        f"entered {_day(one.entered_at, zone)}"
    )


def _basis(one: LoadingBasis, zone: ZoneInfo) -> str:
    return f"{one.aircraft.registration}: revision {one.revision}, entered {_day(one.entered_at, zone)}"


def _table(one: Provision, zone: ZoneInfo) -> str:
    return f"table {one.number}, true from {_day(one.true_from, zone)}"


def _day(at: datetime, zone: ZoneInfo) -> str:
    return f"{at.astimezone(zone):%Y-%m-%d}"

"""The versions of an aircraft as pages and answers show them: author, approval, and when each held, on
both clocks.
"""

from dataclasses import dataclass
from datetime import datetime
from uuid import UUID

from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Standing


@dataclass(frozen=True, slots=True)
class Window:
    """The version was held true from `valid_from` until `valid_until`, as known from `known_from` until
    `known_until`.

    Ends are not included; None: until further notice.
    """

    valid_from: datetime
    valid_until: datetime | None
    known_from: datetime
    known_until: datetime | None


@dataclass(frozen=True, slots=True)
class VersionHistory:
    """One version with its author, its approval, if it has one, and its windows in the order they became
    known.
    """

    version: LoadingBasis | EmptyWeight
    entered_by: str
    approved_by: str | None
    approved_at: datetime | None
    true_from: datetime | None
    windows: tuple[Window, ...]


def loading_basis_history(aircraft: Aircraft) -> tuple[VersionHistory, ...]:
    """This function will return every loading basis of the aircraft, newest revision first."""
    rows = aircraft.loading_bases.select_related("entered_by", "approval__approved_by").order_by("-revision")
    windows = _windows(aircraft)
    return tuple(_history(row, windows) for row in rows)


def empty_weight_history(aircraft: Aircraft) -> tuple[VersionHistory, ...]:
    """This function will return every empty weight of the aircraft, the latest beginning first."""
    rows = aircraft.empty_weights.select_related("entered_by", "approval__approved_by")
    windows = _windows(aircraft)
    return tuple(_history(row, windows) for row in rows.order_by("-true_from", "-entered_at"))


def history_of(version: LoadingBasis | EmptyWeight) -> VersionHistory:
    """This function will return one version with its author, approval and windows."""
    return _history(version, _windows(version.aircraft))


def _windows(aircraft: Aircraft) -> dict[UUID, list[Window]]:
    found: dict[UUID, list[Window]] = {}
    for row in Standing.objects.filter(aircraft=aircraft).order_by("id"):
        window = Window(row.valid.lower, row.valid.upper, row.known.lower, row.known.upper)
        found.setdefault(row.version, []).append(window)
    return found


def _history(version: LoadingBasis | EmptyWeight, windows: dict[UUID, list[Window]]) -> VersionHistory:
    approval = getattr(version, "approval", None)
    return VersionHistory(
        version=version,
        entered_by=version.entered_by.name,
        approved_by=approval.approved_by.name if approval else None,
        approved_at=approval.known_from if approval else None,
        true_from=approval.true_from if approval else None,
        windows=tuple(windows.get(version.id, ())),
    )

"""The rejects desk: open loads that are outside or unresolved, who has them, what became of earlier ones."""

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import datetime
from uuid import UUID

from django.db.models import QuerySet

from fleet.models import Person
from loads.models import Assessment, Load, Present, Remark
from loads.queries.current import Current, current_of, loads_present

REJECTED = ("outside", "unresolved")
MOST_REJECTS = 100
# A chain of revisions is followed this far; nobody revises one flight more often.
_LONGEST_CHAIN = 50


@dataclass(frozen=True, slots=True)
class Reject:
    """One load on the desk with its remarks in order; `holder` has it, by name, "" when nobody is named."""

    current: Current
    holder: str
    remarks: tuple[Remark, ...]


@dataclass(frozen=True, slots=True)
class Settled:
    """A load that was rejected once and is no longer on the desk.

    `end` is the load that stands at the end of its revisions, the load itself when nothing replaced it.
    """

    current: Current
    rejected: Assessment
    end: Current
    remarks: tuple[Remark, ...]


def open_rejects(operator: str, *, most: int = MOST_REJECTS) -> tuple[Reject, ...]:
    """This function will return the loads on the desk, the next departure first; they stay until superseded
    or withdrawn.
    """
    rows = _present(operator).filter(state="open", verdict__in=REJECTED)
    found = [current_of(row) for row in rows.order_by("departure", "load_id")[:most]]
    remarks = _remarks({one.load.id for one in found})
    return tuple(
        Reject(one, _holder(one, remarks.get(one.load.id, ())), remarks.get(one.load.id, ())) for one in found
    )


def reject_of(current: Current) -> Reject:
    """This function will return a load with its remarks and who has it."""
    remarks = _remarks({current.load.id}).get(current.load.id, ())
    return Reject(current, _holder(current, remarks), remarks)


def settled_rejects(
    operator: str, since: datetime, until: datetime, *, most: int = MOST_REJECTS
) -> tuple[Settled, ...]:
    """This function will return the loads departing from `since` to `until` that were rejected and are no
    longer on the desk, the latest departure first.
    """
    rows = (
        _present(operator)
        .filter(rejected=True, departure__gte=since, departure__lt=until)
        .exclude(state="open", verdict__in=REJECTED)
    )
    found = [current_of(row) for row in rows.order_by("-departure", "-load_id")[:most]]
    loads = {one.load.id for one in found}
    verdicts = Assessment.objects.filter(load_id__in=loads, verdict__in=REJECTED).order_by(
        "load_id", "number"
    )
    reasons = {one.load_id: one for one in verdicts}  # of several the last counts
    ends, remarks = _ends(found), _remarks(loads)
    return tuple(
        Settled(one, reasons[one.load.id], ends[one.load.id], remarks.get(one.load.id, ())) for one in found
    )


def people_who_may_hold(operator: str) -> tuple[Person, ...]:
    """This function will return the operator's active people, by name: a reject can be handed to each."""
    return tuple(Person.objects.filter(operator_id=operator, is_active=True).order_by("name", "login"))


def _present(operator: str) -> "QuerySet[Present]":
    return loads_present().select_related("load__pilot").filter(operator_id=operator)


def _remarks(loads: Iterable[UUID]) -> dict[UUID, tuple[Remark, ...]]:
    found: dict[UUID, tuple[Remark, ...]] = {}
    rows = Remark.objects.filter(load_id__in=list(loads)).select_related("person", "holder")
    for row in rows.order_by("load_id", "number"):
        found[row.load_id] = (*found.get(row.load_id, ()), row)
    return found


def _holder(current: Current, remarks: tuple[Remark, ...]) -> str:
    named = [remark.holder.name for remark in remarks if remark.holder is not None]
    pilot = current.load.pilot
    return named[-1] if named else (pilot.name if pilot is not None else "")


def _ends(found: list[Current]) -> dict[UUID, Current]:
    """Follow the revisions of each load to the last one, a query for each round of revisions."""
    last = {one.load.id: one.load.id for one in found}
    for _ in range(_LONGEST_CHAIN):
        rows = Load.objects.filter(replaces_id__in=set(last.values())).values_list("replaces_id", "id")
        after = dict(rows)
        if not after:
            break
        last = {first: after.get(end, end) for first, end in last.items()}
    standing = {one.load.id: one for one in found}
    missing = set(last.values()) - standing.keys()
    standing |= {row.load_id: current_of(row) for row in loads_present().filter(load_id__in=missing)}
    return {first: standing[end] for first, end in last.items()}

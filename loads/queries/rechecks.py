"""Rechecks as they stand: how far the work is, the counts, and the table of what came out otherwise."""

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Final
from uuid import UUID

from django.db.models import Count, F, Func, IntegerField, Q, QuerySet, Sum

from loads.models import LoadFlag, Recheck, RecheckedLoad, RecheckResult
from records.models import Outbox
from records.refusal import NotKnown

MOST_ROWS: Final = 500
COUNTS: Final = ("same", "changed", "not_computed", "other_fit", "gone")
RECHECKING: Final = "loads.tasks.recheck"
COLUMNS: Final = (
    "load",
    "aircraft",
    "flight",
    "leg",
    "planned departure",
    "signed verdict",
    "verdict now",
    "limit",
    "excess",
    "code",
)


@dataclass(frozen=True, slots=True)
class Progress:
    """How far a recheck is. `state`: "waiting" (nobody has begun), "running", "finished". `problem`: the kind
    of error the last try met, "" for none.
    """

    state: str
    loads: int
    done: int
    counts: dict[str, int]
    exactly: int
    flagged: int
    problem: str


@dataclass(frozen=True, slots=True)
class Page:
    """Some rows of the table, and where the next page begins, None when there is none."""

    rows: tuple[RecheckedLoad, ...]
    after: tuple[int, int] | None


def recheck_of(operator: str, recheck: UUID) -> Recheck:
    """This function will return the operator's recheck; raises NotKnown, for another operator's too."""
    found = _rechecks(operator).filter(id=recheck).first()
    if found is None:
        raise NotKnown("recheck-not-known", "There is no recheck of this number.")
    return found


def last_rechecks(operator: str, most: int = 30) -> tuple[Recheck, ...]:
    """This function will return the operator's rechecks, the one asked for last first."""
    return tuple(_rechecks(operator).select_related("result").order_by("-asked_at", "-id")[:most])


def progress_of(recheck: Recheck) -> Progress:
    """This function will return how far a recheck is."""
    length = Func(F("loads"), function="cardinality", output_field=IntegerField())
    found = recheck.parts.annotate(length=length).aggregate(
        loads=Sum("length", default=0),
        done=Sum("length", default=0, filter=Q(done_at__isnull=False)),
        parts=Count("id"),
        exact=Sum("exactly", default=0),
        **{f"of_{name}": Sum(name, default=0) for name in COUNTS},
    )
    result = RecheckResult.objects.filter(recheck=recheck).first()
    promised = Outbox.objects.filter(task=RECHECKING, key=str(recheck.id))
    return Progress(
        state="finished" if result else "running" if found["parts"] else "waiting",
        loads=found["loads"],
        done=found["done"],
        counts={name: found[f"of_{name}"] for name in COUNTS},
        exactly=found["exact"],
        flagged=result.flagged if result else 0,
        problem=promised.values_list("last_problem", flat=True).first() or "",
    )


def table_page(recheck: Recheck, after: tuple[int, int] | None = None, most: int = MOST_ROWS) -> Page:
    """This function will return rows of the table in their order: flights to come first, then past ones."""
    rows = _table(recheck)
    if after is not None:
        part, row = after
        rows = rows.filter(Q(part__gt=part) | Q(part=part, id__gt=row))
    found = list(rows[: most + 1])
    shown = tuple(found[:most])
    return Page(shown, (shown[-1].part, shown[-1].pk) if len(found) > most else None)


def table_rows(recheck: Recheck) -> Iterator[tuple[str, ...]]:
    """This function will yield the whole table as texts in the order of `COLUMNS`, a few hundred rows read at
    a time.
    """
    for one in _table(recheck).iterator(chunk_size=500):
        yield texts_of(one)


def texts_of(one: RecheckedLoad) -> tuple[str, ...]:
    """This function will return one row of the table as texts."""
    load = one.load
    return (
        str(load.id),
        load.aircraft.registration,
        load.reference,
        str(load.leg),
        load.departure_text,
        one.verdict,
        one.now,
        one.limit,
        one.excess,
        one.code,
    )


def flags_of(load: UUID) -> tuple[LoadFlag, ...]:
    """This function will return the flags on a load, the latest first."""
    return tuple(_flags().filter(load_id=load))


def flagged_among(loads: set[UUID]) -> dict[UUID, LoadFlag]:
    """This function will return the latest flag of each of these loads that has one."""
    found: dict[UUID, LoadFlag] = {}
    for one in _flags().filter(load_id__in=loads):
        found.setdefault(one.load_id, one)
    return found


def _flags() -> "QuerySet[LoadFlag]":
    against = ("recheck__empty_weight", "recheck__loading_basis", "recheck__standard_weights")
    rows = LoadFlag.objects.select_related("recheck", *against).defer(
        *(f"{name}__document" for name in against)
    )
    return rows.order_by("-flagged_at", "-id")


def _rechecks(operator: str) -> "QuerySet[Recheck]":
    against = ("empty_weight__aircraft", "loading_basis__aircraft", "standard_weights")
    return (
        Recheck.objects.filter(operator_id=operator)
        .select_related("aircraft", "operator", "asked_by", *against)
        .defer("loading_basis__document", "standard_weights__document")
    )


def _table(recheck: Recheck) -> "QuerySet[RecheckedLoad]":
    return recheck.rows.select_related("load__aircraft").order_by("part", "id")

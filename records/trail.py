"""Reading the trail of one chain: acts with their places in it, newest first, a page at a time."""

import json
from dataclasses import dataclass
from datetime import datetime
from typing import Any
from uuid import UUID

from django.db.models import Count, Q

from records.models import Act, Change, GuardedTable, Name
from records.refusal import NotKnown

MOST_ACTS = 200
_CHANGED = "changed"  # all that an image says of a hidden column


@dataclass(frozen=True, slots=True)
class Asked:
    """Which acts to read; "" and None leave a filter out.

    `about` and `actor` are whole keys ("load:<uuid>", "person:7"), `kind` the name of an act; `since` is
    included, `until` is not.
    """

    about: str = ""
    actor: str = ""
    kind: str = ""
    since: datetime | None = None
    until: datetime | None = None


@dataclass(frozen=True, slots=True)
class Line:
    """One act: who did what about what, why, where it stands in the chain and how many rows it wrote.

    `name` is the actor's name as it was printed then, "" when it was destroyed or there never was one.
    """

    act: UUID
    at: datetime
    kind: str
    actor_kind: str
    actor_key: str
    name: str
    capacity: str
    about: str
    reason: str
    request: str
    caused_by: UUID | None
    position: int
    digest: str
    rows: int


@dataclass(frozen=True, slots=True)
class Trail:
    """Some acts, newest first, and the act after which the next page begins, if there is one."""

    lines: tuple[Line, ...]
    after: UUID | None


@dataclass(frozen=True, slots=True)
class Written:
    """One row an act wrote: the fields of its image that were set or changed, as (name, before, after).

    A row that was added has no "before" (None). What is personal stands as a salted digest, what is hidden
    (a password) as "changed".
    """

    table: str
    row: str
    operation: str
    fields: tuple[tuple[str, Any, Any], ...]


@dataclass(frozen=True, slots=True)
class Entry:
    """One act with every row it wrote, and the sealed entry as it is hashed."""

    line: Line
    written: tuple[Written, ...]
    previous: str | None
    text: str


def read_trail(chain: str, asked: Asked, *, after: UUID | None = None, most: int = 50) -> Trail:
    """This function will return at most `most` sealed acts of the chain, the newest first.

    The numbers of acts rise with the time they were opened, so they are the order and the cursor.
    """
    acts = Act.objects.filter(_wanted(chain, asked, after), seal__isnull=False)
    rows = list(acts.select_related("seal").defer("seal__entry").order_by("-id")[: most + 1])
    shown = rows[:most]
    lines = _lines(shown)
    return Trail(lines, shown[-1].id if len(rows) > most else None)


def entry_of(chain: str, act: UUID) -> Entry:
    """This function will return one act of the chain with what it wrote; raises NotKnown."""
    found = Act.objects.filter(chain=chain, id=act, seal__isnull=False).select_related("seal").first()
    if found is None:
        raise NotKnown("act-not-known", "There is no act of this number.")
    changes = Change.objects.filter(act_id=act).order_by("id")
    (line,) = _lines([found])
    written = tuple(_written(change) for change in changes)
    return Entry(line, written, found.seal.previous, found.seal.entry)


def actors_of(chain: str) -> tuple[tuple[str, str], ...]:
    """This function will return who has a name in the chain, as (key, name last printed), by name."""
    rows = Name.objects.filter(chain=chain).order_by("actor_key", "-id").distinct("actor_key")
    named = ((row.actor_key, bytes(row.name).decode("utf-8", "replace")) for row in rows)
    return tuple(sorted(((key, name or key) for key, name in named), key=lambda pair: pair[1].casefold()))


def _wanted(chain: str, asked: Asked, after: UUID | None) -> Q:
    wanted = Q(chain=chain)
    if asked.about:
        wanted &= Q(about=asked.about)
    if asked.actor:
        wanted &= Q(actor_key=asked.actor)
    if asked.kind:
        wanted &= Q(kind=asked.kind)
    if asked.since is not None:
        wanted &= Q(at__gte=asked.since)
    if asked.until is not None:
        wanted &= Q(at__lt=asked.until)
    if after is not None:
        wanted &= Q(id__lt=after)
    return wanted


def _lines(acts: list[Act]) -> tuple[Line, ...]:
    digests = {act.name_digest for act in acts if act.name_digest}
    names = {
        row.digest: bytes(row.name).decode("utf-8", "replace")
        for row in Name.objects.filter(digest__in=digests, actor_key__in={act.actor_key for act in acts})
    }
    counted = (
        Change.objects.filter(act_id__in=[act.id for act in acts]).values("act_id").annotate(rows=Count("id"))
    )
    rows = {one["act_id"]: one["rows"] for one in counted}
    return tuple(_line(act, names.get(act.name_digest or "", ""), rows.get(act.id, 0)) for act in acts)


def _line(act: Act, name: str, rows: int) -> Line:
    return Line(
        act=act.id,
        at=act.at,
        kind=act.kind,
        actor_kind=act.actor_kind,
        actor_key=act.actor_key,
        name=name,
        capacity=act.capacity,
        about=act.about,
        reason=act.reason,
        request=act.request,
        caused_by=act.caused_by,
        position=act.seal.position,
        digest=act.seal.digest,
        rows=rows,
    )


def _written(change: Change) -> Written:
    image = json.loads(change.image)
    hidden = (
        GuardedTable.objects.filter(name=change.table_name).values_list("hidden", flat=True).first() or []
    )
    before: dict[str, Any] | None = None
    if change.operation == "update":
        earlier = Change.objects.filter(
            table_name=change.table_name, row_key=change.row_key, id__lt=change.id
        ).order_by("-id")
        text = earlier.values_list("image", flat=True).first()
        before = json.loads(text) if text is not None else {}
    fields = tuple(
        (name, None if before is None else before.get(name), value)
        for name, value in image.items()
        if before is None or before.get(name) != value or (name in hidden and value == _CHANGED)
    )
    return Written(change.table_name, change.row_key, change.operation, fields)

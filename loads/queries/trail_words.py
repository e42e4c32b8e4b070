"""The trail in sentences: what acts are called, and what the things they are about are called."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from types import MappingProxyType
from typing import Final
from uuid import UUID

import fleet.acts
import loads.acts
import records.acts
from fleet.models import Aircraft, Operator, Person, Token
from loads.models import Load
from records.trail import Line

SENTENCES: Final[Mapping[str, str]] = MappingProxyType(
    {kind.name: kind.sentence for room in (records.acts, fleet.acts, loads.acts) for kind in room.KINDS}
)
_WORKERS: Final = "the service itself"


@dataclass(frozen=True, slots=True)
class Subject:
    """What an act is about, as people call it: `registration` stands large, `words` say the rest.

    `page` names our page of it ("load", "aircraft"), with `key` in its address; "" when there is none.
    """

    words: str
    registration: str = ""
    page: str = ""
    key: str = ""


def said(kind: str) -> str:
    """This function will return an act in words ("accepted a load")."""
    return SENTENCES.get(kind) or f"did “{kind.replace('-', ' ')}”"


def who(line: Line) -> str:
    """This function will return who acted: the name as printed then, or the key where no name is left."""
    if line.name:
        return line.name
    if line.actor_kind == "service":
        return _WORKERS
    return f"{line.actor_key.replace(':', ' ')} (name no longer kept)"


def subjects(operator: str, abouts: Iterable[str]) -> dict[str, Subject]:
    """This function will return what each `about` is called, in five queries however many there are.

    Whatever is not this operator's, or not of a kind known here, is called by its key.
    """
    asked = {about: tuple(about.partition(":")[::2]) for about in abouts}
    found = {about: Subject(" ".join(parts)) for about, parts in asked.items()}
    for kind, named in (
        ("load", _loads),
        ("aircraft", _aircraft),
        ("person", _people),
        ("token", _tokens),
        ("operator", _operators),
    ):
        keys = {key for what, key in asked.values() if what == kind}
        if keys:
            found |= {f"{kind}:{key}": subject for key, subject in named(operator, keys).items()}
    return found


def _loads(operator: str, keys: set[str]) -> dict[str, Subject]:
    rows = Load.objects.filter(operator_id=operator, id__in=_uuids(keys)).select_related("aircraft")
    return {str(row.id): _load(row) for row in rows}


def _load(row: Load) -> Subject:
    leg = f" leg {row.leg}" if row.leg > 1 else ""
    words = f"{row.reference}{leg}, {row.origin} to {row.destination}, {row.departure_text[:10]}"
    return Subject(words, row.aircraft.registration, "load", str(row.id))


def _aircraft(operator: str, keys: set[str]) -> dict[str, Subject]:
    rows = Aircraft.objects.filter(operator_id=operator, id__in=_uuids(keys))
    return {str(row.id): Subject(row.type, row.registration, "aircraft", row.registration) for row in rows}


def _people(operator: str, keys: set[str]) -> dict[str, Subject]:
    rows = Person.objects.filter(operator_id=operator, id__in=_numbers(keys))
    return {str(row.pk): Subject(f"{row.name} (person {row.pk})") for row in rows}


def _tokens(operator: str, keys: set[str]) -> dict[str, Subject]:
    rows = Token.objects.filter(operator_id=operator, id__in=_numbers(keys))
    return {str(row.pk): Subject(f"token “{row.label}”") for row in rows}


def _operators(operator: str, keys: set[str]) -> dict[str, Subject]:
    rows = Operator.objects.filter(code=operator, code__in=keys)
    return {row.code: Subject(row.name) for row in rows}


def _uuids(keys: set[str]) -> list[UUID]:
    found = []
    for key in keys:
        try:
            found.append(UUID(key))
        except ValueError:
            continue
    return found


def _numbers(keys: set[str]) -> list[int]:
    return [int(key) for key in keys if key.isascii() and key.isdigit() and len(key) < 19]  # noqa: PLR2004  # a bigint

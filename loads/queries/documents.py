"""Manifests by number: searched by number, registration, reference and day, a page at a time."""

from dataclasses import dataclass
from datetime import datetime

from django.db.models import Q

from loads.models import Paper

MOST_DOCUMENTS = 200


@dataclass(frozen=True, slots=True)
class Search:
    """What to look for; None and "" leave a filter out.

    `registration` is whole, `reference` the beginning of the flight's reference, both in any case. `since` is
    the first planned departure included, `until` the first that is not.
    """

    number: int | None = None
    registration: str = ""
    reference: str = ""
    since: datetime | None = None
    until: datetime | None = None


@dataclass(frozen=True, slots=True)
class Filed:
    """One manifest number with its flight; the digest, size and time of filing are None until it is filed."""

    paper: Paper
    digest: str | None
    size: int | None
    filed_at: datetime | None


@dataclass(frozen=True, slots=True)
class Found:
    """Some manifests, the highest number first, and the number after which the next page begins."""

    manifests: tuple[Filed, ...]
    after: int | None


def search_documents(operator: str, search: Search, *, after: int | None = None, most: int = 50) -> Found:
    """This function will return at most `most` manifests of the operator, the highest number first."""
    rows = (
        Paper.objects.filter(_wanted(operator, search, after))
        .select_related("load__aircraft", "filed__document")
        .defer("filed__document__body")
        .order_by("-number")[: most + 1]
    )
    found = [_filed(row) for row in rows]
    shown = tuple(found[:most])
    return Found(shown, shown[-1].paper.number if len(found) > most else None)


def _wanted(operator: str, search: Search, after: int | None) -> Q:
    wanted = Q(operator_id=operator)
    if search.number is not None:
        wanted &= Q(number=search.number)
    if search.registration:
        wanted &= Q(load__aircraft__registration=search.registration.upper())
    if search.reference:
        # The operator of the load is that of its paper; named, so that one index answers.
        wanted &= Q(load__operator_id=operator, load__reference__istartswith=search.reference)
    if search.since is not None:
        wanted &= Q(load__departure__gte=search.since)
    if search.until is not None:
        wanted &= Q(load__departure__lt=search.until)
    if after is not None:
        wanted &= Q(number__lt=after)
    return wanted


def _filed(paper: Paper) -> Filed:
    filed = getattr(paper, "filed", None)
    if filed is None:
        return Filed(paper, None, None, None)
    return Filed(paper, filed.document_id, filed.document.size, filed.filed_at)

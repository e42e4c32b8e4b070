"""Reads the document `tarebook.standard-weights/1`: every fault by its pointer, all at once."""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace
from datetime import date, datetime, timedelta
from decimal import Decimal
from functools import lru_cache
from typing import Any

from fleet.document_schema import shape_faults
from fleet.quantities import Quantity, Unit
from fleet.standard_weights import (
    Addition,
    Category,
    CrewKind,
    DeclaredRule,
    MonthDay,
    Row,
    Season,
    StandardWeights,
)
from records.refusal import Fault, Invalid
from records.strict_json import read

SCHEMA = "standard-weights-1"
# A leap year, so that every day of any year is asked.
_EVERY_DAY = tuple(date(2028, 1, 1) + timedelta(days=day) for day in range(366))


def read_standard_weights(document: object) -> StandardWeights:
    """Return the table in a document. Raises `Invalid` with all faults: of form, a category, season or row
    that does not go with the rest, a day of the year in no season or in two.
    """
    faults = shape_faults(SCHEMA, document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    table = _table(document, faults)
    if table is None or faults:
        raise Invalid(*faults)
    return table


def true_from_of(document: Mapping[str, Any]) -> datetime:
    """Return from when a sound document holds."""
    return datetime.fromisoformat(document["true_from"])


@lru_cache(maxsize=64)
def standard_weights_from_text(text: str, number: int) -> StandardWeights:
    """Return the table in the text of a stored version; texts already read are remembered."""
    table = read_standard_weights(read(text.encode()))
    return replace(table, label=f"{table.title}, version {number}")


def _table(document: Mapping[str, Any], faults: list[Fault]) -> StandardWeights | None:
    own = document["source"]
    if "document" not in own:
        faults.append(
            Fault("/source/document", "missing", "the document the table was taken from is missing; name it")
        )
        return None
    seasons = tuple(_seasons(document.get("seasons", ()), faults))
    categories = tuple(_categories(document["categories"], faults))
    rows = tuple(_rows(document, {each.id: each for each in categories}, seasons, faults))
    return StandardWeights(
        title=document["title"],
        source=_source(own, own),
        categories=categories,
        seasons=seasons,
        rows=rows,
        declared=_declared(document.get("declared"), own, faults),
        crew=tuple(_crew(document.get("crew", ()), own, faults)),
    )


def _categories(given: Sequence[Mapping[str, Any]], faults: list[Fault]) -> Iterator[Category]:
    ids = [each["id"] for each in given]
    plain = {each["id"] for each in given if "counts_as" not in each}
    for place, each in enumerate(given):
        where = f"/categories/{place}"
        if ids.index(each["id"]) != place:
            faults.append(Fault(f"{where}/id", "duplicate", "stands there twice; give each its own id"))
        start, end = each.get("from_age"), each.get("below_age")
        if start is not None and end is not None and end <= start:
            faults.append(Fault(f"{where}/below_age", "out-of-order", "must be above from_age; correct one"))
        if "counts_as" in each and each["counts_as"] not in plain:
            faults.append(
                Fault(
                    f"{where}/counts_as",
                    "unknown-category",
                    "names no category with a weight of its own; use one of the others",
                )
            )
        yield Category(each["id"], each["name"], start, end, each.get("counts_as"))


def _seasons(given: Sequence[Mapping[str, Any]], faults: list[Fault]) -> Iterator[Season]:
    found: list[Season] = []
    for place, each in enumerate(given):
        where = f"/seasons/{place}"
        if any(season.id == each["id"] for season in found):
            faults.append(Fault(f"{where}/id", "duplicate", "stands there twice; give each its own id"))
        days = [_month_day(each[name], f"{where}/{name}", faults) for name in ("first", "last")]
        season = Season(each["id"], each["name"], days[0], days[1])
        found.append(season)
        yield season
    if found and not faults:
        counts = [(day, sum(season.holds(day) for season in found)) for day in _EVERY_DAY]
        wrong = next(((day, count) for day, count in counts if count != 1), None)
        if wrong is not None:
            day, count = wrong
            where = "in no season" if count == 0 else f"in {count} seasons"
            detail = f"{day:%m-%d} lies {where}; let the seasons hold every day exactly once"
            faults.append(Fault("/seasons", "season-gap" if count == 0 else "season-overlap", detail))


def _month_day(text: str, where: str, faults: list[Fault]) -> MonthDay:
    month, day = int(text[:2]), int(text[3:])
    try:
        date(2028, month, day)
    except ValueError:
        faults.append(Fault(where, "wrong-form", "no such day in any year; correct it"))
    return MonthDay(month, day)


def _rows(
    document: Mapping[str, Any],
    categories: Mapping[str, Category],
    seasons: tuple[Season, ...],
    faults: list[Fault],
) -> Iterator[Row]:
    known = {season.id for season in seasons}
    needed = [each.id for each in categories.values() if each.counts_as is None]
    for place, each in enumerate(document["rows"]):
        where = f"/rows/{place}"
        if each.get("to_seats", each["from_seats"]) < each["from_seats"]:
            faults.append(
                Fault(f"{where}/to_seats", "out-of-order", "must not be below from_seats; correct one")
            )
        if "season" in each and each["season"] not in known:
            faults.append(Fault(f"{where}/season", "unknown-season", "not a season of this table; add it"))
        yield Row(
            number=place + 1,
            from_seats=each["from_seats"],
            to_seats=each.get("to_seats"),
            season=each.get("season"),
            operations=tuple(each.get("operations", ())),
            routes=tuple((one["origin"], one["destination"]) for one in each.get("routes", ())),
            weights=_weights(each["weights"], f"{where}/weights", needed, faults),
            source=_source(each["source"], document["source"]),
        )


def _weights(
    given: Sequence[Mapping[str, Any]], where: str, needed: list[str], faults: list[Fault]
) -> dict[str, Quantity]:
    found: dict[str, Quantity] = {}
    for place, each in enumerate(given):
        name = each["category"]
        if name not in needed:
            detail = "not a category with a weight of its own; use one of the table's"
            faults.append(Fault(f"{where}/{place}/category", "unknown-category", detail))
        if name in found:
            faults.append(Fault(f"{where}/{place}/category", "duplicate", "stands there twice; remove one"))
        found[name] = _weight(each, f"{where}/{place}/value", faults)
    lacking = [name for name in needed if name not in found]
    if lacking:
        detail = f"no weight for {', '.join(lacking)}; every row has one for every category"
        faults.append(Fault(where, "category-missing", detail))
    return found


def _declared(
    given: Mapping[str, Any] | None, own: Mapping[str, Any], faults: list[Fault]
) -> DeclaredRule | None:
    if given is None:
        return None
    if "none" in given and len(given) > len({"none", "source"}):
        faults.append(
            Fault("/declared", "none-and-more", "says none and more; leave out either none or the rest")
        )
    additions = tuple(
        Addition(each["what"], _weight(each["weight"], f"/declared/additions/{place}/weight/value", faults))
        for place, each in enumerate(given.get("additions", ()))
    )
    return DeclaredRule(
        "none" not in given, given.get("below_seats"), additions, _source(given["source"], own)
    )


def _crew(
    given: Sequence[Mapping[str, Any]], own: Mapping[str, Any], faults: list[Fault]
) -> Iterator[CrewKind]:
    positions: set[str] = set()
    ids: set[str] = set()
    for place, each in enumerate(given):
        where = f"/crew/{place}"
        if each["id"] in ids:
            faults.append(Fault(f"{where}/id", "duplicate", "stands there twice; give each its own id"))
        if positions & set(each["positions"]):
            faults.append(
                Fault(f"{where}/positions", "duplicate", "a position is of one kind only; remove it from one")
            )
        ids.add(each["id"])
        positions |= set(each["positions"])
        weight = _weight(each["weight"], f"{where}/weight/value", faults)
        yield CrewKind(
            each["id"], each["name"], tuple(each["positions"]), weight, _source(each["source"], own)
        )


def _weight(given: Mapping[str, Any], where: str, faults: list[Fault]) -> Quantity:
    value = Decimal(given["value"])
    if value <= 0:
        faults.append(Fault(where, "not-above-zero", "must be above zero; correct it"))
    return Quantity(value, Unit(given["unit"]))


def _source(given: Mapping[str, Any], own: Mapping[str, Any]) -> str:
    """Return a source in words: document, revision, page, and the authority that approved it."""
    document = given.get("document", own["document"])
    revision = given.get("revision", own.get("revision") if "document" not in given else None)
    authority = given.get("authority")
    return (
        f"{document}{f' rev {revision}' if revision else ''} p. {given['page']}"
        f"{f', approved by {authority}' if authority else ''}"
    )

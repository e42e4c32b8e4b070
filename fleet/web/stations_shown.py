"""Where things may be, as the loading basis in force states it: rows for its page, figures as typed."""

from collections.abc import Iterator, Mapping
from typing import Any

Row = dict[str, str]
NOT_ENTERED = "not entered: loads stay unresolved"


def limit_row(document: Mapping[str, Any], title: str, limit: Mapping[str, Any] | None) -> Row:
    """This function will return a limit with where it stands; one not entered says what follows from it."""
    if limit is None:
        return {"title": title, "value": NOT_ENTERED, "source": ""}
    value = "none" if limit.get("none") else f"{limit['value']} {limit['unit']}"
    return {"title": title, "value": value, "source": source_words(document, limit["source"])}


def station_rows(document: Mapping[str, Any]) -> list[Row]:
    """This function will return the limits of places, zones and running sums, of floors and rails, and the
    seats that are marked.
    """
    conditions = {one["id"]: one["name"] for one in document.get("conditions", ())}
    rows: list[Row] = []
    for kind in ("places", "zones"):
        for spot in document[kind]:
            rows.append(limit_row(document, _titled(spot), spot.get("maximum")))
            rows += _conditional(document, spot, conditions)
            rows += _floor(document, spot)
    for seat in document["seats"]:
        rows += _conditional(document, seat, conditions)
        rows += _rail(document, seat)
    for sum_ in document.get("cumulative", ()):
        rows += [
            limit_row(document, f"{_titled(sum_)}, {sum_['from']} to {step['name']}", step.get("maximum"))
            for step in sum_["steps"]
        ]
    return [*rows, *_marks(document)]


def _titled(spot: Mapping[str, Any]) -> str:
    name: str = spot["name"]
    outside = ", outside the aircraft" if spot.get("external") else ""
    return f"{name[:1].upper()}{name[1:]}{outside}"


def source_words(document: Mapping[str, Any], source: Mapping[str, Any]) -> str:
    """This function will return where a figure stands: document, revision and page."""
    own = document["document"]
    number = source.get("document", own["number"])
    revision = source.get("revision", "" if "document" in source else own["revision"])
    return f"{number}{f' rev {revision}' if revision else ''} p. {source['page']}"


def _conditional(
    document: Mapping[str, Any], spot: Mapping[str, Any], conditions: Mapping[str, str]
) -> Iterator[Row]:
    for each in spot.get("conditional", ()):
        words = ", ".join(conditions[name] for name in each["when"])
        yield limit_row(document, f"{_titled(spot)}, {words}", each["maximum"])


def _floor(document: Mapping[str, Any], place: Mapping[str, Any]) -> Iterator[Row]:
    floor = place.get("floor")
    if floor is None:
        return
    yield limit_row(document, f"{_titled(place)}, floor on an area", floor.get("per_area"))
    title = f"{_titled(place)}, floor along its length ({floor['runs']} the aircraft)"
    yield limit_row(document, title, floor.get("per_length"))
    free = floor.get("no_footprint")
    if free:
        parts = [*free.get("kinds", ())]
        if "up_to" in free:
            parts.insert(0, f"up to {free['up_to']['value']} {free['up_to']['unit']} each")
        source = source_words(document, free["source"])
        yield {"title": f"{_titled(place)}, no footprint asked", "value": ", ".join(parts), "source": source}


def _rail(document: Mapping[str, Any], seat: Mapping[str, Any]) -> Iterator[Row]:
    rail = seat.get("rail")
    if rail is None:
        return
    ends = " to ".join(f"{rail[end]['value']} {rail[end]['unit']}" for end in ("forward", "aft"))
    settings = ", ".join(
        f"{one['setting']} at {one['arm']['value']} {one['arm']['unit']}" for one in rail.get("settings", ())
    )
    value = f"{ends}{f'; settings {settings}' if settings else '; no named settings'}"
    yield {
        "title": f"{_titled(seat)}, rail",
        "value": value,
        "source": source_words(document, rail["source"]),
    }


def _marks(document: Mapping[str, Any]) -> Iterator[Row]:
    for mark, wanted, title in (
        ("exit_row", True, "Seats at an exit"),
        ("infant_restraint", True, "Seats with a restraint for an infant"),
        ("infant_restraint", False, "Seats without a restraint for an infant"),
        ("attendant", True, "Seats for an attendant"),
    ):
        marked = [seat["name"] for seat in document["seats"] if seat.get(mark) is wanted]
        if marked:
            yield {"title": title, "value": ", ".join(marked), "source": ""}

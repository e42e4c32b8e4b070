"""Checks of what the floor of a place bears: each item's weight on the area it touches, and along the length
it runs.

    on an area   weight of the item with its pallet, net and spreader / area that touches the floor
    along        that weight / how far what touches the floor runs the way the place runs

An item that stands on nothing stated is not known, unless the basis says that its kind or its weight needs no
footprint. Where each item alone is within the running limit but all of them side by side would not be, the
check tells to stand them one behind another; where the place is stated to be too short for that, it is
unresolved.
"""

from collections.abc import Sequence
from fractions import Fraction

from fleet.conversion import converted, length_under
from fleet.quantities import AREA_LOAD_OF, LINE_LOAD_OF, Unit
from fleet.stations import Floor, FloorLimit
from loads.balance.aboard import Declared, Item
from loads.balance.exact import added
from loads.balance.footing import Contact
from loads.balance.margins import Figure, below, not_entered
from loads.balance.prepared import Prepared
from loads.balance.result import Check
from loads.balance.rounding import printed

LOAD_PLACES = 1
SIZE_PLACES = 1
METRE_PLACES = 3
AREA, RUN = "floor-area", "floor-run"
WORDS = {AREA: "floor load on an area", RUN: "floor load along its length"}


def floor_checks(declared: Declared, ready: Prepared) -> list[Check]:
    """Return the checks of every place whose floor limits are stated and on whose floor something stands.

    What fails or is not known is told item by item; of items within a limit, the one with the least room.
    """
    found: list[Check] = []
    for place in ready.basis.places:
        floor = place.floor
        if floor is None:
            continue
        items = [item for item in declared.items if item.place.id == place.id and not item.removed]
        bearing = [item for item in items if not _free(item, floor)]
        for kind, limit in ((AREA, floor.per_area), (RUN, floor.per_length)):
            if items:
                found += _told([_item(item, kind, floor, limit, ready) for item in bearing], kind, items)
        if floor.per_length is not None:
            found += _together(bearing, floor, floor.per_length, ready)
    return found


def _free(item: Item, floor: Floor) -> bool:
    """Return whether an item needs no footprint: by its kind, or by what it weighs."""
    light = floor.free_up_to is not None and item.weight is not None and item.weight <= floor.free_up_to
    return item.contact is None and (light or item.kind in floor.free_kinds)


def _told(checks: Sequence[Check], kind: str, items: Sequence[Item]) -> list[Check]:
    place = items[0].place
    if not checks:
        text = "nothing that needs a footprint stands here"
        return [Check(f"{kind}.{place.id}", f"{place.name}, {WORDS[kind]}", "pass", margin_text=text)]
    stopping = [check for check in checks if check.outcome != "pass"]
    if stopping:
        return stopping
    return [min(checks, key=lambda check: (check.room is None, check.room or Fraction(0)))]


def _item(item: Item, kind: str, floor: Floor, limit: FloorLimit | None, ready: Prepared) -> Check:
    place, called = item.place, _called(item)
    code = f"{kind}.{place.id}.{called.rpartition(' ')[2] if item.pointer else 'added'}"
    title = f"{place.name}, {WORDS[kind]}, {called} ({item.kind})"
    if limit is None:
        return not_entered(code, title, None, "", None)._replace(unit=None)
    source = str(limit.source)
    if limit.value is None or limit.unit is None:
        return Check(code, title, "pass", margin_text="no limit", source=source)
    unit = limit.unit
    if item.contact is None or item.weight is None:
        what = "footprint" if item.contact is None else "weight"
        return Check(
            code,
            title,
            "unresolved",
            unit=unit.value,
            margin_text=f"the {what} of {called} is not known",
            source=source,
            what_next=f"Enter the {what} of {called}: what touches the floor, not its outline."
            if what == "footprint"
            else f"Enter the weight of {called}.",
        )
    size = item.contact.area if kind == AREA else item.contact.run(floor.runs)
    shown = _shown(item.weight / size, limit.value, unit, kind, ready)
    fix_of = _spread(item, item.contact, limit.value, unit, kind=kind, floor=floor, ready=ready)
    return below(Figure(code, title, shown[0], unit.value, LOAD_PLACES), shown[1], source, lambda _: fix_of)


def _together(items: Sequence[Item], floor: Floor, limit: FloorLimit, ready: Prepared) -> list[Check]:
    """Return what must be told where items, each within the running limit, would break it side by side."""
    standing = [(item.weight, item.contact.run(floor.runs)) for item in items if item.contact and item.weight]
    if limit.value is None or limit.unit is None or len(standing) < len(items) or len(standing) <= 1:
        return []
    beside = added(weight / run for weight, run in standing)
    if beside <= limit.value or any(weight / run > limit.value for weight, run in standing):
        return []
    place, way = items[0].place, "lengthwise" if floor.runs == "along" else "across the aircraft"
    needs = added(run for _, run in standing)
    side, most = _shown(beside, limit.value, limit.unit, RUN, ready)
    actual, bound = printed(side, LOAD_PLACES, "up"), printed(most, LOAD_PLACES, "down")
    text = f"side by side these items would load it with {actual} {limit.unit.value} of {bound}"
    check = Check(
        f"{RUN}.{place.id}",
        f"{place.name}, {WORDS[RUN]}, items together",
        "advisory",
        unit=limit.unit.value,
        margin_text=f"{text}: stand them one behind another, {way}",
        source=str(limit.source),
    )
    if floor.length is None or needs <= floor.length:
        return [check]
    short = f"{_size(needs, ready.basis.length_unit, 'up')} of {_size(floor.length, ready.basis.length_unit)}"
    return [
        check._replace(
            outcome="unresolved",
            margin_text=f"{text}, and one behind another they need {short}",
            what_next="Take an item out, or put items on one pallet or spreader and enter its size.",
        )
    ]


def _spread(
    item: Item, contact: Contact, limit: Fraction, unit: Unit, *, kind: str, floor: Floor, ready: Prepared
) -> str:
    """Return what would make an item bearable: the least area or length under it, rounded up."""
    called, weight, length = _called(item), item.weight or Fraction(0), ready.basis.length_unit
    own = length_under(unit)
    lies = any(part.part == "spreader" for part in item.rigging)
    least = weight / limit
    # A spreader weighs, too, and so needs a little more of itself than what it carries does.
    needs = "a larger spreader" if lies else "a spreader"
    what = "under it" if lies else "under it, and more by what the spreader itself weighs"
    if kind == AREA:
        area = printed(converted(Fraction(1), length, own) ** 2 * least, _places(own), "up")
        under = f"at least {area} {own.value}2 {what}"
        return f"Stand {called} on {needs}: {under}; or put part of it elsewhere."
    way = "along the aircraft" if floor.runs == "along" else "across the aircraft"
    turned = contact.across if floor.runs == "along" else contact.along
    turn = f"Turn {called}, or stand it" if turned >= least else f"Stand {called}"
    return (
        f"{turn} on {needs}: at least {_size(least, length, 'up', own)} {way} {what}; "
        f"or put part of it elsewhere."
    )


def _shown(
    actual: Fraction, limit: Fraction, unit: Unit, kind: str, ready: Prepared
) -> tuple[Fraction, Fraction]:
    """Return a load and its limit in the unit the limit was entered in, exactly."""
    of = AREA_LOAD_OF if kind == AREA else LINE_LOAD_OF
    own = of[ready.basis.weight_unit, ready.basis.length_unit]
    return converted(actual, own, unit), converted(limit, own, unit)


def _size(length: Fraction, given: Unit, direction: str = "down", wanted: Unit | None = None) -> str:
    unit = wanted or given
    figure = converted(length, given, unit)
    return f"{printed(figure, _places(unit), 'up' if direction == 'up' else 'down')} {unit.value}"


def _places(unit: Unit) -> int:
    return METRE_PLACES if unit is Unit.M else SIZE_PLACES


def _called(item: Item) -> str:
    """Return which item of the load it is, counted from 1: what it is called may name somebody. One that is
    only thought of, to see what would be if, stands on no line; one that comes aboard stands in its event.
    """
    before, _, number = item.pointer.rpartition("/")
    if before.startswith("/sequence/"):
        return f"coming item {int(before.split('/')[2]) + 1}.{int(number) + 1}"
    return f"item {int(number) + 1}" if number else "an added item"

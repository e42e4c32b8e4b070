"""Reading a last-minute change: itemised lines, each something that goes on or off.

A line is of one of six kinds: a passenger, an item or fuel, on or off. Fuel type, aircraft, configuration,
crew, limits and what is meant to burn have no line: changing them is a revision. A weight is always stated
where something goes on, because a bound on weight cannot be kept with an unknown one.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final, Literal

from fleet.quantities import Dimension
from loads.balance.fields import Faults, Fields
from loads.balance.footing import footing_form
from loads.balance.fuelling import WEIGHT_OR_VOLUME
from records.refusal import Invalid

Change = Literal["passenger-on", "passenger-off", "item-on", "item-off", "fuel-on", "fuel-off"]
REQUIRED: Final = ("lines", "persons_on_board")
MOST_LINES: Final = 20
MOST_PERSONS: Final = 1000
LONGEST_ID: Final = 64
LONGEST_WHAT: Final = 120
# Equipment is part of what the aircraft is, so it is no line here.
KINDS_AT_THE_DOOR: Final = ("baggage", "cargo", "ballast", "consumable")
HOWS_AT_THE_DOOR: Final = ("weighed", "declared", "estimated")
# By kind of line: the fields it needs, and those it may have.
FORMS: Final[Mapping[str, tuple[tuple[str, ...], tuple[str, ...]]]] = {
    "passenger-on": (("name", "seat", "weight", "how"), ("category", "lap_infant", "restraint")),
    "passenger-off": (("seat",), ()),
    "item-on": (("kind", "what", "place", "weight", "how"), ("footprint",)),
    "item-off": (("what", "place"), ("weight",)),
    "fuel-on": (("tank", "quantity"), ()),
    "fuel-off": (("tank", "quantity"), ()),
}


@dataclass(frozen=True, slots=True)
class LateChange:
    """What is to change, line by line as typed, and how many persons are then on board."""

    lines: tuple[Mapping[str, object], ...]
    persons_on_board: int


def read_late_change(document: object) -> LateChange:
    """Return the change in a document `{lines, persons_on_board}`; raises Invalid with every fault.

    Names, seats and places are looked at where the changed load is read.
    """
    faults = Faults()
    fields = Fields(document, "", faults, REQUIRED)
    persons = fields.whole("persons_on_board", 1, MOST_PERSONS)
    given = fields.raw("lines")
    lines: list[Mapping[str, object]] = []
    if "lines" in fields and not isinstance(given, list | tuple):
        fields.note("lines", "list-form", "a list is needed here; write [...] with a line for each change")
    elif isinstance(given, list | tuple):
        if not 1 <= len(given) <= MOST_LINES:
            fields.note("lines", "out-of-range", f"1 to {MOST_LINES} lines make a last-minute change")
        else:
            lines = [_line(line, f"/lines/{place}", faults) for place, line in enumerate(given)]
    if faults.all():
        raise Invalid(*faults.all())
    if persons is None:
        raise AssertionError("the count of persons is missing and no fault was noted")
    return LateChange(tuple(lines), persons)


def _line(given: object, pointer: str, faults: Faults) -> Mapping[str, object]:
    kind = given.get("change") if isinstance(given, Mapping) else None
    if not isinstance(kind, str) or kind not in FORMS:
        if isinstance(given, Mapping):
            detail = f"say what changes; write {' or '.join(FORMS)}"
            faults.note(f"{pointer}/change", "choice" if "change" in given else "missing", detail)
        else:
            faults.note(pointer, "object-form", "an object is needed here; write {...} with named fields")
        return {}
    needed, optional = FORMS[kind]
    line = Fields(given, pointer, faults, ("change", *needed), optional)
    for name in ("seat", "place", "tank"):
        line.text(name, LONGEST_ID)
    for name in ("name", "what"):
        line.text(name, LONGEST_WHAT)
    line.choice("kind", KINDS_AT_THE_DOOR)
    line.choice("how", HOWS_AT_THE_DOOR)
    line.quantity("weight", Dimension.WEIGHT, zero=False)
    line.quantity("restraint", Dimension.WEIGHT, zero=False)
    footing_form(line)
    line.quantity("quantity", WEIGHT_OR_VOLUME, zero=False)
    infant = line.inner("lap_infant", ("name", "weight", "how"))
    if infant is not None:
        infant.text("name", LONGEST_WHAT)
        infant.choice("how", HOWS_AT_THE_DOOR)
        infant.quantity("weight", Dimension.WEIGHT, zero=False)
    return {str(name): value for name, value in given.items()} if isinstance(given, Mapping) else {}

"""Between the page and the document: what happens in flight, both ways; no Django here.

Inputs of an event: `event:0:kind`, `event:0:after` with `event:0:unit`, `event:0:since`; of who or what
leaves or moves, `event:0:line:0:who`, `:to`, `:weight`, `:unit`; of who or what comes aboard,
`event:0:line:0:is` and the inputs of a person or an item; of a transfer, `event:0:from`, `:to`, `:quantity`,
`:quantity_unit`; of gear and flaps, `event:0:part:GEAR`.

Who is aboard is chosen as `seat:ROW1-L`, what is aboard as `item:0`, the row of the items table, so that it
is still the same item when its words are typed anew; `words:AFT-HOLD:crate` is any other.
"""

from collections.abc import Callable, Mapping
from typing import Any

from loads.web.form_lines import ITEM_PARTS, PERSON_PARTS, item_in, person_in, type_item, type_person
from loads.web.typed import Typed, begun, clean, quantity_of, type_quantity

MOST_EVENTS = 60
MOST_LINES = 200
KINDS = ("leave", "move", "come_aboard", "transfer", "position")
LINED = ("leave", "move", "come_aboard")  # kinds that are a list of lines
COMER_PARTS = tuple(dict.fromkeys((*PERSON_PARTS, "seat", "at", *ITEM_PARTS)))
LINE_PARTS = tuple(dict.fromkeys(("who", "to", *COMER_PARTS)))
PERSON, ITEM = "person", "item"
SINCE_START = "engine start"
Line = Callable[[Typed, str, str, dict[str, str]], dict[str, Any]]


def event_of(number: int) -> str:
    """This function will return what the names of an event's inputs begin with."""
    return f"event:{number}"


def lines_of(typed: Typed, event: str) -> list[int]:
    """This function will return the lines of an event in which something was typed."""
    held = sorted({_number_of(name, f"{event}:line:") for name in typed if name.startswith(f"{event}:line:")})
    return [line for line in held if line >= 0 and begun(typed, f"{event}:line:{line}", LINE_PARTS)]


def _number_of(name: str, start: str) -> int:
    digits = name.removeprefix(start).partition(":")[0]
    return (
        int(digits) if digits.isascii() and digits.isdigit() and len(digits) <= len(str(MOST_LINES)) else -1
    )


def sequence_in(typed: Typed, field_of: dict[str, str]) -> dict[str, Any]:
    """This function will return the sequence typed; an event in which nothing was typed is left out."""
    events: list[dict[str, Any]] = []
    for number in range(MOST_EVENTS):
        event = event_of(number)
        kind = clean(typed, f"{event}:kind")
        if kind and _is_begun(typed, event, kind):
            events.append(_event_in(typed, event, kind, f"/sequence/{len(events)}", field_of))
    return {"sequence": events} if events else {}


def _is_begun(typed: Typed, event: str, kind: str) -> bool:
    if begun(typed, event, ("after", "from", "to", "quantity")):
        return True
    parts = [name for name in typed if name.startswith(f"{event}:part:") and clean(typed, name)]
    return bool(parts) or (kind in LINED and bool(lines_of(typed, event)))


def _event_in(typed: Typed, event: str, kind: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    found: dict[str, Any] = {}
    field_of |= {
        at: f"{event}:after",
        f"{at}/after_burning": f"{event}:after",
        f"{at}/since": f"{event}:since",
    }
    if clean(typed, f"{event}:after"):
        found["after_burning"] = quantity_of(typed, f"{event}:after", f"{event}:unit")
    if since := clean(typed, f"{event}:since"):
        found["since"] = since
    if kind in LINED:
        read = {"leave": _leaving_in, "move": _moving_in}.get(kind, _coming_in)
        lines = lines_of(typed, event)
        field_of[f"{at}/{kind}"] = f"{event}:line:{lines[0] if lines else 0}:{_first_input(typed, event)}"
        found[kind] = [
            read(typed, f"{event}:line:{line}", f"{at}/{kind}/{row}", field_of)
            for row, line in enumerate(lines)
        ]
    elif kind == "transfer":
        found[kind] = _transfer_in(typed, event, f"{at}/transfer", field_of)
    elif kind == "position":
        found[kind] = _positions_in(typed, event, f"{at}/position", field_of)
    return found


def _first_input(typed: Typed, event: str) -> str:
    return {PERSON: "name", ITEM: "what"}.get(clean(typed, f"{event}:line:0:is"), "who")


def _who_in(typed: Typed, chosen: str) -> dict[str, str]:
    kind, _, which = chosen.partition(":")
    if kind == "item":
        return {part: clean(typed, f"item:{which}:{part}") for part in ("place", "what")}
    if kind == "words":
        place, _, what = which.partition(":")
        return {"place": place, "what": what}
    return {"seat": which} if kind == "seat" else {"seat": chosen} if chosen else {}


def _leaving_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    found: dict[str, Any] = {**_who_in(typed, clean(typed, f"{prefix}:who"))}
    if clean(typed, f"{prefix}:weight"):
        found["weight"] = quantity_of(typed, f"{prefix}:weight", f"{prefix}:unit")
    field_of |= {at: f"{prefix}:who", f"{at}/weight": f"{prefix}:weight"}
    return found


def _moving_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    found: dict[str, Any] = {**_who_in(typed, clean(typed, f"{prefix}:who"))}
    if to := clean(typed, f"{prefix}:to"):
        found["to"] = to
    field_of |= {at: f"{prefix}:who", f"{at}/to": f"{prefix}:to"}
    return found


def _coming_in(typed: Typed, prefix: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    if clean(typed, f"{prefix}:is") == ITEM:
        return item_in(typed, prefix, at, field_of)
    person = person_in(typed, prefix, at, field_of) | {"seat": clean(typed, f"{prefix}:seat")}
    for part in ("position", "at"):
        if value := clean(typed, f"{prefix}:{part}"):
            person[part] = value
    field_of |= {f"{at}/{part}": f"{prefix}:{part}" for part in ("seat", "at")}
    return person


def _transfer_in(typed: Typed, event: str, at: str, field_of: dict[str, str]) -> dict[str, Any]:
    field_of |= {f"{at}/{part}": f"{event}:{part}" for part in ("from", "to", "quantity")}
    found: dict[str, Any] = {
        part: clean(typed, f"{event}:{part}") for part in ("from", "to") if clean(typed, f"{event}:{part}")
    }
    if clean(typed, f"{event}:quantity"):
        found["quantity"] = quantity_of(typed, f"{event}:quantity", f"{event}:quantity_unit")
    return found


def _positions_in(typed: Typed, event: str, at: str, field_of: dict[str, str]) -> dict[str, str]:
    start = f"{event}:part:"
    named = {name.removeprefix(start): name for name in typed if name.startswith(start)}
    field_of |= {f"{at}/{part}": name for part, name in named.items()}
    if named:
        field_of[at] = next(iter(named.values()))
    return {part: clean(typed, name) for part, name in named.items() if clean(typed, name)}


def type_events(typed: dict[str, str], document: Mapping[str, Any]) -> None:
    """This function will put the sequence of a document into its inputs."""
    rows = {
        (item["place"], item["what"]): row for row, item in reversed([*enumerate(document.get("items", ()))])
    }
    for number, event in enumerate(document.get("sequence", ())):
        prefix = event_of(number)
        kind = next((kind for kind in KINDS if kind in event), "")
        typed[f"{prefix}:kind"] = kind
        type_quantity(typed, f"{prefix}:after", f"{prefix}:unit", event.get("after_burning"))
        if event.get("since") == SINCE_START:
            typed[f"{prefix}:since"] = SINCE_START
        if kind in LINED:
            for line, each in enumerate(event[kind]):
                _type_line(typed, f"{prefix}:line:{line}", kind, each, rows)
        elif kind == "transfer":
            typed |= {f"{prefix}:{part}": str(event[kind][part]) for part in ("from", "to")}
            type_quantity(typed, f"{prefix}:quantity", f"{prefix}:quantity_unit", event[kind]["quantity"])
        elif kind == "position":
            typed |= {f"{prefix}:part:{part}": str(state) for part, state in event[kind].items()}


def _type_line(
    typed: dict[str, str],
    prefix: str,
    kind: str,
    line: Mapping[str, Any],
    rows: Mapping[tuple[str, str], int],
) -> None:
    if kind == "come_aboard":
        person = "seat" in line
        typed[f"{prefix}:is"] = PERSON if person else ITEM
        (type_person if person else type_item)(typed, prefix, line)
        typed |= {f"{prefix}:{part}": str(line[part]) for part in ("seat", "at") if part in line}
        return
    if "seat" in line:
        typed[f"{prefix}:who"] = f"seat:{line['seat']}"
    else:
        row = rows.get((line["place"], line["what"]))
        typed[f"{prefix}:who"] = f"words:{line['place']}:{line['what']}" if row is None else f"item:{row}"
    if "to" in line:
        typed[f"{prefix}:to"] = str(line["to"])
    type_quantity(typed, f"{prefix}:weight", f"{prefix}:unit", line.get("weight"))

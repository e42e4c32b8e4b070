"""Adding, moving and taking out events on the page that declares a load; nothing is computed or stored.

Buttons send `arrange` with one of: `add leave` (and the other kinds, `person` and `item` for who and what
comes aboard), `more 2`, `person 2`, `item 2`, `up 2`, `drop 2`; the number is the event's.
"""

from collections.abc import Mapping

from loads.web.form_events import ITEM, KINDS, MOST_EVENTS, MOST_LINES, PERSON, event_of, lines_of

ARRANGE = "arrange"
ADDED = "add"
FOCUS = "begin at"  # the input at which the page begins; no input is called so
FEWEST_LINES = 2
MORE_LINES = 3
COMING = "come_aboard"
START = "event:"
LONGER = {"more": "who", PERSON: "name", ITEM: "what"}  # where a line that is added begins


def events_in(typed: Mapping[str, str]) -> list[int]:
    """This function will return the numbers of the events on the page, in order."""
    return [number for number in range(MOST_EVENTS) if typed.get(f"{event_of(number)}:kind")]


def rows_in(typed: Mapping[str, str], number: int) -> int:
    """This function will return how many lines an event shows: those typed in and one more, or as many as
    were asked for.
    """
    event = event_of(number)
    asked = typed.get(f"{event}:rows", "")
    rows = int(asked) if asked.isascii() and asked.isdigit() and len(asked) <= len(str(MOST_LINES)) else 0
    typed_to = max(lines_of(typed, event), default=-1) + 1
    spare = 0 if typed.get(f"{event}:kind") == COMING else 1
    return min(MOST_LINES, max(rows, typed_to + spare, FEWEST_LINES * spare))


def arranged(typed: Mapping[str, str]) -> dict[str, str]:
    """This function will return what was typed with the events as the pressed button wants them, numbered
    anew.
    """
    word, _, which = typed.get(ARRANGE, "").partition(" ")
    others = {name: value for name, value in typed.items() if not name.startswith(START)}
    events = [_parts(typed, number) for number in events_in(typed)]
    at = int(which) if which.isascii() and which.isdigit() and len(which) <= len(str(MOST_EVENTS)) else -1
    known = 0 <= at < len(events)
    begin = "after"
    if word == ADDED and len(events) < MOST_EVENTS and (new := _new(which)):
        at = len(events)
        events.append(new)
    elif word == "drop" and known:
        del events[at]
        at = min(at, len(events) - 1)
    elif word == "up" and known and at > 0:
        events[at - 1 : at + 1] = reversed(events[at - 1 : at + 1])
        at -= 1
    elif word in LONGER and known:
        row = rows_in(typed, at)
        begin = f"line:{row}:{LONGER[word]}"
        events[at] |= {"rows": str(min(MOST_LINES, row + (MORE_LINES if word == "more" else 1)))}
        if word != "more" and row < MOST_LINES:
            events[at][f"line:{row}:is"] = word
    numbered = {
        f"{event_of(to)}:{part}": value for to, event in enumerate(events) for part, value in event.items()
    }
    return others | numbered | {FOCUS: f"{event_of(at)}:{begin}"}


def _parts(typed: Mapping[str, str], number: int) -> dict[str, str]:
    start = f"{event_of(number)}:"
    return {name.removeprefix(start): value for name, value in typed.items() if name.startswith(start)}


def _new(kind: str) -> dict[str, str]:
    if kind in (PERSON, ITEM):
        return {"kind": COMING, "rows": "1", "line:0:is": kind}
    return {"kind": kind} if kind in KINDS and kind != COMING else {}

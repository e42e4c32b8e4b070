"""What would bring a load within, and the room in one that is, as its page and the rejects desk show it."""

from collections.abc import Mapping
from datetime import datetime
from typing import Any

from loads.acts import REVISE_LOAD
from loads.balance.remedies.patching import patched
from loads.lifecycle import ways_out
from loads.manifest.words import Words
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.remedies import SECONDS, remedies_for
from records.actor import Actor
from records.refusal import Refused

PROVED = {
    "smallest": "Proved to be the smallest change of its kind.",
    "best found": "The best that was found.",
}
NUMBERS = frozenset(str(number) for number in range(1, 30))


def remedies_shown(current: Current, words: Words, now: datetime, actor: Actor) -> dict[str, Any]:
    """This function will return what the page of a load shows that can still be changed; nothing for any
    other.
    """
    if not ways_out(current.state):
        return {}
    found = _found(current, now, SECONDS)
    if found is None:
        return {}
    may_revise = "superseded" in ways_out(current.state) and REVISE_LOAD.name in actor.may
    return {
        "remedies": [_remedy(one, number, words) for number, one in enumerate(found["remedies"], 1)],
        "remedies_said": words.said(found["said"]),
        "may_take_remedy": may_revise,
        "more": [_line(one, words) for one in found["more"] if one["stopped_by"] or one["amount"] != "0"],
        "error": [_line(one, words) for one in found["error"] if one["stopped_by"] or one["percent"] != "0"],
    }


def first_sentence(current: Current, words: Words, now: datetime, seconds: float) -> str:
    """This function will return what the first remedy says, or nothing where there is none, or no time."""
    found = _found(current, now, seconds) if seconds > 0 else None
    return words.said(found["remedies"][0]["sentence"]) if found and found["remedies"] else ""


def remedied(current: Current, number: str, now: datetime) -> dict[str, Any] | None:
    """This function will return what was declared with a remedy of the page put in; None where it is not
    offered any more.
    """
    found = _found(current, now, SECONDS)
    offered = found["remedies"] if found else []
    if number not in NUMBERS or int(number) > len(offered) or not offered[int(number) - 1]["change"]:
        return None
    return patched(declared_now(current), offered[int(number) - 1]["change"])


def _found(current: Current, now: datetime, seconds: float) -> dict[str, Any] | None:
    """This function will return what was found; None for a load that can no longer be read against what is in
    force.
    """
    try:
        return remedies_for(current.load.operator_id, declared_now(current), now, seconds=seconds)
    except Refused:
        return None


def _remedy(one: Mapping[str, Any], number: int, words: Words) -> dict[str, Any]:
    rows = [
        {
            "title": words.said(each["title"]),
            "before": f"{each['before']} {each['unit']}",
            "after": f"{each['after']} {each['unit']}",
        }
        for each in one["figures"]
        if each["before"] != each["after"]
    ]
    rows += [
        {part: words.said(each[part]) for part in ("title", "before", "after")} for each in one["mended"]
    ]
    governing = one["next"] or {}
    return {
        "number": number,
        "sentence": words.said(one["sentence"]),
        "proved": PROVED[one["found"]],
        "rows": rows,
        "next": [words.said(governing[part]) for part in ("weight", "cg") if governing.get(part)],
        "can_be_put_in": bool(one["change"]),
    }


def _line(one: Mapping[str, Any], words: Words) -> dict[str, Any]:
    stopped = words.said(one["stopped_by"]) if one["stopped_by"] else "nothing up to there"
    return {**one, "name": words.said(one["name"]), "stopped_by": stopped, "open": not one["stopped_by"]}

"""What gear and flaps change, as the loading basis in force states it: rows for its page, as typed."""

from collections.abc import Mapping
from typing import Any

from fleet.web.stations_shown import Row, source_words

HELD = {"ground": "on the ground", "flight": "in flight"}


def position_rows(document: Mapping[str, Any]) -> list[Row]:
    """This function will return a row for each state of each moving part: its change of moment, and where it
    may hold.
    """
    return [
        {
            "title": f"{part['name']} {state['name']}".capitalize(),
            "value": f"{_change(part, state)}, {' and '.join(HELD[where] for where in state['holds'])}",
            "source": source_words(document, state["source"]),
        }
        for part in document.get("positions", ())
        for state in part["states"]
    ]


def _change(part: Mapping[str, Any], state: Mapping[str, Any]) -> str:
    if state["id"] == part["as_weighed"]:
        return "as weighed"
    return f"moment {state['moment_change']['value']} {state['moment_change']['unit']}"

"""The operator's margins and the presentation of moments, as rows of the table of limits."""

from collections.abc import Iterator, Mapping
from typing import Any

from fleet.web.as_typed import as_typed

Row = dict[str, str]
SIDES = ("forward", "aft", "left", "right")


def margin_rows(document: Mapping[str, Any]) -> Iterator[Row]:
    """This function will yield each margin inside the certified envelopes, as typed, with its page."""
    for each in document.get("curtailments", ()):
        yield {
            "title": f"Operator's margin {each['id']}: {each['for']}, at {', '.join(each['phases'])}",
            "value": "; ".join(_amounts(row) for row in each["amounts"]),
            "source": _source(each["source"], document),
        }


def presentation_rows(document: Mapping[str, Any]) -> Iterator[Row]:
    """This function will yield how moments are shown beside themselves, as typed, with its page."""
    given = document.get("presentation", {})
    if "index" in given:
        index = given["index"]
        arm, divisor = as_typed(index["reference_arm"]), as_typed(index["divisor"])
        yield {
            "title": "Index units",
            "value": f"weight x (arm - {arm}) / {divisor} + {index['constant']}",
            "source": _source(index["source"], document),
        }
    if "moment_divisor" in given:
        yield {
            "title": "Moments shown divided by",
            "value": str(given["moment_divisor"]["value"]),
            "source": _source(given["moment_divisor"]["source"], document),
        }


def _amounts(row: Mapping[str, Any]) -> str:
    sides = ", ".join(f"{side} {as_typed(row[side])}" for side in SIDES if side in row)
    ends = [f"{word} {as_typed(row[word])}" for word in ("from", "to") if word in row]
    return f"{' '.join(ends)}: {sides}" if ends else sides


def _source(source: Mapping[str, Any], document: Mapping[str, Any]) -> str:
    own = document["document"]
    if "document" in source:
        revision = f" rev {source['revision']}" if source.get("revision") else ""
        return f"{source['document']}{revision} p. {source['page']}"
    return f"{own['number']} rev {source.get('revision', own['revision'])} p. {source['page']}"

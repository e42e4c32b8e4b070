"""Envelopes, limits by category, modification and performance, fuel balance, lateral limits and trim, as the
loading basis in force states them: rows for its page, figures as typed.
"""

from collections.abc import Iterator, Mapping
from typing import Any

from fleet.web.stations_shown import Row, limit_row, source_words

Document = Mapping[str, Any]


def rule_rows(document: Document) -> list[Row]:
    """This function will return a row for each of them; [] for a basis that has none."""
    return [
        *_datums(document),
        *_envelopes(document),
        *_changed(document, "certification_categories", "in the {}"),
        *_changed(document, "modifications", "with {} fitted"),
        *_performance(document),
        *_by_cg(document),
        *_fuel_balance(document),
        *_trim(document),
    ]


def _datums(document: Document) -> Iterator[Row]:
    """Yield how far each other datum lies from that of the basis."""
    for each in document.get("other_datums", ()):
        offset = f"{each['offset']['value']} {each['offset']['unit']}"
        yield {
            "title": f"Arms from {each['name']}",
            "value": f"{offset} is added: arms from {document['datum']['name']}",
            "source": source_words(document, each["source"]),
        }


def _envelopes(document: Document) -> Iterator[Row]:
    """Yield the corners of each envelope as typed."""
    for each in document["envelopes"]:
        across = "centre of gravity" if each["axis"] == "longitudinal" else "lateral centre of gravity"
        held = ", ".join(phase.replace("-", " ") for phase in each["phases"])
        plane = f"{each['plane']} ({each['unit']})"
        if "divided_by" in each:
            plane += f" divided by {each['divided_by']}"
        corners = "; ".join(f"{value} at {weight}" for weight, value in each["points"])
        yield {
            "title": f"Envelope {each['id']}, {across}, at {held}{outside_words(each)}",
            "value": f"{plane} at weight ({each['weight_unit']}): {corners}",
            "source": source_words(document, each["source"]),
        }


def outside_words(limit: Document) -> str:
    """This function will return whether a limit holds with or without an external load; "" for both."""
    words = {"carried": ", with an external load", "none": ", without an external load"}
    return words.get(limit.get("external_load", ""), "")


def _changed(document: Document, part: str, when: str) -> Iterator[Row]:
    """Yield the limits that a category or a modification changes."""
    for each in document.get(part, ()):
        words = when.format(each["name"])
        if part == "modifications":
            words += f" ({_fitted(document, each['id'])})"
        for field, limit in each.get("limits", {}).items():
            yield limit_row(document, f"{field.replace('_', ' ').capitalize()} {words}", limit)
        if not each.get("limits"):
            source = source_words(document, each["source"])
            yield {"title": f"Limits {words}", "value": "those of every category", "source": source}


def _fitted(document: Document, modification: str) -> str:
    names = [
        one["name"] for one in document["configurations"] if modification in one.get("modifications", ())
    ]
    return ", ".join(names) or "in no configuration"


def _performance(document: Document) -> Iterator[Row]:
    rules = [("", rule) for rule in document.get("performance", ())]
    rules += [
        (f", {one['name']}", rule)
        for one in document["configurations"]
        for rule in one.get("performance", ())
    ]
    for where, rule in rules:
        operations = ", ".join(rule.get("operations", ())) or "all operations"
        needed = f"to be stated: {', '.join(rule['kinds'])}" if "kinds" in rule else "to be stated"
        yield {
            "title": f"Performance-limited {rule['at']} weight, {operations}{where}",
            "value": needed if rule["rule"] == "required" else "structural limits are enough",
            "source": source_words(document, rule["source"]),
        }


def _by_cg(document: Document) -> Iterator[Row]:
    for each in document.get("lateral_by_cg", ()):
        points = "; ".join(f"{along}: {across}" for along, across in each["points"])
        yield {
            "title": f"Lateral {each['gives']} against CG, {', '.join(each['phases'])}{outside_words(each)}",
            "value": f"{points} ({each['longitudinal_unit']}: {each['unit']}, right positive)",
            "source": source_words(document, each["source"]),
        }


def _fuel_balance(document: Document) -> Iterator[Row]:
    for each in document.get("fuel_balance", ()):
        if "maximum" in each:
            value = f"{each['maximum']['value']} {each['maximum']['unit']} apart"
        else:
            rows = "; ".join(f"{aboard}: {most}" for aboard, most in each["table"]["points"])
            value = f"by {each['table']['unit']} of fuel aboard, {rows} apart"
        yield {
            "title": f"Fuel balance, {each['name']}",
            "value": value,
            "source": source_words(document, each["source"]),
        }


def _trim(document: Document) -> Iterator[Row]:
    trim = document.get("trim", {})
    if trim.get("none"):
        yield {"title": "Take-off trim", "value": "none", "source": source_words(document, trim["source"])}
    unit = "% MAC" if trim.get("against") == "chord" else trim.get("against_unit", "")
    for table in trim.get("tables", ()):
        flap = f", flaps {table['flap']}" if "flap" in table else ""
        weight = f", {table['weight']['value']} {table['weight']['unit']}" if "weight" in table else ""
        points = "; ".join(f"{cg} {unit}: {setting}" for cg, setting in table["points"])
        yield {
            "title": f"Take-off trim{flap}{weight}",
            "value": f"{points} ({trim['unit']}, in steps of {trim['step']})",
            "source": source_words(document, table["source"]),
        }
    if "range" in trim:
        low, high = trim["range"]["low"], trim["range"]["high"]
        yield {
            "title": "Trim settings allowed for take-off",
            "value": f"{low} to {high} {trim['unit']}",
            "source": source_words(document, trim["range"]["source"]),
        }

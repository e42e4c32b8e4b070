"""The tables of the paper: the computation line by line, the phases, the limits, and what was used."""

from collections.abc import Iterable, Mapping
from typing import Any

from loads.manifest.facts import Computed, Facts, SignatureFacts, typed_sources
from loads.manifest.figures import both_clocks, column, sided, utc
from loads.manifest.ruler import ruler
from loads.manifest.words import Words
from loads.plot_marks import MARKS, WORST, shape
from loads.svg import element

Row = dict[str, Any]
# How the checks are laid out: those of the whole aircraft first, then the small ones, two beside each other.
WHOLE = (
    "weight",
    "performance",
    "cg",
    "lateral",
    "lateral-by-cg",
    "trim",
    "fuel",
    "fuel-balance",
    "persons",
    "standing",
    "weights",
    "path",
)
# Checks whose title holds what was typed into the basis, where nothing is put into other words.
TYPED = {
    "seat",
    "place",
    "zone",
    "tank",
    "tank-table",
    "performance",
    "fuel-balance",
    "cumulative",
    "floor-area",
    "floor-run",
}
WORST_OF = {"longitudinal": "CG", "lateral": "lateral CG", "lateral by CG": "lateral by CG"}
LATERAL_PATH = {"path.lateral", "path.zero-fuel-lateral", "path.lateral-by-cg"}
OUTCOMES = {"pass": "kept", "fail": "BROKEN", "unresolved": "NOT CHECKED", "advisory": "told, not judged"}


def computation(facts: Computed, words: Words) -> list[Row]:
    """This function will return the loading computation with the names of the people beside their lines."""
    lines = facts.result["sumsheet"]
    columns = {key: column([line[key] for line in lines]) for key in ("weight", "arm", "moment")}
    columns["lateral_moment"] = sided([line["lateral_moment"] for line in lines])
    cells = _presented_cells(facts, lines)
    return [
        {
            "line": str(line["line"]),
            "what": line["what"] if line["pointer"] else words.said(line["what"]),
            "name": _name_at(facts.inputs, line["pointer"]),
            "how": _how(facts, line),
            "total": line["total"],
            **{key: values[place] for key, values in columns.items()},
            "presented": cells[place],
        }
        for place, line in enumerate(lines)
    ]


def presented(facts: Computed) -> dict[str, list[str]]:
    """This function will return how moments are shown beside themselves: titles of columns, and the words."""
    given = facts.result.get("presentation") or {}
    found: dict[str, list[str]] = {"titles": [], "keys": [], "words": []}
    if "index" in given:
        found["titles"].append("index")
        found["keys"].append("index")
        found["words"].append(f"{given['index']['text']}, {given['index']['source']}")
    if "moment_divided" in given:
        divided = given["moment_divided"]
        found["titles"].append(f"moment / {divided['divisor']}")
        found["keys"].append("moment_divided")
        found["words"].append(f"moments divided by {divided['divisor']}, {divided['source']}")
    return found


def _presented_cells(facts: Computed, rows: Iterable[Mapping[str, Any]]) -> list[list[str]]:
    """The cells of the further columns, row by row; no columns, no cells."""
    held = list(rows)
    columns = [column([row.get(key) for row in held]) for key in presented(facts)["keys"]]
    return [[each[place] for each in columns] for place in range(len(held))]


def phases(facts: Computed) -> list[Row]:
    """This function will return the phases, and where the burn is worst, with their marks on the plot."""
    rows = [
        *({**row, "letter": MARKS[row["phase"]]} for row in facts.result["phases"]),
        *(_worst_row(each) for each in (facts.result.get("path") or {}).get("worst", ())),
    ]
    columns = {
        key: column([row[key] for row in rows])
        for key in ("weight", "moment", "arm", "percent_chord", "fuel")
    }
    columns["lateral_arm"] = sided([row["lateral_arm"] for row in rows])
    cells = _presented_cells(facts, rows)
    return [
        {
            "letter": row["letter"],
            "shape": element("svg", shape(row["letter"], (6, 6)), viewBox="0 0 12 12"),
            "phase": row["phase"],
            **{key: values[place] for key, values in columns.items()},
            "presented": cells[place],
        }
        for place, row in enumerate(rows)
    ]


def _worst_row(worst: Mapping[str, Any]) -> Row:
    """The worst point of the burn as a row beside the phases."""
    side = WORST_OF[worst["axis"]]
    return {**worst, "letter": WORST, "phase": f"{side} worst, {worst['point']}"}


def limits(facts: Computed, words: Words) -> dict[str, Any]:
    """This function will return every check with its ruler: the aircraft's, and in pairs its parts'."""
    checks = facts.result["checks"]
    whole = [check for check in checks if check["code"].partition(".")[0] in WHOLE]
    parts = [check for check in checks if check["code"].partition(".")[0] not in WHOLE]
    rows = [_limit(check, words) for check in parts]
    half = (len(rows) + 1) // 2
    pairs = [rows[place::half] for place in range(half)]
    return {"whole": [_limit(check, words) for check in whole], "parts": pairs}


def _limit(check: Mapping[str, Any], words: Words) -> Row:
    family = check["code"].partition(".")[0]
    typed = family in TYPED and not check["code"].startswith("performance.required")
    kept = check["result"] == "pass"
    low, actual, high = check["low"], check["actual"], check["limit"]
    lateral = family in {"lateral", "lateral-by-cg"} or check["code"] in LATERAL_PATH
    low, actual, high = sided([low, actual, high]) if lateral else column([low, actual, high])
    return {
        "title": check["title"] if typed else words.said(check["title"]),
        "actual": actual,
        "low": low,
        "high": high,
        "unit": "" if family == "persons" else check["unit"] or "",
        "ruler": "" if family == "persons" else ruler(check),
        "margin": words.said(check["margin_text"]),
        # In the narrow list of parts a limit that is kept shows its room alone.
        "short": f"{check['margin']} {check['unit']}"
        if kept and check["margin"]
        else words.said(check["margin_text"]),
        "outcome": OUTCOMES[check["result"]],
        "kept": kept,
        "stops": check["result"] in {"fail", "unresolved"},
        "source": check["source"],
    }


def allowable(facts: Computed, words: Words) -> list[Row]:
    """This function will return what bears on the take-off weight, the least marked."""
    block = facts.result["allowable_take_off"]
    weights = column([one["weight"] for one in block["candidates"]])
    return [
        {
            "name": words.said(one["name"], typed=typed_sources(facts)),
            "weight": weight,
            "least": one["name"] == block["governed_by"],
        }
        for one, weight in zip(block["candidates"], weights, strict=True)
    ]


def versions(facts: Facts, words: Words) -> list[tuple[str, str, str]]:
    """This function will return the versions used, each as (what, in words, digest)."""
    basis, empty = facts.basis, facts.empty_weight
    title = basis.document["document"]
    manual = f"{title['title']}, {title['number']} revision {title['revision']}"
    weight = empty.document["weight"]
    how = empty.document.get("how", "")
    report = f", report {empty.document['report']}" if empty.document.get("report") else ""
    dated = f" of {empty.document['date']}" if empty.document.get("date") else ""
    stated = f"{weight['value']} {weight['unit']} by {how}{dated}{report}, true from {utc(empty.true_from)}"
    return [
        ("Loading basis", f"revision {basis.revision} ({manual}){_since(basis.known_from)}", basis.digest),
        *((one.what, one.words, one.digest) for one in facts.provisions),
        (words.said("Empty weight"), f"{stated}{_since(empty.known_from)}", empty.digest),
    ]


def _since(moment: Any) -> str:
    return f", approved {utc(moment)}" if moment else ""


def signatures(facts: Facts) -> list[Row]:
    """This function will return the signatures in the order they were given, with both clocks."""
    return [_signature(one, facts) for one in facts.signatures]


def signatures_under_earlier_issues(facts: Facts) -> list[Row]:
    """This function will return the signatures given before the last-minute change, the same way."""
    return [_signature(one, facts) for one in facts.earlier]


def _signature(one: SignatureFacts, facts: Facts) -> Row:
    return {
        "name": one.name,
        "capacity": one.capacity,
        "meaning": one.meaning,
        "statement": one.statement,
        "time": both_clocks(one.signed_at, facts.operator.time_zone),
        "means": f"password at a {one.means}"
        if one.means == "session"
        else f"password and a personal {one.means}",
    }


def changes(facts: Facts, words: Words) -> list[Row]:
    """This function will return the last-minute changes, each a numbered line with its parts."""
    return [
        {
            "number": str(one.number),
            "issue": str(one.number + 1),
            "lines": one.lines,
            "by": one.by,
            "time": both_clocks(one.at, facts.operator.time_zone),
            "counted": words.said(f"added up {one.moved}, of {one.bound} allowed"),
        }
        for one in facts.changes
    ]


def _name_at(inputs: Mapping[str, Any], pointer: str | None) -> str:
    """Look up the name behind a line, or what an item is; a lap infant stands beside its adult."""
    if not pointer:
        return ""
    found = _at(inputs, pointer)
    if not isinstance(found, Mapping):
        return ""
    infant = found.get("lap_infant")
    beside = f", with infant {infant['name']}" if infant else ""
    return f"{found.get('name') or found.get('what', '')}{beside}"


def crew(facts: Facts) -> Iterable[str]:
    """This function will return each crew member with name, position and seat."""
    return [f"{line['name']}, {line['position']} ({line['seat']})" for line in facts.inputs["crew"]]


def _at(inputs: Mapping[str, Any], pointer: str) -> Any:
    found: Any = inputs
    for step in pointer.strip("/").split("/"):
        found = found[int(step)] if isinstance(found, list | tuple) else found[step]
    return found


def _how(facts: Computed, line: Mapping[str, Any]) -> str:
    """How a weight was got, and as what it was typed where that was in another unit."""
    how = line["how"] or ""
    typed = _at(facts.inputs, line["pointer"]) if line["pointer"] else None
    weight = typed.get("weight") if isinstance(typed, Mapping) else None
    if not isinstance(weight, Mapping) or weight["unit"] == facts.result["units"]["weight"]:
        return how
    return f"{how}, {weight['value']} {weight['unit']}"

"""The block a pilot reads first, in the order in which a pilot asks."""

from collections.abc import Iterator, Mapping
from datetime import UTC, datetime
from typing import Any

from loads.balance.aboard import PILOT_IN_COMMAND
from loads.balance.rounding import CHORD_PLACES
from loads.manifest.facts import Computed, Facts, typed_sources
from loads.manifest.figures import SPACE, column, figure, offset, percent_chord
from loads.manifest.words import Words

Block = dict[str, Any]
VERDICTS = {
    "within": ("Within limits", "Every limit that was checked is kept."),
    "outside": ("Outside limits", "At least one limit is broken. Do not depart on this load."),
    "unresolved": (
        "Unresolved",
        "Something that is needed could not be checked. Do not depart on this load.",
    ),
}


def flight_block(facts: Facts) -> Block:
    """This function will return what identifies the flight: reference, date, both clocks, route, crew."""
    flight = facts.inputs["flight"]
    departure = datetime.fromisoformat(flight["departure"])
    return {
        "reference": flight["reference"],
        "leg": str(flight["leg"]),
        "date": f"{departure:%Y-%m-%d}",
        "local": f"{departure:%H:%M} {offset(departure)}",
        "utc": f"{departure.astimezone(UTC):%Y-%m-%d %H:%M} UTC",
        "origin": flight["origin"],
        "destination": flight["destination"],
        "operation": flight["operation"],
        "pilot": _pilot(facts.inputs),
        "configuration": facts.inputs["configuration"],
        "category": (facts.result.get("certification_category") or {}).get("name", ""),
    }


def verdict_block(facts: Computed, words: Words) -> Block:
    """This function will return the verdict in words, with the nearest limit of weight and of balance."""
    head, sentence = VERDICTS[facts.result["verdict"]]
    under = permits_said(facts.result)
    governing = facts.result["governing"]
    return {
        "head": head,
        "sentence": f"{sentence} {under[0].upper()}{under[1:]}." if under else sentence,
        "permits": under,
        "weight": words.said(governing["weight"], typed=typed_sources(facts)),
        "cg": words.said(governing["cg"]),
    }


def permits_said(result: Mapping[str, Any]) -> str:
    """This function will name the permits a load was judged under, for beside its verdict: `under permit
    SFP-88`; empty without one.
    """
    given = [one["number"] for one in result.get("restrictions_and_permits", ()) if one["kind"] == "permit"]
    return f"under permit{'s' if len(given) > 1 else ''} {', '.join(given)}" if given else ""


def figures_block(facts: Facts, words: Words) -> Block:
    """This function will return take-off weight, CG and their limits, trim, other weights, persons."""
    result = facts.result
    units, at = result["units"], {phase["phase"]: phase for phase in result["phases"]}
    checks = {check["code"]: check for check in result["checks"]}
    allowable = result["allowable_take_off"]
    cg = checks["cg.take-off"]
    return {
        "take_off": figure(at["take-off"]["weight"]),
        "unit": units["weight"],
        "allowable": figure(allowable["weight"]) if allowable["weight"] else "no limit",
        "governed_by": words.said(allowable["governed_by"], typed=typed_sources(facts)),
        "cg_arm": figure(at["take-off"]["arm"]),
        "cg_unit": units["length"],
        "cg_chord": figure(at["take-off"]["percent_chord"], CHORD_PLACES)
        if at["take-off"]["percent_chord"]
        else "",
        "cg_low": figure(cg["low"]) if cg["low"] else "none",
        "cg_high": figure(cg["limit"]) if cg["limit"] else "none",
        "cg_chord_limits": _chord_limits(facts, cg),
        "cg_margin": words.said(cg["margin_text"]),
        "lateral": figure_sided(at["take-off"]["lateral_text"]),
        "trim": _trim(facts),
        "zero_fuel": _beside(at["zero fuel"]["weight"], checks["weight.zero-fuel"]),
        "landing": _beside(at["landing"]["weight"], checks["weight.landing"]),
        "persons": _persons(result["persons"]),
    }


def fuel_block(facts: Computed) -> Block:
    """This function will return the fuel by tank and in total, in volume and in weight."""
    fuel = facts.result["fuel"]
    keys = ("at_engine_start", "at_take_off", "at_landing")
    figures = iter(column([tank[key] for key in keys for tank in fuel["tanks"]]))
    columns = {key: [next(figures) for _ in fuel["tanks"]] for key in keys}
    tanks = [
        {"name": _as_typed(facts, tank), **{key: values[place] for key, values in columns.items()}}
        for place, tank in enumerate(fuel["tanks"])
    ]
    totals = {key: figure(fuel[key]) for key in _FUEL_TOTALS}
    return {
        **totals,
        "tanks": tanks,
        "unit": fuel["unit"],
        "volume_unit": fuel["volume_unit"],
        "density": fuel["density"],
        "density_source": fuel["density_source"],
    }


def _as_typed(facts: Computed, tank: Mapping[str, Any]) -> str:
    """The name of a tank, and what was typed at engine start where that was in another unit."""
    typed = facts.inputs["fuel"]["at_engine_start"].get(tank["tank"])
    name = str(tank["name"])
    if typed is None or typed["unit"] == tank["unit"]:
        return name
    return f"{name} ({typed['value']} {typed['unit']} typed)"


_FUEL_TOTALS = ("engine_start", "taxi", "take_off", "trip", "landing", "minimum_at_landing")


def open_points(facts: Computed, words: Words) -> Block:
    """This function will return what was not assessed, what is standard or estimated, and what is advised."""
    return {
        "not_assessed": [words.said(text) for text in facts.result["not_assessed"]],
        "by_how": list(_by_how(facts)),
        "advisories": [words.said(text) for text in facts.result["advisories"]],
        "papers": [_paper(one, words) for one in facts.result.get("restrictions_and_permits", ())],
    }


def _paper(one: Mapping[str, Any], words: Words) -> dict[str, str]:
    """Tell a restriction or permit that held at the departure: what it does, from when until when."""
    by = f", by {one['authority']}" if one["authority"] else ""
    until = f"until {_moment(one['until'])}" if one["until"] else "until lifted"
    does = "; ".join(words.said(line) for line in one["lines"])
    return {
        "kind": one["kind"],
        "title": f"{one['kind']} {one['number']}{by}",
        "text": f"{one['what']}: {does}. From {_moment(one['from'])}, {until}. {one['source']}",
    }


def _moment(text: str) -> str:
    return f"{datetime.fromisoformat(text).astimezone(UTC):%Y-%m-%d %H:%M} UTC"


def figure_sided(text: str) -> str:
    """This function will keep a sided text such as `R 0.3 in` on one line."""
    return text.replace(" ", SPACE)


def _by_how(facts: Computed) -> Iterator[str]:
    """Name the lines whose weight is standard or estimated; nothing means all were weighed or declared."""
    for how in ("standard", "estimated"):
        lines = [str(line["line"]) for line in facts.result["sumsheet"] if line["how"] == how]
        if lines:
            yield f"{how}: line{'s' if len(lines) > 1 else ''} {', '.join(lines)} of the loading computation"


def _pilot(inputs: Mapping[str, Any]) -> str:
    named = (line["name"] for line in inputs["crew"] if line["position"] == PILOT_IN_COMMAND)
    return next(named, "not named")


def _chord_limits(facts: Facts, cg: Mapping[str, Any]) -> str:
    """Both limits as per cent of the chord, rounded towards each other."""
    if facts.basis.chord is None or cg["low"] is None or cg["limit"] is None:
        return ""
    low = percent_chord(cg["low"], facts.basis.chord, "up")
    high = percent_chord(cg["limit"], facts.basis.chord, "down")
    return f"{figure(low, CHORD_PLACES)} to {figure(high, CHORD_PLACES)} %"


def _trim(facts: Facts) -> str:
    found = facts.result.get("trim")
    if found is not None:
        return "; ".join(trim_lines(found))
    trim = facts.basis.document.get("trim")
    if isinstance(trim, Mapping) and trim.get("none"):
        page = trim.get("source", {}).get("page", "")
        return f"none in the approved data{f' (p. {page})' if page else ''}"
    return "not in the loading basis"


def trim_lines(trim: Mapping[str, Any]) -> list[str]:
    """This function will return the trim setting, a line for each flap setting: `flaps 10: 4.5 units`."""
    found = []
    for one in trim["settings"]:
        said = f"{figure(one['setting'])} {trim['unit']}" if one["setting"] else one["why"]
        found.append(f"flaps {one['flap']}: {said}" if one["flap"] else said)
    return found


def _beside(weight: str, check: Mapping[str, Any]) -> Block:
    limit = f"limit {figure(check['limit'])} {check['unit']}" if check["limit"] else check["margin_text"]
    return {"weight": figure(weight), "limit": limit}


def _persons(counts: Mapping[str, int]) -> Block:
    parts = [f"{counts['crew']} crew", _counted(counts["passengers"], "passenger")]
    if counts["lap_infants"]:
        parts.append(_counted(counts["lap_infants"], "lap infant"))
    if "greatest_in_flight" in counts:
        parts.append(f"at most {counts['greatest_in_flight']} in flight")
    return {"total": str(counts["total"]), "words": ", ".join(parts)}


def _counted(count: int, what: str) -> str:
    return f"{count} {what}{'' if count == 1 else 's'}"

"""The whole paper as plain values for the template: texts, lists, and drawings as SVG text."""

import segno

from fleet.basis import Axis
from loads.cautions import CAUTIONS, INVENTED
from loads.manifest import pilot_block, tables
from loads.manifest.facts import Facts
from loads.manifest.figures import both_clocks
from loads.manifest.words import SINGLE_ENGINE_US, WORDS, Words
from loads.plot import Frame, plot
from loads.plot_across import plot_across

# Height of one plot, by paper and by whether there are two of them, so that the first page holds them.
HEIGHTS = {("Letter", False): 300.0, ("A4", False): 340.0, ("Letter", True): 183.0, ("A4", True): 215.0}
# Each line of a last-minute change takes this much of the plots, which stay readable at what is left.
LINE_OF_CHANGES, MOST_SPARED = 12.0, 84.0
STATEMENT_NAME = "statement.json"
ENCLOSED = (
    f"Enclosed in this file as {STATEMENT_NAME}: what was signed (inputs as typed, digests of the versions "
    "used, engine, result; RFC 8785). Its SHA-256 is the document digest."
)


def sheet(facts: Facts) -> dict[str, object]:
    """This function will return everything the template prints; the same facts give the same values."""
    words = WORDS[facts.operator.rule_set]
    return {
        "title": title_of(facts),
        "paper": words.paper,
        "word": words.weight,
        "Word": words.weight.capitalize(),
        "operating": words.operating,
        "rules": words.rules,
        "rules_note": _rules_note(facts, words),
        "invented": INVENTED if facts.operator.invented else "",
        "operator": facts.operator,
        "aircraft": facts.aircraft,
        "number": str(facts.number),
        "issue": str(facts.issue) if facts.changes else "",
        "changes": tables.changes(facts, words),
        "earlier": tables.signatures_under_earlier_issues(facts),
        "load": facts.load,
        "replaces": facts.replaces,
        "legs": facts.legs,
        "uplift": facts.uplift[:1].upper() + facts.uplift[1:],
        "units": facts.result["units"],
        "flight": pilot_block.flight_block(facts),
        "verdict": pilot_block.verdict_block(facts, words),
        "figures": pilot_block.figures_block(facts, words),
        "fuel": pilot_block.fuel_block(facts),
        "open": pilot_block.open_points(facts, words),
        "presented": tables.presented(facts),
        "phases": tables.phases(facts),
        "plots": _plots(facts, words),
        "computation": tables.computation(facts, words),
        "limits": tables.limits(facts, words),
        "allowable": tables.allowable(facts, words),
        "crew": tables.crew(facts),
        "versions": tables.versions(facts, words),
        "signatures": tables.signatures(facts),
        "seal": {
            "position": str(facts.seal.position),
            "digest": facts.seal.digest,
            "time": both_clocks(facts.seal.at, facts.operator.time_zone),
        },
        "digest": facts.digest,
        "enclosed": ENCLOSED,
        "engine": facts.engine,
        "cautions": CAUTIONS,
        "code": _code(facts),
    }


def title_of(facts: Facts) -> str:
    """This function will return the title of the paper; it names no person."""
    flight = facts.inputs["flight"]
    named = f"{flight['reference']} leg {flight['leg']}"
    issue = f" issue {facts.issue}" if facts.changes else ""
    return f"Load manifest {facts.number}{issue}, {facts.aircraft.registration}, {named}"


def _plots(facts: Facts, words: Words) -> list[str]:
    """The longitudinal plot, and beside it one for each kind of lateral limit the basis has."""
    basis = facts.basis
    lateral = any(envelope.axis == "lateral" for envelope in basis.envelopes)
    beside = lateral or bool(basis.lateral_by_cg)
    height = HEIGHTS[words.paper, beside] - _height_of_changes(facts)
    if lateral and basis.lateral_by_cg:
        height *= 0.56  # three of them in the room of two
    frame = Frame(height=height, bottom=height - 34.0)
    axes: tuple[Axis, ...] = ("longitudinal", "lateral") if lateral else ("longitudinal",)
    drawn = [
        plot(
            facts.result,
            basis.envelopes,
            axis=axis,
            weight_word=words.weight,
            frame=frame,
            curtailments=basis.curtailments,
        )
        for axis in axes
    ]
    drawn.append(plot_across(facts.result, basis.lateral_by_cg, frame=frame))
    return [one for one in drawn if one]


def _height_of_changes(facts: Facts) -> float:
    """What the lines of last-minute changes take from the first page, up to what a plot can spare."""
    lines = sum(max(len(one.lines), 2) for one in facts.changes)
    return min(MOST_SPARED, LINE_OF_CHANGES * lines)


def _rules_note(facts: Facts, words: Words) -> str:
    if facts.operator.rule_set == "US" and facts.aircraft.engines == 1:
        return f"{words.rules_are} {SINGLE_ENGINE_US}"
    return words.rules_are


def _code(facts: Facts) -> str:
    """A QR code with the number and the digest, for comparing a paper with the record by machine."""
    issue = f" issue {facts.issue}" if facts.changes else ""
    text = f"{facts.operator.code} manifest {facts.number}{issue} sha256:{facts.digest}"
    drawn: str = segno.make(text, error="m", micro=False).svg_inline(border=0, svgclass=None, lineclass=None)
    return drawn

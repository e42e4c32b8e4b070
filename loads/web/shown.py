"""What one load's page shows, as plain values."""

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from datetime import UTC, datetime
from itertools import zip_longest
from typing import Any
from zoneinfo import ZoneInfo

from django.utils.safestring import mark_safe

from fleet.applicable import applicable
from fleet.basis import Axis
from fleet.models import EmptyWeight, LoadingBasis, Provision
from fleet.queries.figures import basis_of
from fleet.queries.provisions import used_provisions
from loads import acts
from loads.balance.governing import NOT_KNOWN
from loads.lifecycle import ways_out
from loads.manifest.figures import figure
from loads.manifest.pilot_block import VERDICTS, fuel_block, open_points, permits_said, trim_lines
from loads.manifest.tables import computation, limits, presented
from loads.manifest.words import Words
from loads.models import Load
from loads.plot import plot
from loads.plot_across import plot_across
from loads.queries.answer import signatures_of
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.legs import legs_answer
from loads.queries.provided import basis_under
from loads.queries.signable import signatures_due
from loads.queries.stale import stale_parts
from loads.web.next_leg import next_leg
from loads.web.wording import words_at
from records.actor import Actor

AXES: tuple[Axis, ...] = ("longitudinal", "lateral")
STEP_WORDS = {
    "open": "submitted",
    "prepared": "signed as prepared",
    "loaded": "confirmed as loaded",
    "accepted": "accepted by the pilot in command",
    "departed": "departed",
    "superseded": "replaced by a revision",
    "withdrawn": "withdrawn",
}
SIGNING_ACTS = {
    "prepared": acts.PREPARE_LOAD.name,
    "loaded": acts.CONFIRM_LOADING.name,
    "accepted": acts.ACCEPT_LOAD.name,
}
FIGURES = (("take-off", "Take-off"), ("zero fuel", "Zero fuel"), ("landing", "Landing"))


@dataclass(frozen=True, slots=True)
class Page:
    """What was declared and what came out, as the tables of the paper take it."""

    inputs: Mapping[str, Any]
    result: Mapping[str, Any]


def load_page(current: Current, zone: ZoneInfo, now: datetime, actor: Actor) -> dict[str, Any]:
    """This function will return the values of one load's page at `now`, for this actor."""
    load, page = current.load, Page(declared_now(current), current.result())
    words = words_at(load.operator_id, now)
    stale = stale_parts(current, now) if ways_out(current.state) else ()
    legs = legs_answer(current)
    return {
        "load": _head(current, zone),
        "units": page.result.get("units"),
        "weight_word": words.weight,
        "figures": _figures(page, words),
        "lines": _lines(page, words),
        "stops": stops(page.result, words),
        "stale": f"Changed since it was assessed: {', '.join(stale)}." if stale else "",
        "limits": _limits(page, words),
        "plots": _plots(current, page.result, words),
        "computation": computation(page, words) if page.result.get("sumsheet") else [],
        "presented": presented(page),
        "steps": _steps(load),
        "versions": _versions(current),
        "legs": legs,
        "next_leg": next_leg(current, legs, actor),
        "can": _can(current, page.inputs, actor, stale=bool(stale)),
    }


def stops(result: Mapping[str, Any], words: Words) -> list[dict[str, str]]:
    """This function will return what is in the way of a departure, and what would help."""
    return [
        {
            "title": words.said(check["title"]),
            "margin": words.said(check["margin_text"]),
            "what_next": words.said(check["what_next"]),
        }
        for check in result.get("checks", ())
        if check["result"] in {"fail", "unresolved"}
    ]


def _lines(page: Page, words: Words) -> dict[str, Any]:
    governing = page.result.get("governing") or {}
    # What is not known of them stands under what was not assessed.
    told = [line for line in (governing.get("weight"), governing.get("cg")) if line and line != NOT_KNOWN]
    return {
        "governing": [words.said(line) for line in told],
        **open_points(page, words),
    }


def verdict_words(verdict: str) -> str:
    """This function will return a verdict as people read it."""
    return VERDICTS[verdict][0]


def _head(current: Current, zone: ZoneInfo) -> dict[str, Any]:
    load, used = current.load, current.assessment
    paper = getattr(load, "paper", None)
    return {
        "id": load.id,
        "registration": load.aircraft.registration,
        "type": load.aircraft.type,
        "reference": load.reference,
        "leg": load.leg,
        "local_departure": load.departure.astimezone(zone).strftime("%Y-%m-%d %H:%M"),
        "utc_departure": load.departure.astimezone(UTC).strftime("%Y-%m-%d %H:%M"),
        "origin": load.origin,
        "destination": load.destination,
        "operation": load.operation.replace("-", " "),
        "configuration": load.configuration,
        "category": _category(current.result()).get("name", ""),
        "verdict": used.verdict,
        "verdict_words": verdict_words(used.verdict),
        "permits": permits_said(current.result()),
        "state": current.state,
        "step": current.step.number,
        "digest": used.digest,
        "number": paper.number if paper else None,
        "replaces": load.replaces_id,
        "replaced_by": Load.objects.filter(replaces=load).values_list("id", flat=True).first(),
    }


def _figures(page: Page, words: Words) -> list[dict[str, Any]]:
    """This function will return the figures a pilot asks for first, each with its limit beside it."""
    result = page.result
    if not result.get("phases"):
        return []
    at = {phase["phase"]: phase for phase in result["phases"]}
    checks = {check["code"]: check for check in result["checks"]}
    margins = {code: words.said(check["margin_text"]) for code, check in checks.items()}
    units = result["units"]
    shown = []
    for phase, title in FIGURES:
        code = phase.replace(" ", "-")
        arm = f"CG {at[phase]['arm']} {units['length']}"
        if at[phase]["percent_chord"]:
            arm += f", {at[phase]['percent_chord']} % MAC"
        if at[phase].get("index"):
            arm += f", index {at[phase]['index']}"
        small = [
            margins.get(f"weight.{code}", ""),
            arm,
            _between(checks.get(f"cg.{code}")),
            margins.get(f"cg.{code}", ""),
        ]
        value = f"{figure(at[phase]['weight'])} {units['weight']}"
        shown.append(
            {"title": f"{title} {words.weight}", "value": value, "small": [one for one in small if one]}
        )
    allowable = result["allowable_take_off"]
    if allowable["weight"]:
        value = f"{figure(allowable['weight'])} {units['weight']}"
        governed = [f"governed by {words.said(allowable['governed_by'])}"]
        shown.insert(1, {"title": f"Allowable take-off {words.weight}", "value": value, "small": governed})
    if result.get("trim"):
        lines = trim_lines(result["trim"])
        shown.insert(2, {"title": "Take-off trim", "value": lines[0], "small": lines[1:]})
    return [*shown, _fuel(page), _persons(page)]


def _between(check: Mapping[str, Any] | None) -> str:
    """This function will return the limits of a CG in words; nothing where there are none."""
    if check is None or not check["low"] or not check["limit"]:
        return ""
    return f"limits {figure(check['low'])} to {figure(check['limit'])} {check['unit']}"


def _fuel(page: Page) -> dict[str, Any]:
    fuel = fuel_block(page)
    tanks = [f"{tank['name']}: {tank['at_take_off']} {fuel['volume_unit']}" for tank in fuel["tanks"]]
    return {"title": "Fuel at take-off", "value": f"{fuel['take_off']} {fuel['unit']}", "small": tanks}


def _persons(page: Page) -> dict[str, Any]:
    counts = page.result["persons"]
    small = [f"{counts['crew']} crew", f"{counts['passengers']} in passenger seats"]
    if counts["lap_infants"]:
        small.append(f"{counts['lap_infants']} on a lap")
    if "greatest_in_flight" in counts:
        small.append(f"at most {counts['greatest_in_flight']} in flight")
    return {"title": "Persons on board", "value": str(counts["total"]), "small": [", ".join(small)]}


def _limits(page: Page, words: Words) -> list[dict[str, Any]]:
    """This function will return every limit as the paper has it: the whole aircraft's, then its parts'."""
    tables = limits(page, words)
    rows = [*tables["whole"], *(row for pair in zip_longest(*tables["parts"]) for row in pair if row)]
    # Drawn by our own code from figures alone; whatever text stands in a drawing is escaped there.
    return [row | {"ruler": mark_safe(row["ruler"])} for row in rows]  # noqa: S308  # see above


def _category(result: Mapping[str, Any]) -> Mapping[str, Any]:
    """This function will return the certification category of the load; nothing where it has none."""
    return result.get("certification_category") or {}


def _plots(current: Current, result: Mapping[str, Any], words: Words) -> list[str]:
    basis = current.assessment.loading_basis
    if basis is None or not result.get("phases"):
        return []
    category = _category(result).get("id")
    ruled = basis_under(basis_of(basis), used_provisions(current.assessment.provisions))
    figures = applicable(ruled, current.load.configuration, category)
    drawn = [
        plot(
            result,
            figures.envelopes,
            axis=axis,
            weight_word=words.weight,
            curtailments=figures.curtailments,
        )
        for axis in AXES
    ]
    drawn.append(plot_across(result, figures.lateral_by_cg))
    return [mark_safe(svg) for svg in drawn if svg]  # noqa: S308  # drawn by our own code, its texts are escaped there


def _steps(load: Load) -> Iterable[dict[str, Any]]:
    signed = {one.step_id: one for one in signatures_of(load)}
    assessed = 0
    for step in load.steps.select_related("person").order_by("number"):
        words = STEP_WORDS[step.after]
        if step.after == "open":
            assessed += 1
            words = "submitted and assessed" if assessed == 1 else "assessed again"
        if step.before == "accepted" == step.after:
            words = "changed at the last minute and accepted again"
        signature = signed.get(step.id)
        name = bytes(signature.name).decode() if signature else step.person.name if step.person else ""
        said = {"capacity": signature.capacity, "signed": signature.statement} if signature else {}
        yield {"at": step.at.astimezone(UTC), "what": words, "who": name, "why": step.reason, **said}


def _versions(current: Current) -> Sequence[dict[str, str]]:
    used = current.assessment
    found: list[tuple[str, LoadingBasis | EmptyWeight | Provision | None]] = [
        ("Loading basis", used.loading_basis),
        ("Empty weight", used.empty_weight),
        *((one.kind.capitalize(), one) for one in used_provisions(used.provisions)),
    ]
    return [
        {"title": title, "digest": version.digest}
        if version
        else {"title": f"{title}: none in force", "digest": ""}
        for title, version in found
    ]


def _can(current: Current, declared: Mapping[str, Any], actor: Actor, *, stale: bool) -> dict[str, Any]:
    """This function will return what this actor can do with the load now; the actions ask all of it again."""
    ways = ways_out(current.state)
    can: dict[str, Any] = {}
    due = {} if stale else signatures_due(current, declared)
    for meaning, text in due.items():
        its_pilot = meaning != "accepted" or current.load.pilot_id == actor.person
        if SIGNING_ACTS[meaning] in actor.may and its_pilot:
            can["sign"] = {"meaning": meaning, "text": text}
    offers = (
        ("assess", "open", acts.ASSESS_LOAD.name, stale),
        ("depart", "departed", acts.DEPART_LOAD.name, True),
        ("revise", "superseded", acts.REVISE_LOAD.name, True),
        ("withdraw", "withdrawn", acts.WITHDRAW_LOAD.name, True),
    )
    can |= {name: True for name, to, act, offered in offers if to in ways and act in actor.may and offered}
    return can

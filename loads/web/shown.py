"""What one load's page shows, as plain values."""

from collections.abc import Iterable, Mapping, Sequence
from datetime import UTC, datetime
from typing import Any
from zoneinfo import ZoneInfo

from django.utils.safestring import mark_safe

from fleet.basis import Axis
from fleet.queries.figures import basis_of
from loads import acts
from loads.lifecycle import ways_out
from loads.manifest.pilot_block import VERDICTS
from loads.manifest.ruler import ruler
from loads.models import Load
from loads.plot import plot
from loads.queries.answer import signatures_of
from loads.queries.current import Current, declared_in
from loads.queries.signable import signatures_due
from loads.queries.stale import stale_parts
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
SIGNING_ACTS = {"prepared": acts.PREPARE_LOAD.name, "accepted": acts.ACCEPT_LOAD.name}
FIGURES = (("take-off", "Take-off"), ("zero fuel", "Zero fuel"), ("landing", "Landing"))


def load_page(current: Current, zone: ZoneInfo, now: datetime, actor: Actor) -> dict[str, Any]:
    """This function will return the values of one load's page at `now`, for this actor."""
    load, result, declared = current.load, current.result(), declared_in(current.load)
    stale = stale_parts(current, now) if ways_out(current.state) else ()
    checks = _checks(result)
    stops = [check for check in checks if check["result"] in {"fail", "unresolved"}]
    return {
        "load": _head(current, zone),
        "result": result,
        "figures": _figures(result),
        "stops": stops,
        "stops_title": "What is in the way, and what would help",
        "stale": f"Changed since it was assessed: {', '.join(stale)}." if stale else "",
        "checks": checks,
        "plots": _plots(current, result),
        "computation": _computation(result, declared),
        "steps": _steps(load),
        "versions": _versions(current),
        "can": _can(current, declared, actor, stale=bool(stale)),
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
        "verdict": used.verdict,
        "verdict_words": verdict_words(used.verdict),
        "state": current.state,
        "step": current.step.number,
        "digest": used.digest,
        "number": paper.number if paper else None,
        "replaces": load.replaces_id,
        "replaced_by": Load.objects.filter(replaces=load).values_list("id", flat=True).first(),
    }


def _figures(result: Mapping[str, Any]) -> list[dict[str, Any]]:
    """This function will return the figures a pilot asks for first, each with its limit beside it."""
    if not result.get("phases"):
        return []
    at = {phase["phase"]: phase for phase in result["phases"]}
    checks = {check["code"]: check for check in result["checks"]}
    units, persons = result["units"], result["persons"]
    shown = []
    for phase, title in FIGURES:
        code = phase.replace(" ", "-")
        small = [checks[f"weight.{code}"]["margin_text"]] if f"weight.{code}" in checks else []
        arm = f"CG {at[phase]['arm']} {units['length']}"
        if at[phase]["percent_chord"]:
            arm += f", {at[phase]['percent_chord']} % of the chord"
        small.append(arm)
        if f"cg.{code}" in checks:
            small.append(checks[f"cg.{code}"]["margin_text"])
        shown.append(
            {"title": f"{title} weight", "value": f"{at[phase]['weight']} {units['weight']}", "small": small}
        )
    allowable = result["allowable_take_off"]
    if allowable["weight"]:
        governed = [f"governed by {allowable['governed_by']}"]
        value = f"{allowable['weight']} {units['weight']}"
        shown.insert(1, {"title": "Allowable take-off weight", "value": value, "small": governed})
    fuel = result["fuel"]
    tanks = [f"{tank['name']}: {tank['at_engine_start']} {tank['unit']}" for tank in fuel["tanks"]]
    shown.append({"title": "Fuel at take-off", "value": f"{fuel['take_off']} {fuel['unit']}", "small": tanks})
    counted = f"{persons['crew']} crew, {persons['passengers']} passengers, {persons['lap_infants']} on laps"
    shown.append({"title": "Persons on board", "value": str(persons["total"]), "small": [counted]})
    return shown


def _checks(result: Mapping[str, Any]) -> list[dict[str, Any]]:
    return [
        dict(check)
        | {
            "actual_text": _with_unit(check["actual"], check["unit"]),
            "limit_text": _limit_text(check),
            # Drawn by our own code from figures alone; every text in it is escaped there.
            "ruler": mark_safe("" if check["code"].startswith("persons") else ruler(check)),  # noqa: S308  # see above
        }
        for check in result.get("checks", ())
    ]


def _with_unit(value: str | None, unit: str | None) -> str:
    if value is None:
        return ""
    return value if unit in {None, "persons"} else f"{value} {unit}"


def _limit_text(check: Mapping[str, Any]) -> str:
    low, high = check["low"], check["limit"]
    if low is not None and high is not None and low != high:
        return f"{low} to {_with_unit(high, check['unit'])}"
    if high is not None:
        return _with_unit(high, check["unit"])
    return f"at least {_with_unit(low, check['unit'])}" if low is not None else ""


def _plots(current: Current, result: Mapping[str, Any]) -> list[str]:
    basis = current.assessment.loading_basis
    if basis is None or not result.get("phases"):
        return []
    envelopes = basis_of(basis).envelopes
    drawn = (plot(result, envelopes, axis=axis) for axis in AXES)
    return [mark_safe(svg) for svg in drawn if svg]  # noqa: S308  # drawn by our own code, its texts are escaped there


def _computation(result: Mapping[str, Any], declared: Mapping[str, Any]) -> list[dict[str, Any]]:
    return [
        dict(line)
        | {"name": _name_at(declared, line["pointer"]), "lateral_text": _sided(line["lateral_moment"])}
        for line in result.get("sumsheet", ())
    ]


def _sided(moment: str | None) -> str:
    """This function will write a lateral moment as people read it: L or R of the centreline, never a bare
    sign.
    """
    if moment is None:
        return ""
    if moment.startswith("-"):
        return f"L {moment[1:]}"
    return f"R {moment}" if any(digit in moment for digit in "123456789") else moment


def _name_at(declared: Mapping[str, Any], pointer: str | None) -> str:
    found: Any = declared
    for step in (pointer or "").strip("/").split("/"):
        if isinstance(found, list):
            found = found[int(step)]
        elif isinstance(found, Mapping):
            found = found.get(step)
    return str(found["name"]) if isinstance(found, Mapping) and "name" in found else ""


def _steps(load: Load) -> Iterable[dict[str, Any]]:
    signed = {one.step_id: one for one in signatures_of(load)}
    assessed = 0
    for step in load.steps.select_related("person").order_by("number"):
        words = STEP_WORDS[step.after]
        if step.after == "open":
            assessed += 1
            words = "submitted and assessed" if assessed == 1 else "assessed again"
        signature = signed.get(step.id)
        name = bytes(signature.name).decode() if signature else step.person.name if step.person else ""
        why = f"as {signature.capacity}: {signature.statement}" if signature else step.reason
        yield {"at": step.at.astimezone(UTC), "what": words, "who": name, "why": why}


def _versions(current: Current) -> Sequence[dict[str, str]]:
    used = current.assessment
    found = [("Loading basis", used.loading_basis), ("Empty weight", used.empty_weight)]
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

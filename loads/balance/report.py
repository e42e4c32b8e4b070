"""The printed parts of a result, as the API answers them, the pages show them and the paper prints them.

Beyond the checks and the verdict: `units`, `phases`, `path`, `allowable_take_off`, `governing`, `fuel`,
`sumsheet`, `operating_weight`, `persons`, `advisories`, `not_assessed`, and of a load with one its
`sequence`. Figures are decimal texts; what is not known is null, and the phases of a load that could not be
computed are an empty list.
"""

from collections.abc import Mapping
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.allowable import Allowable, allowable_take_off
from loads.balance.checks_path import path_document
from loads.balance.exact import quotient, times
from loads.balance.fitted import fitted_lines
from loads.balance.flight_weights import FlightWeights
from loads.balance.fuel import FuelState
from loads.balance.governing import NOT_KNOWN, cg_line, return_advisory, weight_line
from loads.balance.over_flight import over_flight
from loads.balance.path_worst import Burn
from loads.balance.prepared import Prepared
from loads.balance.presented import presentation_document, presented
from loads.balance.result import Check, Json, Line, State
from loads.balance.rounding import CHORD_PLACES, VOLUME_PLACES, WEIGHT_PLACES, printed
from loads.balance.sums import Sums
from loads.balance.sumsheet import Aboard, as_rows
from loads.balance.sumsheet_events import sequence_document
from loads.balance.told_besides import told_besides
from loads.balance.trim_setting import trim_document

DENSITY_PLACES = 4


class Assessed(NamedTuple):
    """What an assessment found, exact; `states` is empty, `fuel` and `burn` None where not known."""

    declared: Declared
    aboard: Aboard
    lines: tuple[Line, ...]
    states: Mapping[Phase, State]
    fuel: Mapping[Phase, FuelState] | None
    burn: Burn | None
    checks: tuple[Check, ...]
    weights: FlightWeights | None = None  # only where something comes aboard in flight or hangs outside


def report(assessed: Assessed, ready: Prepared) -> Json:
    """Return the printed parts of an assessment with a basis."""
    declared, aboard, lines, states, fuel, burn, checks, weights = assessed
    allowable = allowable_take_off(declared, states, weights) if states else None
    return {
        "units": {"weight": ready.weight, "length": ready.length, "moment": ready.moment},
        "phases": [_phase(state, ready) for state in states.values()],
        "path": None if burn is None else path_document(burn, checks, ready),
        "allowable_take_off": None if allowable is None else allowable.as_document(),
        "governing": _governing(allowable, states, checks, ready),
        "fuel": None if fuel is None else _fuel(declared, fuel, ready),
        "sumsheet": as_rows(lines, ready),
        "operating_weight": _operating(aboard.operating_weight, ready),
        **_whole_aircraft(declared, states, ready),
        "persons": _persons(declared),
        "advisories": _advisories(declared, states, ready),
        "not_assessed": _not_assessed(checks, bool(states)),
        **({"sequence": sequence_document(declared, ready)} if declared.sequence else {}),
        **told_besides(declared),
        **presentation_document(ready),
    }


def _whole_aircraft(declared: Declared, states: Mapping[Phase, State], ready: Prepared) -> Json:
    """Return what only some bases have: the certification category, and the take-off trim setting."""
    found: Json = {}
    if declared.category is not None:
        found["certification_category"] = {"id": declared.category.id, "name": declared.category.name}
    if ready.basis.trim is not None:
        found["trim"] = trim_document(declared, states.get("take-off"), ready)
    return found


def report_without_basis() -> Json:
    """Return the same parts where no loading basis is in force: nothing is known."""
    return {
        "units": {"weight": None, "length": None, "moment": None},
        "phases": [],
        "path": None,
        "allowable_take_off": None,
        "governing": {"weight": NOT_KNOWN, "cg": NOT_KNOWN},
        "fuel": None,
        "sumsheet": [],
        "operating_weight": None,
        "persons": None,
        "advisories": [],
        "not_assessed": ["everything: no loading basis is in force"],
    }


def _phase(state: State, ready: Prepared) -> Json:
    percent = ready.chord_percent(state.arm)
    lateral = printed(state.lateral_arm, ready.length_places)
    return {
        "phase": state.phase,
        "weight": printed(state.weight, WEIGHT_PLACES),
        "moment": printed(state.moment, ready.moment_places),
        "arm": printed(state.arm, ready.length_places),
        "percent_chord": None if percent is None else printed(percent, CHORD_PLACES),
        "lateral_arm": lateral,
        "lateral_text": _side(lateral, ready.length),
        "fuel": printed(state.fuel, WEIGHT_PLACES),
        **presented(state.weight, state.moment, ready),
    }


def _side(lateral: str, unit: str) -> str:
    """Return a lateral figure as people read it: `R 0.3 in`, `L 2.4 in`, never with a bare sign."""
    if lateral == "0":
        return f"0 {unit}"
    return f"L {lateral[1:]} {unit}" if lateral.startswith("-") else f"R {lateral} {unit}"


def _governing(
    allowable: Allowable | None, states: Mapping[Phase, State], checks: tuple[Check, ...], ready: Prepared
) -> Json:
    if allowable is None:
        return {"weight": NOT_KNOWN, "cg": NOT_KNOWN}
    return {"weight": weight_line(allowable, states["take-off"], ready), "cg": cg_line(checks)}


def _fuel(declared: Declared, fuel: Mapping[Phase, FuelState], ready: Prepared) -> Json:
    plan = declared.fuel
    ramp, take_off, landing = fuel["ramp"], fuel["take-off"], fuel["landing"]
    density = f"{printed(plan.density, DENSITY_PLACES)} {ready.density}"
    return {
        "unit": ready.weight,
        "volume_unit": ready.volume,
        "density": density,
        "density_source": plan.density_source,
        "tanks": [
            {
                "tank": held.tank.id,
                "name": held.tank.name,
                "at_engine_start": _volume(ramp.usable[held.tank.id]),
                "at_take_off": _volume(take_off.usable[held.tank.id]),
                "at_landing": _volume(landing.usable[held.tank.id]),
                "unit": ready.volume,
                "weight_at_engine_start": _weight(times(ramp.usable[held.tank.id], plan.density)),
                "not_usable": _volume(held.trapped),
            }
            for held in plan.tanks
        ],
        "engine_start": _weight(ramp.usable_weight),
        "taxi": _weight(plan.taxi),
        "take_off": _weight(take_off.usable_weight),
        "trip": _weight(plan.trip),
        "landing": _weight(landing.usable_weight),
        "minimum_at_landing": _weight(plan.minimum_at_landing),
    }


def _operating(sums: Sums | None, ready: Prepared) -> Json | None:
    if sums is None or sums.weight <= 0:
        return None
    arm = quotient(sums.moment, sums.weight)
    percent = ready.chord_percent(arm)
    return {
        "weight": _weight(sums.weight),
        "arm": printed(arm, ready.length_places),
        "moment": printed(sums.moment, ready.moment_places),
        "percent_chord": None if percent is None else printed(percent, CHORD_PLACES),
        **presented(sums.weight, sums.moment, ready),
    }


def _persons(declared: Declared) -> Json:
    crew, passengers = len(declared.crew), len(declared.passengers)
    infants = sum(person.lap_infant is not None for person in declared.passengers)
    found: Json = {
        "crew": crew,
        "passengers": passengers,
        "lap_infants": infants,
        "total": crew + passengers + infants,
    }
    if any(event.coming for event in declared.sequence):
        found["greatest_in_flight"] = max(map(_heads, over_flight(declared)))
    return found


def _heads(aboard: Declared) -> int:
    infants = sum(person.lap_infant is not None for person in aboard.passengers)
    return len(aboard.crew) + len(aboard.passengers) + infants


def _advisories(declared: Declared, states: Mapping[Phase, State], ready: Prepared) -> list[str]:
    """Return the few lines that are told without a verdict, each with a figure."""
    found = return_advisory(declared, states, ready) if states else []
    found += fitted_lines(declared, ready)
    if declared.sequence:
        count = len(declared.sequence)
        events = "1 event" if count == 1 else f"{count} events"
        found.append(f"{events} on the flight: landing is as after all of them, zero fuel as before any")
        if any(event.coming for event in declared.sequence):
            found.append("who and what comes aboard in flight is in no weight before that, take-off included")
    estimated = sum(item.how == "estimated" for item in declared.items)
    if estimated:
        found.append(f"{estimated} of {len(declared.items)} item weights are estimates")
    for held in declared.fuel.tanks:
        if held.trapped:
            found.append(f"{_volume(held.trapped)} {ready.volume} in {held.tank.name} cannot be used")
    return found


def _not_assessed(checks: tuple[Check, ...], computed: bool) -> list[str]:
    found = [] if computed else ["weights and centres of gravity: a figure they need is not known"]
    told = [check for check in checks if check.outcome == "advisory" and check.phase]
    return found + [f"{check.title}: {check.margin_text}" for check in told]


def _weight(weight: Fraction) -> str:
    return printed(weight, WEIGHT_PLACES)


def _volume(volume: Fraction) -> str:
    return printed(volume, VOLUME_PLACES)

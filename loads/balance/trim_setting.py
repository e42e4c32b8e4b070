"""The take-off trim setting of a load: from the basis's table, judged against the settings allowed."""

from fractions import Fraction
from typing import NamedTuple

from fleet.positions import PartState
from fleet.sourced import Source
from fleet.trim import OffTrimTable, Trim, TrimTable
from loads.balance.aboard import Declared
from loads.balance.prepared import Prepared
from loads.balance.result import Check, Json, Outcome, State
from loads.balance.rounding import CHORD_PLACES, WEIGHT_PLACES, between, printed

CODE, TITLE = "trim.take-off", "take-off trim setting"
MOST_PLACES = 6


class Setting(NamedTuple):
    """The setting for one flap setting (None: it does not depend on flaps); `exact` is None off the table,
    `why` then says how.
    """

    flap: str | None
    exact: Fraction | None
    shown: str | None
    why: str
    source: Source

    def words(self, unit: str) -> str:
        """Return it as it is read out: `flaps 10: 4.5 units nose up`."""
        said = f"{self.shown} {unit}" if self.shown is not None else self.why
        return f"flaps {self.flap}: {said}" if self.flap is not None else said


def trim_settings(declared: Declared, take_off: State, ready: Prepared) -> tuple[Setting, ...]:
    """Return the setting of each flap setting the basis has a table for, or of the one the load states for
    the take-off; () without a table.
    """
    trim = ready.basis.trim
    if trim is None:
        return ()
    flaps = [table.flap for table in trim.tables if table.flap is not None]
    stated = _stated(declared, flaps) if flaps and declared.sequence else None
    if stated is None:
        return tuple(_setting(table, trim, take_off, ready) for table in trim.tables)
    wanted = [table for table in trim.tables if table.flap in (stated.name, stated.id)]
    if not wanted:
        why = f"the table has settings for flaps {', '.join(flaps)} only"
        return (Setting(stated.name, None, None, why, trim.tables[0].lines[0].source),)
    return tuple(_setting(table, trim, take_off, ready) for table in wanted)


def _stated(declared: Declared, flaps: list[str]) -> PartState | None:
    """Return the state in which the load puts the flaps before take-off: the last one, of a part that has
    states by the names or ids of the tables; None where it says nothing of them.
    """
    found = None
    for event in declared.sequence:
        for part, state in event.positions if event.leg == "taxi" else ():
            if any(one.name in flaps or one.id in flaps for one in part.states):
                found = state
    return found


def trim_checks(declared: Declared, take_off: State, ready: Prepared) -> list[Check]:
    """Return the one check of the setting, [] without a table.

    It is kept when any flap setting that may be meant has one that is allowed; off every table it is
    unresolved.
    """
    trim, settings = ready.basis.trim, trim_settings(declared, take_off, ready)
    if trim is None:
        return []
    known = [each for each in settings if each.exact is not None]
    allowed = [each for each in known if _allowed(each, trim)]
    text = "; ".join(each.words(trim.unit) for each in settings)
    source = str((allowed or known or list(settings))[0].source)
    if not known:
        fix = "Bring the CG or the weight to where the table has a setting, or enter the rest of the table."
        blank = (None, None, None, trim.unit, None)
        return [Check(CODE, TITLE, "unresolved", "take-off", *blank, text, source, fix)]
    one = (allowed or known)[0]
    shown, low, high = one.shown, None, None
    if one.exact is not None and trim.lowest is not None and trim.highest is not None:
        places = _places(trim.step)
        judged, low, high, _ = between(one.exact, trim.lowest, trim.highest, places)
        source = str(trim.source)
        if not allowed:
            shown = judged
            text = f"{judged} {trim.unit}, outside the settings allowed for take-off"
    outcome: Outcome = "pass" if allowed else "fail"
    fix = "" if allowed else "Move weight so that the setting comes into the range."
    return [Check(CODE, TITLE, outcome, "take-off", shown, high, low, trim.unit, None, text, source, fix)]


def trim_document(declared: Declared, take_off: State | None, ready: Prepared) -> Json | None:
    """Return the block of the result document; None without a table, or where the CG is not known."""
    trim = ready.basis.trim
    if trim is None or take_off is None:
        return None
    return {
        "unit": trim.unit,
        "settings": [
            {"flap": one.flap, "setting": one.shown, "why": one.why, "source": str(one.source)}
            for one in trim_settings(declared, take_off, ready)
        ],
    }


def _allowed(setting: Setting, trim: Trim) -> bool:
    if setting.exact is None or trim.lowest is None or trim.highest is None:
        return setting.exact is not None
    return trim.lowest <= setting.exact <= trim.highest


def _setting(table: TrimTable, trim: Trim, take_off: State, ready: Prepared) -> Setting:
    source = table.lines[0].source
    cg = take_off.arm if trim.against == "arm" else ready.chord_percent(take_off.arm)
    if cg is None:
        return Setting(table.flap, None, None, "the basis has no chord", source)
    try:
        exact = table.setting(cg, take_off.weight)
    except OffTrimTable as off:
        unit, places = ready.weight, WEIGHT_PLACES
        if off.of == "CG":
            arms = trim.against == "arm"
            unit, places = (ready.length, ready.length_places) if arms else ("%", CHORD_PLACES)
        at, first, last = (printed(figure, places) for figure in (off.at, off.first, off.last))
        what = "the CG" if off.of == "CG" else "the weight"
        why = f"{what} of {at} {unit} is outside the table, {first} to {last} {unit}"
        return Setting(table.flap, None, None, why, source)
    return Setting(table.flap, exact, printed(trim.stepped(exact), _places(trim.step)), "", source)


def _places(step: Fraction) -> int:
    """Return how many decimals a step is printed with."""
    return next(
        (places for places in range(MOST_PLACES) if (step * 10**places).denominator == 1), MOST_PLACES
    )

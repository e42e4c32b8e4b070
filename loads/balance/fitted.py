"""Reading what is fitted on the day: the conditions that hold, and where seats stand on their rails."""

from dataclasses import replace
from fractions import Fraction

from fleet.basis import Basis, Seat
from fleet.stations import Condition
from loads.balance.aboard import Declared
from loads.balance.fields import Fields
from loads.balance.prepared import Prepared
from loads.balance.rounding import printed

FITTED_FIELDS = ("conditions", "seat_settings")
SETTING_FIELDS = ("setting",)
SETTING_OPTIONAL = ("seat", "row")
LONGEST_ID = 64
LONGEST_ROW = 120
MOST_CONDITIONS = 60
MOST_SETTINGS = 400


def read_conditions(fields: Fields, basis: Basis) -> tuple[Condition, ...]:
    """Return the conditions declared to hold; one the basis does not name is a fault. Not declared: it does
    not hold.
    """
    if "conditions" not in fields:
        return ()
    known = {condition.id: condition for condition in basis.conditions}
    found = []
    for pointer, word in fields.words("conditions", MOST_CONDITIONS, LONGEST_ID):
        if word in known:
            found.append(known[word])
        else:
            has = ", ".join(known) or "none"
            fields.note_at(pointer, "unknown-condition", f"no such condition; the basis has {has}")
    return tuple(found)


def read_settings(fields: Fields, basis: Basis) -> tuple[tuple[Seat, str], ...]:
    """Return the seats whose setting on the rail is stated, as they then stand, each with the setting's name.

    A line states the setting of one seat, or of every seat on a rail in a row.
    """
    found: dict[str, tuple[Seat, str]] = {}
    for line in fields.objects("seat_settings", MOST_SETTINGS, SETTING_FIELDS, SETTING_OPTIONAL):
        setting = line.text("setting", LONGEST_ID)
        for seat in _seats_of(line, basis):
            if seat.id in found:
                detail = f"the setting of {seat.name} is already stated; keep one line"
                line.note("seat" if "seat" in line else "row", "setting-twice", detail)
            elif setting is not None and seat.rail is not None:
                arm = next((each.arm for each in seat.rail.settings if each.name == setting), None)
                if arm is None:
                    has = ", ".join(each.name for each in seat.rail.settings) or "no named settings"
                    line.note("setting", "unknown-setting", f"no such setting; {seat.name} has {has}")
                else:
                    found[seat.id] = (replace(seat, arm=arm, rail=None), setting)
    return tuple(found.values())


def fitted_lines(declared: Declared, ready: Prepared) -> list[str]:
    """Return in words what was declared to be fitted, and which seats on rails nobody stated, with the ends
    of the rail, so that both can be redone by hand.
    """
    found = [f"declared as fitted: {condition.name}" for condition in declared.conditions]
    if declared.settings:
        stated = ", ".join(f"{seat.name} at {setting}" for seat, setting in declared.settings)
        found.append(f"seats on rails: {stated}")
    people = (*declared.crew, *declared.passengers)
    open_ended = [
        f"{person.seat.name} {_arm(person.seat.rail.forward, ready)} to {_arm(person.seat.rail.aft, ready)}"
        for person in people
        if person.seat.rail is not None
    ]
    if open_ended:
        ends = ", ".join(open_ended)
        found.append(f"both ends of the rail checked, no setting stated: {ends} {ready.length}")
    return found


def _arm(arm: Fraction, ready: Prepared) -> str:
    return printed(arm, ready.length_places)


def settings_form(fields: Fields) -> None:
    """Note what of these fields can be seen to be wrong without a basis."""
    if "conditions" in fields:
        fields.words("conditions", MOST_CONDITIONS, LONGEST_ID)
    for line in fields.objects("seat_settings", MOST_SETTINGS, SETTING_FIELDS, SETTING_OPTIONAL):
        line.text("setting", LONGEST_ID)
        _named(line)


def _named(line: Fields) -> tuple[str | None, str | None]:
    seat, row = line.text("seat", LONGEST_ID), line.text("row", LONGEST_ROW)
    if ("seat" in line) == ("row" in line):
        line.note("seat", "seat-or-row", "a line is for one seat or for one row; state one of the two")
        return None, None
    return seat, row


def _seats_of(line: Fields, basis: Basis) -> tuple[Seat, ...]:
    """Return the seats on rails that a line is for, noting what the basis does not have."""
    wanted, row = _named(line)
    if wanted is not None:
        named = [seat for seat in basis.seats if seat.id == wanted]
        if not named:
            line.note("seat", "unknown-seat", "no such seat in the basis; correct it")
    elif row is not None:
        named = [seat for seat in basis.seats if seat.row == row]
        if not named:
            rows = ", ".join(dict.fromkeys(seat.row for seat in basis.seats if seat.row)) or "no rows"
            line.note("row", "unknown-row", f"no such row; the basis has {rows}")
    else:
        return ()
    on_rails = tuple(seat for seat in named if seat.rail is not None)
    if named and not on_rails:
        field = "seat" if wanted is not None else "row"
        line.note(field, "not-on-a-rail", "does not stand on a rail, so it has no setting; remove the line")
    return on_rails

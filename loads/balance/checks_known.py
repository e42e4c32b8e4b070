"""Checks of what must be known before a sum means anything: the standing records, every weight, the count of
people.
"""

from fractions import Fraction

from fleet.basis import Basis
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared
from loads.balance.checks_lateral import AT
from loads.balance.fuel import FuelOffTable
from loads.balance.over_flight import coming_items, coming_people
from loads.balance.prepared import Prepared
from loads.balance.result import Check
from loads.balance.rounding import LENGTH_PLACES, MOMENT_PLACES, VOLUME_PLACES, WEIGHT_PLACES, printed


def no_basis() -> Check:
    """Return the check of an aircraft without a loading basis in force."""
    return Check(
        "standing.loading-basis",
        "loading basis in force",
        "unresolved",
        margin_text="no loading basis in force",
        what_next="Enter and approve a loading basis that holds at the departure, then assess again.",
    )


def empty_weight_check(empty: EmptyFigures | None, basis: Basis, fit: str) -> Check:
    """Return whether an empty weight is in force that fits: measured from the basis's datum, on this fit."""
    code, title = "standing.empty-weight", "empty weight in force"
    if empty is None:
        why, fix = "no empty weight in force", "Enter and approve an empty weight that holds at the departure"
    elif empty.datum != basis.datum:
        why = f"the empty weight is measured from '{empty.datum}', the loading basis from '{basis.datum}'"
        fix = "Enter the empty weight from the datum of the loading basis"
    elif empty.fit != fit:
        why = f"the empty weight is on {empty.fit}, the configuration is flown on {fit}"
        fix = "Enter the empty weight on the fit of this configuration"
    else:
        return Check(code, title, "pass", margin_text=f"{empty.how}, on {empty.fit}{_restated(empty, basis)}")
    return Check(code, title, "unresolved", margin_text=why, what_next=f"{fix}, then assess again.")


def _restated(empty: EmptyFigures, basis: Basis) -> str:
    """Return the working of an empty weight from another datum; "" where it counts from the basis's own."""
    other = empty.restated
    if other is None:
        return ""
    moment = f"{basis.weight_unit.value} {basis.length_unit.value}"
    places, arms = MOMENT_PLACES[basis.length_unit], LENGTH_PLACES[basis.length_unit]
    weight, offset = printed(empty.weight, WEIGHT_PLACES), printed(other.offset, arms)
    sum_ = f"{printed(other.moment, places)} + {weight} x {offset}"
    here = f"{printed(empty.moment, places)} {moment} from '{basis.datum}'"
    return f"; restated from '{other.datum}': {sum_} = {here} ({other.source})"


def weight_knowledge(declared: Declared) -> list[Check]:
    """Return the checks that every weight is known, and that no person's is only an estimate, unless the
    operator's procedure allows that.

    Standard weights need an approved table; without one each leaves a load unresolved.
    """
    people = (*declared.crew, *declared.passengers, *coming_people(declared))
    items = (*declared.items, *coming_items(declared))
    unknown = [person.seat.name for person in people if person.weight is None]
    unknown += [item.place.name for item in items if item.weight is None]
    estimated = [person.seat.name for person in people if person.how == "estimated"]
    estimated += [
        f"{person.seat.name} (lap infant)"
        for person in people
        if person.lap_infant is not None and person.lap_infant.how == "estimated"
    ]
    found = [Check("weights.unknown", "every weight is known", "pass", margin_text="all weights are known")]
    if unknown:
        where = ", ".join(unknown)
        use = declared.standards
        found[0] = Check(
            "weights.unknown",
            "every weight is known",
            "unresolved",
            actual=str(len(unknown)),
            margin_text=f"standard weights without an approved table: {where}"
            if use is None
            else f"not known from the table in force: {where}",
            what_next=f"Weigh or declare: {where}. Or have a table of standard weights approved.",
        )
    if estimated:
        where = ", ".join(estimated)
        if allowed := declared.circumstances.estimates:
            found.append(_estimates_allowed(estimated, allowed))
            return found
        found.append(
            Check(
                "weights.estimated",
                "no person's weight is an estimate",
                "unresolved",
                actual=str(len(estimated)),
                margin_text=f"estimated: {where}",
                what_next=f"Weigh or declare: {where}.",
            )
        )
    return found


def _estimates_allowed(where: list[str], by: str) -> Check:
    return Check(
        "weights.estimated",
        "estimates of people's weights are in the procedure",
        "pass",
        actual=str(len(where)),
        margin_text=f"estimated: {', '.join(where)}; the operator's procedure allows it",
        source=by,
    )


def nothing_left_check(least: Fraction, ready: Prepared) -> Check:
    """Return the failing check of a load from which more was taken out than it weighs."""
    return Check(
        "weight.total",
        "weight of the aircraft",
        "fail",
        None,
        printed(least, WEIGHT_PLACES),
        None,
        "0",
        ready.weight,
        margin_text="more is taken out than the aircraft weighs",
        what_next="Correct the weights of the equipment that is not aboard.",
    )


def persons_check(declared: Declared) -> Check:
    """Return whether as many people are aboard as the load says: crew, passengers and lap infants."""
    infants = sum(person.lap_infant is not None for person in declared.passengers)
    listed = len(declared.crew) + len(declared.passengers) + infants
    code, title, said = "persons.count", "persons on board", str(declared.persons_on_board)
    if listed == declared.persons_on_board:
        return Check(code, title, "pass", None, str(listed), said, said, "persons", "0", "as declared")
    text = f"{listed} listed, {said} declared"
    fix = "Count again, and correct the list or the number."
    return Check(code, title, "fail", None, str(listed), said, said, "persons", None, text, what_next=fix)


def off_table_check(off: FuelOffTable, ready: Prepared) -> Check:
    """Return the check of a tank whose table does not cover what it holds at some phase or event."""
    tank = next(one for one in ready.basis.tanks if one.id == off.tank)
    first, last, volume = (printed(figure, VOLUME_PLACES) for figure in (off.first, off.last, off.volume))
    phase = None if isinstance(off.at, int) else off.at
    where = f" at event {off.at}" if phase is None else AT[phase]
    text = f"{volume} {ready.volume}{where} is off the table, which runs from {first} to {last}"
    fix = f"Change the fuel of {tank.name}, or enter the rest of its table in the loading basis."
    return Check(
        f"tank-table.{tank.id}",
        f"{tank.name}, table of arms",
        "unresolved",
        phase,
        volume,
        last,
        first,
        ready.volume,
        margin_text=text,
        source=str(tank.source),
        what_next=fix,
    )

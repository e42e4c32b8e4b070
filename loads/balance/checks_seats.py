"""Checks of who may sit where, as far as the basis marks seats: exit rows, and restraints for infants.

That no child and no infant sits at an emergency exit is common practice; the operator's rules decide. A basis
that marks no exit row, and no seat without a restraint, has no such check.
"""

from loads.balance.aboard import Declared, Person
from loads.balance.plausible import CHILD_CATEGORIES
from loads.balance.prepared import Prepared
from loads.balance.result import Check

YOUNG = frozenset(CHILD_CATEGORIES)
SOURCE = "common practice; the operator's rules decide"


def seat_checks(declared: Declared, ready: Prepared) -> list[Check]:
    """Return the checks of the seats that are taken and marked."""
    found = []
    people = declared.passengers
    at_exits = [person for person in people if person.seat.exit_row]
    if at_exits:
        young = [person.seat.name for person in at_exits if _is(person, YOUNG) or person.lap_infant]
        found.append(_check("seats.exit-row", "no child or infant at an exit", young, "seat at an exit"))
    infants = [person for person in people if person.lap_infant or _is(person, frozenset({"infant"}))]
    marked = any(seat.infant_restraint is not None for seat in ready.basis.seats)
    if infants and marked:
        without = [person.seat.name for person in infants if person.seat.infant_restraint is False]
        title = "infants only where a restraint can be fixed"
        found.append(
            _check("seats.infant-restraint", title, without, "seat without a restraint for an infant")
        )
    return found


def _is(person: Person, categories: frozenset[str]) -> bool:
    return person.category is not None and person.category.casefold() in categories


def _check(code: str, title: str, seats: list[str], where: str) -> Check:
    if not seats:
        return Check(code, title, "pass", margin_text="as declared", source=SOURCE)
    named = ", ".join(seats)
    return Check(
        code,
        title,
        "fail",
        actual=str(len(seats)),
        limit="0",
        margin_text=f"{where}: {named}",
        source=SOURCE,
        what_next=f"Give another seat to the child or infant in {named}.",
    )

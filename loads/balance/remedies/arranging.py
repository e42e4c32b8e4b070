"""People and items that change their seats and places: which smallest set of moves brings a load within.

Nothing leaves the aircraft, so its weights stay and one moment is added to the whole path along the aircraft
and one across it (see `reach`). That makes seats and places a linear mixed-integer program: who sits where
(0 or 1), how many tenths of an item go where, and which of the allowed intervals of moment is reached. Two
programs are solved, one after the other: the fewest that move; then, with no more than these, the least
weight that moves. What is found is assessed; where it does not hold for a reason the program does not know,
that very set of moves is ruled out and the next best is asked for.
"""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from math import ceil, floor

from fleet.basis import Place, Seat
from fleet.sourced import Limit
from loads.balance.aboard import Item, Person
from loads.balance.checks_places import held_by
from loads.balance.remedies.moving_more import more_moved
from loads.balance.remedies.program import Number, Outcome, Program, Solution
from loads.balance.remedies.question import BY_PEOPLE_ALONE, NOT_BY_LOADING, TENTH, Question
from loads.balance.remedies.reach import Interval, Ways
from loads.balance.remedies.steps import Reseat, Shift, Step, taken
from loads.balance.remedies.suiting import fixed_lines, free_seats, suits
from loads.balance.result import Result

PARTED = frozenset({"baggage", "cargo", "ballast", "consumable"})
MOST_TRIED = 40


@dataclass(frozen=True, slots=True)
class Found:
    """Moves that bring a load within, and the result with them; `proven`: no smaller set of moves does."""

    steps: tuple[Step, ...]
    result: Result
    proven: bool


@dataclass
class _Table:
    """The program with what its columns mean."""

    program: Program = field(default_factory=Program)
    seats: dict[int, tuple[Person, Seat]] = field(default_factory=dict)
    moves: dict[int, tuple[Item, Place, int]] = field(default_factory=dict)  # switch: item, place, its tenths
    along: dict[int, Number] = field(default_factory=dict)
    across: dict[int, Number] = field(default_factory=dict)
    more: dict[str, dict[int, Number]] = field(default_factory=dict)  # by seat or place: what comes or goes


def arranged(question: Question, ways: Ways, *, people: bool, items: bool) -> Found | None:
    """Return the smallest set of moves of people, of items, or of both, that brings the load within; None
    when there is none, or none was found in time.
    """
    if ways.along == () or ways.across == () or not _mendable(question, people=people):
        return None
    table = table_of(question, ways, people=people, items=items)
    if not table.seats and not table.moves:
        return None
    proven = True
    for _ in range(MOST_TRIED):
        solution = _smallest(table, question)
        if not isinstance(solution, Solution):
            return None
        proven = proven and solution.proven
        chosen = [column for column in (*table.seats, *table.moves) if solution.is_on(column)]
        steps = _steps(table, solution, chosen)
        result = question.assessed(taken(question.declared, steps))
        if result.verdict == "within":
            return Found(steps, result, proven)
        if (more := more_moved(question, steps)) is not None:
            return Found(*more, proven=False)  # others might do with less
        # With parts of items, other amounts of the same moves might have held: then it is the best found.
        proven = proven and not any(column in table.moves for column in chosen)
        others = [column for column in (*table.seats, *table.moves) if column not in set(chosen)]
        ruled_out: dict[int, Number] = {**dict.fromkeys(chosen, 1), **dict.fromkeys(others, -1)}
        table.program.row(ruled_out, high=len(chosen) - 1)
    return None


def _mendable(question: Question, *, people: bool) -> bool:
    """Return whether moving what is aboard can mend every limit that is broken."""
    low, high = question.weight_range()
    if (low is not None and low > 0) or (high is not None and high < 0):
        return False
    others = NOT_BY_LOADING if people else (*NOT_BY_LOADING, *BY_PEOPLE_ALONE)
    return not question.breaks(*others)


def table_of(question: Question, ways: Ways, *, people: bool, items: bool) -> _Table:
    """Return the program: one cost for each that moves."""
    table = _Table()
    if people:
        _seat_columns(table, question)
    if items:
        _item_columns(table, question)
    _held_rows(table, question)
    for moments, axis in ((table.along, ways.along), (table.across, ways.across)):
        if axis is not None:
            _reach_one(table.program, moments, axis)
    return table


def _smallest(table: _Table, question: Question) -> Outcome:
    """Return the solution with the fewest moves, and of these the one that moves the least weight."""
    program = table.program
    fewest = program.solve(question.left())
    if not isinstance(fewest, Solution):
        return fewest
    count = round(fewest.best)
    whole = sum((_weight(person) for person, _ in table.seats.values()), Fraction(0))
    whole += sum((item.weight or Fraction(0) for item, _, _ in table.moves.values()), Fraction(0))
    least = Program(**{name: list(part) for name, part in vars(program).items()})
    least.row(dict.fromkeys((*table.seats, *table.moves), 1), high=count)
    for column, (person, _) in table.seats.items():
        least.costs[column] = float(_weight(person) / whole)
    for column, (_, _, tenths) in table.moves.items():
        least.costs[column] = 0.0
        least.costs[tenths] = float(TENTH / whole)
    solution = least.solve(question.left())
    if isinstance(solution, Solution):
        return solution._replace(proven=solution.proven and fewest.proven)
    return fewest._replace(proven=False)


def _seat_columns(table: _Table, question: Question) -> None:
    """Add who can go where. Whoever stays has no column, so every column that is on is a move."""
    declared, program = question.declared, table.program
    held = held_by(declared)
    open_to = free_seats(declared, question.ready.basis.seats)
    passengers = {person.seat.id: person for person in declared.passengers}
    arriving: dict[str, dict[int, Number]] = {seat.id: {} for seat in open_to}
    leaving: dict[str, dict[int, Number]] = {seat.id: {} for seat in open_to}
    fixed = fixed_lines(declared)
    for person in declared.passengers:
        weight = held.get(person.seat.id)
        if weight is None or person.weight is None or person.pointer in fixed:
            continue
        for seat in open_to:
            if seat.id != person.seat.id and suits(seat, person) and _bears(seat, weight):
                column = program.switch(1)
                table.seats[column] = person, seat
                _put(table, column, weight, person.seat, seat)
                arriving[seat.id][column] = 1
                leaving.setdefault(person.seat.id, {})[column] = 1
    for seat in open_to:
        # Who comes needs the seat empty: taken now, somebody has to leave it; and nobody goes to two seats.
        comes, goes = arriving[seat.id], leaving.get(seat.id, {})
        if seat.id in passengers:
            program.row(goes, high=1)
            program.row({**comes, **dict.fromkeys(goes, -1)}, high=0)
        elif len(comes) > 1:
            program.row(comes, high=1)


def _item_columns(table: _Table, question: Question) -> None:
    """Add what can go where: a switch for each way, and whole tenths of a weight behind it."""
    declared, program = question.declared, table.program
    open_to = [
        place
        for place in question.ready.basis.places
        if place.id in set(declared.configuration.places) and not place.external
    ]
    fixed = fixed_lines(declared)
    for item in declared.items:
        if not is_movable(item) or item.weight is None or item.pointer in fixed or item.place.external:
            continue
        parts: dict[int, Number] = {}
        for place in open_to:
            if place.id == item.place.id or place.maximum is None:
                continue
            switch = program.switch(1)
            if can_be_parted(item):
                most = max(floor(item.weight / TENTH), 1)
                column, each = program.column(0, 0, most, whole=True), min(TENTH, item.weight)
                program.row({column: 1, switch: -most}, high=0)
            else:
                most, column, each = 1, switch, item.weight
            parts[column] = Fraction(1, most)
            table.moves[switch] = item, place, column
            _put(table, column, each, item.place, place)
        if len(parts) > 1:
            program.row(parts, high=1)


def _held_rows(table: _Table, question: Question) -> None:
    """Add what places and zones may hold; what a seat bears was asked before its column was made."""
    held = held_by(question.declared)
    basis = question.ready.basis
    spots: list[tuple[Limit | None, tuple[str, ...]]] = [
        (place.maximum, (place.id,)) for place in basis.places
    ]
    spots += [(zone.maximum, zone.members) for zone in basis.zones]
    for maximum, members in spots:
        if maximum is None or maximum.value is None:
            continue
        parts: dict[int, Number] = {}
        for member in members:
            for column, each in table.more.get(member, {}).items():
                parts[column] = Fraction(parts.get(column, 0)) + Fraction(each)
        now = sum((held.get(member) or Fraction(0) for member in members), Fraction(0))
        if any(parts.values()):
            table.program.row(parts, high=maximum.value - now)


def _reach_one(program: Program, moments: Mapping[int, Number], ways: tuple[Interval, ...]) -> None:
    """Add that the moment moved lies in one of these intervals."""
    if len(ways) == 1:
        program.row(moments, *ways[0])
        return
    switches = [program.switch() for _ in ways]
    program.row(dict.fromkeys(switches, 1), low=1, high=1)
    lows = {switch: -low for switch, (low, _) in zip(switches, ways, strict=True)}
    highs = {switch: -high for switch, (_, high) in zip(switches, ways, strict=True)}
    program.row({**moments, **lows}, low=0)
    program.row({**moments, **highs}, high=0)


def _put(table: _Table, column: int, weight: Fraction, start: Seat | Place, end: Seat | Place) -> None:
    table.along[column] = weight * (end.arm - start.arm)
    table.across[column] = weight * (end.lateral_arm - start.lateral_arm)
    table.more.setdefault(start.id, {})[column] = -weight
    table.more.setdefault(end.id, {})[column] = weight


def _steps(table: _Table, solution: Solution, chosen: list[int]) -> tuple[Step, ...]:
    return tuple(_each_step(table, solution, chosen))


def _each_step(table: _Table, solution: Solution, chosen: list[int]) -> Iterator[Step]:
    gone: dict[int, Fraction] = {}
    for column in chosen:
        if column in table.seats:
            yield Reseat(*table.seats[column])
            continue
        item, place, tenths = table.moves[column]
        whole = item.weight or Fraction(0)
        weight = whole
        if tenths != column:
            amount = round(solution.values[tenths])
            # The last tenth takes what is left of a weight that is no whole number of tenths.
            weight = whole if amount >= floor(whole / TENTH) else amount * TENTH
            weight = min(weight, whole - gone.get(id(item), Fraction(0)))
            gone[id(item)] = gone.get(id(item), Fraction(0)) + weight
        if weight > 0:
            yield Shift(item, place, weight)


def _weight(person: Person) -> Fraction:
    infant = person.lap_infant
    own = person.weight or Fraction(0)
    return (
        own + (infant.weight or Fraction(0) if infant is not None else Fraction(0)) + (person.restraint or 0)
    )


def _bears(seat: Seat, weight: Fraction) -> bool:
    """Return whether a seat is known to bear a weight; a limit that was not entered is not known."""
    return seat.maximum is not None and (seat.maximum.value is None or weight <= seat.maximum.value)


def is_movable(item: Item) -> bool:
    """Return whether an item may be moved or left: what was taken out of the empty weight is not aboard."""
    return not item.removed


def can_be_parted(item: Item) -> bool:
    """Return whether a part of it may go elsewhere: not of equipment, nor of what stands on a pallet."""
    return item.kind in PARTED and item.contact is None and not item.rigging


def tenths_up(amount: Fraction) -> int:
    """Return an amount in whole tenths, rounded up."""
    return ceil(amount / TENTH)

"""The single steps a remedy is made of, and the load with them taken. Nothing here judges.

A weighed figure is never changed: what is parted from a line is another line, and the two add up to it.
"""

from collections.abc import Iterable
from dataclasses import dataclass, replace
from fractions import Fraction

from fleet.basis import Configuration, Place, Seat, Tank
from loads.balance.aboard import Declared, Item, Person


@dataclass(frozen=True, slots=True)
class Reseat:
    """A passenger goes to another seat, with the infant on the lap, if there is one."""

    person: Person
    end: Seat


@dataclass(frozen=True, slots=True)
class Shift:
    """All of an item, or a part of it, goes to another place."""

    item: Item
    end: Place
    weight: Fraction

    @property
    def whole(self) -> bool:
        """Whether nothing of it stays behind."""
        return self.weight == self.item.weight


@dataclass(frozen=True, slots=True)
class Take:
    """All of an item, or a part of it, stays on the ground."""

    item: Item
    weight: Fraction

    @property
    def whole(self) -> bool:
        """Whether nothing of it stays aboard."""
        return self.weight == self.item.weight


@dataclass(frozen=True, slots=True)
class Ballast:
    """Ballast that is loaded as a line of its own."""

    place: Place
    weight: Fraction


@dataclass(frozen=True, slots=True)
class Refuel:
    """More (above 0) or less usable fuel in a tank at engine start, by volume."""

    tank: Tank
    volume: Fraction


@dataclass(frozen=True, slots=True)
class Refit:
    """Another configuration; everybody and everything stays where it is."""

    configuration: Configuration


@dataclass(frozen=True, slots=True)
class Leave:
    """A passenger stays on the ground. Which one is not for a program to say: this is never shown."""

    person: Person


Step = Reseat | Shift | Take | Ballast | Refuel | Refit | Leave


def taken(declared: Declared, steps: Iterable[Step]) -> Declared:
    """Return the load with these steps taken."""
    for step in steps:
        match step:
            case Reseat(person, end):
                moved = [replace(one, seat=end) if one is person else one for one in declared.passengers]
                declared = replace(declared, passengers=tuple(moved))
            case Shift(item, end, weight):
                there = replace(item, place=end, weight=weight)
                declared = replace(declared, items=tuple(_parted(declared.items, item, weight, there)))
            case Take(item, weight):
                declared = replace(declared, items=tuple(_parted(declared.items, item, weight, None)))
            case Ballast(place, weight):
                line = Item("ballast", "ballast", place, weight, "weighed", False, "")  # not removed
                declared = replace(declared, items=(*declared.items, line))
            case Refuel(tank, volume):
                held = [
                    replace(one, usable=one.usable + volume) if one.tank.id == tank.id else one
                    for one in declared.fuel.tanks
                ]
                declared = replace(declared, fuel=replace(declared.fuel, tanks=tuple(held)))
            case Refit(configuration):
                declared = replace(declared, configuration=configuration)
            case Leave(person):
                declared = _without(declared, person)
    return declared


def _parted(items: Iterable[Item], item: Item, weight: Fraction, there: Item | None) -> Iterable[Item]:
    for one in items:
        if one.pointer != item.pointer or one.place is not item.place:
            yield one
            continue
        left = (one.weight or weight) - weight
        if left:
            yield replace(one, weight=left)
        if there is not None:
            yield there


def _without(declared: Declared, person: Person) -> Declared:
    gone = 1 + (person.lap_infant is not None)
    return replace(
        declared,
        passengers=tuple(one for one in declared.passengers if one is not person),
        persons_on_board=declared.persons_on_board - gone,
    )

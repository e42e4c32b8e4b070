"""Restrictions and permits of one aircraft, and what they make of its loading basis for a time.

A restriction tightens: a limit or maximum lowered, a seat blocked, a place closed, fuel that cannot be used,
a narrower envelope beside the basis's own. A permit replaces the limit, maximum or envelope it names. Permits
are put in first; then the tightest of what remains wins, so no permit loosens a restriction. All exact.
"""

from collections import OrderedDict
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field, fields, replace
from datetime import datetime
from decimal import Decimal
from fractions import Fraction
from typing import Final, Literal, TypeVar

from fleet.basis import Basis, Configuration, Envelope, Limits, Place, Seat, Zone
from fleet.conversion import in_unit
from fleet.envelope import NotAnEnvelope
from fleet.polygon import Point
from fleet.quantities import LENGTHS, MOMENT_OF, Quantity, Unit
from fleet.sourced import Limit, Source
from fleet.stations import Conditional

LIMIT_WORDS: Final[Mapping[str, str]] = {
    "ramp": "maximum ramp weight",
    "take_off": "maximum take-off weight",
    "zero_fuel": "maximum zero fuel weight",
    "landing": "maximum landing weight",
    "minimum_flying": "minimum flying weight",
    "with_external_load": "maximum weight with an external load",
}
LEAST: Final = "minimum_flying"  # the one limit that tightens upward
HIGHER: Final = "with_external_load"  # the one limit above the others, which not every manual has
MOST_KEPT: Final = 64
_Held = TypeVar("_Held", Seat, Place, Zone)


@dataclass(frozen=True, slots=True)
class Effect:
    """One thing a restriction or permit does, to what it names: a limit, or ids of the basis.

    `amount` is the limit, or the fuel that cannot be used; `points` are (arm or moment, weight) in `units`.
    """

    effect: Literal["limit", "maximum", "seats", "places", "fuel", "envelope"]
    names: tuple[str, ...]
    amount: Quantity | None = None
    points: tuple[tuple[Decimal, Decimal], ...] = ()
    units: tuple[Unit, Unit] | None = None


@dataclass(frozen=True, slots=True)
class Paper:
    """One restriction or permit as entered. `until` None: until it is lifted. `operations` () : all of them;
    `conditions` are what a permit demands besides, to be printed.
    """

    kind: Literal["restriction", "permit"]
    number: str
    what: str
    authority: str
    since: datetime
    until: datetime | None
    source: Source
    effects: tuple[Effect, ...]
    operations: tuple[str, ...] = ()
    conditions: tuple[str, ...] = ()

    @property
    def title(self) -> str:
        """What it is called in a sentence."""
        return f"{self.kind} {self.number}"


@dataclass(frozen=True, slots=True)
class Ruled:
    """A basis under restrictions and permits. `trapped`: volume in each tank that cannot be used.

    `lines` say for each paper what it does; `unmet` what a paper names and the basis does not have, which
    leaves a load unresolved.
    """

    basis: Basis
    trapped: Mapping[str, Fraction] = field(default_factory=dict)
    lines: tuple[tuple[str, ...], ...] = ()
    unmet: tuple[str, ...] = ()


_KEPT: "OrderedDict[tuple[int, tuple[Paper, ...]], tuple[Basis, Ruled]]" = OrderedDict()


def apply(basis: Basis, papers: tuple[Paper, ...]) -> Ruled:
    """Return the basis with the papers in it; the basis itself where there are none.

    The latest ones are kept, so that the same arguments give the very same object.
    """
    if not papers:
        return Ruled(basis)
    key = (id(basis), papers)
    kept = _KEPT.get(key)
    if kept is None or kept[0] is not basis:
        kept = (basis, _ruled(basis, papers))
        _KEPT[key] = kept
        while len(_KEPT) > MOST_KEPT:
            _KEPT.popitem(last=False)
    return kept[1]


def unknown_names(basis: Basis, effect: Effect) -> list[str]:
    """Return what an effect names and the basis does not have."""
    known = _known(basis)[effect.effect]
    return [name for name in effect.names if name not in known]


def _known(basis: Basis) -> dict[str, frozenset[str]]:
    seats, places, zones, tanks, envelopes = (
        frozenset(one.id for one in part)
        for part in (basis.seats, basis.places, basis.zones, basis.tanks, basis.envelopes)
    )
    return {
        # A lowered maximum with an external load must not make one where the manual gives none.
        "limit": frozenset(LIMIT_WORDS) - ({HIGHER} if basis.limits.with_external_load is None else set()),
        "maximum": seats | places | zones,
        "seats": seats,
        "places": places,
        "fuel": tanks,
        "envelope": envelopes,
    }


def _ruled(basis: Basis, papers: tuple[Paper, ...]) -> Ruled:
    first = [paper for paper in papers if paper.kind == "permit"]
    found, unmet, trapped = basis, [], dict[str, Fraction]()
    for paper in (*first, *(paper for paper in papers if paper.kind == "restriction")):
        for effect in paper.effects:
            missing = unknown_names(basis, effect)
            unmet += [
                f"{paper.title} names {name}, which the loading basis does not have" for name in missing
            ]
            if missing:
                continue
            if effect.effect == "fuel":
                volume = in_unit(_amount(effect), basis.volume_unit)
                trapped[effect.names[0]] = max(trapped.get(effect.names[0], Fraction(0)), volume)
                continue
            try:
                found = _PUT[effect.effect](found, basis, paper, effect)
            except NotAnEnvelope:
                unmet.append(f"the envelope of {paper.title} is none in the units of the loading basis")
    names = {
        one.id: one.name for part in (basis.seats, basis.places, basis.zones, basis.tanks) for one in part
    }
    lines = tuple(sentences(paper, names) for paper in papers)
    return Ruled(found, trapped, lines, tuple(unmet))


def _limit(found: Basis, before: Basis, paper: Paper, effect: Effect) -> Basis:
    name = effect.names[0]
    limit = Limit(in_unit(_amount(effect), before.weight_unit), _source(paper))
    # A configuration's own limit is not the one a permit names: it stays, and the tighter of the two wins.
    own = getattr(before.limits, name)

    def put(limits: Limits, was: Limits) -> Limits:
        held, first = getattr(limits, name), getattr(was, name)
        replaces = paper.kind == "permit" and held == first == own
        return replace(limits, **{name: limit if replaces else tighter(held, limit, least=name == LEAST)})

    befores = {one.id: one.limits for one in before.configurations}
    return replace(
        found,
        limits=put(found.limits, before.limits),
        configurations=tuple(
            replace(one, limits=put(one.limits, befores[one.id])) for one in found.configurations
        ),
    )


def tighter(one: Limit | None, other: Limit, *, least: bool = False) -> Limit:
    """Return the tighter of two limits; `least`: they are minima. What was not entered, or is none, is looser
    than any value.
    """
    if one is None or one.value is None or other.value is None:
        return other if other.value is not None or one is None else one
    closer = other.value > one.value if least else other.value < one.value
    return other if closer else one


def _maximum(found: Basis, before: Basis, paper: Paper, effect: Effect) -> Basis:
    limit = Limit(in_unit(_amount(effect), before.weight_unit), _source(paper))
    first = {one.id: one.maximum for part in (before.seats, before.places, before.zones) for one in part}

    def put(one: _Held) -> _Held:
        if one.id not in effect.names:
            return one
        if paper.kind == "permit":
            replaces = one.maximum == first[one.id]
            return replace(one, maximum=limit if replaces else tighter(one.maximum, limit))
        conditional = tuple(Conditional(each.when, tighter(each.maximum, limit)) for each in one.conditional)
        return replace(one, maximum=tighter(one.maximum, limit), conditional=conditional)

    return replace(
        found,
        seats=tuple(put(one) for one in found.seats),
        places=tuple(put(one) for one in found.places),
        zones=tuple(put(one) for one in found.zones),
    )


def _closed(found: Basis, _before: Basis, paper: Paper, effect: Effect) -> Basis:
    def without(one: Configuration) -> Configuration:
        return replace(
            one,
            seats=tuple(seat for seat in one.seats if seat not in effect.names),
            places=tuple(place for place in one.places if place not in effect.names),
        )

    return replace(
        found,
        configurations=tuple(without(one) for one in found.configurations),
        closed=(*found.closed, *((name, paper.title) for name in effect.names)),
    )


def _envelope(found: Basis, before: Basis, paper: Paper, effect: Effect) -> Basis:
    name = effect.names[0]
    own = next(one for one in before.envelopes if one.id == name)
    made = replace(own, points=corners_of(effect, own, before), source=_source(paper))
    if paper.kind == "restriction":
        return replace(found, envelopes=(*found.envelopes, replace(made, id=f"{name} {paper.number}")))
    kept: list[Envelope] = [made if one == own else one for one in found.envelopes]
    if own not in found.envelopes:  # two permits replace the same envelope: both hold
        kept.append(replace(made, id=f"{name} {paper.number}"))
    return replace(found, envelopes=tuple(kept))


def corners_of(effect: Effect, own: Envelope, basis: Basis) -> tuple[Point, ...]:
    """Return the corners an effect gives for an envelope of the basis, exactly, in the units of the basis."""
    if effect.units is None:
        raise TypeError("the reader gives an envelope its units")
    unit = basis.length_unit if own.plane == "arm" else MOMENT_OF[basis.weight_unit, basis.length_unit]
    return tuple(
        (
            in_unit(Quantity(across, effect.units[0]), unit),
            in_unit(Quantity(up, effect.units[1]), basis.weight_unit),
        )
        for across, up in effect.points
    )


_PUT: Final[Mapping[str, Callable[[Basis, Basis, Paper, Effect], Basis]]] = {
    "limit": _limit,
    "maximum": _maximum,
    "seats": _closed,
    "places": _closed,
    "envelope": _envelope,
}


def _amount(effect: Effect) -> Quantity:
    if effect.amount is None:
        raise TypeError("the reader gives this effect its amount")
    return effect.amount


def _source(paper: Paper) -> Source:
    return replace(paper.source, document=f"{paper.title}, {paper.source.document}")


def sentences(paper: Paper, names: Mapping[str, str]) -> tuple[str, ...]:
    """Return what each effect does, as people read it: amounts as typed, ids by name where one is known."""
    return tuple(_sentence(paper, effect, names) for effect in paper.effects)


def _sentence(paper: Paper, effect: Effect, known: Mapping[str, str]) -> str:
    names = ", ".join(known.get(name, name) for name in effect.names)
    amount = "" if effect.amount is None else f"{effect.amount.value:f} {effect.amount.unit.value}"
    permitted = " permitted" if paper.kind == "permit" else ""
    match effect.effect:
        case "limit":
            return f"{LIMIT_WORDS[effect.names[0]]} {amount}{permitted}"
        case "maximum":
            return f"at most {amount} in {names}{permitted}"
        case "seats":
            return f"{names} blocked"
        case "places":
            return f"{names} closed"
        case "fuel":
            return f"{amount} in {names} cannot be used"
        case _:
            return f"envelope {names} {'replaced' if permitted else 'narrowed'}"


def is_of(unit: Unit, plane: Literal["arm", "moment"]) -> bool:
    """Return whether a unit measures what stands across an envelope that is straight in this plane."""
    return unit in LENGTHS if plane == "arm" else unit in MOMENT_OF.values()


def limit_names() -> tuple[str, ...]:
    """Return the limits a paper may name."""
    return tuple(one.name for one in fields(Limits))

"""Legs as linked loads: which load a leg follows, which follow it, and what fuel is planned in between."""

from dataclasses import dataclass, replace
from datetime import datetime
from uuid import UUID

from fleet.basis import Basis
from fleet.conversion import converted
from fleet.models import Aircraft
from fleet.queries.figures import basis_of
from loads.balance.aboard import Flight, FuelPlan
from loads.balance.exact import added
from loads.balance.fields import Faults, Fields
from loads.balance.fuelling import read_fuel
from loads.balance.rounding import WEIGHT_PLACES, printed
from loads.lifecycle import GONE
from loads.models import Assessment, Leg, Load
from loads.queries.current import Current, load_of
from loads.queries.declaration import declared_now
from records.refusal import Fault, Invalid, NotKnown

POINTER = "/flight/follows"


@dataclass(frozen=True, slots=True)
class Link:
    """Another leg, as people read it: the load, its flight, its state."""

    load: UUID
    words: str
    state: str


def leg_before(operator: str, aircraft: Aircraft, flight: Flight) -> Current | None:
    """This function will return the load that a flight says it follows; None where it says nothing.

    Raises Invalid, naming the field, for a load nobody knows, of another aircraft, that ends elsewhere or
    does not depart before.
    """
    if flight.follows is None:
        return None
    try:
        found = load_of(operator, UUID(flight.follows))
    except NotKnown:
        raise _refused("unknown-load", "no load has this id; write the id of the leg before") from None
    before = found.load
    if before.aircraft_id != aircraft.id:
        detail = "that load is of another aircraft; a leg follows one of the same aircraft"
        raise _refused("leg-of-another-aircraft", detail)
    if before.destination != flight.origin:
        detail = f"that leg ends at {before.destination}, this one begins at {flight.origin}; correct one"
        raise _refused("leg-ends-elsewhere", detail)
    if before.departure >= flight.departure:
        detail = f"that leg departs at {before.departure_text}, not before this one; correct one of the two"
        raise _refused("leg-not-before", detail)
    return found


def demand_standing(before: Current | None) -> None:
    """This function will refuse, with Invalid, to follow a load that was replaced or withdrawn."""
    if before is not None and before.state in GONE:
        detail = f"that load is {before.state}; name the load of the leg before that stands"
        raise _refused("leg-not-standing", detail)


def follows(load: Load) -> Link | None:
    """This function will return the leg a load follows, if it says one."""
    leg = Leg.objects.filter(load=load).select_related("follows").first()
    return None if leg is None else _link(leg.follows)


def followed_by(load: Load, then: datetime | None = None) -> tuple[Link, ...]:
    """This function will return the legs that follow a load, those that were replaced left out; as they were
    at `then`, if it is given.
    """
    later = Load.objects.filter(before__follows=load)
    replaced = Load.objects.filter(replaces__in=later)
    if then is not None:
        later, replaced = later.filter(submitted_at__lte=then), replaced.filter(submitted_at__lte=then)
    gone = set(replaced.values_list("replaces_id", flat=True))
    return tuple(_link(one) for one in later.order_by("departure", "id") if one.id not in gone)


def legs_answer(current: Current) -> dict[str, object]:
    """This function will return both links of a load as the answer shows them."""
    before = follows(current.load)
    return {
        "follows": None if before is None else _shown(before),
        "followed_by": [_shown(one) for one in followed_by(current.load)],
        "uplift": "" if before is None else uplift_words(current),
    }


def uplift_words(current: Current, then: datetime | None = None) -> str:
    """This function will return, in words, the fuel planned to be taken on since the leg before, as that one
    was declared at `then`, if it is given; "" where one of the two loads tells no fuel. It is told, and
    decides nothing.
    """
    leg = Leg.objects.filter(load=current.load).first()
    if leg is None:
        return ""
    before = load_of(current.load.operator_id, leg.follows_id)
    if then is not None:
        held = Assessment.objects.filter(load=before.load, assessed_at__lte=then).order_by("-number").first()
        before = replace(before, assessment=held or before.assessment)
    now, earlier = _fuel(current), _fuel(before)
    if now is None or earlier is None:
        return ""
    (plan, basis), (landed, other) = now, earlier
    start = added(fuel.usable for fuel in plan.tanks) * plan.density
    left = added(fuel.usable for fuel in landed.tanks) * landed.density - landed.taxi - landed.trip
    change = start - converted(left, other.weight_unit, basis.weight_unit)
    unit = basis.weight_unit.value
    figures = (printed(abs(change), WEIGHT_PLACES), printed(start, WEIGHT_PLACES))
    if change < 0:
        return f"{figures[0]} {unit} less fuel at engine start than the leg before is to land with"
    return f"planned uplift {figures[0]} {unit}, to {figures[1]} {unit} at engine start"


def _fuel(current: Current) -> tuple[FuelPlan, Basis] | None:
    version = current.assessment.loading_basis
    if version is None:
        return None
    basis, document = basis_of(version), declared_now(current)
    plan = read_fuel(Fields(document, "", Faults(), (), tuple(document)), basis)
    return None if plan is None else (plan, basis)


def _link(load: Load) -> Link:
    words = f"{load.reference} leg {load.leg}, {load.origin} to {load.destination}, {load.departure_text}"
    last = load.steps.order_by("-number").values_list("after", flat=True).first()
    return Link(load.id, words, last or "")


def _shown(link: Link) -> dict[str, object]:
    return {
        "load": link.load,
        "flight": link.words,
        "state": link.state,
        "href": f"/api/v1/loads/{link.load}",
    }


def _refused(code: str, detail: str) -> Invalid:
    return Invalid(Fault(POINTER, code, detail))

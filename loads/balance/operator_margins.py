"""What is told of an operator's margins beside a check of a centre of gravity.

A load is judged by the operational envelope. Beside it stand the margins that bind at the nearest edge, their
sum at this weight, and whether the certified envelope still holds.
"""

from fractions import Fraction

from fleet.basis import Envelope
from fleet.curtailment import CurtailedShape, Curtailment, Inset
from fleet.envelope import Section
from fleet.positions import CARRIED, EXTERNAL_LOAD, NOT_CARRIED
from loads.balance.prepared import Bound, Prepared
from loads.balance.result import Check, Json
from loads.balance.rounding import between, printed, room

OUTSIDE: dict[tuple[str, ...], str] = {
    (CARRIED,): ", in the envelope with an external load",
    (NOT_CARRIED,): ", in the envelope without an external load",
}
EDGES: dict[str, int] = {"forward": 0, "left": 0, "aft": 1, "right": 1}


def outside_of(envelope: Envelope) -> tuple[str, ...]:
    """Return with which external load an envelope holds; () for either."""
    return dict(envelope.positions).get(EXTERNAL_LOAD, ())


def told(check: Check, weight: Fraction, moment: Fraction, bound: Bound, ready: Prepared) -> Check:
    """Return a check against an operational envelope with its margins named and the certified verdict told.

    A check of a certified envelope comes back as it is; of one that holds only with an external load, or only
    without one, that is told.
    """
    envelope, shape = bound
    length, places = ready.length, ready.length_places
    if envelope.positions:
        check = check._replace(margin_text=check.margin_text + OUTSIDE.get(outside_of(envelope), ""))
    if not isinstance(shape, CurtailedShape):
        return check
    binding = _binding(shape, weight, check.edge)
    certified = shape.certified.arm_section(weight, moment)
    holds = shape.certified.holds(weight, moment)
    words = _certified_words(check, certified, holds, moment / weight, ready)
    sources = ", ".join(dict.fromkeys(str(each.source) for each in shape.curtailments))
    limits: Json = {"low": None, "limit": None, "margin": None}
    if certified is not None:
        _, low, high, digits = between(moment / weight, certified.low, certified.high, places)
        limits = {"low": low, "limit": high, "margin": printed(certified.margin, digits, "down")}
    total = sum((amount for _, amount, _ in binding), Fraction(0))
    text = f"{check.margin_text}; {words}"
    if binding:
        text += f"; {_margins_words(binding, total, check.edge, length, places)}"
    return check._replace(
        margin_text=text,
        source=f"{envelope.source}; {sources}",
        curtailed={
            "certified": {"within": holds, **limits, "source": str(envelope.source)},
            "edge": check.edge,
            "unit": length,
            "together": printed(total, places),
            "margins": [
                {
                    "id": each.id,
                    "for": each.purpose,
                    "amount": printed(amount, places),
                    "stated": _stated(inset, ready),
                    "source": str(each.source),
                }
                for each, amount, inset in binding
            ],
        },
    )


def _binding(
    shape: CurtailedShape, weight: Fraction, edge: str | None
) -> list[tuple[Curtailment, Fraction, Inset]]:
    """Return what moves the nearest edge in at a weight: each with its amount in arm and as stated."""
    if edge is None:
        return []
    found = []
    for each in shape.curtailments:
        inset = each.insets(shape.axis, weight)[EDGES[edge]]
        amount = inset.at(weight)
        if amount:
            found.append((each, amount, inset))
    return found


def _certified_words(
    check: Check, certified: Section | None, holds: bool, arm: Fraction, ready: Prepared
) -> str:
    """Return where the load is in the certified envelope; inside both, the way to its edge on that side."""
    length, places = ready.length, ready.length_places
    if certified is None:
        return "no part of the certified envelope lies at this weight"
    figure = f"{room(certified.margin, places)} {length}"
    if not holds:
        return f"outside the certified envelope, too, by {figure}"
    if check.outcome == "fail":
        where = f"inside the certified envelope by {figure}" if certified.margin else "on the certified edge"
        return f"outside the operator's margin, {where}"
    if check.edge is None:
        return f"certified edge {figure} away"
    away = certified.high - arm if EDGES[check.edge] else arm - certified.low
    return f"certified {check.edge} limit {printed(away, places, 'down')} {length} away"


def _margins_words(
    binding: list[tuple[Curtailment, Fraction, Inset]],
    total: Fraction,
    edge: str | None,
    length: str,
    places: int,
) -> str:
    parts = ", ".join(f"{each.purpose} {printed(amount, places)}" for each, amount, _ in binding)
    if len(binding) == 1:
        return f"operator's {edge} margin: {parts} {length}"
    return f"operator's {edge} margins: {parts}, together {printed(total, places)} {length}"


def _stated(inset: Inset, ready: Prepared) -> str:
    """Return an amount as the operator's manual states it, in the units of the basis: an arm or a moment."""
    if inset.moment:
        return f"{printed(inset.moment, ready.moment_places)} {ready.moment}"
    return f"{printed(inset.arm, ready.length_places)} {ready.length}"

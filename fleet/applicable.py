"""The part of a loading basis that holds for one configuration, in one certification category.

Envelopes, lateral limits and an operator's margins may name the configurations and categories they are for.
What is left out here does not hold; everything else of the basis stays as it is.
"""

from collections import OrderedDict
from dataclasses import replace

from fleet.basis import Basis, Envelope, Limits
from fleet.curtailment import Curtailment
from fleet.flight_rules import NamedLimits
from fleet.lateral import LateralByCg

MOST_KEPT = 128
Applies = Envelope | LateralByCg | Curtailment
_KEPT: "OrderedDict[tuple[int, str, str], tuple[Basis, Basis]]" = OrderedDict()


def applicable(basis: Basis, configuration: str, category: str | None) -> Basis:
    """Return the basis with the envelopes and lateral limits that hold; itself where it makes no difference.

    The latest ones are kept, so that the same arguments give the very same object.
    """
    limits: tuple[Applies, ...] = (*basis.envelopes, *basis.lateral_by_cg, *basis.curtailments)
    if not any(one.configurations or one.categories for one in limits):
        return basis
    key = (id(basis), configuration, category or "")
    kept = _KEPT.get(key)
    if kept is not None and kept[0] is basis:
        return kept[1]
    found = replace(
        basis,
        envelopes=tuple(one for one in basis.envelopes if holds_for(one, configuration, category)),
        lateral_by_cg=tuple(one for one in basis.lateral_by_cg if holds_for(one, configuration, category)),
        curtailments=tuple(one for one in basis.curtailments if holds_for(one, configuration, category)),
    )
    if _lateral(basis) and not _lateral(found):  # limits for others are no page that shows there are none
        found = replace(found, lateral_limits_entered=False)
    _KEPT[key] = (basis, found)
    while len(_KEPT) > MOST_KEPT:
        _KEPT.popitem(last=False)
    return found


def _lateral(basis: Basis) -> bool:
    return bool(basis.lateral_by_cg) or any(one.axis == "lateral" for one in basis.envelopes)


def holds_for(limit: Applies, configuration: str, category: str | None) -> bool:
    """Return whether a limit is for a configuration in a category; without any named it is for all."""
    if limit.configurations and configuration not in limit.configurations:
        return False
    return not limit.categories or category in limit.categories


def tightest(limits: Limits, own: NamedLimits) -> Limits:
    """Return limits with others, such as those of a category, where these are the tighter ones.

    A limit with a value is tighter than none, and stands where none was entered.
    """
    found = {}
    for field, limit in own:
        held = getattr(limits, field)
        if limit.value is None:
            found[field] = held or limit
        elif held is None or held.value is None:
            found[field] = limit
        else:
            least = field == "minimum_flying"
            tighter = limit.value > held.value if least else limit.value < held.value
            found[field] = limit if tighter else held
    return replace(limits, **found) if found else limits

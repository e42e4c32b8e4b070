"""The certification category a load is flown in (normal, utility, ...), where the basis has several.

A category may have limits of its own, each a tightening, and envelopes of its own. Nothing is assumed: with
more than one category in the basis a load states which.
"""

from dataclasses import replace

from fleet.applicable import tightest
from fleet.basis import Basis, Configuration
from fleet.flight_rules import CertificationCategory
from loads.balance.fields import Fields

FIELD = "certification_category"
LONGEST_ID = 64


def read_category(fields: Fields, basis: Basis) -> CertificationCategory | None:
    """Return the category of a load, noting faults: not stated though there are several, or unknown."""
    known = basis.certification_categories
    stated = fields.text(FIELD, LONGEST_ID)
    if FIELD not in fields:
        if len(known) > 1:
            choice = " or ".join(one.id for one in known)
            fields.note(FIELD, "missing", f"the basis has several certification categories; write {choice}")
        return known[0] if len(known) == 1 else None
    found = next((one for one in known if one.id == stated), None)
    if found is None and stated is not None:
        has = ", ".join(one.id for one in known) or "none, so leave it out"
        fields.note(FIELD, "unknown-category", f"no such certification category; the basis has {has}")
    return found


def in_category(configuration: Configuration, category: CertificationCategory | None) -> Configuration:
    """Return a configuration with the limits of a category where they are the tighter ones."""
    if category is None or not category.limits:
        return configuration
    return replace(configuration, limits=tightest(configuration.limits, category.limits))

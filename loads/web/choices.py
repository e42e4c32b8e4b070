"""The words offered in the lists of the page that declares a load; no Django here."""

from loads.web.form_lines import TAKEN_OUT
from loads.web.inputs import Choices

WEIGHT_UNITS: Choices = (("lb", "lb"), ("kg", "kg"))
VOLUME_UNITS: Choices = (("US gal", "US gal"), ("imp gal", "imp gal"), ("l", "l"))
DENSITY_UNITS: Choices = (("lb/US gal", "lb/US gal"), ("lb/imp gal", "lb/imp gal"), ("kg/l", "kg/l"))
HOW: Choices = (
    ("", "choose"),
    ("weighed", "weighed"),
    ("declared", "declared"),
    ("standard", "standard"),
    ("estimated", "estimated"),
)
INFANT_HOW: Choices = tuple(choice for choice in HOW if choice[0] != "standard")
POSITIONS: Choices = (
    ("", "passenger"),
    ("pilot in command", "pilot in command"),
    ("second pilot", "second pilot"),
    ("cabin attendant", "cabin attendant"),
    ("other crew", "other crew"),
)
CATEGORIES: Choices = (("", "none"), ("adult", "adult"), ("child", "child"), ("infant", "infant"))
COMING_KINDS: Choices = (
    ("", "choose"),
    ("baggage", "baggage"),
    ("cargo", "cargo"),
    ("ballast", "ballast"),
    ("equipment", "equipment"),
    ("consumable", "consumable"),
)
KINDS: Choices = (*COMING_KINDS, (TAKEN_OUT, TAKEN_OUT))
RELEASED: Choices = (("", "no"), ("yes", "yes"))
OPERATIONS: Choices = (
    ("", "choose"),
    ("passenger-charter", "passenger charter"),
    ("cargo-charter", "cargo charter"),
    ("air-taxi", "air taxi"),
    ("aerial-work", "aerial work"),
    ("positioning", "positioning"),
    ("training", "training"),
)
LIMITS_AT: Choices = (("take-off", "take-off"), ("landing", "landing"))


def own_unit_first(choices: Choices, unit: str) -> Choices:
    """This function will return a list of units with the basis's own first."""
    return tuple(sorted(choices, key=lambda choice: choice[0] != unit))

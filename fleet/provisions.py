"""What an operator lays down for a time, besides an aircraft's own loading data: the kinds of it."""

from typing import Final, Literal

Kind = Literal["standard weights", "rules", "restriction", "permit"]

STANDARD_WEIGHTS: Final = "standard weights"
RULES: Final = "rules"
RESTRICTION: Final = "restriction"
PERMIT: Final = "permit"

# Of these one version holds at a time, for all aircraft of the operator; the others hold side by side, each
# for one aircraft.
OF_THE_OPERATOR: Final = (STANDARD_WEIGHTS, RULES)
OF_ONE_AIRCRAFT: Final = (RESTRICTION, PERMIT)

# What tightens binds as soon as it is entered. What widens, or says what people weigh, needs a second person.
NEEDS_APPROVAL: Final = (STANDARD_WEIGHTS, RULES, PERMIT)

"""The cautions that stand wherever a verdict is shown: page, API answer and paper."""

CAUTIONS: tuple[str, ...] = (
    (
        "The approved flight manual, the operator's approved procedures, local rules and licensed people "
        "decide; this computation does not replace them."
    ),
    (
        "It is only as true as what was declared: check people, items, places and fuel at the aircraft "
        "before departure."
    ),
    "Nothing that was not assessed is shown as passed; what was not assessed is listed.",
)
INVENTED = "INVENTED DATA, NOT FOR FLIGHT"

"""Whether the weights that performance allows are stated, where the approved data ask for them.

A limit that is stated is checked as one of weight (`performance.<phase>.<number>`). Here only its absence is
found: what is required and was not stated cannot be judged, so the load is unresolved.
"""

from collections.abc import Iterable

from fleet.basis import Basis
from fleet.flight_rules import At, PerformanceRule
from loads.balance.aboard import Declared
from loads.balance.result import Check

PHASES: tuple[At, ...] = ("take-off", "landing")


def performance_checks(declared: Declared, basis: Basis) -> list[Check]:
    """Return one check for each phase the basis, or the configuration instead, has a rule for."""
    rules = declared.configuration.performance or basis.performance
    if not rules:
        return []
    found = ((at, rule_for(at, rules, declared.outline.flight.operation)) for at in PHASES)
    return [_check(at, rule, declared) for at, rule in found if rule is not None]


def rule_for(at: At, rules: Iterable[PerformanceRule], operation: str) -> PerformanceRule | None:
    """Return the rule of an operation at a phase: the one that names it, or else the one that names none."""
    mine = [rule for rule in rules if rule.at == at]
    wanted = operation.casefold()
    named = [rule for rule in mine if wanted in (each.casefold() for each in rule.operations)]
    return next(iter(named or [rule for rule in mine if not rule.operations]), None)


def _check(at: At, rule: PerformanceRule, declared: Declared) -> Check:
    code, title, source = f"performance.required.{at}", f"performance-limited {at} weight", str(rule.source)
    operation = declared.outline.flight.operation
    if not rule.required:
        text = "the structural limits are enough for this operation"
        return Check(code, title, "pass", at, margin_text=text, source=source)
    stated = [limit for limit in declared.limits if limit.at == at]
    kinds = {limit.kind for limit in stated}
    missing = [kind for kind in rule.kinds if kind not in kinds]
    if stated and not missing:
        return Check(code, title, "pass", at, margin_text="stated with the load", source=source)
    what = " and ".join(missing) if stated and missing else "" if not rule.kinds else " and ".join(rule.kinds)
    text = f"required for {operation}, not stated{f': {what}' if what else ''}"
    allows = f"the performance allows ({what})" if what else "the performance allows"
    fix = f"State in `limits` the greatest {at} weight {allows}, with the sheet or page it comes from."
    return Check(code, title, "unresolved", at, margin_text=text, source=source, what_next=fix)

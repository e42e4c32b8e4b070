"""Checks of weights that come from a table of standard weights, or are added to by one."""

from loads.balance.result import Check
from loads.balance.standard_use import StandardUse


def standard_checks(use: StandardUse | None) -> list[Check]:
    """Return what is told of the table that was used, and whether the declared weights are ones it allows;
    nothing where no table was needed.
    """
    if use is None:
        return []
    found = []
    if use.refused:
        found.append(
            Check(
                "weights.declared",
                "declared weights are ones the table allows",
                "unresolved",
                margin_text=f"the table allows no declared weight in this aircraft: {use.refused}",
                source=use.source,
                what_next=f"Weigh, or declare as standard: {use.refused}.",
            )
        )
    if use.standard or use.declared:
        found.append(
            Check(
                "weights.standard",
                "standard weights are from the table in force",
                "unresolved" if use.unknown else "pass",
                actual=str(use.standard) if use.standard else None,
                margin_text=use.unknown or _words(use),
                source=use.source,
                what_next="Weigh or declare them, or have a table approved that holds for this flight."
                if use.unknown
                else "",
            )
        )
    return found


def _words(use: StandardUse) -> str:
    parts = [f"{use.standard} standard"]
    parts += [f"{use.declared} declared with {use.additions}"] if use.declared else []
    row = ", ".join(part for part in (use.row, use.season) if part)
    return f"{' and '.join(parts)}, by {use.label}{f', {row}' if row else ''}"

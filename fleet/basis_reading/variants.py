"""Reads what makes limits differ within one basis: certification categories and approved modifications."""

from dataclasses import dataclass, replace
from typing import Any

from fleet.applicable import tightest
from fleet.basis import Limits
from fleet.basis_reading.findings import Findings
from fleet.basis_reading.limits import FIELDS, contradictions, given_limits, tighter
from fleet.flight_rules import CertificationCategory, Modification, NamedLimits


@dataclass(frozen=True, slots=True)
class Variants:
    """The limits of a basis with what changes them; `categories` holds whole sets, tightened already."""

    limits: Limits
    modifications: tuple[Modification, ...]
    certification_categories: tuple[CertificationCategory, ...]

    def of_configuration(self, findings: Findings, at: str, entry: dict[str, Any]) -> Limits:
        """Return the limits of a configuration before its own: those of the basis, or of what it has fitted.

        An unknown modification, and two that replace the same limit, are faults.
        """
        fitted = entry.get("modifications", [])
        findings.known(fitted, findings.named("modifications"), f"{at}/modifications", "modification")
        limits = self.limits
        by: dict[str, str] = {}
        for row, each in enumerate(fitted):
            for field, limit in self._replaced(each):
                if by.setdefault(field, each) != each:
                    findings.fault(
                        f"{at}/modifications/{row}",
                        "limit-replaced-twice",
                        f"{by[field]} replaces the {field.replace('_', ' ')} limit already; "
                        "enter the two together as one modification, as they were approved",
                    )
                limits = replace(limits, **{field: limit})
        for _, detail in contradictions(limits, by.keys()):
            findings.fault(f"{at}/modifications", "limits-contradict", detail)
        return limits

    def served(self, findings: Findings, entry: dict[str, Any]) -> list[Limits]:
        """Return the sets of limits an envelope has to go with: of its configurations, in its categories."""
        named = entry.get("configurations")
        bases = [self.limits]
        if self.modifications and (fits := [c for _, c in findings.entries("configurations")]):
            mine = [each for each in fits if named is None or each["id"] in named]
            bases = [self._fitted(each.get("modifications", [])) for each in mine] or bases
        wanted = entry.get("categories")
        tighter = [
            one.limits for one in self.certification_categories if wanted is None or one.id in wanted
        ] or [()]
        return [tightest(limits, own) for limits in bases for own in tighter]

    def _fitted(self, fitted: list[str]) -> Limits:
        limits = self.limits
        for each in fitted:
            limits = replace(limits, **dict(self._replaced(each)))
        return limits

    def _replaced(self, identity: str) -> NamedLimits:
        return next((one.limits for one in self.modifications if one.id == identity), ())


def read_variants(findings: Findings, limits: Limits) -> Variants:
    """Return the modifications and categories; a category may only tighten, a modification replaces."""
    return Variants(limits, _modifications(findings), _categories(findings, limits))


def _modifications(findings: Findings) -> tuple[Modification, ...]:
    findings.once(("modifications",))
    found = []
    for at, entry in findings.entries("modifications"):
        limits = named(given_limits(findings, entry["limits"], f"{at}/limits"))
        if not limits:
            findings.fault(
                f"{at}/limits", "too-few", "a modification is entered for the limits it replaces; enter them"
            )
        found.append(Modification(entry["id"], entry["name"], limits, findings.source(entry["source"])))
    return tuple(found)


def _categories(findings: Findings, limits: Limits) -> tuple[CertificationCategory, ...]:
    findings.once(("certification_categories",))
    found = []
    for at, entry in findings.entries("certification_categories"):
        own = entry.get("limits")
        if own is not None:
            # For its faults. A category may allow less at take-off than another limit allows at landing.
            tighter(findings, own, f"{at}/limits", limits)
        found.append(
            CertificationCategory(
                entry["id"],
                entry["name"],
                named(given_limits(findings, own, f"{at}/limits")),
                findings.source(entry["source"]),
            )
        )
    return tuple(found)


def named(limits: Limits) -> NamedLimits:
    """Return the limits that were entered, each with its field."""
    pairs = ((field, getattr(limits, field)) for field in FIELDS)
    return tuple((field, limit) for field, limit in pairs if limit is not None)

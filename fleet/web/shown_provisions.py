"""What the pages of tables, rules, restrictions and permits show, as plain values."""

from collections.abc import Iterator
from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

from fleet.models import Provision
from fleet.provisions import PERMIT, RESTRICTION, RULES, STANDARD_WEIGHTS
from fleet.restriction_reading import paper_from_text
from fleet.restrictions import Paper, sentences
from fleet.rules import NAMES, Applies, Rules
from fleet.rules_reading import rules_from_text
from fleet.standard_weights import StandardWeights
from fleet.standard_weights_reading import standard_weights_from_text
from fleet.web.asking import local
from records.canonical import decimal_text


def version_shown(one: Provision, zone: ZoneInfo, now: datetime, held: frozenset[Any]) -> dict[str, Any]:
    """This function will return one version: what it says, since when, by whom; `held` are those in force."""
    approval, ending = getattr(one, "approval", None), getattr(one, "ending", None)
    standing = _standing(one, now, held)
    return {
        "title": _title(one),
        "digest": one.digest,
        "lines": list(lines_of(one)),
        "true_from": local(one.true_from, zone),
        "true_until": local(one.true_until, zone),
        "entered_at": local(one.entered_at, zone),
        "entered_by": one.entered_by.name,
        "approved": f"{local(approval.known_from, zone)} by {approval.approved_by.name}" if approval else "",
        "ended": f"ended {local(ending.true_from, zone)} by {ending.ended_by.name}: {ending.reason}"
        if ending
        else "",
        "standing": standing,
        "gone": standing in {"superseded", "lapsed", "ended"},
    }


def lines_of(one: Provision) -> Iterator[str]:
    """This function will say what a version says, line by line."""
    if one.kind == STANDARD_WEIGHTS:
        yield from _table_lines(standard_weights_from_text(one.document, one.number))
    elif one.kind == RULES:
        yield from _rule_lines(rules_from_text(one.document))
    else:
        yield from _paper_lines(_paper(one))


def paper_shown(one: Provision) -> dict[str, str]:
    """This function will return a restriction or permit in one line."""
    paper = _paper(one)
    return {"kind": one.kind, "title": paper.title, "text": "; ".join(_paper_lines(paper))}


def _paper(one: Provision) -> Paper:
    return paper_from_text(one.document, "permit" if one.kind == PERMIT else "restriction")


def _title(one: Provision) -> str:
    if one.kind in {RESTRICTION, PERMIT}:
        return _paper(one).title
    if one.kind == RULES:
        return f"{one.number}: {rules_from_text(one.document).title}"
    return f"{one.number}: {standard_weights_from_text(one.document, one.number).title}"


def _paper_lines(paper: Paper) -> Iterator[str]:
    yield paper.what
    if paper.authority:
        yield f"given by {paper.authority}"
    yield from sentences(paper, {})
    if paper.operations:
        yield f"for {', '.join(paper.operations)} only"
    yield from paper.conditions
    yield str(paper.source)


def _table_lines(table: StandardWeights) -> Iterator[str]:
    seasons = {season.id: season for season in table.seasons}
    for row in table.rows:
        where = [row.seats(), *row.operations, *(f"{start} to {end}" for start, end in row.routes)]
        if row.season is not None:
            season = seasons[row.season]
            where.append(f"{season.name} ({season.first} to {season.last})")
        weights = ", ".join(
            f"{name} {decimal_text(weight.value)} {weight.unit.value}" for name, weight in row.weights.items()
        )
        yield f"{', '.join(where)}: {weights}; {row.source}"
    for category in table.categories:
        counts = f", counts as {category.counts_as}" if category.counts_as else ""
        ages = f", {category.ages()}" if category.ages() else ""
        yield f"{category.id}: {category.name}{ages}{counts}"
    if table.declared is not None:
        yield _declared_line(table)
    for kind in table.crew:
        yield f"{kind.name}: {decimal_text(kind.weight.value)} {kind.weight.unit.value}; {kind.source}"


def _declared_line(table: StandardWeights) -> str:
    rule = table.declared
    if rule is None or not rule.allowed:
        return "declared weights may not be used"
    below = "" if rule.below_seats is None else f" below {rule.below_seats} seats"
    added = ", ".join(
        f"{one.what} {decimal_text(one.weight.value)} {one.weight.unit.value}" for one in rule.additions
    )
    return f"declared weights{below}, plus {added or 'nothing'}; {rule.source}"


def _rule_lines(rules: Rules) -> Iterator[str]:
    for rule in rules.rules:
        yield f"{NAMES[rule.name]}: {rule.words()}{_for(rule.applies)}; {rule.source}"


def _for(applies: Applies) -> str:
    parts = [f"{applies.category}s"] if applies.category else []
    for what, least, most in (
        ("engines", applies.from_engines, applies.to_engines),
        ("seats", applies.from_seats, applies.to_seats),
    ):
        if least is not None or most is not None:
            span = f"{'up' if least is None else least}{'' if most is None else f' to {most}'}"
            parts.append(f"{span}{' or more' if most is None else ''} {what}")
    parts += applies.operations
    return f", for {', '.join(parts)}" if parts else ""


def _standing(one: Provision, now: datetime, held: frozenset[Any]) -> str:
    ending = getattr(one, "ending", None)
    if one.id in held:
        return "in force"
    if one.kind != RESTRICTION and getattr(one, "approval", None) is None:
        return "awaits a second person"
    if ending is not None and ending.true_from <= now:
        return "ended"
    if one.true_until is not None and one.true_until <= now:
        return "lapsed"
    return "in force later" if one.true_from > now else "superseded"

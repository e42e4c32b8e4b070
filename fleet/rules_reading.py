"""Reads the document `tarebook.rules/1`: every fault by its pointer, all at once."""

from collections.abc import Mapping
from functools import lru_cache
from typing import Any, Final

from fleet.document_schema import shape_faults
from fleet.rules import Applies, Interval, Rule, Rules
from records.refusal import Fault, Invalid
from records.strict_json import read

SIGNATURE: Final = "loading-signature"
_ANSWERS: Final = ("none", "interval", "demanded")


def read_rules(document: object) -> Rules:
    """Return the rules in a document. Raises `Invalid` with all faults: of form, a rule that says nothing or
    two things, one that can never be reached behind another.
    """
    faults = shape_faults("rules-1", document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    rules = tuple(_rule(each, f"/rules/{place}", faults) for place, each in enumerate(document["rules"]))
    for place, rule in enumerate(rules):
        if any(one.name == rule.name and one.applies in {Applies(), rule.applies} for one in rules[:place]):
            detail = "an earlier rule of this name applies to all of this; put the narrower one first"
            faults.append(Fault(f"/rules/{place}", "never-reached", detail))
    if faults:
        raise Invalid(*faults)
    return Rules(document["title"], rules)


@lru_cache(maxsize=64)
def rules_from_text(text: str) -> Rules:
    """Return the rules in the text of a stored document; texts already read are remembered."""
    return read_rules(read(text.encode()))


def _rule(given: Mapping[str, Any], where: str, faults: list[Fault]) -> Rule:
    said = [name for name in _ANSWERS if name in given]
    wanted = "demanded" if given["rule"] == SIGNATURE else "interval"
    if len(said) != 1 or said[0] not in {"none", wanted}:
        detail = f"this rule says either none or {wanted}, one of them; correct it"
        faults.append(Fault(where, "one-of", detail))
    interval = given.get("interval")
    return Rule(
        name=given["rule"],
        interval=None if interval is None else Interval(interval["count"], interval["unit"]),
        demanded="demanded" in given,
        source=_source(given["source"]),
        applies=_applies(given.get("applies_to", {}), f"{where}/applies_to", faults),
    )


def _applies(given: Mapping[str, Any], where: str, faults: list[Fault]) -> Applies:
    for what in ("engines", "seats"):
        least, most = given.get(f"from_{what}"), given.get(f"to_{what}")
        if least is not None and most is not None and most < least:
            detail = f"must not be below from_{what}; correct one"
            faults.append(Fault(f"{where}/to_{what}", "out-of-order", detail))
    plain = {name: value for name, value in given.items() if name != "operations"}
    return Applies(**plain, operations=tuple(given.get("operations", ())))


def _source(given: Mapping[str, Any]) -> str:
    document = f", {given['document']}" if "document" in given else ""
    page = f" p. {given['page']}" if "page" in given else ""
    return f"{given['rule']}{document}{page}"

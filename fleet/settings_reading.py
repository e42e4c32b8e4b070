"""Reads a change of an operator's settings: plain values, every fault by its pointer."""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from decimal import Decimal
from typing import Any, Final

from fleet.document_schema import shape_faults
from fleet.entering import plausible
from fleet.mail_address import mail_fault
from fleet.quantities import number_or_fault
from records.refusal import Fault, Invalid

# A bound on last-minute changes is a small weight, and a threshold a small part; both as a person would type
# them. The database holds the same forms.
MOST_WEIGHT: Final = Decimal(1_000_000)
MOST_PERCENT: Final = Decimal(100)
_PLACES: Final = -3
_AS_THEY_ARE: Final = (
    "prepare_and_accept_by_one",
    "estimates_may_be_signed",
    "rule_set",
    "procedure",
    "weight_method",
)


@dataclass(frozen=True, slots=True)
class SettingsChange:
    """What is to hold from `true_from` (None: from the act on), by column of the row, and why.

    Columns that are not in `columns` stay as they are at that time.
    """

    true_from: datetime | None
    reason: str
    columns: Mapping[str, Any]


def read_settings(document: object) -> SettingsChange:
    """This function will return the change in a document `settings-1`; raises Invalid with all faults."""
    faults = shape_faults("settings-1", document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    columns: dict[str, Any] = {name: document[name] for name in _AS_THEY_ARE if name in document}
    if "last_minute_bound" in document:
        columns |= _bound(document["last_minute_bound"], faults)
    if "weighing_threshold_percent" in document:
        where = "/weighing_threshold_percent"
        given = document["weighing_threshold_percent"]
        columns["weighing_threshold_percent"] = (
            "" if given is None else _figure(given, where, MOST_PERCENT, faults)
        )
    if "operations_mail" in document:
        columns["operations_mail"] = _addresses(document["operations_mail"], faults)
    true_from = None
    if "true_from" in document:
        true_from = plausible(datetime.fromisoformat(document["true_from"]), "/true_from")
    if faults:
        raise Invalid(*faults)
    return SettingsChange(true_from, document["reason"], columns)


def _bound(given: Mapping[str, Any] | None, faults: list[Fault]) -> dict[str, Any]:
    if given is None:
        return {"last_minute_weight": "", "last_minute_unit": "", "last_minute_persons": None}
    weight = given["weight"]
    return {
        "last_minute_weight": _figure(
            weight["value"], "/last_minute_bound/weight/value", MOST_WEIGHT, faults
        ),
        "last_minute_unit": weight["unit"],
        "last_minute_persons": given["persons"],
    }


def _figure(given: object, where: str, below: Decimal, faults: list[Fault]) -> str:
    """This function will return a figure as typed, and note a fault when it is none that makes sense."""
    number = number_or_fault(given, where)
    if isinstance(number, Fault):
        faults.append(number)
        return ""
    exponent = number.as_tuple().exponent
    if not 0 <= number < below:
        faults.append(Fault(where, "out-of-range", f"must be 0 or more and less than {below}; correct it"))
    elif isinstance(exponent, int) and exponent < _PLACES:
        faults.append(Fault(where, "too-fine", "at most three decimal places; round it"))
    return f"{number:f}".removeprefix("-")


def _addresses(given: list[str], faults: list[Fault]) -> list[str]:
    found = (mail_fault(address, f"/operations_mail/{place}") for place, address in enumerate(given))
    faults += [fault for fault in found if fault is not None]
    return list(given)

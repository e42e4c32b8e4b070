"""What one reading of a document carries along: the faults found so far, the units, and which parts are
sound.

Form is checked first, on the whole document. The parts that passed are then read, so that one answer names
the faults of form of one seat and the contradiction between two limits alike. A part with a fault in it is
not read further.
"""

from collections.abc import Iterator
from decimal import Decimal
from fractions import Fraction
from typing import Any

from fleet.conversion import in_unit
from fleet.quantities import DENSITY_OF, MOMENT_OF, Quantity, Unit
from fleet.sourced import Limit, Source
from records.refusal import Fault
from records.strict_json import pointer_step

Entry = tuple[str, dict[str, Any]]  # JSON pointer, object


class Findings:
    """One reading of a loading basis. Numbers come out as exact rationals in the basis's own units."""

    def __init__(self, document: dict[str, Any], faults: list[Fault]) -> None:
        """Begin with the faults of form already found; the objects they lie in count as unsound."""
        self.document = document
        self.faults = faults
        self._unsound = {
            fault.pointer[:end]
            for fault in faults
            for end in range(len(fault.pointer) + 1)
            if end == len(fault.pointer) or fault.pointer[end] == "/"
        }
        units = document["units"]
        self.weight = Unit(units["weight"])
        self.length = Unit(units["length"])
        self.volume = Unit(units["volume"])
        self.density = DENSITY_OF[self.weight, self.volume]
        self.moment = MOMENT_OF[self.weight, self.length]

    def fault(self, pointer: str, code: str, detail: str) -> None:
        """Add a fault."""
        self.faults.append(Fault(pointer, code, detail))

    def sound(self, pointer: str) -> bool:
        """Return whether no fault of form lies at a pointer or beneath it."""
        return pointer not in self._unsound

    def entries(self, field: str) -> Iterator[Entry]:
        """Yield the sound objects of a list of the document, each with its pointer."""
        found = self.document.get(field)
        if isinstance(found, list):
            for number, entry in enumerate(found):
                at = f"{pointer_step(field)}/{number}"
                if self.sound(at):
                    yield at, entry

    def named(self, field: str) -> frozenset[str]:
        """Return the ids a list of the document gives, unsound entries too, so that naming them is no
        second fault.
        """
        found = self.document.get(field)
        entries = found if isinstance(found, list) else []
        ids = (entry.get("id") for entry in entries if isinstance(entry, dict))
        return frozenset(each for each in ids if isinstance(each, str))

    def source(self, given: dict[str, Any]) -> Source:
        """Return the source of a figure; document and revision default to those of the basis."""
        own = self.document["document"]
        if "document" in given:
            return Source(given["document"], given.get("revision", ""), given["page"])
        return Source(own["number"], given.get("revision", own["revision"]), given["page"])

    def limit(self, given: dict[str, Any] | None, at: str) -> Limit | None:
        """Return a weight limit; None when it was not entered. A value that is not above zero is a fault."""
        if given is None:
            return None
        if "none" in given:
            return Limit(None, self.source(given["source"]))
        return Limit(self.above_zero(given, self.weight, at), self.source(given["source"]))

    def above_zero(self, given: dict[str, Any], unit: Unit, at: str) -> Fraction:
        """Return a quantity as `exact` does, after a fault when it is not above zero."""
        value = exact(given, unit)
        if value <= 0:
            self.fault(f"{at}/value", "not-above-zero", "must be above zero; correct it")
        return value

    def known(self, ids: list[str], known: frozenset[str], at: str, what: str) -> None:
        """Add a fault for every id that is unknown or stands in the list twice."""
        for number, each in enumerate(ids):
            if each not in known:
                self.fault(
                    f"{at}/{number}", "unknown-id", f"{each} is no {what} of this basis; correct or enter it"
                )
            elif each in ids[:number]:
                self.fault(f"{at}/{number}", "duplicate", f"{each} stands here twice; remove one")

    def once(self, fields: tuple[str, ...]) -> None:
        """Add a fault for every id that is given twice within the named lists of the document."""
        seen: set[str] = set()
        for field in fields:
            for at, entry in self.entries(field):
                if entry["id"] in seen:
                    self.fault(f"{at}/id", "duplicate-id", f"{entry['id']} is already used; give another id")
                seen.add(entry["id"])


def exact(given: dict[str, Any], unit: Unit) -> Fraction:
    """Return a quantity whose form was checked as an exact number of a unit of the same dimension."""
    return in_unit(Quantity(Decimal(given["value"]), Unit(given["unit"])), unit)


def number(value: Any) -> Fraction:
    """Return a number whose form was checked, exactly."""
    return Fraction(Decimal(value))

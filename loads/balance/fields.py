"""Strict reading of a JSON object: every fault is noted by JSON pointer, with a stable code and the next
step.

Codes noted here: `object-form`, `list-form`, `text-form`, `number-form`, `flag-form`, `choice`, `missing`,
`unknown-field`, `empty`, `too-long`, `too-many`, `untrimmed`, `control-character`, `negative`, `zero`,
`out-of-range`; and those of `fleet.quantities` for quantities.
"""

import unicodedata
from collections.abc import Mapping

from fleet.quantities import Dimension, Quantity, quantity_or_fault
from records.refusal import Fault
from records.strict_json import pointer_step

LONGEST_KEY = 100  # of a field name nobody knows, this much is sent back
MOST_FAULTS = 100  # further faults of one document are not listed
# Characters that change how a line reads or prints: controls, line and paragraph separators, surrogates, and
# the marks that override or isolate the direction of writing (Unicode Standard Annex 9, section 2).
_REFUSED_CATEGORIES = frozenset({"Cc", "Cs", "Zl", "Zp", "Cn"})
_DIRECTION_MARKS = frozenset("\u202a\u202b\u202c\u202d\u202e\u2066\u2067\u2068\u2069")


class Faults:
    """The faults of one document, in the order in which they were met."""

    def __init__(self) -> None:
        self._noted: list[Fault] = []

    def note(self, pointer: str, code: str, detail: str) -> None:
        """Keep a fault, up to `MOST_FAULTS`."""
        if len(self._noted) < MOST_FAULTS:
            self._noted.append(Fault(pointer, code, detail))

    def keep(self, fault: Fault) -> None:
        """Keep a fault that another reader made."""
        if len(self._noted) < MOST_FAULTS:
            self._noted.append(fault)

    def all(self) -> tuple[Fault, ...]:
        """Return what was noted."""
        return tuple(self._noted)


class Fields:
    """One object of a document; each method takes one field and returns None where it noted a fault or found
    nothing.
    """

    __slots__ = ("_faults", "_values", "pointer")

    def __init__(
        self,
        document: object,
        pointer: str,
        faults: Faults,
        required: tuple[str, ...] = (),
        optional: tuple[str, ...] = (),
    ) -> None:
        self._faults = faults
        self.pointer = pointer
        self._values: Mapping[str, object] = {}
        if not isinstance(document, Mapping):
            faults.note(pointer, "object-form", "an object is needed here; write {...} with named fields")
            return
        self._values = document
        for name in document:
            if name not in required and name not in optional:
                known = ", ".join((*required, *optional))
                where = f"{pointer}{pointer_step(str(name)[:LONGEST_KEY])}"
                faults.note(where, "unknown-field", f"no such field here; the fields are {known}")
        for name in required:
            if name not in document:
                faults.note(
                    f"{pointer}/{name}", "missing", "this field is needed and nothing is assumed; state it"
                )

    def __contains__(self, name: str) -> bool:
        return name in self._values

    def read_as(self, required: tuple[str, ...], optional: tuple[str, ...]) -> "Fields":
        """Return the same object, its fields held against these."""
        return Fields(self._values, self.pointer, self._faults, required, optional)

    def at(self, name: str) -> str:
        """Return the JSON pointer of a field."""
        return f"{self.pointer}{pointer_step(name)}"

    def note(self, name: str, code: str, detail: str) -> None:
        """Note a fault of a field."""
        self._faults.note(self.at(name), code, detail)

    def raw(self, name: str) -> object:
        """Return a field as it stands, or None."""
        return self._values.get(name)

    def text(self, name: str, longest: int) -> str | None:
        """Return a text of 1 to `longest` characters without controls and without blanks at its ends."""
        if name not in self._values:
            return None
        value = self._values[name]
        if not isinstance(value, str):
            self.note(name, "text-form", "a text is needed here; write it in quotes")
            return None
        fault = fault_of_text(value, longest)
        if fault is not None:
            self.note(name, *fault)
            return None
        return value

    def choice(self, name: str, choices: tuple[str, ...]) -> str | None:
        """Return a text that is one of `choices`."""
        if name not in self._values:
            return None
        value = self._values[name]
        if not isinstance(value, str) or value not in choices:
            self.note(name, "choice", f"not one of the words used here; write {' or '.join(choices)}")
            return None
        return value

    def whole(self, name: str, least: int, most: int) -> int | None:
        """Return a whole JSON number from `least` to `most`."""
        if name not in self._values:
            return None
        value = self._values[name]
        if isinstance(value, bool) or not isinstance(value, int):
            self.note(name, "number-form", "a whole number is needed here; write it without point and quotes")
            return None
        if not least <= value <= most:
            self.note(name, "out-of-range", f"out of range; write a number from {least} to {most}")
            return None
        return value

    def flag(self, name: str) -> bool | None:
        """Return true or false."""
        if name not in self._values:
            return None
        value = self._values[name]
        if not isinstance(value, bool):
            self.note(name, "flag-form", "true or false is needed here, without quotes")
            return None
        return value

    def quantity(
        self,
        name: str,
        dimension: Dimension | tuple[Dimension, ...],
        *,
        zero: bool,
        also: frozenset[str] = frozenset(),
    ) -> Quantity | None:
        """Return a quantity of 0 or more, or above 0 where `zero` is false."""
        if name not in self._values:
            return None
        found = quantity_or_fault(self._values[name], self.at(name), dimension, also=also)
        if isinstance(found, Fault):
            self._faults.keep(found)
            return None
        if found.value < 0:
            self._faults.note(f"{self.at(name)}/value", "negative", "below zero; write a positive figure")
            return None
        if found.value == 0 and not zero:
            detail = "zero makes no sense here; write the true figure, or leave the line out"
            self._faults.note(f"{self.at(name)}/value", "zero", detail)
            return None
        return found

    def weight_got(self, how: str | None) -> Quantity | None:
        """Return the weight of a line that says how it was got: a standard one is not typed, any other must
        be.
        """
        if how == "standard":
            if "weight" in self:
                detail = "a standard weight comes from a table; leave the weight out, or say how it is known"
                self.note("weight", "weight-with-standard", detail)
            return None
        if "weight" not in self:
            if how is not None:
                self.note("weight", "missing", "the weight is missing and none is assumed; state it")
            return None
        return self.quantity("weight", Dimension.WEIGHT, zero=False)

    def inner(self, name: str, required: tuple[str, ...], optional: tuple[str, ...] = ()) -> "Fields | None":
        """Return an object inside this one, or None when the field is absent."""
        if name not in self._values:
            return None
        return Fields(self._values[name], self.at(name), self._faults, required, optional)

    def mapping(self, name: str) -> "Fields | None":
        """Return an object inside this one without looking at its fields; None, and no fault, when it is no
        object.
        """
        value = self._values.get(name)
        if not isinstance(value, Mapping):
            return None
        return Fields(value, self.at(name), self._faults, tuple(value))

    def named(
        self, name: str, known: tuple[str, ...], code: str, what: str, *, all_needed: bool
    ) -> "Fields | None":
        """Return an object whose field names are ids; an unknown one gets `code`."""
        if name not in self._values:
            return None
        value = self._values[name]
        if isinstance(value, Mapping):
            for key in value:
                if key not in known:
                    where = f"{self.at(name)}{pointer_step(str(key)[:LONGEST_KEY])}"
                    self._faults.note(
                        where, code, f"no such {what}; the basis has {', '.join(known) or 'none'}"
                    )
            value = {key: given for key, given in value.items() if key in known}
        return Fields(
            value, self.at(name), self._faults, known if all_needed else (), () if all_needed else known
        )

    def words(self, name: str, most: int, longest: int) -> "tuple[tuple[str, str], ...]":
        """Return the texts of a list, each with its pointer; one that stands twice gets `duplicate`."""
        value = self._values.get(name, ())
        if not isinstance(value, list | tuple):
            self.note(name, "list-form", "a list is needed here; write [...], or leave it out")
            return ()
        if len(value) > most:
            self.note(name, "too-many", f"{len(value)} lines; at most {most} are read")
            return ()
        numbered = {str(place): each for place, each in enumerate(value)}
        entries = Fields(numbered, self.at(name), self._faults, (), tuple(numbered))
        found: list[tuple[str, str]] = []
        for place in numbered:
            word = entries.text(place, longest)
            if word is not None and word in {earlier for _, earlier in found}:
                entries.note(place, "duplicate", "stands here twice; remove one")
            elif word is not None:
                found.append((entries.at(place), word))
        return tuple(found)

    def note_at(self, pointer: str, code: str, detail: str) -> None:
        """Note a fault at a pointer that another method gave."""
        self._faults.note(pointer, code, detail)

    def objects(
        self, name: str, most: int, required: tuple[str, ...], optional: tuple[str, ...] = ()
    ) -> "tuple[Fields, ...]":
        """Return the objects of a list of at most `most` lines; () when it is absent or no list."""
        if name not in self._values:
            return ()
        value = self._values[name]
        if not isinstance(value, list | tuple):
            self.note(name, "list-form", "a list is needed here; write [...], empty if there is nothing")
            return ()
        if len(value) > most:
            self.note(name, "too-many", f"{len(value)} lines; at most {most} are read, so put lines together")
            return ()
        where = self.at(name)
        return tuple(
            Fields(line, f"{where}/{place}", self._faults, required, optional)
            for place, line in enumerate(value)
        )


def fault_of_text(value: str, longest: int) -> tuple[str, str] | None:
    """Return code and detail of what is wrong with a text, or None."""
    if not value.strip():
        return "empty", "the text is empty; fill it in"
    if len(value) > longest:
        return "too-long", f"{len(value)} characters; at most {longest} are kept, so shorten it"
    if not value.isprintable() or not value.isascii():
        for character in value:
            if character in _DIRECTION_MARKS or unicodedata.category(character) in _REFUSED_CATEGORIES:
                return "control-character", "a control character is in the text; type it again without"
    if value != value.strip():
        return "untrimmed", "blanks stand before or after the text; remove them"
    return None

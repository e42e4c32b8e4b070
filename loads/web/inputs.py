"""The inputs of a page as plain values: what each is called, holds, offers, and what was wrong with it."""

from collections.abc import Mapping
from dataclasses import dataclass, replace

Choices = tuple[tuple[str, str], ...]


@dataclass(frozen=True, slots=True)
class Field:
    """One input: its name, what it holds now and what was wrong with it."""

    name: str
    label: str
    value: str
    fault: str = ""
    choices: Choices = ()
    title: str = ""
    hint: str = ""
    type: str = "text"
    figure: bool = False
    maximum: int = 0
    focus: bool = False


@dataclass(frozen=True, slots=True)
class Maker:
    """Makes inputs from what was typed and the faults found, by input name; the page begins at `focus`."""

    typed: Mapping[str, str]
    faults: Mapping[str, str]
    focus: str = ""

    def text(
        self, name: str, label: str, *, maximum: int = 80, title: str = "", hint: str = "", kind: str = "text"
    ) -> Field:
        """This function will return an input for words."""
        return Field(
            name,
            label,
            self.typed.get(name, ""),
            self.faults.get(name, ""),
            (),
            title or label,
            hint,
            kind,
            False,
            maximum,
            name == self.focus,
        )

    def figure(self, name: str, label: str, *, title: str = "", hint: str = "") -> Field:
        """This function will return an input for one figure."""
        return replace(self.text(name, label, maximum=20, title=title, hint=hint), figure=True)

    def choice(self, name: str, label: str, choices: Choices, *, first: str = "", title: str = "") -> Field:
        """This function will return a list to choose from; `first` is chosen while nothing was typed.

        A word typed elsewhere that is in no list is added: left out, the browser would choose another for it.
        """
        value = self.typed.get(name, first)
        if value and value not in {word for word, _ in choices}:
            choices = (*choices, (value, value))
        fault, focus = self.faults.get(name, ""), name == self.focus
        return Field(name, label, value, fault, choices, title or label, focus=focus)

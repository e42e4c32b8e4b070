"""Reads a page as a browser without script would: headings, links, words, and forms with what they hold."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from html.parser import HTMLParser

from django.http import HttpResponse

VOID = frozenset({"input", "meta", "link", "br", "col", "img", "hr"})
HEADINGS = ("h1", "h2", "h3")
WITHIN_A_LINE = frozenset({"a", "span", "strong", "title"})


@dataclass
class Form:
    """One form: where it goes, and the values of its inputs as they would be sent."""

    action: str
    method: str
    values: dict[str, str] = field(default_factory=dict)
    buttons: list[tuple[str, str]] = field(default_factory=list)
    labelled: set[str] = field(default_factory=set)

    def filled(self, changes: Mapping[str, str], *, press: str = "") -> dict[str, str]:
        """This function will return what is sent; only inputs the form has can be filled, as in a browser."""
        strange = set(changes) - set(self.values)
        assert not strange, f"the form has no input {strange}"
        pressed = [name for name, value in self.buttons if value == press]
        assert pressed or not press, f"the form has no button {press}"
        return self.values | changes | ({pressed[0]: press} if press else {})


class Page(HTMLParser):
    """One page. `words` is everything that is read, blanks run together."""

    def __init__(self, response: HttpResponse) -> None:
        super().__init__()
        assert response["Content-Type"].startswith("text/html"), response["Content-Type"]
        self.status = response.status_code
        self.forms: list[Form] = []
        self.links: dict[str, str] = {}
        self.headings: list[tuple[str, str]] = []
        self.faults: dict[str, str] = {}
        self.alerts: list[str] = []
        self._stack: list[tuple[str, dict[str, str], list[str]]] = []
        self._words: list[str] = []
        self._select = ""
        self._chosen: str | None = None
        self.feed(response.content.decode())
        self.close()
        self.words = " ".join("".join(self._words).split())

    @property
    def h1(self) -> str:
        """The one heading of the first order."""
        found = [words for level, words in self.headings if level == "h1"]
        assert len(found) == 1, found
        return found[0]

    def form(self, action: str) -> Form:
        """This function will return the one form whose address ends so; `""` is the page's own."""
        found = [one for one in self.forms if (one.action.endswith(action) if action else not one.action)]
        assert len(found) == 1, [one.action for one in self.forms]
        return found[0]

    def actions(self) -> set[str]:
        """This function will return the last word of each form's address, sign-out left out."""
        return {one.action.rpartition("/")[2] for one in self.forms} - {"sign-out"}

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """This function will keep what a tag begins."""
        held = {name: value or "" for name, value in attrs}
        self._part(tag)
        if tag == "form":
            self.forms.append(Form(held.get("action", ""), held.get("method", "get")))
        elif tag == "input":
            self._input(held)
        elif tag == "select":
            self.forms[-1].values[held["name"]] = ""
            self._select, self._chosen = held["name"], None
        elif tag == "option":
            self._option(held)
        elif tag == "button" and self.forms:
            self.forms[-1].buttons.append((held.get("name", ""), held.get("value", "")))
        if tag not in VOID:
            self._stack.append((tag, held, []))

    def handle_endtag(self, tag: str) -> None:
        """This function will keep the words of what ends, by what it was."""
        self._part(tag)
        while self._stack:
            began, held, parts = self._stack.pop()
            words = " ".join("".join(parts).split())
            if began in HEADINGS:
                self.headings.append((began, words))
            if began == "a":
                self.links[words] = held.get("href", "")
            if held.get("id", "").endswith(":fault"):
                self.faults[held["id"].removesuffix(":fault")] = words
            if held.get("role") == "alert":
                self.alerts.append(words)
            if began == tag:
                break

    def handle_data(self, data: str) -> None:
        """This function will keep words for all they stand in."""
        self._words.append(data)
        for _, _, parts in self._stack:
            parts.append(data)

    def _part(self, tag: str) -> None:
        if tag not in WITHIN_A_LINE:
            self.handle_data(" ")

    def _input(self, held: dict[str, str]) -> None:
        form = self.forms[-1]
        if held.get("type") == "checkbox" and "checked" not in held:
            form.values.setdefault(held["name"], "")
            return
        form.values[held["name"]] = held.get("value", "")

    def _option(self, held: dict[str, str]) -> None:
        # Without a chosen one a browser sends the first.
        if "selected" in held or self._chosen is None:
            self._chosen = self.forms[-1].values[self._select] = held.get("value", "")

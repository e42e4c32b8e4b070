"""What happens to an accepted load: a last-minute change, and notes once it departed."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any
from uuid import UUID, uuid4

from service.client.exchange import Exchange
from service.client.reading import read
from service.client.shapes import Load, LoadLine, load_in


@dataclass(frozen=True, slots=True)
class LatePreview:
    """A last-minute change worked out, nothing stored. `digest` is what the pilot in command signs; `lines`
    are the words the manifest of issue `issue` will print, `to_sign` those that are signed.
    """

    verdict: str
    digest: str
    issue: int
    lines: tuple[str, ...]
    to_sign: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


@dataclass(frozen=True, slots=True)
class Note:
    """A note after flight."""

    id: str
    written_at: str
    text: str


class LateChanges:
    """Changes at the door, and corrections after flight."""

    _exchange: Exchange

    def preview_late_change(self, load: Load | LoadLine, change: Mapping[str, object]) -> LatePreview:
        """This function will have a change of an accepted load computed: its `lines` and the
        `persons_on_board` there are then. Nothing is stored.
        """
        path = f"/loads/{UUID(load.id)}/last-minute-changes/preview"
        return _preview_in(self._exchange.post(path, change).document())

    def change_late(
        self,
        load: Load | LoadLine,
        change: Mapping[str, object],
        preview: LatePreview,
        password: str,
        *,
        key: str = "",
    ) -> Load:
        """This function will make the change that was previewed and accept the load again, in one step. Only
        the token of its pilot in command does it, with their password and the scope `sign`.
        """
        path = f"/loads/{UUID(load.id)}/last-minute-changes"
        signed = {**change, "digest": preview.digest, "password": password}
        return load_in(self._exchange.post(path, signed, key=key or str(uuid4()), etag=load.etag))

    def write_note(self, load: Load | LoadLine, text: str, *, key: str = "") -> Note:
        """This function will say what was wrong on a load that departed; its manifest stays as it is."""
        path = f"/loads/{UUID(load.id)}/notes"
        return _note_in(self._exchange.post(path, {"text": text}, key=key or str(uuid4())).document())


def _preview_in(body: Mapping[str, Any]) -> LatePreview:
    named = ("verdict", "digest", "issue", "to_sign")
    return read(
        lambda one: LatePreview(**{name: one[name] for name in named}, lines=tuple(one["lines"]), body=one),
        body,
    )


def _note_in(body: Mapping[str, Any]) -> Note:
    return read(lambda one: Note(one["id"], one["written_at"], one["text"]), body)

"""What a backup says about itself: its parts with their digests, where every chain ended, how many rows.

A folder of a backup holds `database.dump`, `manifest.json` and `manifest.sha256`, in a form that
`sha256sum --check` reads. Nothing else belongs there; keys never do.
"""

import hashlib
import json
import os
from dataclasses import dataclass
from pathlib import Path
from typing import Any, Final

SCHEMA: Final = "tarebook.backup/1"
MANIFEST: Final = "manifest.json"
DIGEST: Final = "manifest.sha256"
DUMP: Final = "database.dump"
_CHUNK: Final = 1024 * 1024


class BackupRefused(Exception):
    """A backup that cannot be made or used, with a sentence that says why."""


@dataclass(frozen=True, slots=True)
class Manifest:
    """What stands in `manifest.json`: heads are (chain, position, digest), parts (name, bytes, SHA-256),
    migrations (application, last name).
    """

    made_at: str
    server: str
    engine: str
    key_check: str
    sound: bool
    heads: tuple[tuple[str, int, str | None], ...]
    rows: dict[str, int]
    migrations: tuple[tuple[str, str], ...]
    parts: tuple[tuple[str, int, str], ...]

    def as_document(self) -> dict[str, Any]:
        """This function will return the document that is written."""
        return {
            "schema": SCHEMA,
            "made_at": self.made_at,
            "server": self.server,
            "engine": self.engine,
            "key_check": self.key_check,
            "sound": self.sound,
            "heads": [{"chain": c, "position": p, "digest": d} for c, p, d in self.heads],
            "rows": self.rows,
            "migrations": [{"of": app, "last": last} for app, last in self.migrations],
            "parts": [{"name": n, "bytes": size, "sha256": digest} for n, size, digest in self.parts],
        }


def part(path: Path) -> tuple[str, int, str]:
    """This function will return name, bytes and SHA-256 (lower-case hex) of a file."""
    whole, size = hashlib.sha256(), 0
    with path.open("rb") as file:
        while chunk := file.read(_CHUNK):
            whole.update(chunk)
            size += len(chunk)
    return path.name, size, whole.hexdigest()


def write(folder: Path, manifest: Manifest) -> str:
    """This function will write the manifest and its digest, and return the digest."""
    text = json.dumps(manifest.as_document(), indent=1, ensure_ascii=False) + "\n"
    digest = hashlib.sha256(text.encode()).hexdigest()
    _write_private(folder / MANIFEST, text)
    _write_private(folder / DIGEST, f"{digest}  {MANIFEST}\n")
    return digest


def read(folder: Path) -> Manifest:
    """This function will return the manifest of a backup whose every byte is as it was written.

    Raises BackupRefused for anything missing, changed, added or not understood.
    """
    try:
        text = (folder / MANIFEST).read_bytes()
        noted = (folder / DIGEST).read_text(encoding="ascii")
    except (OSError, UnicodeDecodeError) as problem:
        raise BackupRefused(
            f"{folder} holds no backup that can be read ({type(problem).__name__})."
        ) from problem
    if noted != f"{hashlib.sha256(text).hexdigest()}  {MANIFEST}\n":
        raise BackupRefused(f"{folder / MANIFEST} is not as it was written: its digest is another.")
    manifest = _understood(folder, text)
    for name, size, digest in manifest.parts:
        try:
            found = part(folder / name)
        except OSError as problem:
            raise BackupRefused(f"{folder / name} cannot be read ({problem.strerror}).") from problem
        if found != (name, size, digest):
            raise BackupRefused(
                f"{folder / name} is not as it was written: {found[1]} bytes with digest {found[2]}, "
                f"where {size} with {digest} were noted."
            )
    return manifest


def _understood(folder: Path, text: bytes) -> Manifest:
    try:
        document = json.loads(text)
        if document["schema"] != SCHEMA:
            raise BackupRefused(f"{folder / MANIFEST} is of another form: {document['schema']}.")
        manifest = Manifest(
            made_at=document["made_at"],
            server=document["server"],
            engine=document["engine"],
            key_check=document["key_check"],
            sound=document["sound"],
            heads=tuple((one["chain"], one["position"], one["digest"]) for one in document["heads"]),
            rows=dict(document["rows"]),
            migrations=tuple((one["of"], one["last"]) for one in document["migrations"]),
            parts=tuple((one["name"], one["bytes"], one["sha256"]) for one in document["parts"]),
        )
    except (ValueError, TypeError, KeyError) as problem:
        raise BackupRefused(
            f"{folder / MANIFEST} cannot be understood ({type(problem).__name__})."
        ) from problem
    if [name for name, *_ in manifest.parts] != [DUMP]:
        raise BackupRefused(f"{folder / MANIFEST} does not name {DUMP} as its one part.")
    return manifest


def _write_private(path: Path, text: str) -> None:
    with os.fdopen(os.open(path, os.O_WRONLY | os.O_CREAT | os.O_EXCL, 0o600), "w", encoding="utf-8") as file:
        file.write(text)
        file.flush()
        os.fsync(file.fileno())

"""The generated passwords of the roles of an embedded cluster, beside its data, readable by this account
only.
"""

import json
import os
import secrets
from pathlib import Path

ROLES = ("postgres", "tarebook_owner", "tarebook_service")


def passwords_of(data: Path) -> dict[str, str]:
    """Return the password of each role of the cluster, made and written at the first call."""
    path = data.with_name(f"{data.name}.passwords")
    if path.exists():
        found: dict[str, str] = json.loads(path.read_text())
        return found
    made = {role: secrets.token_urlsafe(24) for role in ROLES}
    write_private(path, json.dumps(made))
    return made


def write_private(path: Path, text: str) -> None:
    """Write a file of mode 600, whole or not at all."""
    path.parent.mkdir(parents=True, exist_ok=True)
    fresh = path.with_name(path.name + ".new")
    fresh.unlink(missing_ok=True)
    with os.fdopen(os.open(fresh, os.O_WRONLY | os.O_CREAT | os.O_EXCL, 0o600), "w") as file:
        file.write(text)
        file.flush()
        os.fsync(file.fileno())
    fresh.replace(path)

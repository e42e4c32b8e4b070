"""The secrets of an installation under docker-compose.yml: `python3 -m service.compose_secrets [FOLDER]`.

Needs nothing but Python. What is there is kept, so it can be run again.
"""

import os
import secrets
import sys
from pathlib import Path

_HOST = "database"  # the database's name in docker-compose.yml
_ROLES = {"superuser": ("postgres", "postgres"), "owner": ("tarebook_owner", "tarebook")}
_ROLES["service"] = ("tarebook_service", "tarebook")


def make(folder: Path) -> tuple[str, ...]:
    """Make whatever secret is missing in the folder, and return the names of those made."""
    folder.mkdir(parents=True, exist_ok=True, mode=0o700)
    made = []
    for name in (*(f"{role}-password" for role in _ROLES), "secret-key", "metrics-token"):
        if not (folder / name).exists():
            _write(folder / name, secrets.token_urlsafe(48))
            made.append(name)
    if not (folder / "mail-password").exists():
        _write(folder / "mail-password", "")  # given by whoever runs the mail server
        made.append("mail-password")
    for role, (login, database) in _ROLES.items():
        password = (folder / f"{role}-password").read_text().strip()
        address = f"postgresql://{login}:{password}@{_HOST}:5432/{database}"
        path = folder / f"{role}-url"
        if not path.exists() or path.read_text().strip() != address:
            path.unlink(missing_ok=True)
            _write(path, address)
            made.append(path.name)
    return tuple(made)


def _write(path: Path, text: str) -> None:
    # Readable by others inside the folder that only its owner may enter: compose mounts a secret as it
    # stands, and the programs in the containers run as an account of their own.
    with os.fdopen(os.open(path, os.O_WRONLY | os.O_CREAT | os.O_EXCL, 0o644), "w") as file:
        file.write(text + "\n")


if __name__ == "__main__":
    place = Path(sys.argv[1]) if len(sys.argv) > 1 else Path(".tarebook/secrets")
    print(f"Made in {place}: {', '.join(make(place)) or 'nothing, all were there'}")

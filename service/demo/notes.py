"""What the invented operator's entering remembers between tries: the one password, tokens, what is done.

Kept in the data folder, readable by its owner only. Tokens are shown once by the service, so they stand
here: a try that
was cut short goes on with the same keys, and nothing is entered twice.
"""

import json
import os
import secrets
from pathlib import Path
from typing import Any


class Notes:
    """A small JSON file that is rewritten whole at every change."""

    def __init__(self, data: Path) -> None:
        self._path = data / "invented-operator.json"
        self._found: dict[str, Any] = json.loads(self._path.read_text("utf-8")) if self._path.exists() else {}

    @property
    def entered(self) -> bool:
        """Whether the whole day was entered."""
        return bool(self._found.get("entered"))

    @property
    def password(self) -> str:
        """The password of every invented login, made once a data folder."""
        if "password" not in self._found:
            self.keep("password", secrets.token_urlsafe(12))
        return str(self._found["password"])

    def get(self, name: str) -> Any:
        """This function will return what was kept under `name`, or None."""
        return self._found.get(name)

    def keep(self, name: str, value: Any) -> None:
        """This function will keep a value; the file is replaced in one step."""
        self._found[name] = value
        fresh = self._path.with_suffix(".new")
        with os.fdopen(
            os.open(fresh, os.O_WRONLY | os.O_CREAT | os.O_TRUNC, 0o600), "w", encoding="utf-8"
        ) as file:
            json.dump(self._found, file, indent=1)
        fresh.replace(self._path)

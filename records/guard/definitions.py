"""What the functions of the door must be, read from the files they are installed from."""

import re
from dataclasses import dataclass
from functools import cache
from pathlib import Path

SQL = Path(__file__).resolve().parent.parent / "sql"
_FUNCTION = re.compile(
    r"^CREATE OR REPLACE FUNCTION (?P<name>\w+)\((?P<head>.*?)\bAS \$\$(?P<body>.*?)\$\$",
    re.DOTALL | re.MULTILINE,
)
_PINNED = re.compile(r"""\bSET "?(\w+)"? = ('[^']*'|[\w, ]+?)(?=\s+SET\b|\s*$)""")


@dataclass(frozen=True, slots=True)
class Definition:
    """One SQL function: its body to the letter, whether it runs with its owner's rights, and what it pins."""

    name: str
    body: str
    with_owners_rights: bool
    pinned: frozenset[str]


@cache
def functions() -> tuple[Definition, ...]:
    """This function will return every function the files in records/sql define."""
    return tuple(
        _read(found)
        for path in sorted(SQL.glob("*.sql"))
        for found in _FUNCTION.finditer(path.read_text("utf-8"))
    )


def _read(found: re.Match[str]) -> Definition:
    head = " ".join(found["head"].split())
    pinned = frozenset(f"{name}={value.strip(chr(39))}" for name, value in _PINNED.findall(head))
    return Definition(found["name"], found["body"], "SECURITY DEFINER" in head, pinned)

"""What the house tests look at: the files that git tracks or would track."""

import ast
import subprocess
from functools import cache
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
ROOMS = ("service", "loads", "fleet", "records")


@cache
def files() -> tuple[Path, ...]:
    """This function will return every file of the house that is there now, without what git ignores."""
    listed = subprocess.run(
        ["git", "ls-files", "--cached", "--others", "--exclude-standard", "-z"],
        cwd=ROOT,
        capture_output=True,
        check=True,
        text=True,
    ).stdout
    return tuple(path for name in sorted(listed.split("\0")) if name and (path := ROOT / name).is_file())


def sources(*, tests: bool = False) -> tuple[Path, ...]:
    """This function will return the Python files of the rooms (or of the tests), without migrations."""
    wanted = ("tests",) if tests else (*ROOMS, "manage.py")
    return tuple(
        path
        for path in files()
        if path.suffix == ".py"
        and path.relative_to(ROOT).parts[0] in wanted
        and "migrations" not in path.relative_to(ROOT).parts
    )


def shown(path: Path) -> str:
    """This function will return the path as people write it."""
    return str(path.relative_to(ROOT))


@cache
def parsed(path: Path) -> ast.Module:
    """This function will return the file's syntax tree."""
    return ast.parse(path.read_text(encoding="utf-8"))

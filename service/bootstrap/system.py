"""What the system itself must bring: the text-layout libraries behind the PDF, and Python's `venv`.

As root on Debian or Ubuntu what is missing is said and then installed; anyone else gets the line to run, and
nothing is changed.
"""

import ctypes
import importlib.util
import os
import platform
import shutil
import subprocess
from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path

from service.bootstrap.speech import say
from service.embedded.stopped import Stopped


@dataclass(frozen=True)
class Piece:
    """Something a system package brings: the package on Debian, what it is for, and whether all works without
    it.
    """

    package: str
    purpose: str
    library: str = ""
    optional: bool = False


_DRAWN_BY = "lays out the text of the PDF"
LIBRARIES = (
    Piece("libpango-1.0-0", _DRAWN_BY, "libpango-1.0.so.0"),
    Piece("libpangoft2-1.0-0", _DRAWN_BY, "libpangoft2-1.0.so.0"),
    Piece(
        "libharfbuzz-subset0",
        "makes the PDF small and quick to make",
        "libharfbuzz-subset.so.0",
        optional=True,
    ),
)
_MAC = {"libpango-1.0.so.0": "libpango-1.0.0.dylib", "libpangoft2-1.0.so.0": "libpangoft2-1.0.0.dylib"}
VENV = Piece("python3-venv", "makes the folder of Python packages")
BROWSER = Piece("chromium", "runs the tests of the pages in a browser", optional=True)
PAPER = Piece("poppler-utils", "turns paper into pictures and text for the tests", optional=True)


def missing(*, tests: bool) -> tuple[Piece, ...]:
    """Return what the system lacks for a run, or for the tests, in the order it is named."""
    found = [piece for piece in LIBRARIES if not _loads(piece.library)]
    if importlib.util.find_spec("ensurepip") is None and shutil.which("uv") is None:
        found.append(VENV)
    if tests:
        found += (
            [BROWSER] if not any(map(shutil.which, ("chromium", "chromium-browser", "google-chrome"))) else []
        )
        found += [PAPER] if not shutil.which("pdftoppm") else []
    return tuple(found)


def make_ready(*, tests: bool, may_install: bool) -> None:
    """Install what the system lacks where we may, else stop with the line that does it. Raises `Stopped`."""
    refuse_musl()
    lacking = missing(tests=tests)
    if not lacking:
        return
    if may_install and _is_debian() and os.geteuid() == 0:
        _install(lacking)
        lacking = tuple(piece for piece in missing(tests=tests) if not piece.optional)
    required = tuple(piece for piece in lacking if not piece.optional)
    if required:
        raise Stopped(_sentence(required, lacking))
    for piece in lacking:
        say(f"Going on without {piece.package}, which {piece.purpose}. To have it: {_line([piece])}")


def refuse_musl() -> None:
    """Stop on a system built on musl (Alpine), for which the packages are not published."""
    if platform.system() == "Linux" and not platform.libc_ver()[0] and list(Path("/lib").glob("ld-musl-*")):
        raise Stopped(
            "Tarebook needs a system with glibc, such as Debian or Ubuntu; no packages are made for musl."
        )


def _loads(library: str) -> bool:
    name = _MAC.get(library, library) if platform.system() == "Darwin" else library
    for place in (name, f"/opt/homebrew/lib/{name}", f"/usr/local/lib/{name}"):
        try:
            ctypes.CDLL(place)
        except OSError:
            continue
        return True
    return False


def _is_debian() -> bool:
    try:
        words = platform.freedesktop_os_release()
    except OSError:
        return False
    family = {words.get("ID", ""), *words.get("ID_LIKE", "").split()}
    return bool(family & {"debian", "ubuntu"}) and shutil.which("apt-get") is not None


def _line(pieces: Iterable[Piece]) -> str:
    if platform.system() == "Darwin":
        return "brew install pango"
    if not _is_debian():
        return "install Pango 1.44 or newer, HarfBuzz and Python's venv with the system's own package manager"
    sudo = "" if os.geteuid() == 0 else "sudo "
    return f"{sudo}apt-get install --no-install-recommends -y {' '.join(piece.package for piece in pieces)}"


def _sentence(required: tuple[Piece, ...], lacking: tuple[Piece, ...]) -> str:
    names = ", ".join(f"{piece.package} ({piece.purpose})" for piece in required)
    return f"This system lacks {names}. Run this line, then the same command again:\n  {_line(lacking)}"


def _install(pieces: tuple[Piece, ...]) -> None:
    for piece in pieces:
        say(f"The system lacks {piece.package}, which {piece.purpose}.")
    say("Installing with apt-get, as this runs as root (--no-system-libraries refuses this).")
    quiet = {**os.environ, "DEBIAN_FRONTEND": "noninteractive"}
    subprocess.run(("apt-get", "update", "-q", "-q"), env=quiet, check=False, stdin=subprocess.DEVNULL)
    needed = [piece.package for piece in pieces if not piece.optional]
    wished = [piece.package for piece in pieces if piece.optional]
    # The optional ones one by one: a release that lacks one of them must not cost us the others.
    for packages in ([needed] if needed else []) + [[one] for one in wished]:
        command = ("apt-get", "install", "-q", "-q", "-y", "--no-install-recommends", *packages)
        say(f"  {' '.join(command)}")
        done = subprocess.run(
            command, env=quiet, check=False, stdin=subprocess.DEVNULL, stdout=subprocess.DEVNULL
        )
        if done.returncode != 0:
            say(f"  apt-get could not install {' '.join(packages)}; it says why above.")
    importlib.invalidate_caches()

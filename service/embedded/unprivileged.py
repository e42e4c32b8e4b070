"""Running a server that refuses to run as root, when we are root.

Nobody is made and no mode of a folder above ours is changed. The server runs as the system's `nobody`, and
keeps one single capability, to read and pass folders it does not own, because a home of root has mode 700.
Where that capability cannot be had (many containers), programs and data go to a state folder of the system
instead, which `nobody` can reach.
"""

import functools
import hashlib
import os
import pwd
import shutil
import subprocess
from dataclasses import dataclass
from pathlib import Path

STATE = Path("/var/lib/tarebook")
_READING = ("--inh-caps=+dac_read_search", "--ambient-caps=+dac_read_search", "--securebits=+no_setuid_fixup")


@dataclass(frozen=True)
class Account:
    """How to run a server: the words before its command, who owns its files, and whether it can pass closed
    folders.
    """

    prefix: tuple[str, ...] = ()
    uid: int | None = None
    gid: int | None = None
    passes_closed_folders: bool = True


def account() -> Account:
    """Return the account servers run as: this one, or `nobody` when we are root."""
    return _nobody() if os.geteuid() == 0 else Account()


@functools.cache
def _nobody() -> Account:
    uid = pwd.getpwnam("nobody").pw_uid
    gid = pwd.getpwuid(uid).pw_gid
    setpriv = shutil.which("setpriv") or "setpriv"
    plain = (setpriv, f"--reuid={uid}", f"--regid={gid}", "--clear-groups", "--no-new-privs")
    reading = (*plain[:-1], *_READING, plain[-1])
    if _works((*reading, "true")):
        return Account(reading, uid, gid)
    return Account(plain, uid, gid, passes_closed_folders=False)


def _works(command: tuple[str, ...]) -> bool:
    try:
        return subprocess.run(command, capture_output=True, check=False, cwd="/").returncode == 0
    except OSError:
        return False


def hand_over(folder: Path, to: Account) -> None:
    """Give a folder, not its contents, to the account and close it to everybody else."""
    folder.mkdir(parents=True, exist_ok=True, mode=0o700)
    if to.uid is not None and to.gid is not None:
        os.chown(folder, to.uid, to.gid)
    folder.chmod(0o700)


def reachable(path: Path, to: Account) -> bool:
    """Return whether the account can read this path where it stands."""
    return to.passes_closed_folders or _works((*to.prefix, "test", "-r", str(path)))


def state_folder(purpose: str) -> Path:
    """Return the folder under the system's state that stands in for one that cannot be reached."""
    return STATE / hashlib.sha256(purpose.encode()).hexdigest()[:12]

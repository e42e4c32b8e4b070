"""Where the sockets of database and broker stand."""

import hashlib
import os
import tempfile
from pathlib import Path

from service.embedded.stopped import Stopped
from service.embedded.unprivileged import Account, hand_over

# The kernel's sun_path holds 108 bytes with the closing zero (unix(7)), 104 on macOS; the longest name we put
# in a folder.
_ROOM = 103
_LONGEST_NAME = ".s.PGSQL.5432"


def socket_folder(wanted: Path, to: Account) -> Path:
    """Make and return a private folder for sockets: the one wanted, or a short one named by a hash of it.

    The path of a socket is limited to about a hundred bytes, however long a path the file system allows.
    """
    folder = wanted
    if len(os.fsencode(wanted / _LONGEST_NAME)) > _ROOM:
        name = hashlib.sha256(os.fsencode(wanted)).hexdigest()[:16]
        folder = Path(tempfile.gettempdir()) / f"tarebook-{os.geteuid()}-{name}"
        if len(os.fsencode(folder / _LONGEST_NAME)) > _ROOM:
            folder = Path("/tmp") / folder.name  # noqa: S108 - owner and kind are checked below
        _refuse_a_strangers(folder, to)
    hand_over(folder, to)
    return folder


def _refuse_a_strangers(folder: Path, to: Account) -> None:
    """Anyone may put a folder of this name into the shared temporary folder beforehand."""
    try:
        found = folder.lstat()
    except FileNotFoundError:
        folder.mkdir(mode=0o700)
        return
    ours = {os.geteuid(), to.uid} - {None}
    if folder.is_symlink() or not folder.is_dir() or found.st_uid not in ours:
        raise Stopped(f"{folder} belongs to someone else; remove it, or give --data a shorter path.")

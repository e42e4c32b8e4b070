"""From the command line to the right program: `start`, `test` and `prove` before any setting is read, the
rest to Django.
"""

import importlib.util
import os
import sys
from pathlib import Path

from service.bootstrap import environment, system
from service.bootstrap.speech import complain
from service.embedded.stopped import Stopped

_REFUSE = "--no-system-libraries"


def run(arguments: list[str]) -> int:
    """Run one command of `manage.py` and return its exit code, 2 when it cannot go on and says why."""
    try:
        return _run(arguments)
    except Stopped as why:
        complain(f"Tarebook: {why}")
        return 2
    except KeyboardInterrupt:
        complain("Stopped by Ctrl-C.")
        return 130


def _run(arguments: list[str]) -> int:
    command = arguments[0] if arguments else "help"
    if command == "start":
        _inside("run", arguments, may_install=_REFUSE not in arguments)
        from service.start.command import start  # noqa: PLC0415 - needs the packages

        return start([word for word in arguments[1:] if word != _REFUSE])
    if command == "test":
        _inside("tests", arguments, may_install=_REFUSE not in arguments)
        from service.gate import gate  # noqa: PLC0415 - not needed by the other commands

        return gate([word for word in arguments[1:] if word != _REFUSE])
    if command == "prove":
        _inside("tests", arguments, may_install=_REFUSE not in arguments)
        from service.prove.command import prove  # noqa: PLC0415 - not needed by the other commands

        return prove([word for word in arguments[1:] if word != _REFUSE])
    # In an image, or in a folder of packages of one's own, Django is already there.
    if importlib.util.find_spec("django") is None:
        _inside("run", arguments, may_install=False)
    from service.start.other import run_django  # noqa: PLC0415 - needs the packages

    return run_django(arguments or ["help"])


def _inside(wanted: str, arguments: list[str], *, may_install: bool) -> None:
    """Go on in the folder of packages: at once if this is its Python, else by becoming it."""
    # Taken out of the environment: a command started by this one decides for itself.
    if os.environ.pop("TAREBOOK_INSIDE", "") == wanted and _is_inside():
        return
    system.make_ready(tests=wanted == "tests", may_install=may_install)
    python = environment.ensure(wanted)
    manage = environment.ROOT / "manage.py"
    sys.stdout.flush()
    os.execve(  # noqa: S606 - the same program, under the Python that has the packages
        python,
        [str(python), str(manage), *arguments],
        {**environment.clean_environment(), "TAREBOOK_INSIDE": wanted},
    )


def _is_inside() -> bool:
    return Path(sys.prefix).absolute() == environment.folder()

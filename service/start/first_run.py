"""Entering the invented operator, in a process of its own: `-m service.start.first_run ADDRESS DATA`."""

import sys
from importlib import import_module
from pathlib import Path

import django


def main(address: str, data: Path) -> None:
    """Set Django up and run the invented day against the server at this address, unless the folder says it is
    entered.
    """
    # The demo imports models, which can be imported only once Django is set up.
    django.setup()
    demo = import_module("service.demo")

    demo.run(address, data)


if __name__ == "__main__":
    main(sys.argv[1], Path(sys.argv[2]))

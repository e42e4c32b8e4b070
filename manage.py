#!/usr/bin/env python3
"""The one command of Tarebook: `start`, `test`, and everything Django offers."""

import sys

if sys.version_info < (3, 11):  # noqa: UP036 - said in one sentence instead of a trace from deep inside
    sys.exit("Tarebook needs Python 3.11 or newer; this is %d.%d." % sys.version_info[:2])  # noqa: UP031 - old Pythons read this line

from service.bootstrap.dispatch import run

if __name__ == "__main__":
    sys.exit(run(sys.argv[1:]))

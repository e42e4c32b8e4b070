"""What is said while a machine is being made ready."""

import contextlib
import sys


def say(text: str) -> None:
    """Print one line of progress at once, also into a pipe."""
    # Nobody listens any more (a closed terminal, a pipe to `head`): what is being done goes on all the same.
    with contextlib.suppress(OSError):
        print(text, flush=True)


def complain(text: str) -> None:
    """Print the sentence that ends a run, on the error stream, after everything said before it."""
    with contextlib.suppress(OSError):
        sys.stdout.flush()
        print(text, file=sys.stderr, flush=True)

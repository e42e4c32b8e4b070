"""What is said while a machine is being made ready."""

import sys


def say(text: str) -> None:
    """Print one line of progress at once, also into a pipe."""
    print(text, flush=True)


def complain(text: str) -> None:
    """Print the sentence that ends a run, on the error stream, after everything said before it."""
    sys.stdout.flush()
    print(text, file=sys.stderr, flush=True)

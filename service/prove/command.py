"""`manage.py prove`: the long forms one after the other, and what each of them counted.

Each runs in a process of its own. With `--only NAME`, once or more, those alone; with `--list`, none.
"""

import argparse
import os
import subprocess
import sys
import time
from collections.abc import Sequence
from dataclasses import dataclass

from service.bootstrap.environment import ROOT, clean_environment
from service.bootstrap.speech import complain, say
from service.prove.items import ITEMS, Item


@dataclass(frozen=True, slots=True)
class Outcome:
    """What came of one long form: whether all of it held, what it said last, and how long it took."""

    item: Item
    held: bool
    last_line: str
    seconds: float


def prove(words: Sequence[str], items: Sequence[Item] = ITEMS) -> int:
    """Run the long forms, print what they counted, and return 0 when all held, 1 when one did not, 2 when
    one was named that there is not.
    """
    asked = _asked(words)
    if asked.list:
        for item in items:
            say(f"{item.name:<16} {item.promise}")
        return 0
    names = {item.name for item in items}
    if unknown := [name for name in asked.only if name not in names]:
        complain(f"There is no {', '.join(unknown)}. There are: {', '.join(item.name for item in items)}.")
        return 2
    outcomes = [_run(item) for item in items if not asked.only or item.name in asked.only]
    say("\nWhat was counted")
    for one in outcomes:
        word = "held" if one.held else "DID NOT HOLD"
        say(f"{word:<13} {one.item.name:<16} {one.seconds:7.0f} s  {one.last_line}")
    return 0 if all(one.held for one in outcomes) else 1


def _asked(words: Sequence[str]) -> argparse.Namespace:
    parser = argparse.ArgumentParser(prog="manage.py prove", description="The long forms of the promises.")
    parser.add_argument(
        "--only", action="append", default=[], metavar="NAME", help="this one; may be repeated"
    )
    parser.add_argument("--list", action="store_true", help="what there is to run")
    return parser.parse_args(list(words))


def _run(item: Item) -> Outcome:
    say(f"\n=== {item.name}: {item.promise}")
    begun, last = time.monotonic(), ""
    environment = {**clean_environment(), "TAREBOOK_LONG_FORMS": "1", "PYTHONUNBUFFERED": "1"}
    for name in ("DATABASE_URL", "OWNER_DATABASE_URL", "BROKER_URL"):
        environment.pop(name, None)  # nothing here touches a database that somebody uses
    with subprocess.Popen(
        (sys.executable, *item.words),
        cwd=ROOT,
        env=environment,
        stdout=subprocess.PIPE,
        stderr=subprocess.STDOUT,
        text=True,
    ) as running:
        for line in running.stdout or ():
            say(line.rstrip(os.linesep))
            last = line.strip() or last
    return Outcome(item, running.returncode == 0, last, time.monotonic() - begun)

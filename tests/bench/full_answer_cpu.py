"""CPU of one full answer: 20 items, four tanks, from the declaration to the result document, and with the
reading.

Run: `python -m tests.bench.full_answer_cpu`. The best of several rounds counts, since other work on the
machine only adds.
"""

import sys
import time
from collections.abc import Callable

from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.statement import digest_of, statement
from tests.pure.loads.making import load, twin, twin_empty

ITEMS = 20
ROUNDS, REPEATS = 100, 15  # short rounds: one that nothing else disturbs is among them
TARGET_MS = 1.0
PLACES = ("AFT-HOLD", "NOSE-HOLD", "WING-LOCKER")


def full_load() -> dict[str, object]:
    """Return the load of the tests with twenty items in pounds and kilograms, four of six seats taken."""
    items = [
        {
            "kind": "cargo",
            "what": f"box {number}",
            "place": PLACES[number % 3],
            "weight": {"value": f"{10 + number}.{number % 10}", "unit": "kg" if number % 2 else "lb"},
            "how": "weighed",
        }
        for number in range(ITEMS)
    ]
    return load(items=items)


def best_ms(work: Callable[[], object]) -> float:
    """Return the milliseconds of CPU of one call, in the best round."""
    return best_in_turns(work)[0]


def best_in_turns(*works: Callable[[], object]) -> list[float]:
    """Return the milliseconds of CPU of one call of each, in its best round; a round of each in turns, so
    that what else the machine does is the same for all.
    """
    best = [float("inf")] * len(works)
    for _ in range(ROUNDS):
        for number, work in enumerate(works):
            begun = time.process_time()
            for _ in range(REPEATS):
                work()
            best[number] = min(best[number], (time.process_time() - begun) / REPEATS)
    return [each * 1000 for each in best]


def main() -> int:
    """Print the table; exit 1 when the full answer takes longer than its target."""
    basis, empty, document = twin(), twin_empty(), full_load()
    declared = read_load(document, basis)
    result = assess(declared, basis, empty).as_document()
    answer = best_ms(lambda: assess(declared, basis, empty).as_document())
    rows = (
        ("declaration to result document", answer),
        ("reading the load document", best_ms(lambda: read_load(document, basis))),
        ("both", best_ms(lambda: assess(read_load(document, basis), basis, empty).as_document())),
        ("digest of the statement", best_ms(lambda: digest_of(statement(document, {}, "1", result)))),
    )
    print(f"{ITEMS} items, {len(basis.tanks)} tanks, {len(result['checks'])} checks: ms of CPU")  # type: ignore[arg-type] # a result is plain JSON
    for name, figure in rows:
        print(f"  {name:<34}{figure:7.3f}")
    print(f"  target for the first line: under {TARGET_MS} ms: {'met' if answer < TARGET_MS else 'MISSED'}")
    return 0 if answer < TARGET_MS else 1


if __name__ == "__main__":
    sys.exit(main())

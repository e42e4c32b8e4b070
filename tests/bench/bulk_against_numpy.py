"""Loads decided in bulk, on one core, against the bare NumPy sums of the same arrays and the exact way.

    python -m tests.bench.bulk_against_numpy [loads]

The arrays are in memory already: weights in seats and places, volumes in tanks. The bare sums are the weight,
the moment and the lateral moment of each load at the five phases, with fuel drawn in the manual's order: no
limit is looked at. Wanted: 4 times their time or less, and 50 times the rate of the exact assessment or more,
which begins at the declaration that was read. What reading the documents costs is told besides. The best of
several rounds counts; the loads are drawn, and all of them are compared with the exact verdicts once.
"""

import gc
import json
import random
import sys
import time
from collections.abc import Callable
from dataclasses import replace
from typing import Any

import numpy as np

from loads.balance.assess import assess
from loads.balance.bulk.deciding import OUTSIDE, UNDECIDED, WITHIN, decide
from loads.balance.bulk.drawing import drawn, moments, total
from loads.balance.bulk.known import Known, known_of
from loads.balance.bulk.reading import Batch, Reading
from loads.balance.declared import read_load
from records.canonical import canonical_of_exact
from tests.pure.loads.making import load, twin, twin_empty

AT_MOST, AT_LEAST = 4.0, 50.0
ROUNDS = 15
COMPARED = 2000


def drawn_documents(count: int) -> list[dict[str, Any]]:
    """Return loads of the tests' twin with drawn people, items and fuel, as they are stored."""
    draw = random.Random(3)
    found = []
    for _ in range(count):
        document = load()
        del document["passengers"][1]["lap_infant"]
        document["persons_on_board"] = 3
        for line in (*document["crew"], *document["passengers"]):
            line["weight"] = {"value": str(draw.randint(120, 240)), "unit": "lb"}
        document["items"] = [
            {
                "kind": "cargo",
                "what": "box",
                "place": place,
                "weight": {"value": f"{draw.randint(50, 1400) / 10}", "unit": draw.choice(["lb", "kg"])},
                "how": "weighed",
            }
            for place in ("AFT-HOLD", "NOSE-HOLD", "WING-LOCKER")
        ]
        for tank, most in (("LEFT-MAIN", 60), ("RIGHT-MAIN", 60), ("LEFT-AUX", 30), ("RIGHT-AUX", 30)):
            volume = str(draw.randint(most * 2 // 3, most))
            document["fuel"]["at_engine_start"][tank] = {"value": volume, "unit": "US gal"}
        document["fuel"]["trip"] = {"value": str(draw.randint(100, 420)), "unit": "lb"}
        found.append(json.loads(canonical_of_exact(document)))
    return found


def bare_sums(known: Known, batch: Batch) -> list[Any]:
    """Return weight and moments at the five phases, a few thousand rows at once as the decision has them."""
    found: list[Any] = []
    for start in range(0, len(batch), 4096):
        part = batch.part(slice(start, start + 4096))
        ramp = list(part.usable.T)
        take_off = drawn(ramp, known.taxi_order, part.taxi)
        landing = drawn(take_off, known.burn_order, part.trip)
        least = drawn(landing, known.burn_order, total(landing) - part.least)
        weight = part.held.sum(axis=1) + known.base[0]
        along = part.held @ known.arms + known.base[1]
        across = part.held @ known.laterals + known.base[2]
        for volumes in (ramp, take_off, landing, least):
            moment, lateral = moments(known.tanks, volumes)
            found.append(weight + total(volumes) * part.density)
            found.append(along + moment * part.density)
            found.append(across + lateral * part.density)
        found += [weight, along, across]  # zero fuel: all that is burnable is gone
    return found


def best(*works: Callable[[], object]) -> list[float]:
    """Return the seconds of CPU of the best round of each, a round of each in turns."""
    for work in works:
        work()
    gc.collect()
    seconds = [float("inf")] * len(works)
    for _ in range(ROUNDS):
        for number, work in enumerate(works):
            begun = time.process_time()
            work()
            seconds[number] = min(seconds[number], time.process_time() - begun)
    return seconds


def main(words: list[str]) -> int:
    """Print the table; 1 when a target is missed or a verdict is wrong."""
    count = int((words or ["100000"])[0])
    basis = replace(twin(), places=twin().places)
    empty = twin_empty()
    known = known_of(basis, "six-seat", empty)
    if known is None:
        raise AssertionError("the basis of this measurement is known to the bulk sums")
    documents = drawn_documents(min(count, 20_000))
    reading = Reading(known)
    (read_s,) = best(lambda: [Reading(known).add(one) for one in documents])
    if not all(reading.add(one) for one in documents):
        raise AssertionError("every load of this measurement is plain")
    few = reading.batch()
    rows = np.resize(np.arange(len(few)), count)
    batch = Batch(*(np.ascontiguousarray(getattr(few, name)[rows]) for name in Batch.__slots__))
    bulk_s, bare_s = best(lambda: decide(known, batch), lambda: bare_sums(known, batch))
    verdict = decide(known, few).verdict
    sample = [read_load(one, basis) for one in documents[:COMPARED]]
    exact_s = best(lambda: [assess(one, basis, empty, advised=False) for one in sample[:200]])[0] / 200
    wrong = sum(
        assess(one, basis, empty, advised=False).verdict != {WITHIN: "within", OUTSIDE: "outside"}[said]
        for one, said in zip(sample, verdict[:COMPARED].tolist(), strict=True)
        if said != UNDECIDED
    )
    shares = {
        name: float((verdict == code).mean()) for name, code in (("within", 0), ("outside", 1), ("left", 2))
    }
    ratio, faster = bulk_s / bare_s, exact_s / (bulk_s / count)
    print(f"{count:,} loads: " + ", ".join(f"{name} {share:.1%}" for name, share in shares.items()))
    print(f"decided in bulk, arrays in memory   {count / bulk_s:12,.0f} loads/s a core")
    print(f"bare NumPy sums of the same         {count / bare_s:12,.0f} loads/s a core")
    print(f"exact assessment, already read      {1 / exact_s:12,.0f} loads/s a core")
    print(f"reading the documents into arrays   {len(documents) / read_s:12,.0f} loads/s a core")
    print(f"bulk / bare sums, time   {ratio:8.2f}   (target {AT_MOST:.0f} or less)")
    print(f"bulk / exact, rate       {faster:8.0f}   (target {AT_LEAST:.0f} or more)")
    print(f"wrong of {COMPARED:,} compared  {wrong:8d}   (target 0)")
    return 1 if ratio > AT_MOST or faster < AT_LEAST or wrong else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))

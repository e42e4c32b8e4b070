"""Every measurement, one after the other: `python -m tests.bench`, or with names for some of them.

Each runs in a process of its own, so that none warms or slows another. Ratios within one measurement count;
times on a shared machine do not.
"""

import subprocess
import sys
from pathlib import Path

# In the order in which they are read: decision, path, answer, paper, act, endpoint, what is stored, start.
MEASUREMENTS = (
    "decision_against_shapely",
    "path_against_shapely",
    "full_answer_cpu",
    "remedies_against_highs",
    "paper_against_weasyprint",
    "act_against_bare_insert",
    "acts_under_load",
    "post_loads_throughput",
    "post_loads_by_clients",
    "memory_over_requests",
    "stored_loads",
    "bulk_against_numpy",
    "recheck_against_read",
    "seconds_to_the_summary",
)


def main(names: list[str]) -> int:
    """This function will run the named measurements, or all, and return 1 if one failed or missed."""
    unknown = [name for name in names if name not in MEASUREMENTS]
    if unknown:
        print(f"Not a measurement: {', '.join(unknown)}. There are: {', '.join(MEASUREMENTS)}.")
        return 2
    failed = []
    for name in names or MEASUREMENTS:
        print(f"\n{name.replace('_', ' ')}", flush=True)
        ran = subprocess.run(
            [sys.executable, "-m", f"tests.bench.{name}"],
            cwd=Path(__file__).resolve().parents[2],
            check=False,
        )
        if ran.returncode != 0:
            failed.append(name)
    if failed:
        print(f"\nmissed a target or could not run: {', '.join(failed)}")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))

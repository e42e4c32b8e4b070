"""The seats and places of a remedy, our whole way against HiGHS alone on the same programs.

    .venv/bin/python -m tests.bench.remedies_against_highs

Nineteen people in nineteen seats, too far aft. Our way: from the assessed load to moves that were assessed
again. That is the moments the path may shift by, the programs as Python makes them, HiGHS, and the exact
assessment of what it proposes. HiGHS alone: the very programs of that run, already handed over, `run` only.
The whole call for all kinds of remedies is shown beside. Best of several rounds, CPU of this process.
"""

import sys
import time
from statistics import median

import highspy

from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.remedies.arranging import arranged
from loads.balance.remedies.finding import find_remedies
from loads.balance.remedies.program import Program
from loads.balance.remedies.question import Question
from loads.balance.remedies.reach import ways_of
from tests.pure.loads.remedies.cabins import asked, empty_of, full_cabin, nineteen

WANTED = 1.5
ROUNDS = 7
CABINS = 6
BASIS = nineteen()


def question_of(seed: int) -> Question:
    """Return a full cabin that is too far aft."""
    return asked(full_cabin(seed), BASIS, empty_of(7600, 196 + seed % 3 * 2))


def programs_of(seed: int) -> list[Program]:
    """Return the programs our way hands to HiGHS for a cabin."""
    kept: list[Program] = []
    given = Program.given

    def keeping(program: Program, seconds: float) -> highspy.Highs:
        kept.append(program)
        return given(program, seconds)

    Program.given = keeping  # type: ignore[method-assign]  # to see what is handed over
    try:
        ours(question_of(seed))
    finally:
        Program.given = given  # type: ignore[method-assign]  # put back
    return kept


def ours(question: Question) -> None:
    """Look for the fewest people to move."""
    found = arranged(question, ways_of(question.result, question.ready), people=True, items=False)
    if found is None or not found.proven:
        raise AssertionError("each of these cabins has a smallest change")


def cpu_ms(work: object, *given: object) -> float:
    """Return the milliseconds of CPU of one call."""
    begun = time.process_time()
    work(*given)  # type: ignore[operator]  # a function of this module
    return (time.process_time() - begun) * 1000


def every_kind(seed: int) -> float:
    """Return the milliseconds of the whole search for a cabin."""
    document, empty = full_cabin(seed), empty_of(7600, 196 + seed % 3 * 2)
    question = asked(document, BASIS, empty)

    def search() -> None:
        find_remedies(
            question, document, lambda changed: assess(read_load(changed, BASIS), BASIS, empty, advised=False)
        )

    return cpu_ms(search)


def main() -> int:
    """Print the table; exit 1 when our way takes more than what is wanted of HiGHS's time."""
    ratios = []
    print(f"{'cabin':>7}{'ours, ms':>12}{'HiGHS, ms':>12}{'ratio':>8}{'every kind, ms':>17}{'programs':>10}")
    for seed in range(CABINS):
        programs = programs_of(seed)
        own, alone = float("inf"), float("inf")
        for _ in range(ROUNDS):
            own = min(own, cpu_ms(ours, question_of(seed)))
            solvers = [program.given(60.0) for program in programs]
            alone = min(alone, cpu_ms(lambda made=solvers: [solver.run() for solver in made]))
        ratios.append(own / alone)
        kinds = min(every_kind(seed) for _ in range(3))
        print(f"{seed:>7}{own:>12.1f}{alone:>12.1f}{own / alone:>8.2f}{kinds:>17.1f}{len(programs):>10}")
    middle = median(ratios)
    met = middle <= WANTED
    print(f"  median ratio {middle:.2f}, wanted {WANTED} or less: {'met' if met else 'MISSED'}")
    return 0 if met else 1


if __name__ == "__main__":
    sys.exit(main())

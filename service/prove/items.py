"""What `manage.py prove` runs: the long forms of the promises, each small enough to be run alone."""

from dataclasses import dataclass
from typing import Final


@dataclass(frozen=True, slots=True)
class Item:
    """One long form. `words` are given to Python; `promise` says what must come out."""

    name: str
    promise: str
    words: tuple[str, ...]


def _tests(name: str, promise: str, *places: str) -> Item:
    return Item(name, promise, ("-m", "pytest", "-q", "-rfEs", "--no-header", "--show-capture=no", *places))


def _measured(name: str, promise: str, module: str, *words: str) -> Item:
    return Item(name, promise, ("-m", f"tests.bench.{module}", *words))


ITEMS: Final[tuple[Item, ...]] = (
    _tests(
        "attacks",
        "each attack on the trail at sixty drawn places is found, and the right entry named",
        "tests/records/test_attacks.py",
        "tests/records/test_access_attacks.py",
    ),
    _measured(
        "acts-under-load",
        "16 clients for 30 s: no gap, the order of commits, no deadlock, 0.9 of the throughput unsealed",
        "acts_under_load",
        "30",
        "16",
    ),
    _measured(
        "long-chain",
        "a million entries are followed at half the rate of bare hashing or better",
        "long_chain",
        "1000000",
    ),
    _measured(
        "edges", "100,000 points on edges and beside them: none judged wrong", "points_on_edges", "100000"
    ),
    _tests(
        "whole-path",
        "hundreds of drawn flights sampled densely: no sample is worse than the worst point named",
        "tests/pure/loads/test_path_against_sampling.py",
        "tests/pure/loads/test_path_across.py",
        "tests/pure/loads/test_path_across_events.py",
        "tests/pure/loads/test_sequence_against_sampling.py",
        "tests/pure/loads/cases/test_curtailment.py",
    ),
    _measured(
        "documents",
        "500 manifests of one process: the same bytes, memory that does not grow",
        "many_documents",
        "500",
    ),
    _tests(
        "manifests",
        "200 manifests, each filed once, though the worker is killed five times and the broker flushed",
        "tests/journeys/test_no_manifest_is_lost.py",
    ),
    _tests(
        "one-effect",
        "one key has one effect, and nobody overwrites what they have not seen",
        "tests/records/api/test_once.py",
        "tests/loads/api/test_exactly_one_effect.py",
        "tests/loads/api/test_no_lost_update.py",
    ),
    _tests(
        "crashes",
        "ten times killed under load: nothing acknowledged is lost, no row without its entry",
        "tests/journeys/test_nothing_acknowledged_is_lost.py",
    ),
    _tests(
        "month",
        "a scheduling system's month over a bad line comes out counted",
        "tests/journeys/test_a_scheduling_system_flies_a_month.py",
    ),
    _tests(
        "permissions",
        "every operation by every role, here and elsewhere",
        "tests/service/test_permissions.py",
    ),
    _tests(
        "description",
        "sixty drawn requests an operation, right and wrong, by three roles: answered as described",
        "tests/service/test_contract.py",
    ),
    _tests(
        "bad-input",
        "every field of every document spoiled in every way: refused by name, nothing stored",
        "tests/service/test_contract_bad_input.py",
    ),
    _tests(
        "faults",
        "each statement, clock, file and broker call fails in turn: nothing half done",
        "tests/journeys/test_faults.py",
    ),
    Item(
        "mutants",
        "of 400 small faults drawn from the pure core the pure tests find 95 in a hundred or more",
        ("-m", "tests.mutation.__main__", "--sample", "400"),
    ),
    _tests(
        "drill", "a backup restored elsewhere verifies, a corrupted one is refused", "tests/service/backup"
    ),
)

"""How many small faults in the pure core the pure tests find: `python -m tests.mutation --sample 400`.

A fault is made by `mutmut`'s operators (a comparison turned, a figure off by one, a call without an argument,
...), one at a time; a test that fails kills it. A sample is drawn with a seed, so that a run can be repeated.
Everything happens in a copy of the tree.
"""

import argparse
import json
import os
import random
import shutil
import subprocess
import sys
import tempfile
from collections.abc import Sequence
from pathlib import Path
from typing import Any, Final

HERE: Final = Path(__file__).resolve().parents[2]
ROOMS: Final = ("fleet", "loads", "records", "service", "tests")
TARGETS: Final[dict[str, tuple[str, ...]]] = {
    "balance": ("loads/balance/**/*.py", "fleet/*.py", "fleet/basis_reading/*.py"),
    "records": ("records/chain.py", "records/access_chain.py", "loads/statement.py", "loads/lifecycle.py"),
}
# Not pure, or nothing but declarations.
LEFT_OUT: Final = (
    "fleet/apps.py",
    "fleet/acts.py",
    "fleet/duties.py",
    "fleet/entering.py",
    "fleet/events.py",
)
TESTS: Final = ("tests/pure",)
CONFIGURATION: Final = '\n[tool.mutmut]\nsource_paths = ["fleet", "loads", "records"]\n'
FOUND: Final = ("killed", "timeout")


def main(words: Sequence[str]) -> int:
    """This function will make the mutants, try them, and print what each module's tests found."""
    asked = _asked(words)
    with tempfile.TemporaryDirectory(prefix="tarebook-mutants-") as folder:
        copy = Path(folder)
        mutants = _mutated(copy, TARGETS[asked.part], asked.only)
        drawn = mutants if asked.sample == 0 else _drawn(mutants, asked.sample, asked.seed)
        (copy / "asked.json").write_text(json.dumps({"drawn": drawn, "jobs": asked.jobs}))
        tries = _tried(copy)
        return _told(drawn, len(mutants), tries, copy, asked)


def _asked(words: Sequence[str]) -> argparse.Namespace:
    reader = argparse.ArgumentParser(prog="python -m tests.mutation", description=__doc__)
    reader.add_argument("--part", choices=tuple(TARGETS), default="balance")
    reader.add_argument("--sample", type=int, default=400, help="how many are drawn; 0: all of them")
    reader.add_argument("--seed", type=int, default=1)
    reader.add_argument("--jobs", type=int, default=os.cpu_count() or 1)
    reader.add_argument("--only", default="", help="modules whose path holds this")
    reader.add_argument("--least", type=float, default=95.0, help="percent that must be found")
    return reader.parse_args(words)


def _mutated(copy: Path, patterns: Sequence[str], only: str) -> list[str]:
    """Copy the tree, put every mutant of every target beside its original, and return their names."""
    for room in ROOMS:
        shutil.copytree(HERE / room, copy / room, ignore=shutil.ignore_patterns("__pycache__", "data"))
    settings = (HERE / "pyproject.toml").read_text("utf-8") + CONFIGURATION
    (copy / "pyproject.toml").write_text(settings, "utf-8")
    for page in ("README.md", "DEVELOPERS.md", "manage.py"):
        shutil.copy(HERE / page, copy / page)
    for extra in ("templates", "static"):
        shutil.copytree(HERE / extra, copy / extra)
    for data in HERE.glob("service/**/data"):
        shutil.copytree(data, copy / data.relative_to(HERE))
    files = sorted({path for pattern in patterns for path in copy.glob(pattern)})
    program = [sys.executable, str(Path(__file__).with_name("making.py")), str(copy)]
    chosen = [str(path.relative_to(copy)) for path in files if only in str(path.relative_to(copy))]
    chosen = [path for path in chosen if path not in LEFT_OUT]
    made = subprocess.run([*program, *chosen], cwd=copy, check=True, capture_output=True, text=True)
    names: list[str] = json.loads(made.stdout)
    return names


def _drawn(mutants: Sequence[str], size: int, seed: int) -> list[str]:
    return random.Random(seed).sample(mutants, min(size, len(mutants)))  # a sample, no secret


def _tried(copy: Path) -> dict[str, str]:
    plugin = "tests.mutation.trying"
    words = ["-m", "pytest", "-q", "-p", plugin, "-p", "no:cacheprovider", "-p", "no:randomly", *TESTS]
    subprocess.run([sys.executable, *words], cwd=copy, check=False)
    tries: dict[str, str] = json.loads((copy / "tries.json").read_text())
    return tries


def _told(
    drawn: Sequence[str], made: int, tries: dict[str, str], copy: Path, asked: argparse.Namespace
) -> int:
    modules: dict[str, list[str]] = {}
    for name in drawn:
        modules.setdefault(name.rpartition(".")[0], []).append(tries.get(name, "not tried"))
    for module in sorted(modules):
        found = sum(one in FOUND for one in modules[module])
        print(f"{module:<48} {found:>5} of {len(modules[module])}")
    sources: dict[str, Any] = json.loads((copy / "differences.json").read_text())
    for name in drawn:
        if tries.get(name, "not tried") not in FOUND:
            print(f"\n{name}: {tries.get(name, 'not tried')}\n{sources.get(name, '')}")
    found = sum(tries.get(name) in FOUND for name in drawn)
    percent = 100 * found / len(drawn)
    print(f"\n{found} of {len(drawn)} drawn (seed {asked.seed}) of {made} made were found: {percent:.1f} %")
    return 0 if percent >= asked.least else 1


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))

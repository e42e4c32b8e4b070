"""How many small faults in the pure core the pure tests find: `python -m tests.mutation --sample 400`.

A fault is made by `mutmut`'s operators (a comparison turned, a figure off by one, a call without an argument,
a word spelled otherwise, ...), one at a time; a test that fails kills it. A sample is drawn with a seed, so
that a run can be repeated. No file of the tree is changed. With `--keep` a folder holds what was made and
which tests reach what, and a later run need not find out again: tests that are new since are tried on all.
"""

import argparse
import json
import os
import random
import subprocess
import sys
import tempfile
from collections.abc import Sequence
from hashlib import sha256
from pathlib import Path
from typing import Any, Final

HERE: Final = Path(__file__).resolve().parents[2]
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
CONFIGURATION: Final = '[tool.mutmut]\nsource_paths = ["."]\n'
FOUND: Final = ("killed", "timeout")
Mutant = dict[str, Any]


def main(words: Sequence[str]) -> int:
    """This function will make the mutants, try them, and print what each module's tests found."""
    asked = _asked(words)
    with tempfile.TemporaryDirectory(prefix="tarebook-mutants-") as passing:
        folder = Path(asked.keep or passing)
        folder.mkdir(parents=True, exist_ok=True)
        mutants = _mutants(folder, TARGETS[asked.part], asked.only)
        drawn = mutants if asked.sample == 0 else _drawn(mutants, asked.sample, asked.seed)
        (folder / "asked.json").write_text(json.dumps({"drawn": drawn, "jobs": asked.jobs}))
        return _told(drawn, len(mutants), _tried(folder), asked)


def _asked(words: Sequence[str]) -> argparse.Namespace:
    reader = argparse.ArgumentParser(prog="python -m tests.mutation", description=__doc__)
    reader.add_argument("--part", choices=tuple(TARGETS), default="balance")
    reader.add_argument("--sample", type=int, default=400, help="how many are drawn; 0: all of them")
    reader.add_argument("--seed", type=int, default=1)
    reader.add_argument("--jobs", type=int, default=os.cpu_count() or 1)
    reader.add_argument("--only", default="", help="modules whose path holds one of these, with commas")
    reader.add_argument("--keep", default="", help="a folder for what a later run need not find out again")
    reader.add_argument("--least", type=float, default=95.0, help="percent that must be found")
    return reader.parse_args(words)


def _mutants(folder: Path, patterns: Sequence[str], only: str) -> list[Mutant]:
    """Return every mutant of the targets, made now or kept from a run on the same source."""
    (folder / "pyproject.toml").write_text(CONFIGURATION, "utf-8")
    files = sorted({path.relative_to(HERE).as_posix() for one in patterns for path in HERE.glob(one)})
    chosen = [path for path in files if path not in LEFT_OUT and any(o in path for o in only.split(","))]
    kept = {path: folder / f"{sha256((HERE / path).read_bytes()).hexdigest()}.json" for path in chosen}
    missing = [path for path in chosen if not kept[path].exists()]
    if missing:
        program = [sys.executable, str(Path(__file__).with_name("making.py")), str(HERE), *missing]
        made = subprocess.run(program, cwd=folder, check=True, capture_output=True, text=True)
        for path, mutants in zip(missing, json.loads(made.stdout), strict=True):
            kept[path].write_text(json.dumps(mutants), "utf-8")
    return [mutant for path in chosen for mutant in json.loads(kept[path].read_text("utf-8"))]


def _drawn(mutants: Sequence[Mutant], size: int, seed: int) -> list[Mutant]:
    return random.Random(seed).sample(mutants, min(size, len(mutants)))  # a sample, no secret


def _tried(folder: Path) -> dict[str, str]:
    plugin = "tests.mutation.trying"
    words = ["-m", "pytest", "-q", "-p", plugin, "-p", "no:cacheprovider", "-p", "no:randomly", *TESTS]
    tree = {"TAREBOOK_MUTANTS": str(folder.resolve()), "PYTHONDONTWRITEBYTECODE": "1"}
    (folder / "tries.json").unlink(missing_ok=True)
    subprocess.run([sys.executable, *words], cwd=HERE, env=os.environ | tree, check=False)
    tries: dict[str, str] = json.loads((folder / "tries.json").read_text())
    return tries


def _told(drawn: Sequence[Mutant], made: int, tries: dict[str, str], asked: argparse.Namespace) -> int:
    modules: dict[str, list[str]] = {}
    for mutant in drawn:
        modules.setdefault(mutant["module"], []).append(tries.get(mutant["name"], "not tried"))
    for module in sorted(modules):
        found = sum(one in FOUND for one in modules[module])
        print(f"{module:<48} {found:>5} of {len(modules[module])}")
    for mutant in drawn:
        if tries.get(mutant["name"], "not tried") not in FOUND:
            print(f"\n{mutant['name']}: {tries.get(mutant['name'], 'not tried')}\n{mutant['difference']}")
    print(f"\nseed {asked.seed}, of {made} made:")
    for text, what in ((True, "in the words of a text"), (False, "elsewhere")):
        part = [mutant for mutant in drawn if mutant["text"] == text]
        print(f"{what}: {sum(tries.get(one['name']) in FOUND for one in part)} of {len(part)} found")
    found = sum(tries.get(mutant["name"]) in FOUND for mutant in drawn)
    percent = 100 * found / max(1, len(drawn))
    print(f"{found} of {len(drawn)} drawn were found: {percent:.1f} %")
    return 0 if percent >= asked.least else 1


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))

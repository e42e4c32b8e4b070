"""500 manifests printed by one process, one after the other: the bytes and the memory.

    python -m tests.bench.many_documents [documents]

Three papers by turns, each always the same; another process prints them, too. Wanted: identical bytes every
time and in both processes, and memory that grows by less than 10 MB after the first fifty.
"""

import hashlib
import os
import subprocess
import sys
from importlib import import_module
from pathlib import Path

MOST_GROWTH_MB = 10.0
WARMING = 50


def main(words: list[str]) -> int:
    """Print the table; 1 when bytes differed or memory grew too much."""
    count = int((words or ["500"])[0])
    papers = _papers()
    first, differing, begun = {}, 0, 0.0
    for number in range(count):
        name = sorted(papers)[number % len(papers)]
        digest = hashlib.sha256(_printed(papers[name])).hexdigest()
        differing += first.setdefault(name, digest) != digest
        if number + 1 == min(WARMING, count):
            begun = _resident_mb()
    grown = _resident_mb() - begun
    elsewhere = subprocess.run(
        [sys.executable, "-m", "tests.bench.many_documents", "--digests"],
        capture_output=True,
        text=True,
        check=True,
    ).stdout.split()
    alike = elsewhere == [first[name] for name in sorted(first)]
    print(f"{'documents':<46}{count:>8}")
    print(f"{'kinds of them':<46}{len(first):>8}")
    print(f"{'with other bytes than the first of their kind':<46}{differing:>8}    (target 0)")
    print(f"{'another process prints the same bytes':<46}{'yes' if alike else 'no':>8}    (target yes)")
    print(f"{'memory after the first fifty, MB':<46}{begun:>8.1f}")
    print(f"{'grown from then on, MB':<46}{grown:>8.1f}    (target under {MOST_GROWTH_MB:g})")
    return 0 if alike and not differing and grown < MOST_GROWTH_MB else 1


def _papers() -> dict[str, object]:
    os.environ.setdefault("SECRET_KEY", "bench")
    os.environ.setdefault("DATABASE_URL", "postgresql://bench@localhost/bench")
    os.environ.setdefault("BROKER_URL", "redis://localhost/0")
    os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
    import_module("django").setup()
    accepted = import_module("tests.pure.loads.accepted_loads")
    return {name: getattr(accepted, name)() for name in ("turboprop", "twin", "helicopter")}


def _printed(facts: object) -> bytes:
    printed: bytes = import_module("loads.manifest.printing").pdf_of(facts)
    return printed


def _resident_mb() -> float:
    """The memory this process holds now, not the most it ever held."""
    pages = int(Path("/proc/self/statm").read_text().split()[1])
    return pages * os.sysconf("SC_PAGE_SIZE") / 1e6


if __name__ == "__main__":
    if sys.argv[1:] == ["--digests"]:
        made = _papers()
        print(*(hashlib.sha256(_printed(made[name])).hexdigest() for name in sorted(made)))
        sys.exit(0)
    sys.exit(main(sys.argv[1:]))

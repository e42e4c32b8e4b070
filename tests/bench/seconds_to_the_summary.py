"""Seconds from `start` to the summary, the first time and the second, on a data folder of its own.

    python -m tests.bench.seconds_to_the_summary

The folder of packages is there already: what is measured is database, queue, tables, people, aircraft,
sixteen flights and their papers. These are times, not ratios: they say something only beside each other.
"""

import shutil
import subprocess
import sys
import tempfile
import time
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]


def _seconds(folder: Path) -> tuple[float, float]:
    """Return the seconds until the logins are printed, right after the summary, and until all is stopped."""
    command = [
        sys.executable,
        "manage.py",
        "start",
        "--data",
        str(folder),
        "--port",
        "0",
        "--exit-after-demo",
    ]
    begun = time.monotonic()
    seen = 0.0
    with subprocess.Popen(
        command, cwd=ROOT, stdout=subprocess.PIPE, stderr=subprocess.STDOUT, text=True
    ) as running:
        assert running.stdout is not None
        for line in running.stdout:
            if line.startswith("Sign in at"):
                seen = time.monotonic() - begun
    if running.returncode != 0 or not seen:
        raise SystemExit(f"start ended with {running.returncode} and no summary")
    return seen, time.monotonic() - begun


def main() -> int:
    """Print the two rows."""
    folder = Path(tempfile.mkdtemp(prefix="tarebook-start-"))
    try:
        for what in ("first start", "second start"):
            seen, stopped = _seconds(folder)
            print(f"{what + ', seconds to the summary':<52} {seen:8.1f}")
            print(f"{what + ', seconds until all is stopped':<52} {stopped:8.1f}")
    finally:
        shutil.rmtree(folder, ignore_errors=True)
    return 0


if __name__ == "__main__":
    sys.exit(main())

"""What a monitor is told of this room: acts by kind, counted when they are committed.

Each process counts for itself. With PROMETHEUS_MULTIPROC_DIR set they write into files of that folder, and
any of them can tell the sum.
"""

from typing import Final

from prometheus_client import Counter

ACTS: Final = Counter("tarebook_acts", "Acts committed, by kind.", ["act"])


def count_act(kind: str) -> None:
    """This function will count one committed act of this kind."""
    ACTS.labels(kind).inc()

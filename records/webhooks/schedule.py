"""When a delivery that failed is tried again, and when it is given up.

The waits are the example schedule of the Standard Webhooks specification 1.0.0 (read for this): at once,
then after 5 s, 5 min, 30 min, 2 h, 5 h, 10 h, 14 h, 20 h, 24 h, each counted from the try before: ten tries
in a little over three days.
"""

from datetime import datetime, timedelta
from typing import Final

# WAITS[n] stands before the try after n failures.
WAITS: Final = (
    timedelta(0),
    timedelta(seconds=5),
    timedelta(minutes=5),
    timedelta(minutes=30),
    timedelta(hours=2),
    timedelta(hours=5),
    timedelta(hours=10),
    timedelta(hours=14),
    timedelta(hours=20),
    timedelta(hours=24),
)
# A receiver may ask for a longer wait (Retry-After), but not for one without end.
LONGEST_ASKED: Final = timedelta(hours=24)
# "It's recommended to also add some level of random jitter": up to a tenth more.
JITTER: Final = 0.1


def next_try(failed: int, at: datetime, *, chance: float, asked: timedelta | None = None) -> datetime | None:
    """This function will return when to try again after `failed` tries, the last one at `at`; None: give up.

    `chance` (0 to 1) draws the jitter; `asked` is the wait the receiver named, which only lengthens.
    """
    if failed >= len(WAITS):
        return None
    wait = WAITS[failed] * (1 + JITTER * chance)
    return at + max(wait, min(asked or timedelta(0), LONGEST_ASKED))

"""How long a self-check counts: six months (EU-OPS Appendix 1 to 1.625, AMC1 SPO.POL.115; read)."""

from calendar import monthrange
from datetime import datetime
from typing import Final

MONTHS: Final = 6
_MONTHS_A_YEAR: Final = 12


def due_after(checked_at: datetime, months: int = MONTHS) -> datetime:
    """Return the moment from which another self-check is due: the same day so many months later, or the last
    day of that month where it has none.
    """
    years, month = divmod(checked_at.month - 1 + months, _MONTHS_A_YEAR)
    year = checked_at.year + years
    day = min(checked_at.day, monthrange(year, month + 1)[1])
    return checked_at.replace(year=year, month=month + 1, day=day)

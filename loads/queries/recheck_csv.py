"""The table of a recheck as CSV (RFC 4180), safe to open in a spreadsheet."""

import csv
import io
from collections.abc import Iterable, Iterator
from typing import Final

# A cell that begins so would be computed by a spreadsheet, whoever wrote it into a flight's reference.
_FORMULA: Final = ("=", "+", "-", "@", "\t", "\r")


def csv_lines(rows: Iterable[tuple[str, ...]]) -> Iterator[str]:
    """This function will yield each row as one line of CSV; a cell that a spreadsheet would take for a
    formula gets an apostrophe in front.
    """
    held = io.StringIO()
    writer = csv.writer(held)
    for row in rows:
        writer.writerow([_harmless(cell) for cell in row])
        yield held.getvalue()
        held.seek(0)
        held.truncate()


def _harmless(cell: str) -> str:
    return f"'{cell}" if cell.startswith(_FORMULA) else cell

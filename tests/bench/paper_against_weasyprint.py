"""One manifest against WeasyPrint alone on the same HTML: what facts, template and enclosure add to it.

    python -m tests.bench.paper_against_weasyprint

CPU seconds of one process, the two taking turns, medians; only the ratio counts. WeasyPrint alone gets the
finished HTML and the same fonts (one font configuration), no enclosure, no identifier and no PDF variant.
"""

import os
import statistics
import sys
import time
from collections.abc import Callable
from importlib import import_module

TURNS = 9
TARGET = 1.2


def main() -> int:
    """Print the table; 1 when the ratio is above the target."""
    os.environ.setdefault("SECRET_KEY", "bench")
    os.environ.setdefault("DATABASE_URL", "postgresql://bench@localhost/bench")
    os.environ.setdefault("BROKER_URL", "redis://localhost/0")
    os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
    import_module("django").setup()
    printing = import_module("loads.manifest.printing")
    press = import_module("records.press")
    facts = import_module("tests.pure.loads.accepted_loads").turboprop()
    html = printing.html_of(facts)
    printing.pdf_of(facts)  # loads WeasyPrint and the fonts for both

    weasyprint = press._weasyprint()
    fonts = press._fonts()

    def ours() -> None:
        printing.pdf_of(facts)

    def alone() -> None:
        weasyprint.HTML(string=html).write_pdf(font_config=fonts)

    mine, theirs = _taking_turns(ours, alone)
    ratio = mine / theirs
    print(f"{'one manifest, from facts':<40}{mine:8.3f} s")
    print(f"{'WeasyPrint alone on the same HTML':<40}{theirs:8.3f} s")
    print(f"{'ratio':<40}{ratio:8.2f}    (target {TARGET} or less)")
    return 0 if ratio <= TARGET else 1


def _taking_turns(one: Callable[[], None], other: Callable[[], None]) -> tuple[float, float]:
    times: tuple[list[float], list[float]] = ([], [])
    for _ in range(TURNS):
        for what, kept in zip((one, other), times, strict=True):
            begun = time.process_time()
            what()
            kept.append(time.process_time() - begun)
    return statistics.median(times[0]), statistics.median(times[1])


if __name__ == "__main__":
    sys.exit(main())

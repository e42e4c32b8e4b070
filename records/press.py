"""HTML to PDF, so that the same input gives the same bytes: bundled fonts, fixed dates, nothing fetched.

WeasyPrint is imported at the first page, not at start: the import costs up to some seconds, and most
processes never print. Bytes still depend on the versions of the libraries, so they are named with each filed
document (`renderer_versions`), and the filed bytes, not the recipe, are the record.
"""

import os
import re
import threading
import unicodedata
from dataclasses import dataclass
from datetime import UTC, datetime
from functools import cache
from hashlib import sha256
from importlib import import_module
from importlib.metadata import version
from pathlib import Path
from typing import Any

FONTS = Path(__file__).resolve().parent.parent / "static" / "fonts"
VARIANT = "pdf/a-3u"
# Written into fonts that WeasyPrint subsets by itself where libharfbuzz-subset is missing; they would hold
# the time.
FONT_DATE = "1767225600"

# One press a process: Pango's font map is shared by all pages (a fresh one for each takes five times the
# memory) and is not made for several threads at once.
_press = threading.Lock()


@dataclass(frozen=True, slots=True)
class Enclosure:
    """A file that travels inside the PDF. `relationship` is a word of ISO 32000-2, 7.11.3."""

    name: str
    body: bytes
    description: str
    relationship: str = "Data"


def press(html: str, *, title: str, created: datetime, attachments: tuple[Enclosure, ...] = ()) -> bytes:
    """This function will return `html` as PDF bytes; the same arguments give the same bytes, in any process.

    `created` is aware and is the only date in the file. Nothing is fetched: a page that names an image, a
    stylesheet or a font elsewhere is printed without it. A character no bundled font carries is printed as
    its code point, `[U+4E2D]`, so that nothing disappears unseen.
    """
    moment = created.astimezone(UTC)
    stamp = moment.strftime("%Y-%m-%dT%H:%M:%SZ")
    text = printable(html)
    with _press:
        weasyprint = _weasyprint()
        page = weasyprint.HTML(string=text, url_fetcher=_nothing_fetched())
        document = page.render(font_config=_fonts(), pdf_variant=VARIANT)
        document.metadata.title = printable(title)
        document.metadata.created = document.metadata.modified = stamp
        enclosed = [
            weasyprint.Attachment(
                string=enclosure.body,
                name=enclosure.name,
                description=enclosure.description,
                relationship=enclosure.relationship,
                created=moment,
                modified=moment,
            )
            for enclosure in attachments
        ]
        identifier = _identifier(text, title, stamp, attachments)
        written: bytes = document.write_pdf(
            pdf_variant=VARIANT, pdf_identifier=identifier, attachments=enclosed
        )
        return written


def printable(text: str) -> str:
    """This function will return the text composed (NFC), with each character the fonts lack as its code
    point.
    """
    text = unicodedata.normalize("NFC", text)
    if text.isascii() and not _CONTROL.search(text):
        return text
    known = _carried()
    return "".join(mark if ord(mark) in known else f"[U+{ord(mark):04X}]" for mark in text)


def renderer_versions() -> str:
    """This function will name what made a document, so that its bytes can be made again for comparison."""
    _weasyprint()
    ffi = import_module("weasyprint.text.ffi")
    packages = ", ".join(f"{name} {version(name)}" for name in ("weasyprint", "pydyf", "fonttools"))
    number = int(ffi.pango.pango_version())
    subsetter = "with" if ffi.harfbuzz_subset else "without"
    return (
        f"{packages}, pango {number // 10000}.{number // 100 % 100}.{number % 100}, "
        f"{subsetter} libharfbuzz-subset, fonts {_fonts_digest()[:16]}"
    )


_CONTROL = re.compile(r"[\x00-\x08\x0b\x0c\x0e-\x1f\x7f]")


def _identifier(text: str, title: str, stamp: str, attachments: tuple[Enclosure, ...]) -> bytes:
    parts = [text.encode(), title.encode(), stamp.encode()]
    for enclosure in attachments:
        parts += [enclosure.name.encode(), enclosure.body]
    sums = b"".join(sha256(part).digest() for part in parts)
    return sha256(b"paper\0" + sums).hexdigest()[:32].encode()


@cache
def _weasyprint() -> Any:
    # Fontconfig reads these when WeasyPrint is imported and never again.
    os.environ["FONTCONFIG_FILE"] = str(FONTS / "fonts.conf")
    os.environ.setdefault("SOURCE_DATE_EPOCH", FONT_DATE)
    return import_module("weasyprint")


@cache
def _fonts() -> Any:
    _weasyprint()
    return import_module("weasyprint.text.fonts").FontConfiguration()


@cache
def _nothing_fetched() -> Any:
    _weasyprint()
    fetcher: Any = import_module("weasyprint.urls").URLFetcher

    class NothingFetched(fetcher):  # type: ignore[misc]  # the base is loaded late, so its type is unknown
        """Refuses every address, `data:` and `file:` among them."""

        def fetch(self, url: str, headers: object = None) -> Any:
            raise ValueError(
                f"the press fetches nothing ({len(url)} characters of address, headers {headers!r})"
            )

    return NothingFetched()


@cache
def _carried() -> frozenset[int]:
    """The characters every weight of the text font carries, with tab and line ends."""
    files = sorted(FONTS.glob("ibm-plex-sans-???.ttf"))
    covered = []
    for file in files:
        with import_module("fontTools.ttLib").TTFont(file, lazy=True) as font:
            covered.append(set(font.getBestCmap()))
    return frozenset(set.intersection(*covered) | {9, 10, 13})


@cache
def _fonts_digest() -> str:
    files = [*sorted(FONTS.glob("*.ttf")), FONTS / "fonts.conf"]
    return sha256(b"".join(file.name.encode() + file.read_bytes() for file in files)).hexdigest()

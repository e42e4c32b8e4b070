"""The press: the same bytes for the same input, nothing fetched, fonts inside, hostile text as text."""

import hashlib
import io
import re
import resource
import subprocess
import sys
from datetime import UTC, datetime, timedelta, timezone
from http.server import BaseHTTPRequestHandler, HTTPServer
from pathlib import Path
from threading import Thread

import pikepdf
import pytest
from pypdf import PdfReader

from records.press import Enclosure, press, printable, renderer_versions

ROOT = Path(__file__).resolve().parents[2]
CREATED = datetime(2026, 12, 1, 14, 0, tzinfo=UTC)
ENCLOSED = (Enclosure("statement.json", b'{"a":"1"}', "what was signed", "Source"),)
STYLE = (
    "<style>body{font-family:'IBM Plex Sans'}b{font-weight:700}i{font-weight:600;font-style:normal}</style>"
)
PAGE = f"<html lang=en><head>{STYLE}</head><body><p>Load manifest <b>14</b> <i>Q9-KTB</i></p></body></html>"


def _pressed(html: str = PAGE, created: datetime = CREATED) -> bytes:
    return press(html, title="Load manifest 14", created=created, attachments=ENCLOSED)


def _text(pdf: bytes) -> str:
    return "\n".join(page.extract_text() for page in PdfReader(io.BytesIO(pdf)).pages)


def test_two_processes_give_the_same_bytes() -> None:
    script = (
        "import hashlib, sys; sys.path[:0] = [sys.argv[1], sys.argv[1] + '/tests/records'];"
        "import test_press; print(hashlib.sha256(test_press._pressed()).hexdigest())"
    )

    sums = {
        subprocess.run(
            [sys.executable, "-c", script, str(ROOT)],
            capture_output=True,
            text=True,
            check=True,
            env={"PATH": "/usr/bin:/bin", "TZ": zone, "LANG": "C"},
        ).stdout.strip()
        for zone in ("UTC", "Pacific/Auckland")
    }

    assert sums == {hashlib.sha256(_pressed()).hexdigest()}


def test_the_dates_in_the_file_are_the_given_one_whatever_its_zone() -> None:
    elsewhere = CREATED.astimezone(timezone(timedelta(hours=-6)))

    with pikepdf.open(io.BytesIO(_pressed())) as pdf:
        dates = {str(pdf.docinfo["/CreationDate"]), str(pdf.docinfo["/ModDate"])}

    assert all("20261201140000" in date for date in dates)
    assert _pressed(created=elsewhere) == _pressed()


def test_another_text_gives_another_identifier() -> None:
    def identifier(pdf: bytes) -> bytes:
        with pikepdf.open(io.BytesIO(pdf)) as opened:
            return bytes(opened.trailer["/ID"][0])

    assert identifier(_pressed()) != identifier(_pressed(PAGE.replace("14", "15")))


def test_only_the_bundled_fonts_are_used_and_all_are_embedded() -> None:
    fonts = []
    with pikepdf.open(io.BytesIO(_pressed())) as pdf:
        for page in pdf.pages:
            for font in page.Resources.Font.values():
                descriptor = font.DescendantFonts[0].FontDescriptor
                fonts.append((str(font.BaseFont), "/FontFile2" in descriptor or "/FontFile3" in descriptor))

    assert len(fonts) == 3
    assert all("IBM-Plex-Sans" in name and embedded for name, embedded in fonts)


def test_the_enclosure_is_an_associated_file_with_its_own_bytes() -> None:
    with pikepdf.open(io.BytesIO(_pressed())) as pdf:
        enclosed = pdf.attachments["statement.json"]
        assert enclosed.get_file().read_bytes() == ENCLOSED[0].body
        assert str(pdf.Root.AF[0].AFRelationship) == "/Source"
        assert not pdf.check_pdf_syntax()


def test_nothing_is_fetched_whatever_a_page_asks_for(tmp_path: Path) -> None:
    asked: list[str] = []

    class Listener(BaseHTTPRequestHandler):
        def do_GET(self) -> None:
            asked.append(self.path)
            self.send_error(404)

        def log_message(self, *_words: object) -> None:
            """Say nothing."""

    secret = tmp_path / "secret.txt"
    secret.write_text("not for the paper")
    with HTTPServer(("127.0.0.1", 0), Listener) as server:
        Thread(target=server.serve_forever, daemon=True).start()
        there = f"http://127.0.0.1:{server.server_port}"
        page = (
            f"<link rel=stylesheet href='{there}/a.css'><link rel=attachment href='file://{secret}'>"
            f"<style>@import url({there}/b.css); @font-face{{font-family:x;src:url({there}/c.ttf)}}"
            f"body{{background:url({there}/d.png)}}</style><img src='{there}/e.png'><img src='file://{secret}'>"
            f"<img src='data:image/png;base64,aGFsbG8='><object data='{there}/f.svg'></object>"
            f"<svg><image href='{there}/g.png'/><use href='{there}/h.svg#x'/></svg><p>still printed</p>"
        )
        pdf = _pressed(f"<html><body>{page}</body></html>")
        server.shutdown()

    assert asked == []
    assert "still printed" in _text(pdf)
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        assert list(opened.attachments) == ["statement.json"]


def test_a_character_no_font_carries_is_printed_as_its_code_point() -> None:
    assert printable("Ana \u4e2d \u202e \x07") == "Ana [U+4E2D] [U+202E] [U+0007]"
    assert printable("Žofie Łuk Ελένη Привет Việt") == "Žofie Łuk Ελένη Привет Việt"
    assert printable("e\u0301") == "\u00e9"


def test_names_in_other_scripts_come_out_of_the_paper_as_they_went_in() -> None:
    names = "Žofie Łukasz Ελένη Привет Việt"

    pdf = _pressed(PAGE.replace("Q9-KTB", names))

    assert names in _text(pdf)


def test_what_made_a_document_is_named() -> None:
    assert re.fullmatch(
        r"weasyprint 70\.\S+, pydyf \S+, fonttools \S+, pango 1\.\d+\.\d+, "
        r"(with|without) libharfbuzz-subset, fonts [0-9a-f]{16}",
        renderer_versions(),
    )


@pytest.mark.slow
def test_memory_stays_flat_over_many_pages() -> None:
    for number in range(30):
        _pressed(PAGE.replace("14", str(number)))
    before = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss

    for number in range(120):
        _pressed(PAGE.replace("14", str(1000 + number)))

    grown = (resource.getrusage(resource.RUSAGE_SELF).ru_maxrss - before) / 1024
    assert grown < 10  # MiB

"""The paper itself: what a pilot and an inspector must find on it, and what hostile text may not do to it."""

import hashlib
import io
import re
from dataclasses import replace
from functools import cache

import pikepdf
import pytest
from pypdf import PdfReader

from loads.balance.engine import ENGINE_VERSION
from loads.cautions import CAUTIONS, INVENTED
from loads.manifest.facts import Facts
from loads.manifest.printing import html_of, pdf_of
from records.archive import DocumentAltered
from tests.pure.loads.accepted_loads import (
    accepted,
    helicopter,
    item,
    person,
    pilot,
    q,
    turboprop,
    turboprop_load,
    twin,
    twin_load,
)

LETTER, A4 = (612, 792), (595, 842)  # points
HOSTILE = '<img src="http://x.invalid/a.png"><script>1</script>&amp;{{ sheet }}{% include "x" %}" onload=\'y'


def _plain(text: str) -> str:
    return re.sub(r"\s+", " ", text.replace("\u00a0", " ").replace("\u2212", "-"))


def _pages(facts: Facts) -> list[str]:
    reader = PdfReader(io.BytesIO(pdf_of(facts)))
    return [_plain(page.extract_text()) for page in reader.pages]


@cache
def _twin() -> tuple[str, ...]:
    return tuple(_pages(twin()))


def test_the_first_page_answers_the_pilot_in_the_order_of_asking() -> None:
    first, governing = _twin()[0], twin().result["governing"]
    asked = [
        "Ostrel Kestava 62, serial 62-0113",
        "KT-214",
        "2026-12-01 08:30 -06:00",
        "2026-12-01 14:30 UTC",
        "XNAL to XKOR",
        "Within limits",
        _plain(governing["weight"]),
        _plain(governing["cg"]),
        "5841 lb",
        "allowable 6150 lb",
        "Zero-fuel weight",
        "4793 lb",
        "159.53 in",
        "18.0 % MAC",
        "154.41 to 162.44 in",
        "10.1 to 22.5 %",
        "5361 lb",
        "not in the loading basis",
        "1 crew, 3 passengers, 1 lap infant",
        "left auxiliary tank",
        "Not assessed: nothing",
        "Permits and restrictions None recorded.",
    ]

    places = [first.find(words) for words in asked]

    assert -1 not in places, asked[places.index(-1)]
    assert (
        first.index("Q9-KTB")
        < first.index("Within limits")
        < first.index("Trim setting")
        < first.index("Signed")
    )


@pytest.mark.parametrize(
    "rule", ["(c)(1)", "(c)(2)", "(c)(3)", "(c)(4)", "(c)(5)", "(c)(6)", "(c)(7)", "(c)(8)"]
)
def test_every_item_of_the_us_rule_has_its_number_beside_it(rule: str) -> None:
    assert f"135.63{rule}" in " ".join(_twin())


def test_signatures_show_name_capacity_meaning_and_both_clocks() -> None:
    first = _twin()[0]

    for words in (
        "R. Amani pilot in command Accepted. I accept this load for the flight named above",
        "R. Amani load preparer Prepared.",
        "2026-12-01 13:52:07 UTC (2026-12-01 07:52:07 -06:00 local)",
    ):
        assert words in first


def test_every_page_names_aircraft_number_and_page_and_says_invented() -> None:
    pages = _twin()

    assert len(pages) == 2
    for number, text in enumerate(pages, 1):
        assert f"Q9-KTB · page {number} of 2" in text
        assert "Load manifest 14 · KT-214 · 2026-12-01" in text
        assert INVENTED in text


def test_a_real_operators_paper_says_nothing_of_invented_data() -> None:
    facts = accepted(twin_load(), "twin", invented=False)

    assert INVENTED not in html_of(facts)


def test_the_record_is_named_to_the_last_digit() -> None:
    facts, text = twin(), "".join(_twin())
    whole = text.replace(" ", "")

    for digest in (facts.digest, facts.seal.digest, facts.basis.digest, facts.empty_weight.digest):
        assert digest in whole
    for words in (
        "entry 42 of the operator's chain, pinned once per load",
        "revision 3 (Ostrel Kestava 62 flight manual, OK62-FM revision D)",
        "3962 lb by weighing of 2026-03-18, report W-2026-07",
        f"engine version {ENGINE_VERSION}",
        facts.operator.procedure,
        facts.operator.weight_method,
        "structural take-off 6200 lb",
        "performance sheet 12 6150 lb (governs)",
    ):
        assert words in text


def test_all_cautions_stand_on_the_first_page() -> None:
    for words in CAUTIONS:
        assert words in _twin()[0]


@pytest.mark.parametrize("make", [twin, turboprop, helicopter])
def test_every_line_and_every_limit_is_printed(make) -> None:
    facts = make()
    text = " ".join(_pages(facts))

    mass = facts.operator.rule_set == "EU-UK"
    for line in facts.result["sumsheet"]:
        if line["pointer"]:
            assert line["what"] in text
    for check in facts.result["checks"]:
        title = check["title"].replace("weight", "mass") if mass else check["title"]
        assert title in text or check["title"] in text
    for place, seated in enumerate(facts.inputs["passengers"]):
        assert seated["name"] in text, place


def test_under_the_european_rule_set_it_speaks_of_mass_and_is_a4() -> None:
    pdf = pdf_of(turboprop())
    text = " ".join(_plain(page.extract_text()) for page in PdfReader(io.BytesIO(pdf)).pages)

    assert "dry operating mass" in text
    assert "MAB.105(a)" in text
    assert "Take-off mass" in text
    assert "take-off weight" not in text
    assert "estimated: line 18 of the loading computation" in text.lower()
    assert _size(pdf) == A4
    assert _size(pdf_of(twin())) == LETTER


def test_typed_words_are_left_as_they_were_typed() -> None:
    stated = [{"at": "take-off", "weight": q(3600, "kg"), "source": "weight sheet 3 of the field"}]
    facts = accepted(turboprop_load(limits=stated), "turboprop", rule_set="EU-UK")

    text = " ".join(_pages(facts))

    assert "governed by weight sheet 3 of the field" in text
    assert "mass sheet" not in text
    assert "take-off mass 3587 of 3600 kg" in text


def test_the_longest_usual_paper_stays_on_two_pages() -> None:
    assert len(_pages(turboprop())) == 2
    assert len(_pages(helicopter())) == 2


def test_a_very_full_load_flows_on_and_loses_nothing() -> None:
    items = [item(f"parcel {n} {'of a very long name ' * 4}.", "AFT-HOLD", q(1, "kg")) for n in range(60)]
    facts = accepted(turboprop_load(items=items), "turboprop", rule_set="EU-UK")

    pages = _pages(facts)

    assert len(pages) >= 3
    assert all(f"page {number} of {len(pages)}" in text for number, text in enumerate(pages, 1))
    text = " ".join(pages)
    assert all(f"parcel {n} of" in text for n in range(60))


def test_hostile_text_in_every_field_is_printed_as_text() -> None:
    load = twin_load(
        crew=[{**pilot("R. Amani", "COCKPIT-L", "181", "lb"), "name": HOSTILE}],
        passengers=[person(HOSTILE + "2", "ROW1-L", "176", "lb")],
        items=[item(HOSTILE, "AFT-HOLD", q(20, "lb"))],
        persons_on_board=2,
        limits=[{"at": "take-off", "weight": q(6150, "lb"), "source": HOSTILE}],
    )
    load["fuel"]["density"]["source"] = HOSTILE
    load["flight"] = {**load["flight"], "operation": "charter"}
    facts = accepted(load, "twin")
    facts = replace(
        facts,
        operator=replace(facts.operator, name=HOSTILE, certificate=HOSTILE, base=HOSTILE, procedure=HOSTILE,
                         weight_method=HOSTILE),
        aircraft=replace(facts.aircraft, registration=HOSTILE, serial_number=HOSTILE, type=HOSTILE),
        signatures=tuple(replace(one, name=HOSTILE, capacity=HOSTILE) for one in facts.signatures),
    )  # fmt: skip

    html, pdf = html_of(facts), pdf_of(facts)

    assert "<img" not in html
    assert "<script" not in html
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        assert list(opened.attachments) == ["statement.json"]
        assert all("/Annots" not in page for page in opened.pages)
    text = "".join(page.extract_text() for page in PdfReader(io.BytesIO(pdf)).pages).replace("\n", "")
    assert "<script>1</script>" in text
    assert "{{ sheet }}" in text.replace("\u00a0", " ")


def test_no_text_leaves_the_paper_even_when_names_are_long_and_unbroken() -> None:
    name = "Q" * 110
    load = twin_load(
        crew=[{**pilot("R. Amani", "COCKPIT-L", "181", "lb"), "name": name}],
        passengers=[],
        persons_on_board=1,
    )

    reader = PdfReader(io.BytesIO(pdf_of(accepted(load, "twin"))))

    texts = [page.extract_text() for page in reader.pages]
    longest = max(len(run) for text in texts for run in re.findall("Q{5,}", text))
    assert longest <= 45  # at 8 points that is 70 mm; unbroken it would be 170 mm
    assert "".join(texts).replace("\n", "").count(name) == 4  # crew, two signatures, computation


def test_the_enclosed_statement_has_the_printed_digest() -> None:
    facts = twin()

    with pikepdf.open(io.BytesIO(pdf_of(facts))) as pdf:
        enclosed = pdf.attachments["statement.json"].get_file().read_bytes()

    assert hashlib.sha256(enclosed).hexdigest() == facts.digest


def test_a_statement_that_does_not_fit_its_digest_is_not_printed() -> None:
    facts = twin()

    with pytest.raises(DocumentAltered):
        pdf_of(replace(facts, statement=facts.statement + b" "))


def _size(pdf: bytes) -> tuple[int, int]:
    box = PdfReader(io.BytesIO(pdf)).pages[0].mediabox
    return round(float(box.width)), round(float(box.height))

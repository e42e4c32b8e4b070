"""The paper of a load somebody is hoisted into and that carries a load on a hook: who comes aboard stands
there by name, the higher maximum with its page, and what all else weighs.
"""

import io
import re
from typing import Any

from pypdf import PdfReader

from loads.manifest.facts import Facts
from loads.manifest.printing import pdf_of
from tests.pure.loads.accepted_loads import accepted, helicopter_load, item, person, q

SLUNG = item("steel drum", "HOOK", q(260, "kg"), kind="cargo", jettisonable=True)
SAVED = person("V. Lindqvist", "REAR-M", "80", "kg", at="HOIST")
FLIGHT = [
    {"after_burning": q(20, "kg"), "leave": [{"place": "HOOK", "what": "steel drum"}]},
    {"after_burning": q(30, "kg"), "come_aboard": [SAVED]},
    {"after_burning": q(30, "kg"), "move": [{"seat": "REAR-M", "to": "REAR-M"}]},
]


def _with_hook(document: dict[str, Any]) -> dict[str, Any]:
    """The invented helicopter with its hook fitted further forward, a hoist, 1,700 kg with an external load,
    and envelopes that reach as high.
    """
    page = {"source": {"page": "9-4"}}
    arms = {"lateral_arm": {"value": "0", "unit": "mm"}, "external": True, **page}
    maximum = {"value": "150", "unit": "kg", **page}
    hoist = {"id": "HOIST", "name": "hoist", "arm": {"value": "2250", "unit": "mm"}, "maximum": maximum}
    document["places"].append(hoist | arms)
    document["places"][0]["arm"]["value"] = "2240"
    document["configurations"][0]["places"] += ["HOOK", "HOIST"]
    document["limits"]["with_external_load"] = {"value": "1700", "unit": "kg", **page}
    for envelope in document["envelopes"]:
        points = envelope["points"]
        tops = [each for each in points if each[0] == "1450"]
        at = points.index(tops[0])
        points[at + 1 : at + 1] = [["1700", each[1]] for each in tops]
    return document


def _facts() -> Facts:
    document = helicopter_load(sequence=FLIGHT)
    document["items"] = [*document["items"], SLUNG]
    return accepted(document, "helicopter", change=_with_hook)


def _words(facts: Facts) -> str:
    pages = (page.extract_text() for page in PdfReader(io.BytesIO(pdf_of(facts))).pages)
    return re.sub(r"\s+", " ", " ".join(pages).replace("\u00a0", " ").replace("\u2212", "-"))


def test_who_comes_aboard_and_what_hangs_outside_stand_on_the_paper() -> None:
    facts = _facts()
    checks = {check["code"]: check for check in facts.result["checks"]}
    assert facts.result["verdict"] == "within", [c for c in facts.result["checks"] if c["result"] != "pass"]
    assert float(checks["weight.take-off"]["actual"]) > 1450
    assert float(checks["weight.take-off-internal"]["actual"]) < 1450

    words = _words(facts)

    assert "take-off weight, with the external load" in words
    assert "without the external load that can be released" in words
    assert "in flight" in words
    assert "V. Lindqvist" in words
    assert "comes aboard: hoist, passenger" in words
    assert "hook, cargo, jettisonable" in words
    assert "at most 4 in flight" in words
    assert "9-4" in words


def test_the_picture_has_a_line_for_each_maximum() -> None:
    words = _words(_facts())
    assert "take-off limit 1700 kg" in words
    assert "without external load, in-flight limit 1450 kg" in words

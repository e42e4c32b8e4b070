"""The ruler of a check: its ends are the limits, the triangle is the load."""

import xml.etree.ElementTree as ET

from loads.manifest.ruler import ruler


def _check(actual, limit, low=None):
    return {"actual": actual, "limit": limit, "low": low}


def _place_and_ends(drawing):
    drawn = ET.fromstring(drawing)  # noqa: S314  # our own drawing
    tag = "{http://www.w3.org/2000/svg}"
    triangle = drawn.find(f"{tag}polygon").get("points").split()[0].split(",")[0]
    ends = [float(each.get("x1")) for each in drawn.iter(f"{tag}line") if each.get("stroke-width") == "1.6"]
    return float(triangle), ends


def test_a_load_within_stands_between_the_ends_in_proportion() -> None:
    place, (low, high) = _place_and_ends(ruler(_check("130", "140", "100")))

    assert abs((place - low) / (high - low) - 0.75) < 0.001


def test_an_upper_limit_alone_is_measured_from_zero() -> None:
    place, (low, high) = _place_and_ends(ruler(_check("30", "120")))

    assert abs((place - low) / (high - low) - 0.25) < 0.001


def test_a_load_beyond_a_limit_stands_beyond_its_end() -> None:
    place, (low, high) = _place_and_ends(ruler(_check("150", "140", "100")))
    under, (bottom, _top) = _place_and_ends(ruler(_check("90", "140", "100")))

    assert place > high > low
    assert under < bottom


def test_without_two_ends_or_an_actual_there_is_none() -> None:
    assert ruler(_check("150", None, "100")) == ""
    assert ruler(_check(None, "140", "100")) == ""
    assert ruler(_check("0", "0")) == ""

"""The chart of rejects: a strip an aircraft, every count in words too, nothing typed unescaped."""

import xml.etree.ElementTree as ET
from datetime import date, timedelta

from loads.trend_chart import MOST_STRIPS, Series, trend_chart

SVG = "{http://www.w3.org/2000/svg}"
WEEKS = [date(2026, 9, 2) + timedelta(days=7 * number) for number in range(13)]


def counts(**places: int) -> tuple[int, ...]:
    return tuple(places.get(f"w{number}", 0) for number in range(13))


def words(svg: str) -> list[str]:
    return [one.text or "" for one in ET.fromstring(svg).iter(f"{SVG}text")]  # noqa: S314  # our own SVG


def test_each_count_stands_above_its_mark_and_in_the_title() -> None:
    svg = trend_chart([Series("Q9-KTB", counts(w2=3, w12=1))], WEEKS)

    assert {"Q9-KTB", "3", "1", "25 Nov", "week beginning"} <= set(words(svg))
    assert svg.count("<circle") == 2
    assert "Q9-KTB: 0, 0, 3, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1" in svg


def test_aircraft_with_the_same_counts_have_lines_of_their_own() -> None:
    svg = trend_chart([Series("Q9-AAA", counts(w12=1)), Series("Q9-BBB", counts(w12=1))], WEEKS)

    lines = {one.get("points") for one in ET.fromstring(svg).iter(f"{SVG}polyline")}  # noqa: S314  # our own SVG
    assert len(lines) == 2


def test_the_higher_count_is_drawn_higher_over_a_common_scale() -> None:
    svg = trend_chart([Series("Q9-AAA", counts(w0=4, w1=2))], WEEKS)

    heights = [float(one.get("cy", "")) for one in ET.fromstring(svg).iter(f"{SVG}circle")]  # noqa: S314  # our own
    assert heights[0] < heights[1]


def test_without_rejects_nothing_is_drawn() -> None:
    assert trend_chart([Series("Q9-KTB", counts())], WEEKS) == ""
    assert trend_chart([], WEEKS) == ""


def test_a_large_fleet_is_cut_to_what_can_be_read() -> None:
    svg = trend_chart([Series(f"Q9-{number:03}", counts(w1=1)) for number in range(30)], WEEKS)

    assert svg.count("<polyline") == MOST_STRIPS


def test_names_are_escaped() -> None:
    svg = trend_chart([Series("<b>&", counts(w1=1))], WEEKS)

    assert "<b>" not in svg
    assert "<b>&" in words(svg)

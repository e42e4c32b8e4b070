"""Midnight, a month's end, a leap day: which day counts is the local one, and a season or interval says
itself whether its last day still belongs to it.

Common practice; 14 CFR 135.185 for calendar months (read; their running to the end of the month remembered).
Late approvals, which need the database, stand in `tests/loads/test_two_clocks.py`.
"""

from datetime import date, datetime

import pytest

from fleet.rules import Interval
from fleet.standard_weights_reading import read_standard_weights
from tests.pure.loads.standards import assessed, document_with, seasonal_document, standard


@pytest.mark.parametrize(
    ("departure", "season"),
    [
        ("2026-10-31T23:59:59-10:00", "summer"),  # 1 November 09:59 in UTC
        ("2026-11-01T00:00:00+14:00", "winter"),  # 31 October 10:00 in UTC
    ],
)
def test_a_flight_at_midnight_is_of_the_day_the_clocks_there_show(departure, season):
    table = read_standard_weights(seasonal_document())

    result = assessed(document_with([standard("A", "ROW1-L", "adult")], departure=departure), table)

    assert result.as_document()["standard_weights"]["season"] == season


def test_calendar_months_end_with_the_month_whenever_in_it_the_aircraft_was_weighed():
    """Weighed on 1 or on 31 March 2026: 36 calendar months run to 31 March 2029 either way."""
    interval = Interval(36, "calendar months")

    assert interval.good_until(date(2026, 3, 1)) == interval.good_until(date(2026, 3, 31))
    assert interval.good_until(date(2026, 3, 1)) == date(2029, 3, 31)


def test_the_last_day_still_serves_and_the_next_does_not():
    good = Interval(36, "calendar months").good_until(date(2026, 3, 17))

    assert not datetime.fromisoformat("2029-03-31T23:59:59-06:00").date() > good
    assert datetime.fromisoformat("2029-04-01T00:00:00-06:00").date() > good

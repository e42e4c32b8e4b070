"""The body of an event."""

import json
from datetime import UTC, datetime

import pytest

from records.webhooks.message import MOST_BYTES, body_of

AT = datetime(2026, 12, 1, 8, 30, tzinfo=UTC)


def test_a_body_has_type_timestamp_and_data():
    body = json.loads(body_of("load.rejected", AT, "load:1", {"verdict": "outside"}))

    assert body == {
        "type": "load.rejected",
        "timestamp": "2026-12-01T08:30:00Z",
        "data": {"about": "load:1", "verdict": "outside"},
    }


def test_the_same_event_gives_the_same_bytes():
    one = body_of("load.rejected", AT, "load:1", {"a": "1", "b": "2"})

    assert one == body_of("load.rejected", AT, "load:1", {"b": "2", "a": "1"})


@pytest.mark.parametrize("name", ["load", "Load.rejected", "load.", "load..rejected", "load rejected", ""])
def test_a_name_is_words_between_full_stops(name):
    with pytest.raises(ValueError, match="named by words"):
        body_of(name, AT, "load:1", {})


def test_a_payload_is_small():
    with pytest.raises(ValueError, match="bytes"):
        body_of("load.rejected", AT, "load:1", {"a": "x" * MOST_BYTES})

"""Rule values: how long something serves, to whom a rule applies, and reading them.

14 CFR 135.185 (read): weighed within the preceding 36 calendar months; a calendar month runs to its end
(remembered). CAT.POL.MAB.100(b) (read): every four years.
"""

from datetime import date
from typing import Any

import pytest

from fleet.rules import Applies, Interval, Subject
from fleet.rules_reading import read_rules
from records.refusal import Invalid

TWIN = Subject("aeroplane", 2, 9)
SINGLE = Subject("aeroplane", 1, 5)


def rule(name: str = "weighing-interval", **more: Any) -> dict[str, Any]:
    return {"rule": name, "source": {"rule": "135.185", "document": "14 CFR", "page": "a"}, **more}


def every(count: int, unit: str) -> dict[str, Any]:
    return {"interval": {"count": count, "unit": unit}}


def rules_document(*rules: dict[str, Any], **changes: Any) -> dict[str, Any]:
    return {
        "schema": "tarebook.rules/1",
        "title": "Rules of the certificate",
        "true_from": "2026-01-01T00:00:00Z",
        "rules": list(rules),
    } | changes


@pytest.mark.parametrize(
    ("count", "unit", "done", "good"),
    [
        (36, "calendar months", date(2025, 12, 30), date(2028, 12, 31)),
        (36, "calendar months", date(2025, 12, 1), date(2028, 12, 31)),
        (1, "calendar months", date(2028, 1, 31), date(2028, 2, 29)),
        (4, "years", date(2024, 2, 29), date(2028, 2, 29)),
        (1, "years", date(2024, 2, 29), date(2025, 2, 28)),
        (6, "months", date(2026, 8, 31), date(2027, 2, 28)),
        (30, "days", date(2026, 12, 30), date(2027, 1, 29)),
        (1200, "years", date(9000, 1, 1), date.max),
        (1200, "days", date.max, date.max),
    ],
)
def test_an_interval_runs_as_its_unit_says(count, unit, done, good):
    assert Interval(count, unit).good_until(done) == good


def test_an_interval_reads_as_people_say_it():
    assert (str(Interval(36, "calendar months")), str(Interval(1, "years"))) == (
        "36 calendar months",
        "1 year",
    )


def test_the_first_rule_that_applies_counts_and_none_is_a_value():
    found = read_rules(
        rules_document(
            rule(none=True, applies_to={"to_engines": 1}),
            rule(**every(4, "years"), applies_to={"operations": ["private"]}),
            rule(**every(36, "calendar months")),
        )
    )

    assert found.for_flight("weighing-interval", SINGLE, "private") is None
    assert str(found.for_flight("weighing-interval", TWIN, "private").interval) == "4 years"
    assert str(found.for_flight("weighing-interval", TWIN, "charter").interval) == "36 calendar months"
    assert found.for_flight("loading-signature", TWIN, "charter") is None
    assert [str(one.interval) for one in found.for_aircraft("weighing-interval", TWIN)] == [
        "4 years",
        "36 calendar months",
    ]
    assert found.for_aircraft("weighing-interval", SINGLE) == []
    assert [one.words() for one in found.rules] == ["none", "4 years", "36 calendar months"]
    assert found.rules[2].source == "135.185, 14 CFR p. a"


@pytest.mark.parametrize(
    ("given", "subject", "applies"),
    [
        ({"category": "helicopter"}, TWIN, False),
        ({"from_engines": 2}, TWIN, True),
        ({"from_engines": 2}, SINGLE, False),
        ({"from_seats": 9, "to_seats": 9}, TWIN, True),
        ({"from_seats": 10}, TWIN, False),
        ({"to_seats": 8}, TWIN, False),
    ],
)
def test_a_rule_applies_to_whom_it_says(given, subject, applies):
    assert Applies(**given).to_aircraft(subject) is applies


def faults_of(document):
    with pytest.raises(Invalid) as refused:
        read_rules(document)
    return {(fault.pointer, fault.code) for fault in refused.value.faults}


def test_a_rule_says_one_thing_of_its_kind():
    document = rules_document(
        rule(),
        rule("manifest-retention", demanded=True),
        rule("loading-signature", **every(1, "days")),
        rule("computer-check-interval", none=True, **every(1, "days")),
    )

    assert faults_of(document) == {(f"/rules/{place}", "one-of") for place in range(4)}


def test_a_rule_behind_one_that_applies_to_all_of_it_is_refused():
    document = rules_document(rule(**every(3, "years")), rule(none=True, applies_to={"to_engines": 1}))

    assert faults_of(document) == {("/rules/1", "never-reached")}


def test_bounds_the_wrong_way_round_are_refused():
    document = rules_document(
        rule(
            **every(3, "years"),
            applies_to={"from_engines": 3, "to_engines": 2, "from_seats": 9, "to_seats": 1},
        )
    )

    assert faults_of(document) == {
        ("/rules/0/applies_to/to_engines", "out-of-order"),
        ("/rules/0/applies_to/to_seats", "out-of-order"),
    }


def test_what_is_no_object_is_refused():
    assert faults_of("rules") == {("", "wrong-type")}

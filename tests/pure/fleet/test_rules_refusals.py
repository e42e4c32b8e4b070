"""Every refusal of an operator's rules word by word, and the whole of a document that says everything."""

import pytest

from fleet.rules import Applies, Interval, Rule, Rules, Subject
from fleet.rules_reading import read_rules, rules_from_text
from records.canonical import canonical
from tests.pure.fleet.documents import told
from tests.pure.fleet.test_rules import every, rule, rules_document


def test_everything_a_rule_may_say_is_read():
    applies = {
        "category": "aeroplane",
        "from_engines": 1,
        "to_engines": 2,
        "from_seats": 3,
        "to_seats": 9,
        "operations": ["charter", "ferry"],
    }
    document = rules_document(
        rule(**every(3, "years"), applies_to=applies),
        rule("loading-signature", demanded=True, source={"rule": "OM-A 8.1"}),
        rule("manifest-retention", none=True, source={"rule": "M.A.305", "page": "4"}),
    )
    wanted = Rules(
        "Rules of the certificate",
        (
            Rule(
                "weighing-interval",
                Interval(3, "years"),
                False,
                "135.185, 14 CFR p. a",
                Applies("aeroplane", 1, 2, 3, 9, ("charter", "ferry")),
            ),
            Rule("loading-signature", None, True, "OM-A 8.1", Applies()),
            Rule("manifest-retention", None, False, "M.A.305 p. 4", Applies()),
        ),
    )

    assert read_rules(document) == wanted
    assert rules_from_text(canonical(document).decode()) == wanted
    assert [one.words() for one in wanted.rules] == ["3 years", "demanded", "none"]


def once(what, place=0):
    return [(f"/rules/{place}", "one-of", f"this rule says either none or {what}, one of them; correct it")]


NEVER = "an earlier rule of this name applies to all of this; put the narrower one first"
SINGLES = {"to_engines": 1}


@pytest.mark.parametrize(
    ("rules", "faults"),
    [
        ([rule()], once("interval")),
        ([rule(none=True, **every(1, "days"))], once("interval")),
        ([rule(demanded=True)], once("interval")),
        ([rule("loading-signature")], once("demanded")),
        ([rule("loading-signature", **every(1, "days"))], once("demanded")),
        ([rule("loading-signature", demanded=True, none=True)], once("demanded")),
        (
            [rule(**every(3, "years")), rule(none=True, applies_to=SINGLES)],
            [("/rules/1", "never-reached", NEVER)],
        ),
        (
            [rule(none=True, applies_to=SINGLES), rule(**every(3, "years"), applies_to=SINGLES)],
            [("/rules/1", "never-reached", NEVER)],
        ),
        (
            [rule(**every(3, "years"), applies_to={"from_engines": 3, "to_engines": 2})],
            [
                (
                    "/rules/0/applies_to/to_engines",
                    "out-of-order",
                    "must not be below from_engines; correct one",
                )
            ],
        ),
        (
            [rule(**every(3, "years"), applies_to={"from_seats": 9, "to_seats": 8})],
            [("/rules/0/applies_to/to_seats", "out-of-order", "must not be below from_seats; correct one")],
        ),
    ],
)
def test_a_refusal_says_where_and_what_to_do(rules, faults):
    assert told(read_rules, rules_document(*rules)) == faults


def test_a_narrower_rule_before_a_wider_one_or_one_of_another_name_behind_it_is_reached():
    document = rules_document(
        rule(none=True, applies_to=SINGLES),
        rule(**every(3, "years")),
        rule("manifest-retention", **every(3, "years"), applies_to={"from_seats": 9, "to_seats": 9}),
    )
    assert len(read_rules(document).rules) == 3


def test_bounds_of_a_rule_are_both_included():
    bounded = Applies(from_engines=1, to_engines=2, from_seats=4, to_seats=6)
    for engines, seats, applies in ((1, 4, True), (2, 6, True), (0, 5, False), (3, 5, False), (1, 3, False)):
        assert bounded.to_aircraft(Subject("aeroplane", engines, seats)) is applies
    assert bounded.to_aircraft(Subject("aeroplane", 1, 7)) is False
    assert Applies(category="aeroplane").to_aircraft(Subject("aeroplane", 1, 1)) is True


def test_a_rule_for_some_operations_binds_flights_of_those_only():
    some = Applies(operations=("charter", "ferry"))
    one = Subject("aeroplane", 1, 1)
    assert some.to_flight(one, "ferry") is True
    assert some.to_flight(one, "private") is False
    assert Applies().to_flight(one, "private") is True
    assert Applies(category="helicopter").to_flight(one, "private") is False


def test_of_one_aircraft_the_rules_up_to_one_that_binds_every_operation():
    interval = Interval(3, "years")
    narrow = Rule("weighing-interval", interval, False, "a", Applies(operations=("charter",)))
    wide = Rule("weighing-interval", None, False, "b", Applies())
    behind = Rule("weighing-interval", interval, False, "c", Applies())
    other = Rule("manifest-retention", interval, False, "d", Applies())
    rules = Rules("R", (other, narrow, wide, behind))
    one = Subject("aeroplane", 1, 1)

    assert rules.for_aircraft("weighing-interval", one) == [narrow]
    assert rules.for_flight("weighing-interval", one, "charter") == narrow
    assert rules.for_flight("weighing-interval", one, "private") is None
    assert rules.for_flight("manifest-retention", one, "private") == other
    assert rules.for_flight("computer-check-interval", one, "private") is None

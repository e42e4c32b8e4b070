"""What holds for every load: order does not matter, totals are sums, and texts, margins and verdict agree."""

from decimal import Decimal
from fractions import Fraction

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from loads.balance.assess import assess
from loads.balance.declared import read_load
from records.canonical import canonical
from tests.pure.loads.making import load, twin, twin_empty

F = Fraction

UNITS = ("lb", "kg")
PLACES = ("NOSE-HOLD", "AFT-HOLD", "WING-LOCKER")
SEATS = ("COCKPIT-R", "ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R")
BASIS = twin()
EMPTY = twin_empty()


@st.composite
def loads(draw):
    """Sound loads of the twin, light and heavy, within and outside."""

    def weight(low, high):
        value = draw(st.decimals(low, high, places=draw(st.integers(0, 3)), allow_nan=False))
        return {"value": str(value), "unit": draw(st.sampled_from(UNITS))}

    seats = draw(st.lists(st.sampled_from(SEATS), unique=True, max_size=5))
    passengers = [
        {"name": f"Person {seat}", "seat": seat, "weight": weight(50, 110), "how": "weighed"}
        for seat in seats
    ]
    items = [
        {
            "kind": "cargo",
            "what": f"box {number}",
            "place": draw(st.sampled_from(PLACES)),
            "weight": weight(1, 200),
            "how": "weighed",
        }
        for number in range(draw(st.integers(0, 6)))
    ]
    document = load(passengers=passengers, items=items, persons_on_board=1 + len(seats), limits=[])
    document["crew"][0]["weight"] = weight(50, 110)
    mains = str(draw(st.decimals(40, 60, places=1)))
    document["fuel"]["at_engine_start"] |= {
        name: {"value": mains, "unit": "US gal"} for name in ("LEFT-MAIN", "RIGHT-MAIN")
    }
    document["fuel"]["trip"]["value"] = str(draw(st.decimals(10, 400, places=1)))
    return document


plenty = settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.too_slow])


@plenty
@given(loads(), st.randoms(use_true_random=False))
def test_lines_in_any_order_give_the_same_phases_checks_and_verdict(document, chance):
    mixed = {**document, "items": document["items"][:], "passengers": document["passengers"][:]}
    chance.shuffle(mixed["items"])
    chance.shuffle(mixed["passengers"])

    one = assess(read_load(document, BASIS), BASIS, EMPTY)
    other = assess(read_load(mixed, BASIS), BASIS, EMPTY)

    assert one.states == other.states
    assert one.verdict == other.verdict
    plain = {check.code: check._replace(what_next="") for check in one.checks}
    assert plain == {check.code: check._replace(what_next="") for check in other.checks}


@plenty
@given(loads())
def test_every_total_is_the_sum_of_what_was_declared(document):
    result = assess(read_load(document, BASIS), BASIS, EMPTY)

    lb = {"lb": F(1), "kg": 1 / F("0.45359237")}
    people = [*document["crew"], *document["passengers"], *document["items"]]
    aboard = sum(F(one["weight"]["value"]) * lb[one["weight"]["unit"]] for one in people)
    fuel = sum(F(held["value"]) for held in document["fuel"]["at_engine_start"].values()) * 6
    assert result.state("ramp").weight == EMPTY.weight + aboard + fuel
    assert result.state("take-off").weight == result.state("ramp").weight - 24
    assert result.state("landing").weight == result.state("take-off").weight - F(
        document["fuel"]["trip"]["value"]
    )


@plenty
@given(loads())
def test_margins_texts_and_verdict_tell_the_same(document):
    result = assess(read_load(document, BASIS), BASIS, EMPTY)

    for check in result.checks:
        if check.room is not None:
            assert (check.room >= 0) == (check.outcome == "pass")
            assert F(check.margin) <= check.room
        if check.outcome == "fail":
            assert check.what_next
        if check.actual and check.limit and check.outcome in ("pass", "fail"):
            within = F(check.actual) <= F(check.limit)
            within = within and (check.low is None or F(check.actual) >= F(check.low))
            assert within == (check.outcome == "pass")
    failed = any(check.outcome == "fail" for check in result.checks)
    assert (result.verdict == "outside") == failed
    canonical(result.as_document())


@plenty
@given(loads())
def test_the_take_off_is_allowed_exactly_when_every_limit_that_bears_on_it_is_kept(document):
    result = assess(read_load(document, BASIS), BASIS, EMPTY)

    codes = ("weight.ramp", "weight.take-off", "weight.zero-fuel", "weight.landing")
    kept = all(result.check(code).outcome == "pass" for code in codes)
    line = result.as_document()["governing"]["weight"]
    assert ("too much" in line) == (not kept)


def test_a_decimal_and_the_same_number_as_text_are_the_same_load():
    typed, text = load(), load()
    typed["items"][0]["weight"]["value"] = Decimal("120.50")
    text["items"][0]["weight"]["value"] = "120.50"

    assert read_load(typed, BASIS) == read_load(text, BASIS)

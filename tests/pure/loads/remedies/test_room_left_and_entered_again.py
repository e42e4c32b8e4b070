"""Room in envelopes that are left and entered again: the amount told is where they are left first.

The oracle tries every tenth, and where two neighbours hold, many amounts between them.
"""

from dataclasses import replace
from fractions import Fraction

from fleet.basis import Basis
from loads.balance.remedies.more import how_much_more
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.steps import Ballast, taken
from tests.pure.loads.making import F, envelope
from tests.pure.loads.remedies.cabins import asked, empty_of, nineteen, seated
from tests.pure.loads.remedies.test_room import lines

# A slit from the top of the envelope down to 9,440 lb, between arms of 204.3 and 204.5.
SLIT = (
    (195, 8000),
    (195, 11000),
    (201, 14000),
    (F("204.3"), 14000),
    (F("204.4"), 9440),
    (F("204.5"), 14000),
    (212, 14000),
    (212, 8000),
)


def slit() -> Basis:
    return replace(nineteen(), envelopes=(envelope(*SLIT),))


def question(basis: Basis) -> Question:
    document = seated({"ROW3-A": 200, "ROW3-B": 150, "ROW3-C": 150}, {"AFT-HOLD": 100}, gallons=60)
    return asked(document, basis, empty_of(7600, 203))


def first_break(asked_of: Question, place: str, most: int) -> Fraction:
    """The last whole pound that holds with every whole pound below it."""
    held = next(one for one in asked_of.ready.basis.places if one.id == place)
    for pounds in range(1, most + 1):
        if asked_of.judge(taken(asked_of.declared, [Ballast(held, Fraction(pounds))])).verdict != "within":
            return Fraction(pounds - 1)
    return Fraction(most)


def test_a_slit_that_is_passed_over_between_two_amounts_looked_at_is_found() -> None:
    asked_of = question(slit())
    assert asked_of.result.verdict == "within"
    hold = next(one for one in asked_of.ready.basis.places if one.id == "AFT-HOLD")
    for quarter in (125, 250, 375, 500):
        loaded = taken(asked_of.declared, [Ballast(hold, Fraction(quarter))])
        assert asked_of.judge(loaded).verdict == "within", "beyond the slit it is inside again"

    told = lines(how_much_more(asked_of))["place", "AFT-HOLD"]

    reached = first_break(asked_of, "AFT-HOLD", 500)
    assert reached < 250
    assert reached <= F(str(told["amount"])) < reached + 1
    assert str(told["stopped_by"]).startswith(("CG", "centre of gravity"))
    for more, within in ((F(str(told["amount"])), True), (F(str(told["amount"])) + TENTH, False)):
        loaded = taken(asked_of.declared, [Ballast(hold, more)])
        assert (asked_of.judge(loaded).verdict == "within") is within

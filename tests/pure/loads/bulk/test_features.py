"""What a basis may hold for the bulk sums to decide its loads."""

from dataclasses import dataclass, field, fields, replace
from fractions import Fraction

import pytest

from fleet.basis import Basis, OtherDatum
from loads.balance.bulk.features import asks_for_more
from tests.pure.loads.making import SOURCE, twin

F = Fraction


def first(ones, **changes):
    return (replace(ones[0], **changes), *ones[1:])


KNOWN = {
    "the plain one": {},
    "a seat in a row": {"seats": first(twin().seats, row="1")},
    "a seat for an attendant": {"seats": first(twin().seats, attendant=True)},
    "a seat with a restraint": {"seats": first(twin().seats, infant_restraint=True)},
    "another datum": {"other_datums": (OtherDatum("firewall", F(40), SOURCE),)},
    "one engine": {"engines": 1},
    "no chord": {"chord": None},
}
MORE = {
    "a seat at an exit": {"seats": first(twin().seats, exit_row=True)},
    "a seat without a restraint": {"seats": first(twin().seats, infant_restraint=False)},
    "a seat limited on a condition": {"seats": first(twin().seats, conditional=("some",))},
    "a seat on a rail": {"seats": first(twin().seats, rail="a rail")},
    "a place outside": {"places": first(twin().places, external=True)},
    "a place with a floor": {"places": first(twin().places, floor="a floor")},
    "a place limited on a condition": {"places": first(twin().places, conditional=("some",))},
    "an envelope of some configurations": {
        "envelopes": first(twin().envelopes, configurations=("six-seat",))
    },
    "an envelope of some categories": {"envelopes": first(twin().envelopes, categories=("normal",))},
    "an envelope with the gear up": {"envelopes": first(twin().envelopes, positions=(("gear", ("up",)),))},
    "a closed seat": {"closed": (("ROW1-L", "a restriction"),)},
    "a trim": {"trim": "a trim"},
    "the operator's own margins": {"curtailments": ("some",)},
    "moving parts": {"positions": ("some",)},
    "limits on the way": {"cumulative": ("some",)},
    "conditions": {"conditions": ("some",)},
    "categories": {"certification_categories": ("some",)},
    "rules of performance": {"performance": ("some",)},
    "a lateral limit by CG": {"lateral_by_cg": ("some",)},
    "a fuel balance": {"fuel_balance": ("some",)},
}


@pytest.mark.parametrize("what", KNOWN)
def test_what_decides_nothing_may_be_there(what):
    basis = replace(twin(), **KNOWN[what])

    assert asks_for_more(basis, basis.configurations[0]) is False


@pytest.mark.parametrize("what", MORE)
def test_anything_else_is_more(what):
    basis = replace(twin(), **MORE[what])

    assert asks_for_more(basis, basis.configurations[0]) is True


def test_a_mark_on_the_last_seat_or_envelope_is_seen_too():
    plain = twin()
    *before, last = plain.seats
    exits = replace(plain, seats=(*before, replace(last, exit_row=True)))
    shared = (*plain.envelopes, replace(plain.envelopes[0], categories=("normal",)))

    assert asks_for_more(exits, plain.configurations[0]) is True
    assert asks_for_more(replace(plain, envelopes=shared), plain.configurations[0]) is True


def test_a_configuration_with_a_modification_or_rules_of_its_own_is_more():
    configuration = twin().configurations[0]

    assert asks_for_more(twin(), replace(configuration, modifications=("M-1",))) is True
    assert asks_for_more(twin(), replace(configuration, performance=("some",))) is True
    assert asks_for_more(twin(), replace(configuration, minimum_crew=2)) is False


@dataclass(frozen=True, slots=True, kw_only=True)
class WithNotes(Basis):
    """As a later program may add to a basis, empty unless stated."""

    notes: list[str] = field(default_factory=list)


@dataclass(frozen=True, slots=True, kw_only=True)
class WithWord(Basis):
    """As a later program may add to a basis, to be stated each time."""

    word: str


def held(basis):
    return {each.name: getattr(basis, each.name) for each in fields(Basis)}


def test_a_field_added_later_is_more_from_the_day_it_holds_anything():
    plain, configuration = twin(), twin().configurations[0]

    assert asks_for_more(WithNotes(**held(plain)), configuration) is False
    assert asks_for_more(WithNotes(**held(plain), notes=["a note"]), configuration) is True
    assert asks_for_more(WithWord(**held(plain), word=""), configuration) is True

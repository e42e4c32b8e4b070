"""The checks alone, as many loads are computed again, are those of the whole assessment of each."""

import random
from dataclasses import replace

from hypothesis import given

from loads.balance.assess import assess, checks_alone
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.drawing import drawn
from tests.pure.loads.bulk.drawing_loads import drawn_basis, drawn_empty, drawn_load
from tests.pure.loads.making import load, twin, twin_empty
from tests.pure.loads.test_sequence_against_sampling import sequenced


def test_of_drawn_loads():
    draw = random.Random(7)
    compared = 0
    for _ in range(12):
        basis, empty = drawn_basis(draw), drawn_empty(draw)
        for _ in range(10):
            try:
                declared = read_load(drawn_load(draw, basis), basis)
            except Invalid:
                continue
            compared += 1
            assert (
                checks_alone(declared, basis, empty) == assess(declared, basis, empty, advised=False).checks
            )
    assert compared > 60


@drawn(15, 150)
@given(sequenced())
def test_of_flights_with_events(flight):
    basis, declared = flight
    whole = assess(declared, basis, twin_empty(), advised=False)
    assert checks_alone(declared, basis, twin_empty()) == whole.checks


def test_of_a_load_whose_empty_weight_is_not_known_or_of_another_datum():
    basis = twin()
    declared = read_load(load(), basis)
    for empty in (None, replace(twin_empty(), datum="elsewhere")):
        found = checks_alone(declared, basis, empty)
        assert found == assess(declared, basis, empty, advised=False).checks
        assert found[0].outcome != "pass"

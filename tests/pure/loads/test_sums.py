"""The sums that decide and the lines that are read say the same."""

from dataclasses import replace
from fractions import Fraction

from hypothesis import given

from loads.balance.aboard import Declared
from loads.balance.declared import read_load
from loads.balance.footing import Rigging
from loads.balance.sums import Sums, sums_without_fuel
from loads.balance.sumsheet import lines_without_fuel
from tests.pure.loads.making import load, twin, twin_empty
from tests.pure.loads.test_properties import loads, plenty

F = Fraction
BASIS, EMPTY = twin(), twin_empty()


def of_lines(declared: Declared) -> Sums:
    """The sums of the lines, added one by one."""
    aboard = lines_without_fuel(declared, EMPTY)
    lines = (*aboard.operating, *aboard.payload)
    return Sums(*(sum(parts, F(0)) for parts in zip(*(line[3:4] + line[5:7] for line in lines), strict=True)))


@plenty
@given(loads())
def test_the_lines_add_up_to_the_sums(document: dict[str, object]) -> None:
    declared = read_load(document, BASIS)
    assert sums_without_fuel(declared, EMPTY) == of_lines(declared)


def test_infants_restraints_what_a_table_adds_rigging_and_what_is_removed_are_in_both() -> None:
    declared = read_load(load(), BASIS)
    first, second = declared.passengers
    (bags,) = declared.items
    assert second.lap_infant is not None
    declared = replace(
        declared,
        passengers=(replace(first, restraint=F(11), added=F(6)), replace(second, added=F("0.7"))),
        items=(
            replace(bags, rigging=(Rigging("net", F("2.5"), "/items/0/net"),)),
            replace(bags, weight=F(-40), removed=True),
        ),
    )
    assert sums_without_fuel(declared, EMPTY) == of_lines(declared)


def test_one_weight_that_is_not_known_leaves_no_sum() -> None:
    declared = read_load(load(), BASIS)
    unknown = replace(declared.passengers[0], weight=None)
    assert sums_without_fuel(replace(declared, passengers=(unknown,)), EMPTY) is None
    assert sums_without_fuel(declared, None) is None

"""The sums that decide and the lines that are read say the same."""

from dataclasses import replace
from fractions import Fraction

from hypothesis import given

from fleet.basis import FixedItem
from loads.balance.aboard import Declared
from loads.balance.declared import read_load
from loads.balance.footing import Rigging
from loads.balance.sums import Sums, operating_sums, sums_without_fuel, with_payload
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


def seated(person, weight, arm, lateral=0, **more):
    """The person of this weight on a seat at these arms."""
    return replace(
        person, weight=weight, seat=replace(person.seat, arm=F(arm), lateral_arm=F(lateral)), **more
    )


def by_hand():
    """A load of fractions: 10/7 lb at 5/3 in for crew, 1/2 and 1/4 lb at 4/5 in, 3 lb at -1/9 in."""
    declared = read_load(load(), BASIS)
    (pilot,), (one, other), (bags,) = declared.crew, declared.passengers, declared.items
    fit = FixedItem("rack", F(7), F(11), F(2)), FixedItem("kit", F(-1, 6), F(3), F(1, 5))
    place = replace(bags.place, arm=F(-1, 9), lateral_arm=F(4))
    return replace(
        declared,
        configuration=replace(declared.configuration, equipment=fit[:1], operating_items=fit[1:]),
        crew=(seated(pilot, F(10, 7), F(5, 3), F(-1, 2)),),
        passengers=(
            seated(one, F(1, 2), F(4, 5), lap_infant=None),
            seated(other, F(1, 4), F(4, 5), 3, lap_infant=None),
        ),
        items=(replace(bags, weight=F(3), place=place),),
    )


def test_sums_of_fractions_are_exact():
    """Fit 7 - 1/6, and crew 10/7: 347/42. Moments 77 - 1/2 and 50/21: 3313/42. Across 14 - 1/30 and -5/7.

    Payload 3/4 and 3; moments 3/5 and -1/3; across 3/4 and 12.
    """
    declared = by_hand()
    across = EMPTY.lateral_moment + 14 - F(1, 30) - F(5, 7)
    operating = Sums(EMPTY.weight + F(347, 42), EMPTY.moment + F(3313, 42), across)

    assert operating_sums(declared, EMPTY) == operating
    assert with_payload(operating, declared) == Sums(
        operating.weight + F(15, 4), operating.moment + F(4, 15), operating.lateral_moment + F(51, 4)
    )
    assert sums_without_fuel(declared, EMPTY) == with_payload(operating, declared)


def test_infants_and_restraints_weigh_where_their_person_sits():
    declared = read_load(load(), BASIS)
    _, other = declared.passengers
    infant = replace(other.lap_infant, weight=F(2))
    people = (seated(other, F(10), 5, -1, lap_infant=infant, restraint=F(3)),)
    alone = replace(declared, passengers=people, items=())
    nothing = Sums(F(0), F(0), F(0))

    assert with_payload(nothing, alone) == Sums(F(15), F(75), F(-15))
    light = (replace(people[0], lap_infant=replace(infant, weight=None)),)
    assert with_payload(nothing, replace(alone, passengers=light)) == Sums(F(13), F(65), F(-13))
    plain = (replace(people[0], lap_infant=None, restraint=None),)
    assert with_payload(nothing, replace(alone, passengers=plain)) == Sums(F(10), F(50), F(-10))
    assert with_payload(nothing, replace(alone, passengers=())) == nothing


def test_each_weight_that_is_not_known_leaves_no_sum():
    declared = by_hand()
    crew = replace(declared, crew=(replace(declared.crew[0], weight=None),))
    items = replace(declared, items=(replace(declared.items[0], weight=None),))
    operating = operating_sums(declared, EMPTY)

    assert operating_sums(crew, EMPTY) is None
    assert sums_without_fuel(crew, EMPTY) is None
    assert with_payload(operating, items) is None
    assert with_payload(None, declared) is None
    assert operating_sums(items, EMPTY) == operating

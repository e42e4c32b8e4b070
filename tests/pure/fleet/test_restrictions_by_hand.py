"""What restrictions and permits make of a basis, effect by effect: the twin of the balance tests, whose
take-off limit is 6,800 lb, landing 6,500, minimum flying 4,300, seats 300 lb and the nose hold 250.
"""

from dataclasses import replace

import pytest

from fleet.quantities import Unit
from fleet.restriction_reading import read_paper
from fleet.restrictions import (
    LIMIT_WORDS,
    MOST_KEPT,
    Effect,
    Ruled,
    apply,
    corners_of,
    is_of,
    limit_names,
    sentences,
    tighter,
    unknown_names,
)
from fleet.sourced import Limit, Source
from fleet.stations import Conditional
from tests.pure.fleet.effects import CORNERS, FERRY, MEL, F, envelope, fuel, limit_of, maximum_of
from tests.pure.loads.making import place, seat, twin
from tests.pure.loads.papers import permit, restriction, restriction_document, ruled

SEATS = {"effect": "seats", "ids": ["ROW1-L"]}


def test_without_papers_a_basis_is_itself_and_the_same_papers_give_the_same_object():
    basis = twin()
    assert apply(basis, ()) == Ruled(basis, {}, (), ())
    paper = restriction(SEATS)
    assert apply(basis, (paper,)) is apply(basis, (paper,))
    assert apply(twin(), (paper,)) is not apply(basis, (paper,))


def test_the_latest_bases_under_papers_are_kept_and_no_more():
    basis, paper = twin(), restriction(SEATS)
    kept = apply(basis, (paper,))
    others = [replace(paper, number=str(number)) for number in range(MOST_KEPT)]
    for other in others[1:]:
        apply(basis, (other,))
    assert apply(basis, (paper,)) is kept
    apply(basis, (others[0],))
    assert apply(basis, (paper,)) is not kept


def test_a_restriction_lowers_a_limit_of_the_basis_and_of_every_configuration():
    found = ruled(restriction(limit_of("landing", "6000"))).basis
    assert found.limits.landing == Limit(F(6000), MEL)
    assert [one.limits.landing for one in found.configurations] == [Limit(F(6000), MEL)] * 2
    assert found.limits.take_off == twin().limits.take_off


def test_a_restriction_loosens_nothing_and_raises_a_minimum():
    found = ruled(restriction(limit_of("landing", "6501"), limit_of("minimum_flying", "4400"))).basis
    assert found.limits.landing == twin().limits.landing
    assert found.limits.minimum_flying == Limit(F(4400), MEL)
    lower = ruled(restriction(limit_of("minimum_flying", "4299"))).basis
    assert lower.limits.minimum_flying == twin().limits.minimum_flying


def test_a_permit_replaces_a_limit_upward_and_a_restriction_beside_it_stays():
    raised = ruled(permit(limit_of("take_off", "7000"))).basis
    assert raised.limits.take_off == Limit(F(7000), FERRY)
    both = ruled(restriction(limit_of("take_off", "6900")), permit(limit_of("take_off", "7000"))).basis
    assert both.limits.take_off == Limit(F(6900), MEL)


def test_of_two_permits_for_one_limit_the_tighter_wins_and_a_configuration_keeps_its_own():
    two = ruled(
        permit(limit_of("take_off", "7000")), permit(limit_of("take_off", "7100"), number="SFP-89")
    ).basis
    assert two.limits.take_off == Limit(F(7000), FERRY)
    basis = twin()
    own = Limit(F(6000), Source("FM", "", "1"))
    first, second = basis.configurations
    tight = replace(first, limits=replace(first.limits, take_off=own))
    found = apply(
        replace(basis, configurations=(tight, second)), (permit(limit_of("take_off", "7000")),)
    ).basis
    assert [one.limits.take_off.value for one in found.configurations] == [6000, 7000]


def test_a_limit_in_another_unit_is_exact():
    found = ruled(
        restriction({"effect": "limit", "limit": "landing", "weight": {"value": "2000", "unit": "kg"}})
    )
    assert found.basis.limits.landing.value == 2000 / F("0.45359237")


def test_a_lowered_maximum_holds_under_every_condition_too():
    basis = twin()
    source = Source("FM", "", "1")
    net = Conditional(frozenset({"NET"}), Limit(F(350), source))
    strap = Conditional(frozenset({"STRAP"}), Limit(F(90), source))
    hold = replace(place("NOSE-HOLD", 30, 250), conditional=(net, strap))
    basis = replace(basis, places=(hold, *basis.places[1:]))

    found = apply(basis, (restriction(maximum_of("NOSE-HOLD", "100")),)).basis

    assert found.places[0].maximum == Limit(F(100), MEL)
    assert found.places[0].conditional == (replace(net, maximum=Limit(F(100), MEL)), strap)
    assert found.places[1:] == basis.places[1:]
    assert (found.seats, found.zones) == (basis.seats, basis.zones)


def test_seats_and_zones_have_maxima_too_and_a_permit_replaces_one():
    assert ruled(restriction(maximum_of("ROW1-L", "170"))).basis.seats[2].maximum == Limit(F(170), MEL)
    assert ruled(restriction(maximum_of("REAR", "500"))).basis.zones[0].maximum == Limit(F(500), MEL)
    raised = permit(maximum_of("ROW1-L", "400"))
    assert ruled(raised).basis.seats[2].maximum == Limit(F(400), FERRY)
    assert ruled(raised).basis.seats[1] == seat("COCKPIT-R", 92, 14)
    again = permit(maximum_of("ROW1-L", "450"), number="SFP-89")
    assert ruled(raised, again).basis.seats[2].maximum == Limit(F(400), FERRY)


def test_seats_and_places_that_are_closed_leave_every_configuration():
    paper = restriction(
        {"effect": "seats", "ids": ["COCKPIT-R", "ROW1-L"]}, {"effect": "places", "ids": ["AFT-HOLD"]}
    )
    six, freight = ruled(paper).basis.configurations
    assert six.seats == ("COCKPIT-L", "ROW1-R", "ROW2-L", "ROW2-R")
    assert six.places == ("NOSE-HOLD", "WING-LOCKER")
    assert (freight.seats, freight.places) == (("COCKPIT-L",), ())
    assert ruled(paper).basis.closed == (
        ("COCKPIT-R", "restriction DD-14"),
        ("ROW1-L", "restriction DD-14"),
        ("AFT-HOLD", "restriction DD-14"),
    )


def test_fuel_that_cannot_be_used_is_the_most_any_paper_says():
    found = ruled(restriction(fuel("LEFT-AUX", "2")), restriction(fuel("LEFT-AUX", "7.570823568", "l")))
    assert dict(found.trapped) == {"LEFT-AUX": F(2)}  # 7.570823568 l are 2 US gal
    more = ruled(restriction(fuel("LEFT-AUX", "2"), fuel("RIGHT-AUX", "1"), fuel("LEFT-AUX", "3")))
    assert dict(more.trapped) == {"LEFT-AUX": F(3), "RIGHT-AUX": F(1)}
    assert more.basis == twin()
    first = ruled(restriction(fuel("LEFT-AUX", "3"), fuel("LEFT-AUX", "2"), fuel("RIGHT-AUX", "0.5")))
    assert dict(first.trapped) == {"LEFT-AUX": F(3), "RIGHT-AUX": F("0.5")}


def test_a_narrower_envelope_stands_beside_the_basis_s_own_and_a_permit_s_in_its_place():
    own = twin().envelopes[0]
    corners = tuple((F(arm), F(weight)) for arm, weight in CORNERS)
    beside = ruled(restriction(envelope())).basis.envelopes
    assert beside == (own, replace(own, id=f"{own.id} DD-14", points=corners, source=MEL))
    instead = ruled(permit(envelope())).basis.envelopes
    assert instead == (replace(own, points=corners, source=FERRY),)
    other = replace(own, id="other")
    basis = replace(twin(), envelopes=(other, own))
    assert apply(basis, (permit(envelope()),)).basis.envelopes == (other, *instead)
    two = ruled(permit(envelope()), permit(envelope(), number="SFP-89")).basis.envelopes
    assert [one.id for one in two] == [own.id, f"{own.id} SFP-89"]


def test_corners_are_brought_into_the_units_of_the_basis():
    effect = read_paper(
        restriction_document(envelope([["2.54", "1"]] * 3, unit="m", weight_unit="kg")), "restriction"
    ).effects[0]
    basis = twin()
    assert corners_of(effect, basis.envelopes[0], basis)[0] == (F(100), 1 / F("0.45359237"))
    moments = replace(basis.envelopes[0], plane="moment")
    across = replace(effect, units=(Unit.LB_FT, Unit.LB))
    assert corners_of(across, moments, basis)[0] == (F("2.54") * 12, F(1))
    with pytest.raises(TypeError, match=r"^the reader gives an envelope its units$"):
        corners_of(replace(effect, units=None), moments, basis)


def test_what_the_basis_does_not_have_is_unmet_and_the_rest_holds():
    found = ruled(restriction({"effect": "seats", "ids": ["ROW7-L", "ROW8-L"]}, limit_of("landing", "6000")))
    assert found.unmet == (
        "restriction DD-14 names ROW7-L, which the loading basis does not have",
        "restriction DD-14 names ROW8-L, which the loading basis does not have",
    )
    assert found.basis.limits.landing == Limit(F(6000), MEL)
    with pytest.raises(TypeError, match=r"^the reader gives this effect its amount$"):
        apply(twin(), (replace(restriction(SEATS), effects=(Effect("limit", ("landing",)),)),))


@pytest.mark.parametrize(
    ("effect", "unknown"),
    [
        (Effect("maximum", ("ROW1-L", "AFT-HOLD", "REAR", "LEFT-AUX")), ["LEFT-AUX"]),
        (Effect("seats", ("AFT-HOLD",)), ["AFT-HOLD"]),
        (Effect("places", ("ROW1-L", "AFT-HOLD")), ["ROW1-L"]),
        (Effect("fuel", ("LEFT-AUX", "AFT-HOLD")), ["AFT-HOLD"]),
        (Effect("envelope", ("longitudinal-arm", "aft")), ["aft"]),
        (Effect("limit", (*LIMIT_WORDS, "floor")), ["with_external_load", "floor"]),
    ],
)
def test_each_effect_names_things_of_its_own_kind(effect, unknown):
    assert unknown_names(twin(), effect) == unknown


def test_a_limit_with_an_external_load_is_known_where_the_manual_gives_one():
    basis = twin()
    with_one = replace(basis, limits=replace(basis.limits, with_external_load=Limit(F(7000), MEL)))
    assert unknown_names(with_one, Effect("limit", ("with_external_load",))) == []


def test_what_each_effect_does_in_a_sentence():
    effects = (
        limit_of("landing", "6000"),
        maximum_of("NOSE-HOLD", "100.50"),
        {"effect": "seats", "ids": ["ROW1-L", "ROW1-R"]},
        {"effect": "places", "ids": ["AFT-HOLD"]},
        fuel("LEFT-AUX", "2"),
        envelope(),
    )
    own = twin().envelopes[0].id
    assert ruled(restriction(*effects)).lines == (
        (
            "maximum landing weight 6000 lb",
            "at most 100.50 lb in nose hold",
            "row1 l, row1 r blocked",
            "aft hold closed",
            "2 US gal in left-aux cannot be used",
            f"envelope {own} narrowed",
        ),
    )
    assert ruled(permit(effects[0], effects[1], effects[5])).lines == (
        (
            "maximum landing weight 6000 lb permitted",
            "at most 100.50 lb in nose hold permitted",
            f"envelope {own} replaced",
        ),
    )
    assert sentences(restriction(effects[2]), {}) == ("ROW1-L, ROW1-R blocked",)


@pytest.mark.parametrize(
    ("one", "other", "least", "wanted"),
    [
        (None, None, False, None),
        (None, 5, False, 5),
        (5, None, False, 5),
        (5, 4, False, 4),
        (5, 6, False, 5),
        (5, 4, True, 5),
        (5, 6, True, 6),
    ],
)
def test_the_tighter_of_two_limits(one, other, least, wanted):
    first = Limit(None if one is None else F(one), MEL)
    second = Limit(None if other is None else F(other), FERRY)
    assert tighter(first, second, least=least).value == wanted


def test_what_was_not_entered_is_looser_than_anything_and_of_equals_the_first_stays():
    some, none = Limit(F(5), FERRY), Limit(None, FERRY)
    assert tighter(None, some) is some
    assert tighter(None, none) is none
    assert tighter(Limit(F(5), MEL), some) == Limit(F(5), MEL)
    assert tighter(Limit(None, MEL), none) == Limit(None, MEL)


def test_units_of_an_envelope_and_the_limits_a_paper_may_name():
    assert is_of(Unit.MM, "arm") is True
    assert is_of(Unit.LB_IN, "arm") is False
    assert is_of(Unit.KG_M, "moment") is True
    assert is_of(Unit.IN, "moment") is False
    assert is_of(Unit.LB, "moment") is False
    assert limit_names() == tuple(LIMIT_WORDS)

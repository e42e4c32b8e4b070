"""A ferry permit: a bounded, numbered, dated widening by an authority, in place of the limit it names.

14 CFR 21.197 (read: special flight permits for overweight flights beyond normal range); the figures are ours.
"""

from tests.pure.loads.making import load, with_limits
from tests.pure.loads.papers import lb, permit, restriction, result_under, ruled

MORE = {"effect": "limit", "limit": "take_off", "weight": lb("7480")}  # 110 % of 6,800
WIDER = {
    "effect": "envelope",
    "of": "longitudinal-arm",
    "points": [["110", "4000"], ["110", "5200"], ["118", "7500"], ["128", "7500"], ["128", "4000"]],
    "unit": "in",
    "weight_unit": "lb",
}


def test_a_permit_replaces_the_limit_it_names_and_no_other():
    basis = ruled(permit(MORE)).basis

    (six, freight) = basis.configurations
    assert six.limits.take_off.value == freight.limits.take_off.value == 7480
    assert str(six.limits.take_off.source) == "permit SFP-88, Permit SFP-88 p. 1"
    assert six.limits.landing.value == 6500


def test_a_restriction_beside_a_permit_still_tightens_whichever_was_entered_first():
    low = restriction({"effect": "limit", "limit": "take_off", "weight": lb("7000")})

    for papers in ((permit(MORE), low), (low, permit(MORE))):
        assert ruled(*papers).basis.limits.take_off.value == 7000


def test_of_two_permits_for_one_limit_the_tighter_holds():
    other = permit(MORE | {"weight": lb("7200")}, number="SFP-89")

    assert ruled(permit(MORE), other).basis.limits.take_off.value == 7200
    assert ruled(other, permit(MORE)).basis.limits.take_off.value == 7200


def test_a_configurations_own_lower_limit_is_not_the_one_a_permit_names():
    from dataclasses import replace  # noqa: PLC0415  # one test alone needs it

    from fleet.restrictions import apply  # noqa: PLC0415  # as above

    basis = with_limits(ramp=6840, take_off=6800, zero_fuel=6200, landing=6500, minimum_flying=4300)
    own = replace(basis.configurations[1].limits, take_off=replace(basis.limits.take_off, value=6000))
    kept = replace(
        basis, configurations=(basis.configurations[0], replace(basis.configurations[1], limits=own))
    )

    (six, freight) = apply(kept, (permit(MORE),)).basis.configurations

    assert (six.limits.take_off.value, freight.limits.take_off.value) == (7480, 6000)


def test_a_heavy_ferry_is_within_only_under_its_permit():
    """1,300 lb in the locker in place of 120 of bags: 5,760.5 + 1,180 = 6,940.5 lb at take-off, above 6,800
    and below the 7,480 of the permit with its envelope.
    """
    heavy = load(limits=[])
    heavy["items"] = [
        {
            "kind": "cargo",
            "what": "ferry tank",
            "place": "WING-LOCKER",
            "weight": lb("1300"),
            "how": "weighed",
        }
    ]
    more = [
        MORE,
        WIDER,
        {"effect": "limit", "limit": "ramp", "weight": lb("7500")},
        {"effect": "limit", "limit": "landing", "weight": lb("7480")},
        {"effect": "limit", "limit": "zero_fuel", "weight": lb("7480")},
    ]

    without, under = result_under(document=heavy), result_under(permit(*more), document=heavy)

    assert without.check("weight.take-off").outcome == "fail"
    assert (under.verdict, under.check("weight.take-off").limit) == ("within", "7480")


def test_what_a_permit_says_is_told_in_words():
    assert ruled(permit(MORE)).lines == (("maximum take-off weight 7480 lb permitted",),)

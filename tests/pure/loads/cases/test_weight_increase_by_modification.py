"""A weight increase by an approved modification: only with the kit fitted, landing and zero fuel as before.

Common practice (supplemental type certificates that raise the take-off weight leave the other limits as they
are). The figures are invented: the demonstration twin with its take-off limit raised by 250 lb.
"""

import pytest

from fleet.basis_reading import read_basis
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, changed, found_in

KIT_PAGE = {"document": "MOD 21-04", "revision": "1", "page": "3"}


def limit_of(document, name):
    return int(document["limits"][name]["value"])


def with_kit(document=None, by=250, fitted=("KIT",)):
    """The twin with a kit that raises ramp and take-off limits, fitted in its first configuration."""
    document = document or basis_document("twin")
    limits = {
        name: {"value": limit_of(document, name) + by, "unit": "lb", "source": KIT_PAGE}
        for name in ("ramp", "take_off")
    }
    kit = {"id": "KIT", "name": "gross weight kit", "limits": limits, "source": KIT_PAGE}
    document = changed(document, "/modifications", [kit])
    document = changed(document, "/configurations/0/modifications", list(fitted))
    first = document["configurations"][0]["id"]
    rest = [one["id"] for one in document["configurations"][1:]]
    plain = document["envelopes"]
    raised = [
        dict(one, id=f"{one['id']}-KIT"[:24], configurations=[first], points=higher(one, by)) for one in plain
    ]
    return changed(
        document, "/envelopes", raised + ([dict(one, configurations=rest) for one in plain] if rest else [])
    )


def higher(envelope, by):
    """The envelope with its upper edge raised: the same arms further up."""
    top = max(int(weight) for weight, _ in envelope["points"])
    return [[int(weight) + (by if int(weight) == top else 0), x] for weight, x in envelope["points"]]


def test_the_limit_is_raised_with_its_own_page_only_where_the_kit_is_fitted():
    document = with_kit()
    basis = read_basis(document)
    fitted, *others = basis.configurations
    before = basis.limits
    assert fitted.limits.take_off.value == before.take_off.value + 250
    assert str(fitted.limits.take_off.source) == "MOD 21-04 rev 1 p. 3"
    assert (fitted.limits.landing, fitted.limits.zero_fuel) == (before.landing, before.zero_fuel)
    assert others
    assert all(one.limits.take_off.value <= before.take_off.value for one in others)


def test_a_configuration_alone_still_may_only_tighten():
    document = with_kit(fitted=["KIT"])
    looser = {
        "value": limit_of(basis_document("twin"), "take_off") + 100,
        "unit": "lb",
        "source": {"page": "2"},
    }
    document = changed(document, "/configurations/1/limits", {"take_off": looser})
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert ("/configurations/1/limits/take_off", "limit-looser") in found_in(refused.value)


def test_with_the_kit_its_own_limit_may_tighten_the_raised_one():
    tighter = {
        "value": limit_of(basis_document("twin"), "take_off") + 100,
        "unit": "lb",
        "source": {"page": "2"},
    }
    basis = read_basis(changed(with_kit(), "/configurations/0/limits", {"take_off": tighter}))
    assert basis.configurations[0].limits.take_off.value == basis.limits.take_off.value + 100


def test_an_envelope_that_ends_below_the_raised_limit_is_a_fault():
    document = with_kit()
    document["envelopes"] = basis_document("twin")["envelopes"]
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert "envelope-below-limit" in {code for _, code in found_in(refused.value)}


def test_two_modifications_that_raise_the_same_limit_are_one_approval_or_a_fault():
    document = with_kit(fitted=["KIT", "OTHER"])
    other = dict(document["modifications"][0], id="OTHER")
    document = changed(document, "/modifications/1", other)
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert ("/configurations/0/modifications/1", "limit-replaced-twice") in found_in(refused.value)


def test_an_unknown_modification_and_one_without_limits_are_faults():
    document = changed(with_kit(fitted=["NONE"]), "/modifications/0/limits", {})
    with pytest.raises(Invalid) as refused:
        read_basis(document)
    assert {
        ("/configurations/0/modifications/0", "unknown-id"),
        ("/modifications/0/limits", "too-few"),
    } <= found_in(refused.value)

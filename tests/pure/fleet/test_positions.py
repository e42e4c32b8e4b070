"""Gear and flaps in a loading basis: read exactly, refused by their field, and how settings go together."""

from fractions import Fraction
from typing import Any

import pytest

from fleet.basis_reading import read_basis
from fleet.positions import Setting, settings
from records.refusal import Invalid
from tests.pure.fleet.documents import basis_document, found_in, is_a_sentence_with_a_next_step

PAGE = {"page": "6-21"}


def state(name: str, change: Any, *holds: str, unit: str = "lb in") -> dict[str, Any]:
    moment = {"value": change, "unit": unit}
    return {"id": name, "name": name.lower(), "moment_change": moment, "holds": list(holds), "source": PAGE}


def gear(**changes: Any) -> dict[str, Any]:
    states = [state("DOWN", 0, "ground", "flight"), state("UP", -1500, "flight")]
    return {"id": "GEAR", "name": "landing gear", "as_weighed": "DOWN", "states": states} | changes


def flaps(*changes: int) -> dict[str, Any]:
    states = [state("IN", 0, "ground", "flight")]
    states += [state(f"F{number}", change, "ground", "flight") for number, change in enumerate(changes)]
    return {"id": "FLAPS", "name": "flaps", "as_weighed": "IN", "states": states}


def with_parts(*parts: Any) -> Any:
    return basis_document("twin") | {"positions": list(parts)}


def refused(*parts: Any) -> set[tuple[str, str]]:
    with pytest.raises(Invalid) as error:
        read_basis(with_parts(*parts))
    assert all(is_a_sentence_with_a_next_step(fault) for fault in error.value.faults)
    return found_in(error.value)


def test_a_change_arrives_exactly_in_the_units_of_the_basis_with_its_page() -> None:
    part = gear(states=[state("DOWN", 0, "ground"), state("UP", "-1.5", "flight", unit="kg m")])
    (read,) = read_basis(with_parts(part)).positions
    # 1 lb is 0.45359237 kg and 1 in is 25.4 mm, both exactly
    assert read.state("UP").moment_change == Fraction("-1.5") / Fraction("0.45359237") / Fraction("0.0254")
    assert read.state("UP").source.page == "6-21"
    assert (read.as_weighed, read.state("DOWN").holds) == ("DOWN", ("ground",))
    with pytest.raises(KeyError):
        read.state("HALF")


def test_a_basis_without_the_section_has_none() -> None:
    assert read_basis(basis_document("twin")).positions == ()


def test_what_cannot_be_is_refused_by_its_field() -> None:
    at = "/positions/0"
    assert refused(gear(as_weighed="HALF")) == {(f"{at}/as_weighed", "unknown-state")}
    assert refused(gear(as_weighed="UP")) == {
        (f"{at}/as_weighed", "not-on-ground"),
        (f"{at}/states/1/moment_change", "change-as-weighed"),
    }
    twice = [state("DOWN", 0, "ground"), state("UP", 1, "flight"), state("UP", 2, "flight")]
    assert refused(gear(states=twice)) == {(f"{at}/states/2/id", "duplicate-id")}
    assert refused(gear(), gear()) == {("/positions/1/id", "duplicate-id")}
    assert refused(gear(states=[state("DOWN", 0, "ground")])) == {(f"{at}/states", "too-few")}
    assert refused(gear(states=[state("DOWN", 0), state("UP", 1, "flight")])) == {
        (f"{at}/states/0/holds", "too-few")
    }
    assert refused(gear(states=[state("DOWN", 0, "ground"), state("UP", 1, "air")])) == {
        (f"{at}/states/1/holds/0", "not-a-choice")
    }
    unit = state("UP", 1, "flight", unit="lb")
    assert refused(gear(states=[state("DOWN", 0, "ground"), unit])) == {
        (f"{at}/states/1/moment_change/unit", "unit-dimension")
    }
    parts = [flaps(*range(1, 8)) | {"id": f"F{number}"} for number in range(3)]
    assert refused(*parts) == {("/positions", "too-many-positions")}  # 8 * 8 * 8 = 512 ways


def test_settings_go_together_and_each_change_of_moment_stands_once() -> None:
    parts = read_basis(with_parts(gear(), flaps(500, 1500))).positions
    # down and in is as weighed; up -1500; flaps +500, +1500; up with flaps -1000 and 0
    assert {(one.words, one.moment) for one in settings(parts, "flight")} == {
        ("landing gear up", -1500),
        ("flaps f0", 500),
        ("flaps f1", 1500),
        ("landing gear up, flaps f0", -1000),
    }
    assert settings(parts, "ground") == (
        Setting("flaps f0", Fraction(500)),
        Setting("flaps f1", Fraction(1500)),
    )
    assert settings((), "flight") == ()

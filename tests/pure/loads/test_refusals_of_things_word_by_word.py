"""Every refusal of what is fitted, of what items stand on, of categories and of standard weights in full."""

from copy import deepcopy
from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from fleet.flight_rules import CertificationCategory
from fleet.standard_weights import StandardWeights
from fleet.standard_weights_reading import read_standard_weights
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.loads.agreed import agreed, faults_told
from tests.pure.loads.cases.test_floor import BAD, crate, hold, loaded, per_area, per_length, sides
from tests.pure.loads.cases.test_seats_on_rails import railed, stated
from tests.pure.loads.cases.test_zones import DOOR, NET
from tests.pure.loads.making import SOURCE, load, twin
from tests.pure.loads.round_figures import q
from tests.pure.loads.standards import document_with, eu_document, passenger, seasonal_document, standard

AGREED = agreed("refusals_of_things")
Asked = tuple[dict[str, Any], Basis, StandardWeights | None]
FLOOR = hold(per_area(50), per_length(60))
CONDITIONED = replace(twin(), conditions=(NET, DOOR))
CATEGORIES = tuple(
    CertificationCategory(each, f"{each} category", (), SOURCE) for each in ("normal", "utility")
)
CLOSED = replace(twin(), closed=(("AFT-HOLD", "DD-15, lining loose"), ("ROW1-L", "DD-14, seat torn")))
SEASONS = read_standard_weights(seasonal_document())
LAP = {"name": "B. Lund", "weight": q(18), "how": "weighed"}


def in_basis(basis: Basis, **changes: Any) -> Asked:
    return load(**changes), basis, None


def people(*who: dict[str, Any], table: StandardWeights | None = SEASONS) -> Asked:
    return document_with(list(who)), twin(), table


def crew(**changes: Any) -> Asked:
    document = document_with([])
    document["crew"][0] |= {"how": "standard", **changes}
    del document["crew"][0]["weight"]
    return document, twin(), read_standard_weights(eu_document())


def items(basis: Basis, *lines: dict[str, Any]) -> Asked:
    return loaded(*lines), basis, None


def placed(where: str, **more: Any) -> dict[str, Any]:
    return crate(80) | {"place": where, **more}


ASKED: dict[str, Asked] = {
    f"{number}. what an item stands on: {pointer} {code}": (loaded(crate(80) | change), FLOOR, None)
    for number, (change, pointer, code) in enumerate(BAD, 1)
} | {
    "a pallet smaller than the spreader under it": items(
        FLOOR, crate(80, pallet={"weight": q(5), **sides(30, 30)}, spreader={"weight": q(5), **sides(30, 29)})
    ),
    "101 feet": items(FLOOR, crate(80, sides(2, 2, feet_lengthwise=101, feet_widthwise=100))),
    "a net of no weight": items(FLOOR, crate(80, net={})),
    "a condition nobody knows, one twice": in_basis(CONDITIONED, conditions=["NET", "net", "NET"]),
    "a condition where none is": in_basis(twin(), conditions=["NET"]),
    "conditions that are no list": in_basis(CONDITIONED, conditions="NET"),
    "61 conditions": in_basis(CONDITIONED, conditions=["NET"] * 61),
    "conditions of other forms": in_basis(CONDITIONED, conditions=[7, "", "N" * 65]),
    "a setting nobody knows": (stated({"seat": "ROW1-L", "setting": "9"}), railed(), None),
    "a setting without a name": (stated({"seat": "ROW1-L"}), railed(), None),
    "a seat and a row, or neither": (
        stated({"seat": "ROW1-L", "row": "1", "setting": "3"}, {"setting": "3"}), railed(), None),
    "the same seat twice": (
        stated({"seat": "ROW1-L", "setting": "3"}, {"row": "1", "setting": "7"},
               {"seat": "ROW1-R", "setting": "3"}), railed(), None),
    "a seat, and rows, nobody knows": (
        stated({"seat": "ROW9", "setting": "3"}, {"row": "9", "setting": "3"}), railed(), None),
    "a row where no rows are": in_basis(twin(), seat_settings=[{"row": "1", "setting": "3"}]),
    "a seat that stands on no rail": in_basis(railed(), seat_settings=[{"seat": "ROW2-L", "setting": "3"}]),
    "a setting for the whole row": (stated({"row": "1", "setting": "9"}), railed(), None),
    "several categories and none stated": in_basis(replace(twin(), certification_categories=CATEGORIES)),
    "a category nobody knows": in_basis(
        replace(twin(), certification_categories=CATEGORIES), certification_category="acrobatic"),
    "a category where none is": in_basis(twin(), certification_category="normal"),
    "a category that is no text": in_basis(
        replace(twin(), certification_categories=CATEGORIES), certification_category=7),
    "a closed place and a blocked seat": in_basis(CLOSED),
    "an item inside that could be released": items(twin(), placed("NOSE-HOLD", jettisonable=True)),
    "equipment that is not aboard and could be released": items(
        replace(twin(), places=tuple(replace(one, external=True) for one in twin().places)),
        placed("NOSE-HOLD", kind="equipment", removed=True, jettisonable=True)),
    "cargo that is taken out": items(twin(), placed("NOSE-HOLD", removed=True)),
    "a category of people that is not in the table": people(standard("A. Lund", "ROW1-L", "infant")),
    "no category at all": people(passenger("A. Lund", "ROW1-L", how="standard")),
    "an infant with a weight on a standard lap": people(
        standard("A. Lund", "ROW1-L", "adult", lap_infant=LAP)),
    "crew of a kind that is not in the table": crew(category="navigator"),
    "a limit that is stated for nothing": in_basis(twin(), limits=[
        {"at": "ramp", "weight": q(0), "source": "s" * 201, "kind": "wind"}]),
    "names and logins that stand twice": in_basis(twin(), persons_on_board=5, crew=[
        load()["crew"][0],
        load()["crew"][0] | {"seat": "COCKPIT-R", "position": "second pilot", "name": "r.  AMANI"}]),
    "61 crew lines and 901 passengers": in_basis(twin(), persons_on_board=962, crew=[{}] * 61,
                                                 passengers=[{}] * 901),
}  # fmt: skip


def told(document: Any, basis: Basis, table: StandardWeights | None) -> list[str]:
    with pytest.raises(Invalid) as refused:
        read_load(deepcopy(document), basis, table)
    return faults_told(refused.value.faults)


@pytest.mark.parametrize("title", ASKED)
def test_what_is_said_of_things_that_cannot_be(title: str) -> None:
    assert told(*ASKED[title]) == AGREED[title]


def test_every_agreed_refusal_of_things_is_asked_for() -> None:
    assert list(AGREED) == list(ASKED)

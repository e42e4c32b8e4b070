"""An infant on a lap is inside a standard adult's weight and adds its own to a weighed or declared one; in a
seat of its own it counts as the table says. It is a person either way, and a seat only in its own.

Source: AMC1 CAT.POL.MAB.100(e) (read): an infant in an adult's arms is inside the adult figure, one in its
own seat is a child of 35 kg.
"""

from fractions import Fraction

from tests.pure.loads.standards import assessed, document_with, eu, passenger, standard

KG = 1 / Fraction("0.45359237")
NINE = {"value": 9, "unit": "kg"}


def payload(result):
    return sum(line.weight for line in result.lines if line.group == "passengers")


def persons(result):
    return result.as_document()["persons"]


def test_a_lap_infant_adds_nothing_to_a_standard_adult():
    """86 kg with the infant and 86 without it; three people aboard against two."""
    lap = [standard("A", "ROW1-L", "female", lap_infant={"name": "I"})]
    alone = [standard("A", "ROW1-L", "female")]

    with_it, without = assessed(document_with(lap), eu()), assessed(document_with(alone), eu())

    assert payload(with_it) == payload(without) == 86 * KG
    assert (persons(with_it)["total"], persons(without)["total"]) == (3, 2)
    assert persons(with_it)["passengers"] == 1


def test_a_lap_infant_adds_its_own_weight_to_a_weighed_adult():
    """70 + 9 = 79 kg at that seat."""
    adult = passenger(
        "A",
        "ROW1-L",
        how="weighed",
        weight={"value": 70, "unit": "kg"},
        lap_infant={"name": "I", "weight": NINE, "how": "weighed"},
    )

    result = assessed(document_with([adult]), eu())

    assert payload(result) == 79 * KG


def test_a_lap_infant_adds_its_own_weight_to_a_declared_adult_and_no_addition_of_its_own():
    """70 declared + 10 clothing and hand baggage + 9 infant = 89 kg."""
    adult = passenger(
        "A",
        "ROW1-L",
        how="declared",
        weight={"value": 70, "unit": "kg"},
        lap_infant={"name": "I", "weight": NINE, "how": "declared"},
    )

    result = assessed(document_with([adult]), eu())

    assert payload(result) == 89 * KG


def test_an_infant_in_a_seat_of_its_own_counts_as_a_child():
    """86 kg the adult, 35 kg the infant beside her."""
    people = [standard("A", "ROW1-L", "female"), standard("I", "ROW1-R", "infant")]

    result = assessed(document_with(people), eu())

    assert payload(result) == (86 + 35) * KG
    assert persons(result)["passengers"] == 2

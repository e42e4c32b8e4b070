"""A team, a hunting party, soldiers: a group that no average fits is weighed or declared person by person,
and nothing of it is averaged away.

Common practice, and AC 120-27F's nonstandard weight groups (remembered): actual weights for such groups.
"""

from fractions import Fraction

from tests.pure.loads.standards import assessed, document_with, eu, passenger, standard

KG = 1 / Fraction("0.45359237")


def kilograms(result):
    return sum(line.weight for line in result.lines if line.group == "passengers") / KG


def test_four_heavy_players_weighed_count_what_they_weigh_beside_a_standard_coach():
    """Four at 130 kg weighed and one standard man at 104: 624 kg, where five standard men would be 520."""
    seats = ("COCKPIT-R", "ROW1-L", "ROW1-R", "ROW2-L")
    players = [
        passenger(f"P{seat}", seat, how="weighed", weight={"value": 130, "unit": "kg"}) for seat in seats
    ]
    coach = standard("C", "ROW2-R", "male")

    result = assessed(document_with([*players, coach]), eu())

    assert kilograms(result) == 624
    told = result.as_document()["standard_weights"]
    assert (told["standard"], told["weighed"]) == (1, 5)  # the pilot is weighed, too


def test_estimates_of_a_group_stay_estimates_and_take_nothing_from_the_table():
    party = [passenger("H", "ROW1-L", how="estimated", weight={"value": 120, "unit": "kg"})]

    result = assessed(document_with(party), eu())

    assert kilograms(result) == 120
    assert result.verdict == "unresolved"
    assert result.check("weights.estimated").margin_text == "estimated: row1 l"

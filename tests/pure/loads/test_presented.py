"""Moments shown as the manual shows them: beside themselves, line by line, never in the place of a figure."""

from dataclasses import replace
from fractions import Fraction

from fleet.presentation import DividedMoment, IndexUnits, Presentation
from tests.pure.loads.making import SOURCE, result_of, twin

F = Fraction
BOTH = Presentation(IndexUnits(F(118), F(1000), F(50), SOURCE), DividedMoment(F(100), SOURCE))


def shown(presentation=BOTH):
    return result_of(basis=replace(twin(), presentation=presentation)).as_document()


def test_every_line_and_total_has_its_index_and_the_lines_add_up_to_the_totals():
    """The constant stands in the empty weight, so a sum by hand from the printed lines comes out."""
    document = shown()

    rows = document["sumsheet"]
    assert all(row["index"] is not None and row["moment_divided"] is not None for row in rows)
    up_to_zero_fuel = []
    for row in rows:
        if row["what"] == "zero fuel":
            assert abs(sum(up_to_zero_fuel) - F(row["index"])) <= F(1, 100) * len(up_to_zero_fuel)
            break
        if not row["total"]:
            up_to_zero_fuel.append(F(row["index"]))
    assert len(up_to_zero_fuel) >= 5


def test_by_hand_the_empty_aircraft():
    """4,350 lb and 507,240.5 lb in: (507240.5 - 118 * 4350) / 1000 + 50 = 43.9405."""
    empty = shown()["sumsheet"][0]

    assert empty["index"] == "43.94"
    assert empty["moment_divided"] == "5072.41"


def test_phases_the_worst_point_and_the_operating_weight_have_them_too():
    document = shown()

    state = result_of().state("take-off")
    at = next(phase for phase in document["phases"] if phase["phase"] == "take-off")
    assert abs(F(at["index"]) - ((state.moment - 118 * state.weight) / 1000 + 50)) <= F(1, 200)
    assert document["operating_weight"]["index"]
    assert all(point["index"] for point in document["path"]["worst"])
    assert document["presentation"]["index"]["text"] == (
        "index = weight x (arm - 118 in) / 1000 lb in + 50 (added to the empty weight and to totals)"
    )
    assert document["presentation"]["moment_divided"] == {"divisor": "100", "source": str(SOURCE)}


def test_one_of_the_two_is_shown_alone():
    document = shown(Presentation(None, DividedMoment(F(1000), SOURCE)))

    assert "index" not in document["phases"][0]
    assert document["phases"][0]["moment_divided"]


def test_nothing_else_of_an_answer_changes():
    """Only shown, never an input: the same checks, to the last letter."""
    plain, with_both = result_of().as_document(), shown()

    def bare(part):
        if isinstance(part, dict):
            kept = {"index", "moment_divided", "presentation"}
            return {name: bare(value) for name, value in part.items() if name not in kept}
        return [bare(each) for each in part] if isinstance(part, list) else part

    assert bare(with_both) == plain

"""More of one item moved than was proposed, where that breaks a limit which the program does not know."""

from collections.abc import Sequence
from dataclasses import replace
from fractions import Fraction
from math import ceil, floor

from loads.balance.aboard import Declared
from loads.balance.remedies.first import first_that_holds
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.steps import Shift, Step, taken
from loads.balance.remedies.varying import Change, Varying
from loads.balance.result import Result


def more_moved(question: Question, steps: Sequence[Step]) -> tuple[tuple[Step, ...], Result] | None:
    """Return the same steps with the least more, in tenths, of the only item that is parted, and the result;
    None where none or several are parted, or no more of it holds. Less of it breaks what the program knows.
    """
    shifts = [step for step in steps if isinstance(step, Shift)]
    parted = [step for step in shifts if not step.whole]
    if len(parted) != 1:
        return None
    (part,) = parted
    weight = part.item.weight or part.weight

    def with_tenths(count: Fraction) -> tuple[Step, ...]:
        return tuple(replace(step, weight=count * TENTH) if step is part else step for step in steps)

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, with_tenths(count))

    varying = Varying(question, Change(changed))
    held = first_that_holds(varying, ceil(part.weight / TENTH) + 1, floor(weight / TENTH))
    return None if held is None else (with_tenths(Fraction(held[0])), held[1])

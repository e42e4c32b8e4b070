"""Another configuration of the same aircraft: offered where everything carries over as it is."""

from fleet.basis import Configuration
from loads.balance.aboard import Declared
from loads.balance.remedies.arranging import Found
from loads.balance.remedies.question import Question
from loads.balance.remedies.steps import Refit, taken

MOST_OFFERED = 2


def refitted(question: Question) -> list[Found]:
    """Return the configurations that carry the load within, in the order of the basis.

    One on another base fit (wheels, skis, floats) has another empty weight: it is another aircraft that day.
    """
    found: list[Found] = []
    for other in question.ready.basis.configurations:
        if len(found) == MOST_OFFERED or not question.left():
            break
        if not carries(other, question.declared):
            continue
        steps = (Refit(other),)
        result = question.assessed(taken(question.declared, steps))
        if result.verdict == "within":
            found.append(Found(steps, result, proven=False))
    return found


def carries(other: Configuration, declared: Declared) -> bool:
    """Return whether a configuration has every seat and place that is used, and enough crew."""
    now = declared.configuration
    people = (*declared.crew, *declared.passengers)
    return (
        other.id != now.id
        and other.fit == now.fit
        and other.minimum_crew <= len(declared.crew)
        and {person.seat.id for person in people} <= set(other.seats)
        and {item.place.id for item in declared.items} <= set(other.places)
    )

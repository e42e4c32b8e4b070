"""Submitting a load: declared, computed and kept in one act."""

from loads.actions.identifier import new_load_id
from loads.actions.keeping import keep_load
from loads.acts import SUBMIT_LOAD
from loads.queries.computation import compute
from loads.queries.current import Current
from loads.queries.legs import demand_standing
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def submit_load(document: dict[str, JSON], *, by: Actor) -> Current:
    """This function will compute and keep a load document `tarebook.load/1`, whatever its verdict.

    Raises Invalid with every fault of the document, NotAllowed; nothing is stored then.
    """
    number = new_load_id()
    with act(SUBMIT_LOAD, by=by, about=f"load:{number}") as entry:
        computation = compute(entry.chain, document, entry.at)
        demand_standing(computation.before)
        return keep_load(entry, number, computation, by=by.person, replaces=None)

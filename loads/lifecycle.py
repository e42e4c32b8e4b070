"""The states of a load and every step between them, as one table. Nothing here reads, writes or knows a
clock.

Laws of the table:
1. Only a load whose verdict is `within` may be prepared, confirmed as loaded, or accepted; each is signed.
2. Accepting is the pilot in command's alone; who that is, is asked where people are known.
3. A load is withdrawn, or superseded by a revision, only before it departed. After that nothing replaces it.
4. `departed`, `superseded` and `withdrawn` have no way out.
5. A last-minute change accepts an accepted load again, under a new assessment.
6. `loaded` stands between `prepared` and `accepted` only where a rule set asks for the loading supervisor.
7. What the table does not list is refused. Besides `accepted` only `open` leads to itself: a load assessed
   again takes a step, so that whoever was about to sign the result before it is refused; one that was
   prepared opens again and is signed anew.

        open --> prepared --> accepted --> departed
                    |            ^
                    +--> loaded -+
        (open, prepared, loaded) --> open, by assessing again
        accepted --> accepted, by a last-minute change
        (open, prepared, loaded, accepted) --> superseded | withdrawn
"""

from dataclasses import dataclass
from typing import Literal

from records.refusal import StepRefused

State = Literal["open", "prepared", "loaded", "accepted", "departed", "superseded", "withdrawn"]
Signer = Literal["load preparer", "loading supervisor", "pilot in command"]

STATES: tuple[State, ...] = ("open", "prepared", "loaded", "accepted", "departed", "superseded", "withdrawn")
FIRST_STATE: State = "open"
GONE: tuple[State, ...] = ("superseded", "withdrawn")  # such a load never leaves on this declaration


@dataclass(frozen=True, slots=True)
class Step:
    """One allowed step: the act that takes it, whether it needs `within`, and whose signature it is."""

    start: State
    end: State
    act: str
    needs_within: bool = False
    signed_by: Signer | None = None


STEPS: tuple[Step, ...] = (
    Step("open", "prepared", "prepare-load", needs_within=True, signed_by="load preparer"),
    Step("prepared", "loaded", "confirm-loading", needs_within=True, signed_by="loading supervisor"),
    Step("prepared", "accepted", "accept-load", needs_within=True, signed_by="pilot in command"),
    Step("loaded", "accepted", "accept-load", needs_within=True, signed_by="pilot in command"),
    Step("accepted", "accepted", "change-load-late", needs_within=True, signed_by="pilot in command"),
    Step("accepted", "departed", "depart-load"),
    Step("open", "open", "assess-load"),
    Step("prepared", "open", "assess-load"),
    Step("loaded", "open", "assess-load"),
    Step("open", "superseded", "revise-load"),
    Step("prepared", "superseded", "revise-load"),
    Step("loaded", "superseded", "revise-load"),
    Step("accepted", "superseded", "revise-load"),
    Step("open", "withdrawn", "withdraw-load"),
    Step("prepared", "withdrawn", "withdraw-load"),
    Step("loaded", "withdrawn", "withdraw-load"),
    Step("accepted", "withdrawn", "withdraw-load"),
)

_BY_PAIR: dict[tuple[str, str], Step] = {(one.start, one.end): one for one in STEPS}


def ways_out(state: str) -> tuple[State, ...]:
    """Name the states that `state` may go to, in the order of the table; () for an end state."""
    return tuple(one.end for one in STEPS if one.start == state)


def step(state: str, to: str, act: str = "") -> Step:
    """Find the step from `state` to `to`, or raise `StepRefused` (409, `step-not-allowed`).

    `act`, where it is known, must be the one that takes that step.
    """
    found = _BY_PAIR.get((state, to))
    if found is not None and act in {"", found.act}:
        return found
    ways = tuple(way for way in ways_out(state) if way != state)
    if ways:
        next_step = f"From {state} a load can become {', '.join(ways)}."
    elif state in STATES:
        next_step = f"A {state} load stays as it is; submit a new load instead."
    else:
        next_step = f"The states are {', '.join(STATES)}."
    raise StepRefused("step-not-allowed", f"A load that is {state} cannot become {to}.", next_step=next_step)

"""Turns a broken database constraint into the refusal it stands for; the constraint decides, also between
racers.
"""

from collections.abc import Callable, Iterator, Mapping
from contextlib import contextmanager

from django.db import IntegrityError

from records.refusal import Refused


@contextmanager
def refused_as(refusals: Mapping[str, Callable[[], Refused]]) -> Iterator[None]:
    """This function will raise the refusal named by the constraint that broke; any other error passes
    unchanged.

    It goes around the act, never inside it: what was written is undone first.
    """
    try:
        yield
    except IntegrityError as error:
        broken = getattr(getattr(error.__cause__, "diag", None), "constraint_name", None)
        refusal = refusals.get(broken or "")
        if refusal is None:
            raise
        raise refusal() from error

"""Reads a shape out of what was answered."""

from collections.abc import Callable, Mapping
from typing import Any, TypeVar

from service.client.problems import AnswerUnusable

Shape = TypeVar("Shape")


def read(reading: Callable[[Mapping[str, Any]], Shape], body: Mapping[str, Any]) -> Shape:
    """This function will read a shape; raises AnswerUnusable where the answer is of another form."""
    try:
        return reading(body)
    except (KeyError, TypeError) as problem:
        raise AnswerUnusable(f"the answer is of another form than described: {problem!r}") from problem

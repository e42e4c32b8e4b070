"""Checks the plain fields of a row before it is written: length, blankness, kind of value."""

from typing import TypeVar

from django.core.exceptions import ValidationError
from django.db.models import Model

from records.refusal import Fault, Invalid

Row = TypeVar("Row", bound=Model)
_CODES = {"blank": "empty", "null": "missing", "max_length": "too-long"}


def checked(row: Row, *, leave: tuple[str, ...] = ()) -> Row:
    """This function will return the row, or raise Invalid with a fault `/field` for each field that is wrong.

    What the database's constraints hold is left to them, and so are the fields in `leave`.
    """
    try:
        row.clean_fields(exclude=set(leave))
    except ValidationError as problem:
        faults = [
            Fault(f"/{field}", _CODES.get(error.code or "", "wrong-form"), " ".join(error.messages))
            for field, errors in problem.error_dict.items()
            for error in errors
        ]
        raise Invalid(*faults) from problem
    return row

"""Checks a new password and hashes it; nothing here writes."""

from django.contrib.auth.hashers import make_password
from django.contrib.auth.password_validation import validate_password
from django.core.exceptions import ValidationError

from records.refusal import Fault, Invalid

LONGEST = 200  # hashing takes time with length; nobody types more


def hash_of_new(password: str, *, pointer: str = "/password") -> str:
    """This function will return the hash of a password good enough to be set; raises Invalid at `pointer`."""
    if len(password) > LONGEST:
        raise Invalid(Fault(pointer, "too-long", f"a password has at most {LONGEST} characters"))
    try:
        validate_password(password)
    except ValidationError as problem:
        raise Invalid(Fault(pointer, "password-weak", " ".join(problem.messages))) from problem
    return make_password(password)

"""What the journeys stand on: a database a module, really committed, and an operator of its own a test."""

from itertools import count

import pytest

from tests.cast import Cast, cast

_numbers = count(1)


@pytest.fixture
def people(own_database: str) -> Cast:
    """This fixture will give the people of an operator nobody else in the module works for."""
    return cast(f"kestrel-{next(_numbers)}")

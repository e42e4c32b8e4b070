"""What the tests of these pages stand on: the cast and the ready twin, entered once a module and committed;
each test runs in a transaction that is undone.
"""

import pytest

from tests.cast import Cast, cast
from tests.makers import ready_aircraft


@pytest.fixture(scope="module")
def people(own_database: str, django_db_blocker: object) -> Cast:
    """This fixture will give the people of an operator that has one ready twin, Q9-KTB."""
    with django_db_blocker.unblock():  # type: ignore[attr-defined] # a fixture without a type
        made = cast()
        ready_aircraft(made)
    return made

"""A database of their own for the tests of the notary, with tables that only they have."""

import pytest

from tests.records import scratch


@pytest.fixture(scope="module")
def scratch_tables(own_database: str) -> str:
    """This fixture will give a module the scratch tables, in a database in which its tests really commit."""
    scratch.make_tables()
    return own_database

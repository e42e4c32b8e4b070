"""People, and a receiver they may trust."""

from collections.abc import Iterator

import pytest

from tests.cast import Cast, cast
from tests.records.webhooks.receiver import ToldReceiver, running


@pytest.fixture
def people(db: None) -> Cast:
    """This fixture will enter an operator with its people."""
    return cast()


@pytest.fixture
def receiver(settings) -> Iterator[ToldReceiver]:
    """This fixture will run a receiver on this machine that the service is set to trust."""
    with running() as told:
        settings.WEBHOOK_TRUSTED_RECEIVERS = frozenset({told.place})
        yield told

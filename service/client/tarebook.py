"""The client itself: one server, one token."""

import ssl
import time
from collections.abc import Callable

from service.client.aircraft import AircraftRecords
from service.client.exchange import Exchange, Patience
from service.client.late import LateChanges
from service.client.loads import Loads
from service.client.people import People
from service.client.provisions import ProvisionRecords
from service.client.rechecks import Rechecks
from service.client.remedies import RemediesOfLoads
from service.client.trail import Trail
from service.client.webhooks import Webhooks


class Tarebook(
    Loads,
    RemediesOfLoads,
    LateChanges,
    AircraftRecords,
    ProvisionRecords,
    Rechecks,
    People,
    Trail,
    Webhooks,
):
    """Talks to one Tarebook with one bearer token. Threads may share it.

    What stores something is sent with an Idempotency-Key that is made once a call, and sent again with the
    same key when no answer came, when the same key is just being answered, and after 429, 502 and 503. Raises
    a subclass of `Refused` for a refusal, `Unanswered` when no answer came at all.
    """

    def __init__(
        self,
        address: str,
        token: str,
        *,
        patience: Patience | None = None,
        tls: ssl.SSLContext | None = None,
        sleep: Callable[[float], None] = time.sleep,
    ) -> None:
        """Raises ValueError for an address that is none. `tls` is for a private certificate authority."""
        self._exchange = Exchange(address, token, patience=patience or Patience(), tls=tls, sleep=sleep)

    def __repr__(self) -> str:
        """Say where to; a token is no text for a log."""
        return f"Tarebook({self._exchange.address!r})"

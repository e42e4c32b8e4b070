"""Subscriptions to events. What arrives at the subscribed address is read by `events.read_message`."""

from collections.abc import Collection, Iterator
from urllib.parse import urlencode
from uuid import uuid4

from service.client.exchange import Exchange
from service.client.shapes import Delivery, Subscription, delivery_in, subscription_in


class Webhooks:
    """What is done with subscriptions."""

    _exchange: Exchange

    def webhooks(self) -> tuple[Subscription, ...]:
        """This function will return the subscriptions that are not ended."""
        found = self._exchange.get("/webhooks").rows("webhooks")
        return tuple(subscription_in(one) for one in found)

    def subscribe(
        self, address: str, events: Collection[str], *, label: str = "", key: str = ""
    ) -> Subscription:
        """This function will have events sent to an address. Keep the `secret` of what is returned: it is
        not shown again.
        """
        asked = {"address": address, "events": list(events), "label": label}
        return subscription_in(self._exchange.post("/webhooks", asked, key=key or str(uuid4())).document())

    def new_webhook_secret(self, subscription: Subscription, *, key: str = "") -> Subscription:
        """This function will make a new secret; for a day messages carry two signatures."""
        path = f"/webhooks/{subscription.id}/secret"
        return subscription_in(self._exchange.post(path, None, key=key or str(uuid4())).document())

    def resume_webhook(self, subscription: Subscription, *, key: str = "") -> Subscription:
        """This function will take up a parked subscription: all that was kept for it is sent."""
        path = f"/webhooks/{subscription.id}/resumption"
        return subscription_in(self._exchange.post(path, None, key=key or str(uuid4())).document())

    def end_webhook(self, subscription: Subscription) -> None:
        """This function will end a subscription."""
        self._exchange.delete(f"/webhooks/{subscription.id}")

    def deliveries(
        self, subscription: Subscription, *, state: str = "", page_rows: int = 50
    ) -> Iterator[Delivery]:
        """This function will give what was or will be sent to a subscriber, the newest first."""
        asked = {"state": state, "limit": str(page_rows)} if state else {"limit": str(page_rows)}
        path = f"/webhooks/{subscription.id}/deliveries?{urlencode(asked)}"
        while path:
            answer = self._exchange.get(path)
            yield from (delivery_in(one) for one in answer.rows("deliveries"))
            path = answer.following

    def replay(self, subscription: Subscription, delivery: Delivery, *, key: str = "") -> Delivery:
        """This function will have one event sent again."""
        path = f"/webhooks/{subscription.id}/deliveries/{delivery.id}/replay"
        return delivery_in(self._exchange.post(path, None, key=key or str(uuid4())).document())

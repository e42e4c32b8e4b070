"""Whether the broker answers right now, found out quickly: no request waits for one that is down."""

from functools import lru_cache

import redis
from django.conf import settings
from redis.backoff import NoBackoff
from redis.retry import Retry

# The queue's own client tries a refused connection again for some six seconds; this one asks once.
PATIENCE_SECONDS = 0.5


def answers() -> bool:
    """This function will return whether the broker answered a ping within half a second; it never raises."""
    try:
        return bool(_asking(settings.BROKER_URL).ping())
    except (redis.RedisError, OSError):
        return False


@lru_cache(maxsize=4)
def _asking(address: str) -> redis.Redis:
    # A socket is spelled redis+socket:// by the queue and unix:// by the client.
    return redis.Redis.from_url(
        address.replace("redis+socket://", "unix://", 1),
        retry=Retry(NoBackoff(), 0),
        socket_connect_timeout=PATIENCE_SECONDS,
        socket_timeout=PATIENCE_SECONDS,
    )

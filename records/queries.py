"""Reading the trail, and the log of sign-ins."""

from collections.abc import Collection
from datetime import datetime
from uuid import UUID

from django.db.models import Max, Q

from records.models import Access, Seal


def seal_of(act_id: UUID) -> Seal | None:
    """This function will return the seal of an act (position, digest, previous), None while it is not
    sealed.
    """
    return Seal.objects.filter(act_id=act_id).defer("entry").first()


def events_of(chain: str, *, key: str = "", before: int | None = None, most: int = 50) -> tuple[Access, ...]:
    """This function will return at most `most` events of the log of sign-ins, the newest first: all of the
    chain or those of one key, from before the number `before` on.
    """
    wanted = Q(chain=chain)
    if key:
        wanted &= Q(key=key)
    if before is not None:
        wanted &= Q(number__lt=before)
    return tuple(Access.objects.filter(wanted).order_by("-number")[:most])


def last_uses(chain: str, tokens: Collection[int]) -> dict[int, datetime]:
    """This function will return when each of these tokens was last noted as used, to five minutes; a token
    never used is not among them.
    """
    keys = [f"token:{number}" for number in tokens]
    found = (
        Access.objects.filter(chain=chain, key__in=keys, what="token-used")
        .values_list("key")
        .annotate(last=Max("at"))
    )
    return {int(key.removeprefix("token:")): last for key, last in found}

"""Reading the trail."""

from uuid import UUID

from records.models import Seal


def seal_of(act_id: UUID) -> Seal | None:
    """This function will return the seal of an act (position, digest, previous), None while it is not
    sealed.
    """
    return Seal.objects.filter(act_id=act_id).defer("entry").first()

"""Whether everything that was done left a sound trail."""

from django.db import transaction

from records.chain import Finding
from records.models import Act
from records.reconcile import reconcile
from records.verify import altered_documents, follow_chains


def unsound() -> tuple[Finding, ...]:
    """This function will return all that does not hold: of the chains, of the filed documents, and between
    the trail and the rows and guards of now.
    """
    with transaction.atomic():
        return (*follow_chains().broken, *altered_documents(), *reconcile())


def acts_about(about: str) -> list[str]:
    """This function will return what was done about something, in order."""
    return list(Act.objects.filter(about=about).order_by("at").values_list("kind", flat=True))

"""What the loads pages ask of a request."""

from datetime import datetime
from zoneinfo import ZoneInfo

from django.http import HttpRequest

from fleet.models import Operator
from records.web.asking import operator_of


def zone_of(request: HttpRequest) -> ZoneInfo:
    """This function will return the time zone of the operator of who is signed in."""
    return ZoneInfo(Operator.objects.values_list("time_zone", flat=True).get(code=operator_of(request)))


def zone_words(zone: ZoneInfo, at: datetime) -> str:
    """This function will name a time zone as people read it: its offset at `at`, and its place if any."""
    offset = f"UTC{at.astimezone(zone).isoformat()[-6:]}"
    return offset if str(zone).startswith("Etc/") else f"{str(zone).replace('_', ' ')} ({offset})"


def typed_in(request: HttpRequest) -> dict[str, str]:
    """This function will return what was typed into a form, by input; of one sent twice the last."""
    return {name: str(value) for name, value in request.POST.items()}

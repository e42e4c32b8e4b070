"""What the loads pages ask of a request."""

from zoneinfo import ZoneInfo

from django.http import HttpRequest

from fleet.models import Operator
from records.web.asking import operator_of


def zone_of(request: HttpRequest) -> ZoneInfo:
    """This function will return the time zone of the operator of who is signed in."""
    return ZoneInfo(Operator.objects.values_list("time_zone", flat=True).get(code=operator_of(request)))


def typed_in(request: HttpRequest) -> dict[str, str]:
    """This function will return what was typed into a form, by input; of one sent twice the last."""
    return {name: str(value) for name, value in request.POST.items()}

"""What the endpoints of this room ask of a request."""

from datetime import datetime

from django.utils import timezone
from drf_spectacular.utils import OpenApiParameter
from rest_framework.request import Request

from fleet.entering import Approving, read_approval
from fleet.models import Aircraft
from fleet.queries.aircraft import aircraft_of
from records.api.asking import instant, operator_of, parameters_of
from records.refusal import Fault, Invalid
from records.strict_json import JSON

AT = OpenApiParameter("at", str, description="True at this instant, with its offset; now unless given.")
AS_KNOWN_AT = OpenApiParameter(
    "as-known-at", str, description="As held true at this instant, with its offset; now unless given."
)


def aircraft_asked(request: Request, registration: str) -> Aircraft:
    """This function will return the aircraft in the address; raises NotKnown, for another operator's too."""
    return aircraft_of(operator_of(request), registration)


def clocks_asked(request: Request) -> tuple[datetime, datetime]:
    """This function will return the instants of both clocks, `at` and `as-known-at`; raises Invalid."""
    given = parameters_of(request, allowed={"at", "as-known-at"})
    now = timezone.now()
    at = instant(given["at"], where="?at") if "at" in given else now
    known = instant(given["as-known-at"], where="?as-known-at") if "as-known-at" in given else now
    return at, known


def approval_asked(document: JSON) -> Approving:
    """This function will return the approval in a document, of a version that says itself from when it holds;
    raises Invalid.
    """
    approving = read_approval(document)
    if approving.true_from is not None:
        raise Invalid(Fault("/true_from", "unknown-field", "the version says itself from when it holds"))
    return approving

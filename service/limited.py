"""A token limited to some aircraft: for it the others do not exist, as another operator's do not.

It stands here and not in each endpoint, and fails closed: what neither names an aircraft, nor a load, nor
says that it limits its own answer, is refused.
"""

from typing import Any, Final

from rest_framework import permissions
from rest_framework.request import Request

from loads.models import Load
from records.api.asking import actor_of
from records.refusal import Fault, Invalid, NotAllowed, NotKnown

# An endpoint that leaves out of its answer to GET whatever the actor does not reach carries this, true.
LIMITS_ITSELF: Final = "limits_its_answer"


def refuse_beyond(reach: frozenset[str], request: Request, view: Any) -> None:
    """This function will do nothing when the request stays within `reach` (registrations).

    Raises NotKnown for an address beyond it, Invalid for an aircraft in the body, NotAllowed for what is
    about no aircraft.
    """
    within = []
    if (registration := view.kwargs.get("registration")) is not None:
        within.append(True)
        if registration.upper() not in reach:
            raise NotKnown("aircraft-not-known", f"No aircraft {registration[:20]} is entered.")
    if (load := view.kwargs.get("load")) is not None:
        within.append(True)
        operator = actor_of(request).operator
        known = Load.objects.filter(pk=load, operator=operator, aircraft__registration__in=reach)
        if not known.exists():
            raise NotKnown("load-not-known", "There is no load of this number.")
    if request.method in permissions.SAFE_METHODS:
        within.append(bool(getattr(view, LIMITS_ITSELF, False)))
    elif isinstance(request.data, dict) and "aircraft" in request.data:
        within.append(True)
        _refuse_body_beyond(reach, request.data["aircraft"])
    if not any(within):
        raise NotAllowed(
            "token-limited-to-aircraft",
            "This token is limited to some aircraft, and this is about none of them.",
            next_step="Use a token that is not limited to aircraft.",
        )


def _refuse_body_beyond(reach: frozenset[str], aircraft: object) -> None:
    # What is no registration at all is left to the reader of the document, who says so with all other faults.
    if isinstance(aircraft, str) and aircraft.upper() not in reach:
        detail = f"no aircraft {aircraft[:20]} is entered; correct the registration, or enter the aircraft"
        raise Invalid(Fault("/aircraft", "unknown-aircraft", detail))

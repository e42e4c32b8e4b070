"""The operator's settings: read on both clocks, changed as a new version."""

from typing import Any

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.change_settings import change_settings
from fleet.api.asking import AS_KNOWN_AT, AT, clocks_asked
from fleet.api.documents import described
from fleet.api.shapes_settings import SettingsAnswer, SettingsShown
from fleet.models import OperatorSettings
from fleet.queries.settings import Settings, last_number, settings_at, settings_history, settings_of
from fleet.settings_reading import read_settings
from records.api.asking import actor_of, document_of, etag, operator_of, state_seen
from records.api.describing import IDEMPOTENCY_KEY, IF_MATCH, problems_of_moving, problems_of_reading
from records.api.once import Answer, once
from records.api.render import rendered


class SettingsEndpoint(APIView):
    """The operator's settings."""

    @extend_schema(
        operation_id="show_settings",
        summary="Read the operator's settings",
        parameters=[AT, AS_KNOWN_AT],
        responses={200: SettingsShown, **problems_of_reading()},
    )
    def get(self, request: Request) -> HttpResponse:
        """What holds at `at`, as known at `as-known-at`, and every version ever entered. The ETag names the
        version entered last, for the next change.
        """
        operator = operator_of(request)
        at, known = clocks_asked(request)
        body = {
            "at": at,
            "as_known_at": known,
            "in_force": settings_answer(settings_at(operator, at, known)),
            "versions": [_version(row) for row in settings_history(operator)],
        }
        tag = etag(last_number(operator))
        return HttpResponse(rendered(body), content_type="application/json", headers={"ETag": tag})

    @extend_schema(
        operation_id="change_settings",
        summary="Change the operator's settings",
        parameters=[IDEMPOTENCY_KEY, IF_MATCH],
        request=described("settings-1"),
        responses={201: SettingsAnswer, **problems_of_moving()},
    )
    def post(self, request: Request) -> HttpResponse:
        """Enters a new version with a reason. What is left out stays as it is. Needs a person with the
        duty of operations manager.
        """
        document = document_of(request)

        def work() -> Answer:
            row = change_settings(actor_of(request), read_settings(document), seen=state_seen(request))
            return 201, {"ETag": etag(row.number)}, settings_answer(settings_of(row))

        return once(request, work)


def settings_answer(one: Settings) -> dict[str, Any]:
    """This function will write settings as they are sent, figures as typed."""
    bound = None
    if one.last_minute_bound_weight is not None:
        bound = {
            "weight": {"value": one.last_minute_bound_weight, "unit": one.last_minute_bound_unit},
            "persons": one.last_minute_bound_persons,
        }
    return {
        "number": one.number,
        "true_from": one.true_from,
        "known_from": one.known_from,
        "last_minute_bound": bound,
        "weighing_threshold_percent": one.weighing_threshold_percent,
        "operations_mail": list(one.operations_mail),
        "prepare_and_accept_by_one": one.prepare_and_accept_by_one,
        "estimates_may_be_signed": one.estimates_may_be_signed,
        "rule_set": one.rule_set,
        "procedure": one.procedure,
        "weight_method": one.weight_method,
    }


def _version(row: OperatorSettings) -> dict[str, Any]:
    return {
        **settings_answer(settings_of(row)),
        "entered_by": f"person:{row.entered_by_id}",
        "reason": row.reason,
    }

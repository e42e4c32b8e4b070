"""Rule values of the operator: entered, listed by both clocks, approved."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from fleet.actions.approve_rules import approve_rules
from fleet.actions.enter_rules import enter_rules
from fleet.api.answers import shown
from fleet.api.answers_provisions import created, now_as_it_is, provision_line, provisions_answer
from fleet.api.asking import AS_KNOWN_AT, AT, approval_asked
from fleet.api.documents import described
from fleet.api.shapes_provisions import ProvisionAnswer, ProvisionList
from fleet.provisions import RULES
from fleet.queries.provisions import provision_of
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.once import Answer, once

PLACE = "/api/v1/rules"


class RulesEndpoint(APIView):
    """The operator's sets of rule values."""

    @extend_schema(operation_id="list_rules", parameters=[AT, AS_KNOWN_AT], responses=ProvisionList)
    def get(self, request: Request) -> HttpResponse:
        """Which set was in force at `at`, as known at `as-known-at`, and every version ever entered."""
        return provisions_answer(request, RULES)

    @extend_schema(
        operation_id="enter_rules",
        request=described("rules-1"),
        responses={201: ProvisionAnswer},
    )
    def post(self, request: Request) -> HttpResponse:
        """Enters a set of rule values. It counts for nothing until a second person approves it."""
        document = document_of(request)

        def work() -> Answer:
            return created(enter_rules(actor_of(request), document), PLACE)

        return once(request, work)


class OneRulesEndpoint(APIView):
    """One set of rule values."""

    @extend_schema(operation_id="show_rules", responses=ProvisionAnswer)
    def get(self, request: Request, version: UUID) -> HttpResponse:
        """The rules with their document, numbers as typed."""
        parameters_of(request, allowed=())
        return shown(provision_line(provision_of(operator_of(request), RULES, version)))


class RulesApprovalEndpoint(APIView):
    """The approval of one set."""

    @extend_schema(
        operation_id="approve_rules",
        request=described("approval-1"),
        responses={201: ProvisionAnswer},
    )
    def post(self, request: Request, version: UUID) -> HttpResponse:
        """Approves the set, by another person than entered it; it holds from its own `true_from`."""
        document = document_of(request)

        def work() -> Answer:
            rules = provision_of(operator_of(request), RULES, version)
            reason = approval_asked(document).reason
            approve_rules(actor_of(request), rules, reason=reason)
            return now_as_it_is(rules)

        return once(request, work)

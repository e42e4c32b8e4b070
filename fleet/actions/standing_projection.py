"""Carries an approval into the projection that says what stands; the two approving actions use it in
their act.
"""

from collections.abc import Callable, Mapping
from functools import partial

from django.db import connection

from fleet.models import Approval, EmptyWeight, LoadingBasis, Standing
from fleet.models.standing import EMPTY_WEIGHT, LOADING_BASIS
from fleet.timeline import Span, place
from records.refusal import NotAllowed, Refused, StepRefused

_APPROVED = partial(
    StepRefused, "approved-already", "This version is approved already; an approval is given once."
)


def _out_of_order() -> StepRefused:
    return StepRefused(
        "approval-out-of-order",
        "Another approval for this aircraft was recorded at the same moment.",
        next_step="Look at what is in force now, then approve again.",
    )


# What the database says of an approval, whoever asks and whatever was checked before.
APPROVAL_REFUSALS: Mapping[str, Callable[[], Refused]] = {
    "fleet_approval_loading_basis_id_key": _APPROVED,
    "fleet_approval_empty_weight_id_key": _APPROVED,
    "approval_is_by_a_second_person": partial(
        NotAllowed, "second-person-needed", "Whoever entered a version does not approve it."
    ),
    "standing_has_one_version_at_any_moment": _out_of_order,
}
_WAIT_FOR_OTHER_APPROVALS = "SELECT pg_advisory_xact_lock(hashtextextended(%s, 4202))"


def stand(approval: Approval, version: LoadingBasis | EmptyWeight) -> None:
    """This function will let the approved version stand from its `true_from`, as known from `known_from`.

    The row it cuts is closed on the known clock, once, and begun anew, shorter. Raises StepRefused when an
    approval of this kind was recorded at or after `known_from`: the second clock only runs forward.
    """
    kind, fit = (LOADING_BASIS, "") if isinstance(version, LoadingBasis) else (EMPTY_WEIGHT, version.fit)
    # Two approvals at a time would each cut what the other has cut already. The exclusion constraint
    # would refuse the second in any case; this lock makes it wait and look again. It is always taken
    # before the chain's.
    with connection.cursor() as cursor:
        cursor.execute(_WAIT_FOR_OTHER_APPROVALS, [f"{approval.aircraft_id} {kind} {fit}"])
    rows = Standing.objects.filter(aircraft=approval.aircraft_id, kind=kind, fit=fit, known__upper_inf=True)
    standing = {Span(row.version, row.valid.lower, row.valid.upper): row for row in rows}
    if any(row.known.lower >= approval.known_from for row in standing.values()):
        raise _out_of_order()
    placing = place(tuple(standing), version.id, approval.true_from)
    if placing.ended is not None:
        row = standing[placing.ended]
        Standing.objects.filter(id=row.id).update(known=(row.known.lower, approval.known_from))
    for span in placing.begun:
        Standing.objects.create(
            operator_id=approval.operator_id,
            aircraft_id=approval.aircraft_id,
            kind=kind,
            fit=fit,
            version=span.version,
            valid=(span.start, span.end),
            known=(approval.known_from, None),
        )

"""Whether an empty weight goes with the loading basis it will be used with; asked at entry and at
approval.
"""

from datetime import datetime

from fleet.empty_weight_reading import read_empty_weight
from fleet.models import Aircraft
from fleet.queries.figures import basis_of
from fleet.queries.in_force import basis_in_force
from records.refusal import Fault, Invalid
from records.strict_json import JSON


def refuse_unfit(aircraft: Aircraft, document: JSON, true_from: datetime, now: datetime) -> None:
    """This function will raise Invalid when the empty weight does not go with the basis in force at
    `true_from`.

    It does not with another datum, a base fit the basis does not have, or a weight the aircraft could not
    take off with. Where no basis is in force there is nothing to go with, and nothing is refused.
    """
    version = basis_in_force(aircraft, true_from, now)
    if version is None:
        return
    basis = basis_of(version)
    figures = read_empty_weight(document, basis)
    limit = basis.limits.take_off
    if limit is not None and limit.value is not None and figures.weight > limit.value:
        raise Invalid(
            Fault(
                "/weight",
                "empty-weight-implausible",
                "the empty aircraft would be above its take-off limit; look at figure and unit",
            )
        )

"""Fields no sample of the endpoints has; what reads them is given nonsense by pure tests."""

from collections.abc import Mapping
from typing import Final

_AIRCRAFT: Final = "/api/v1/aircraft/{registration}"
_LOAD: Final = "/api/v1/loads/{load}"
# Not in any sample here, by how their pointers begin: the pure reader that takes them is given nonsense in
# tests/pure (the path of it stands beside), without the endpoint around it.
_SEQUENCE: Final = (
    "/sequence",  # tests/pure/loads/test_sequencing.py
    "/certification_category",
    "/flight/follows",  # tests/loads/test_legs.py
    "/items/#/jettisonable",  # tests/pure/loads/cases/test_sling_load.py
    "/limits/#/kind",
    "/seat_settings",  # tests/pure/loads/cases/test_seats_on_rails.py
)
SPOILED_ELSEWHERE: Final[Mapping[str, tuple[str, ...]]] = {
    f"{_AIRCRAFT}/loading-bases": (
        "/certification_categories",  # tests/pure/fleet/test_basis_reading_rules.py
        "/modifications",
        "/fuel_balance",
        "/configurations",
        "/limits/with_external_load",  # tests/pure/fleet/test_external_loads.py
        "/places",
        "/seats",  # tests/pure/fleet/test_stations.py
        "/zones",
        "/cumulative",
        "/curtailments",  # tests/pure/fleet/test_reading_curtailments.py
        "/presentation",  # tests/pure/fleet/test_presentation.py
        "/envelopes/#/divided_by",
        "/tanks/#/table",
    ),
    f"{_AIRCRAFT}/permits": ("/effects",),
    f"{_AIRCRAFT}/restrictions": ("/effects",),
    f"{_AIRCRAFT}/weighings": ("/weighed_on",),
    "/api/v1/assessments": _SEQUENCE,
    "/api/v1/loads": _SEQUENCE,
    f"{_LOAD}/revisions": _SEQUENCE,
    "/api/v1/rules": ("/rules",),
    "/api/v1/standard-weights": ("/categories",),
}

"""What is declared of a load as it stands: as first sent in, with the last-minute changes since."""

from loads.models import LateChange
from loads.queries.current import Current, declared_in
from records import strict_json


def declared_now(current: Current) -> dict[str, strict_json.JSON]:
    """This function will return the document the assessment in use was made of, numbers as texts."""
    if current.assessment.number == 1:  # a changed load has been assessed at least twice
        return declared_in(current.load)
    change = LateChange.objects.filter(assessment=current.assessment).only("body").first()
    if change is None:
        return declared_in(current.load)
    document = strict_json.read(bytes(change.body))
    if not isinstance(document, dict):
        raise TypeError("a stored declaration is always an object")
    return document

"""How many examples a property is tried with: few in the gate, many in `manage.py prove`."""

import os

from hypothesis import HealthCheck, settings

LONG = os.environ.get("TAREBOOK_LONG_FORMS") == "1"


def drawn(few: int, many: int) -> settings:
    """This function will return the settings for `few` examples of a property, `many` in the long form.

    Without a deadline: what takes long on a busy machine is no failure.
    """
    return settings(
        max_examples=many if LONG else few, deadline=None, suppress_health_check=list(HealthCheck)
    )

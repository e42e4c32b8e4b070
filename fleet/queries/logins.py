"""Who is behind a login."""

from collections.abc import Collection

from records.prepared import rows

# Logins are stored in lower case, a constraint says so.
_ACTIVE = "SELECT login, id FROM fleet_person WHERE operator_id = %s AND is_active AND login = ANY(%s)"


def active_people(operator: str, logins: Collection[str]) -> dict[str, int]:
    """This function will return the numbers of the operator's active people by login, of those asked for in
    lower case; whoever is unknown, has left or is another operator's is left out.
    """
    return dict(rows(_ACTIVE, [operator, list(logins)]))

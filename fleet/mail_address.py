"""What a mail address looks like, as people type one into a form."""

import re
from typing import Final

from records.refusal import Fault

LONGEST: Final = 254
# One mailbox and one domain of at least two labels; display names, comments and quoting are left out on
# purpose (RFC 5321 allows them; nobody types them into such a form).
_MAIL: Final = re.compile(
    r"[A-Za-z0-9.!#$%&'*+/=?^_`{|}~-]{1,64}@(?:[A-Za-z0-9](?:[A-Za-z0-9-]{0,61}[A-Za-z0-9])?\.)+"
    r"[A-Za-z](?:[A-Za-z0-9-]{0,61}[A-Za-z0-9])",
    re.ASCII,
)


def mail_fault(address: str, pointer: str) -> Fault | None:
    """Return the fault of a text that is no plain mail address, None for one that is."""
    if len(address) <= LONGEST and _MAIL.fullmatch(address):
        return None
    return Fault(pointer, "mail-form", "write one address, like ops@example.org")

"""How a line of the log looks: level, logger, number of the request, words; and never a secret.

What must not stand there is not logged in the first place; this is the last look, for texts of libraries and
of the database, which quote whole rows.
"""

import logging
import re
from typing import Final

from records.act import request_id

HIDDEN: Final = "[hidden]"
# Each keeps what it calls `kept` and hides the rest of what it finds.
_SECRETS: Final = (
    re.compile(r"(?P<kept>)\btb_[A-Za-z0-9_-]{8,}"),  # our tokens
    re.compile(r"(?P<kept>)\bwhsec_[A-Za-z0-9+/=_-]{8,}"),  # secrets of webhooks
    re.compile(r"(?P<kept>\b(?:Bearer|Basic) )[\w.~+/=-]{6,}", re.IGNORECASE),
    re.compile(r"(?P<kept>://)[^/\s:@]*:[^/\s@]*(?=@)"),  # login and password of an address
    re.compile(r"(?P<kept>)\b(?:pbkdf2_\w+|argon2\w*|scrypt|md5)\$\S+"),  # stored passwords
    re.compile(r"(?P<kept>\bpassword['\"]?\s?[=:]\s?).*$", re.IGNORECASE | re.MULTILINE),
    # PostgreSQL quotes the row it refused, and the values of a key.
    re.compile(r"(?P<kept>DETAIL:).*$", re.MULTILINE),
)


class Numbered(logging.Filter):
    """Gives every record the number of the request it was written in, or a dash."""

    def filter(self, record: logging.LogRecord) -> bool:
        """This function will set the number and let the record through."""
        record.request_number = request_id.get() or "-"
        return True


class Plain(logging.Formatter):
    """One record as text, traces included, with whatever looks like a secret hidden."""

    def format(self, record: logging.LogRecord) -> str:
        """This function will return the text without secrets."""
        return hide(super().format(record))


def hide(text: str) -> str:
    """This function will put `[hidden]` in the place of everything that looks like a secret."""
    for secret in _SECRETS:
        text = secret.sub(rf"\g<kept>{HIDDEN}", text)
    return text

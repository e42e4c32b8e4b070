"""In which words a page speaks: those of the rule set in force."""

from datetime import datetime

from fleet.queries.settings import settings_at
from loads.manifest.words import WORDS, Words


def words_at(operator: str, at: datetime) -> Words:
    """This function will return the words of the operator's rule set at `at`, as known then."""
    return WORDS[settings_at(operator, at, at).rule_set]

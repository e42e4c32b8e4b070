"""From the facts of a load to the bytes of its manifest."""

import hashlib

from django.template.loader import render_to_string

from loads.manifest.facts import Facts
from loads.manifest.sheet import ENCLOSED, STATEMENT_NAME, sheet, title_of
from records.archive import DocumentAltered
from records.press import Enclosure, press


def html_of(facts: Facts) -> str:
    """This function will return the manifest as HTML; every text is escaped by the template engine."""
    return render_to_string("print/manifest.html", {"sheet": sheet(facts)})


def pdf_of(facts: Facts) -> bytes:
    """This function will return the manifest as PDF bytes, the same for the same facts.

    Its date is that of the act of acceptance. Raises DocumentAltered when the statement does not fit its
    digest.
    """
    if hashlib.sha256(facts.statement).hexdigest() != facts.digest:
        raise DocumentAltered(
            "statement-altered",
            "The statement put together from the record does not fit the digest that was signed.",
            next_step="Run the verification of the trail and tell whoever keeps the records.",
        )
    return press(
        html_of(facts), title=title_of(facts), created=facts.seal.at, attachments=(enclosure_of(facts),)
    )


def enclosure_of(facts: Facts) -> Enclosure:
    """This function will return the statement as it travels inside the PDF."""
    return Enclosure(STATEMENT_NAME, facts.statement, ENCLOSED, "Source")

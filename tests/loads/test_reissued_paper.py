"""The reissued manifest as it is read: number and issue, numbered lines, who signed what."""

import io

import pytest
from pypdf import PdfReader

from loads.actions.file_manifest import manifest_bytes
from tests.cast import cast
from tests.loads.late import BAG, again, bounded, change_of, changed
from tests.loads.making import accepted
from tests.makers import q, ready_aircraft

pytestmark = pytest.mark.django_db
OFF = {"change": "passenger-off", "seat": "ROW1-R"}
FUEL = {"change": "fuel-on", "tank": "LEFT", "quantity": q("5", "US gal")}


@pytest.fixture
def issues():
    """Pages of the first, second and third issue of one manifest, as text."""
    people = cast()
    ready_aircraft(people)
    bounded(people, weight="500", persons=3)
    current = accepted(people)
    current = again(changed(people, current, change_of(BAG)))
    changed(people, current, change_of(OFF, FUEL, persons=2))
    return [_pages(manifest_bytes(people.operator.code, current.load.id, issue)) for issue in (1, 2, 3)]


def _pages(body):
    return [" ".join(page.extract_text().split()) for page in PdfReader(io.BytesIO(body)).pages]


def test_every_issue_keeps_the_number_and_later_ones_say_which_they_are(issues) -> None:
    first, second, third = issues

    assert all("Load manifest 1 ·" in page for page in first)
    assert all("Load manifest 1, issue 2 ·" in page for page in second)
    assert all("Load manifest 1, issue 3 ·" in page for page in third)
    assert all("manifest 1 issue 3 · digest" in page for page in third)


def test_changes_are_numbered_lines_with_who_accepted_them_and_what_they_add_up_to(issues) -> None:
    first, second, third = (pages[0] for pages in issues)

    assert "Changed at the last minute" not in first
    assert "1 Baggage “bag at the door” on, NOSE-HOLD, 20 lb weighed issue 2, accepted by R. Amani" in second
    assert "passenger" not in second.partition("Changed at the last minute")[2].partition("Signed")[0]
    assert "this issue 3 stands in place of every earlier one" in third
    assert "2 Passenger M. Dravo off, ROW1-R, 190 lb declared Fuel up, LEFT, 5 US gal" in third
    # 20 + 190 + 5 x 6.7 lb, and one person.
    assert "added up 243.5 lb and 1 person, of 500 lb and 3 persons allowed" in third


def test_the_signature_under_the_changed_load_stands_on_the_first_page(issues) -> None:
    for pages in issues:
        assert "R. Amani pilot in command Accepted. I accept this load" in pages[0]
        assert "Document digest" in pages[0]


def test_who_prepared_the_load_stands_on_every_issue(issues) -> None:
    first, second, third = (" ".join(pages) for pages in issues)

    assert "D. Lorn load preparer Prepared." in first
    assert "Signed under earlier issues D. Lorn, load preparer: prepared" in second
    assert second.count("pilot in command: accepted") == 1
    assert third.count("pilot in command: accepted") == 2

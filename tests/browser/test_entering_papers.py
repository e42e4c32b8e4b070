"""The pages on which restrictions, permits and rule values are typed, in a browser and on small screens."""

import pytest

from fleet.models import Provision
from tests.browser.conftest import Site, Visit
from tests.browser.test_pages_are_for_everybody import PHONE, SMALLEST, press_on, too_wide, type_in, wrong_on

pytestmark = pytest.mark.browser


@pytest.mark.parametrize(
    "visit",
    [pytest.param({}, id="desk"), pytest.param(PHONE, id="phone"), pytest.param(SMALLEST, id="smallest")],
    indirect=True,
)
def test_each_has_structure_and_is_no_wider_than_its_screen(visit: Visit, site: Site) -> None:
    found = []
    for who, path in (
        (site.people.maintenance, "/aircraft/Q9-KTB/restrictions"),
        (site.people.maintenance, "/aircraft/Q9-KTB/permits"),
        (site.people.manager, "/rules"),
    ):
        visit.context.clear_cookies()
        visit.sign_in(who.login)
        visit.open(path)
        assert visit.page.locator("input[name=typed]").count() == 1
        found += [too_wide(visit), *wrong_on(visit)]

    assert [sentence for sentence in found if sentence] == []


def test_a_restriction_is_entered_with_the_keyboard_alone(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.maintenance.login)
    visit.open("/aircraft/Q9-KTB/restrictions")
    for name, text in (
        ("number", "DD-14"), ("what", "Seat belt worn"), ("true_from", "11302026"),
        ("document_title", "Minimum equipment list"), ("page", "25-3"),
        ("effect:0:effect", "seats"), ("effect:0:which", "ROW2-L"),
    ):  # fmt: skip
        type_in(visit, f'[id="{name}"]', text)
        if name == "true_from":
            visit.page.keyboard.press("Tab")  # from the year to the time
            visit.page.keyboard.type("0600AM")
    press_on(visit, "form:has(input[name=typed]) button.main")
    visit.page.wait_for_selector("text=ROW2-L blocked")

    assert Provision.objects.get(kind="restriction").document.count("ROW2-L") == 1

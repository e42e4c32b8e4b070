"""Events of a flight in a browser: by the keyboard alone, with script and without, and on small screens."""

import pytest

from loads.models import Load
from loads.queries.current import declared_in
from tests.browser.at_the_desk import come_to_the_desk, fill_in, named
from tests.browser.conftest import Site, Visit
from tests.browser.test_pages_are_for_everybody import (
    PHONE,
    SMALLEST,
    press_on,
    tab_to,
    too_wide,
    type_in,
    wrong_on,
)

pytestmark = pytest.mark.browser


def add_by_keyboard(visit: Visit, kind: str, event: int) -> None:
    """This function will add an event and wait until the page begins at its first input."""
    press_on(visit, f'button[value="add {kind}"]')
    visit.page.wait_for_selector(named(f"event:{event}:after"))
    visit.page.wait_for_function("(id) => document.activeElement.id === id", arg=f"event:{event}:after")


@pytest.mark.parametrize(
    "visit",
    [pytest.param({}, id="with script"), pytest.param({"java_script_enabled": False}, id="without script")],
    indirect=True,
)
def test_events_are_declared_and_put_in_order_with_the_keyboard_alone(visit: Visit, site: Site) -> None:
    page = visit.page
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    fill_in(visit, reference="KT-JUMP")

    press_on(visit, "#in-flight")
    add_by_keyboard(visit, "leave", 0)
    page.keyboard.type("100")
    type_in(visit, named("event:0:line:0:who"), "row1 l")
    add_by_keyboard(visit, "move", 1)
    page.keyboard.type("100")
    type_in(visit, named("event:1:line:0:who"), "row1 l")
    type_in(visit, named("event:1:line:0:to"), "aft hold")
    press_on(visit, 'button[value="up 1"]')
    page.wait_for_selector(named("event:0:line:0:to"))
    tab_to(visit, named("event:1:after"))
    page.keyboard.press("Enter")  # in a figure, as anywhere on the page: computed, not another event
    page.wait_for_selector("text=Computed, nothing stored")
    assert "event:2:kind" not in page.content()
    press_on(visit, "button[value=submit]")
    page.wait_for_url("**/loads/*")

    assert "event 2, leaves" in page.locator("main").inner_text().lower()
    document = declared_in(Load.objects.filter(reference="KT-JUMP").latest("submitted_at"))
    burned = {"value": "100", "unit": "lb"}
    assert document["sequence"] == [
        {"after_burning": burned, "move": [{"seat": "ROW1-L", "to": "AFT-HOLD"}]},
        {"after_burning": burned, "leave": [{"seat": "ROW1-L"}]},
    ]


@pytest.mark.parametrize(
    "visit",
    [
        pytest.param({}, id="desk"),
        pytest.param(PHONE, id="phone"),
        pytest.param(SMALLEST, id="smallest"),
    ],
    indirect=True,
)
def test_a_page_with_events_has_structure_and_is_no_wider_than_its_screen(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    visit.page.click("#in-flight")
    for number, kind in enumerate(("leave", "move", "person", "item", "transfer")):
        visit.page.click(f'button[value="add {kind}"]')
        visit.page.wait_for_selector(named(f"event:{number}:after"))
        visit.page.wait_for_load_state()

    assert (too_wide(visit), wrong_on(visit)) == ("", [])

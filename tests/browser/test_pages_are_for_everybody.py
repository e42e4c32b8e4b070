"""Every page: structure, names of inputs, contrast, small screens, and the keyboard alone."""

from pathlib import Path
from typing import Any

import pytest

from tests.browser.at_the_desk import come_to_the_desk, fill_in, named, submit
from tests.browser.conftest import Site, Visit
from tests.cast import PASSWORD

pytestmark = pytest.mark.browser
PHONE = {"viewport": {"width": 375, "height": 667}, "is_mobile": True, "has_touch": True}
SMALLEST = {"viewport": {"width": 320, "height": 568}, "is_mobile": True, "has_touch": True}

STRUCTURE = Path(__file__).with_name("structure.js").read_text("utf-8")


def wrong_on(visit: Visit) -> list[str]:
    found: list[str] = visit.page.evaluate(STRUCTURE)
    return [f"{visit.page.url.removeprefix(visit.site.address)}: {sentence}" for sentence in found]


def every_page(visit: Visit) -> list[str]:
    """This function will go to every page there is, and return what `wrong_on` says of each."""
    wrong = []
    visit.open("/sign-in")
    wrong += wrong_on(visit)
    visit.sign_in(visit.site.people.pilot.login)
    load = submit(visit).removeprefix(visit.site.address)
    for path in (
        load,
        f"{load}/revise",
        "/?day=2026-12-01",
        "/?day=2031-01-01",
        "/aircraft",
        "/aircraft/Q9-KTB",
    ):
        visit.open(path)
        wrong += wrong_on(visit)
    visit.open("/declare")
    wrong += wrong_on(visit)
    come_to_the_desk(visit)
    wrong += wrong_on(visit)
    visit.page.click("text=Submit the load")
    visit.page.wait_for_selector("[role=alert]")
    visit.page.wait_for_load_state()
    wrong += wrong_on(visit)
    visit.open("/loads/00000000-0000-7000-8000-000000000000")
    return wrong + wrong_on(visit)


def test_every_page_has_structure_names_and_contrast(visit: Visit) -> None:
    assert every_page(visit) == []


def too_wide(visit: Visit) -> str:
    wide: list[int] = visit.page.evaluate(
        "[document.documentElement.scrollWidth, document.documentElement.clientWidth]"
    )
    return "" if wide[0] <= wide[1] else f"{visit.page.url}: {wide[0]} wide on a screen of {wide[1]}"


@pytest.mark.parametrize(
    "visit", [pytest.param(PHONE, id="phone"), pytest.param(SMALLEST, id="smallest")], indirect=True
)
def test_no_page_is_wider_than_a_small_screen(visit: Visit) -> None:
    visit.open("/sign-in")
    found = [too_wide(visit)]
    visit.sign_in(visit.site.people.pilot.login)
    load = submit(visit).removeprefix(visit.site.address)
    for path in (load, f"{load}/revise", "/?day=2026-12-01", "/aircraft", "/aircraft/Q9-KTB", "/declare"):
        visit.open(path)
        found.append(too_wide(visit))
    visit.open(load)
    visit.page.click("summary:has-text('Sign as prepared')")
    found.append(too_wide(visit))

    assert [sentence for sentence in found if sentence] == []


def tab_to(visit: Visit, wanted: str) -> None:
    """This function will press Tab until what `wanted` finds has the focus."""
    for _ in range(300):
        if visit.page.evaluate("(wanted) => document.activeElement.matches(wanted)", wanted):
            return
        visit.page.keyboard.press("Tab")
    raise AssertionError(f"Tab never comes to {wanted}")


def type_in(visit: Visit, wanted: str, text: str) -> None:
    tab_to(visit, wanted)
    visit.page.keyboard.type(text)


def press_on(visit: Visit, wanted: str) -> None:
    tab_to(visit, wanted)
    visit.page.keyboard.press("Enter")


def test_a_load_is_declared_and_signed_with_the_keyboard_alone(visit: Visit, site: Site) -> None:
    page = visit.page
    visit.open("/sign-in")
    type_in(visit, "#login", site.people.pilot.login)
    type_in(visit, "#password", PASSWORD)
    page.keyboard.press("Enter")
    page.wait_for_selector("h1:has-text('Loads of')")
    press_on(visit, "nav a[href='/declare']")
    page.wait_for_selector("#aircraft")
    type_in(visit, "#aircraft", "Q9-KTB")
    type_in(visit, "#date", "12012026")
    type_in(visit, "#time", "0730AM")
    press_on(visit, "main button")
    page.wait_for_selector("#configuration")
    type_in(visit, "#configuration", "four seat")
    press_on(visit, "main button")
    page.wait_for_selector(named("seat:ROW1-L:name"))

    for name, text in _in_the_order_of_the_page(site):
        type_in(visit, named(name), text)
    press_on(visit, "button[value=submit]")
    page.wait_for_url("**/loads/*")

    press_on(visit, "summary")
    type_in(visit, "#password", PASSWORD)
    page.keyboard.press("Enter")
    page.wait_for_selector(".state--prepared")


def _in_the_order_of_the_page(site: Site) -> list[tuple[str, str]]:
    return [
        ("reference", "KT-KEYS"), ("origin", "XNAL"), ("destination", "XKOR"), ("operation", "passenger"),
        ("seat:COCKPIT-L:name", "R. Amani"), ("seat:COCKPIT-L:position", "pilot"),
        ("seat:COCKPIT-L:person", site.people.pilot.login), ("seat:COCKPIT-L:weight", "181"),
        ("seat:COCKPIT-L:how", "weighed"), ("persons_on_board", "1"),
        ("tank:LEFT:quantity", "100"), ("tank:RIGHT:quantity", "100"),
        ("density", "6.7"), ("density:source", "note 4471"), ("taxi", "40"), ("trip", "640"),
        ("minimum_at_landing", "420"),
    ]  # fmt: skip


def test_the_first_tab_skips_to_the_content(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.pilot.login)
    visit.page.keyboard.press("Tab")
    assert visit.page.evaluate("document.activeElement.className") == "skip"
    assert visit.page.locator(".skip").bounding_box()["x"] >= 0

    visit.page.keyboard.press("Enter")

    assert visit.page.evaluate("document.activeElement.id") == "content"


def test_what_has_the_focus_can_be_seen(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.pilot.login)
    come_to_the_desk(visit)
    focused: list[Any] = []
    for _ in range(25):
        visit.page.keyboard.press("Tab")
        focused.append(
            visit.page.evaluate(
                "[document.activeElement.id || document.activeElement.textContent,"
                " parseFloat(getComputedStyle(document.activeElement).outlineWidth)]"
            )
        )

    assert [one for one in focused if one[1] < 2] == []


def test_arrow_keys_move_between_the_rows_of_the_table(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    page = visit.page

    page.focus(named("item:0:weight"))
    page.keyboard.press("ArrowDown")
    down = page.evaluate("document.activeElement.id")
    page.keyboard.press("ArrowUp")

    assert (down, page.evaluate("document.activeElement.id")) == ("item:1:weight", "item:0:weight")


def test_arrow_keys_stay_in_their_column_over_seats_of_different_use(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    visited = []

    visit.page.focus(named("seat:COCKPIT-L:weight"))
    for _ in range(5):
        visit.page.keyboard.press("ArrowDown")
        visited.append(visit.page.evaluate("document.activeElement.id"))

    seats = ("COCKPIT-R", "ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R")
    assert visited == [f"seat:{seat}:weight" for seat in seats]


def test_a_visit_asks_nobody_but_the_server(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.pilot.login)
    come_to_the_desk(visit)
    fill_in(visit)

    assert {address.partition("/static/")[0] for address in visit.requests if "/static/" in address} == {
        site.address
    }
    assert any(address.endswith(".woff2") for address in visit.requests)

"""Declaring a load in a browser: the figures of a load that is within, and where each is typed."""

from tests.browser.conftest import Visit

CHOSEN = {"aircraft": "Q9-KTB", "date": "2026-12-01", "time": "07:30"}
TYPED = {
    "reference": "KT-214", "origin": "XNAL", "destination": "XKOR", "persons_on_board": "2",
    "seat:COCKPIT-L:name": "R. Amani", "seat:COCKPIT-L:weight": "181",
    "seat:ROW1-L:name": "L. Osei", "seat:ROW1-L:weight": "176",
    "item:0:what": "checked bags", "item:0:weight": "120",
    "density": "6.7", "density:source": "delivery note 4471",
    "tank:LEFT:quantity": "100", "tank:RIGHT:quantity": "100",
    "taxi": "40", "trip": "640", "minimum_at_landing": "420",
}  # fmt: skip
CHOICES = {
    "operation": "passenger charter", "seat:COCKPIT-L:position": "pilot in command",
    "seat:COCKPIT-L:how": "weighed", "seat:ROW1-L:how": "declared",
    "item:0:place": "aft hold", "item:0:kind": "baggage", "item:0:how": "weighed",
}  # fmt: skip


def named(name: str) -> str:
    """This function will return how an input of that name is found."""
    return f'[id="{name}"]'


def come_to_the_desk(visit: Visit) -> None:
    """This function will choose aircraft, departure and what is fitted."""
    page = visit.page
    visit.open("/declare")
    page.select_option("#aircraft", CHOSEN["aircraft"])
    page.fill("#date", CHOSEN["date"])
    page.fill("#time", CHOSEN["time"])
    page.click("text=Go on")
    page.select_option("#configuration", label="four seat")
    page.click("text=Go on")
    # A click does not wait for the page it leads to: what is only on that page, then the whole of it.
    page.wait_for_selector(named("seat:COCKPIT-L:name"))
    page.wait_for_load_state()


def fill_in(visit: Visit, **changes: str) -> None:
    """This function will type the figures of the load, with some changed."""
    login = {"seat:COCKPIT-L:person": visit.site.people.pilot.login}
    for name, value in (TYPED | login | changes).items():
        visit.page.fill(named(name), value)
    for name, label in CHOICES.items():
        visit.page.select_option(named(name), label=label)


def submit(visit: Visit) -> str:
    """This function will declare the load and return the address of its page."""
    come_to_the_desk(visit)
    fill_in(visit)
    visit.page.click("text=Submit the load")
    visit.page.wait_for_url("**/loads/*")
    return visit.page.url

"""The whole way of a load in a browser, with script and without."""

import pytest

from loads.models import Load, Signature
from loads.queries.current import load_of
from tests.browser.at_the_desk import come_to_the_desk, fill_in, named, submit
from tests.browser.conftest import Site, Visit
from tests.cast import PASSWORD

pytestmark = pytest.mark.browser
with_and_without_script = pytest.mark.parametrize(
    "visit",
    [pytest.param({}, id="with script"), pytest.param({"java_script_enabled": False}, id="without script")],
    indirect=True,
)


def sign(visit: Visit, meaning: str) -> None:
    page = visit.page
    page.click(f"summary:has-text('Sign as {meaning}')")
    assert page.locator("blockquote.signed").inner_text().strip()
    page.fill("#password", PASSWORD)
    page.click(f"button:has-text('Sign as {meaning}')")
    page.wait_for_selector(f".state--{meaning}")


@with_and_without_script
def test_a_load_goes_from_declaring_to_its_manifest(visit: Visit, site: Site) -> None:
    page = visit.page
    visit.sign_in(site.people.pilot.login)
    come_to_the_desk(visit)
    fill_in(visit)
    before = Load.objects.count()

    page.click("text=Compute, store nothing")
    page.wait_for_selector("text=Computed, nothing stored")
    assert "WITHIN" in page.locator("section.note .verdict").inner_text().upper()
    assert Load.objects.count() == before
    assert page.input_value(named("seat:ROW1-L:weight")) == "176"

    page.click("text=Submit the load")
    page.wait_for_url("**/loads/*")
    assert page.locator("h1").inner_text() == "Q9-KTB"
    sign(visit, "prepared")
    sign(visit, "accepted")

    link = page.locator("a:has-text('(PDF)')").first.get_attribute("href")
    paper = visit.context.request.get(f"{site.address}{link}")
    assert (paper.status, paper.headers["content-type"]) == (200, "application/pdf")
    assert paper.body().startswith(b"%PDF-")

    page.click("summary:has-text('Record the departure')")
    page.click("button:has-text('Departed')")
    page.wait_for_selector(".state--departed")
    load = Load.objects.latest("submitted_at")
    assert load_of(site.people.operator.code, load.id).state == "departed"
    assert Signature.objects.filter(load=load).count() == 2


@with_and_without_script
def test_a_fault_is_shown_next_to_its_input_and_nothing_typed_is_lost(visit: Visit, site: Site) -> None:
    page = visit.page
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    fill_in(visit, **{"seat:ROW1-L:weight": "1760", "trip": ""})

    page.click("text=Submit the load")
    page.wait_for_selector("[role=alert]")

    marked = page.locator("[aria-invalid=true]")
    assert {marked.nth(n).get_attribute("id") for n in range(marked.count())} == {
        "seat:ROW1-L:weight",
        "trip",
    }
    described = marked.first.get_attribute("aria-describedby")
    assert page.locator(named(described)).is_visible()
    assert page.input_value(named("seat:ROW1-L:weight")) == "1760"
    page.click("[role=alert] a >> nth=0")
    assert page.url.endswith(("#seat:ROW1-L:weight", "#trip"))


def test_after_a_refusal_the_reasons_have_the_focus(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)

    visit.page.click("text=Submit the load")
    visit.page.wait_for_selector("[role=alert]")

    assert visit.page.evaluate("document.activeElement.getAttribute('role')") == "alert"


def test_a_form_pressed_twice_is_sent_once(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    come_to_the_desk(visit)
    fill_in(visit, reference="KT-TWICE")

    visit.page.dblclick("text=Submit the load")
    visit.page.wait_for_url("**/loads/*")

    assert Load.objects.filter(reference="KT-TWICE").count() == 1


def test_a_wrong_password_is_said_and_the_form_stands_open_for_another_try(visit: Visit, site: Site) -> None:
    page = visit.page
    visit.sign_in(site.people.preparer.login)
    submit(visit)

    page.click("summary:has-text('Sign as prepared')")
    page.fill("#password", "not-my-password-at-all")
    page.click("button:has-text('Sign as prepared')")

    page.wait_for_selector("[role=alert]")
    assert "not the password" in page.locator("[role=alert]").inner_text()
    assert page.locator("#password").is_visible()
    assert page.input_value("#password") == ""
    page.fill("#password", PASSWORD)
    page.click("button:has-text('Sign as prepared')")
    page.wait_for_selector(".state--prepared")


def test_going_back_after_submitting_keeps_the_form_usable(visit: Visit, site: Site) -> None:
    visit.sign_in(site.people.preparer.login)
    submit(visit)

    visit.page.go_back()
    fill_in(visit)
    visit.page.click("text=Compute, store nothing")

    visit.page.wait_for_selector("text=Computed, nothing stored")

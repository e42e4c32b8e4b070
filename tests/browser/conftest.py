"""A real browser on a real server: Chromium without a window, the pages over HTTP, a database that commits.

`TAREBOOK_CHROMIUM` names the browser; without it Debian's own is used. A missing browser is a failure.
"""

import os
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path
from urllib.parse import urlsplit

import pytest
from playwright.sync_api import Browser, BrowserContext, Page, sync_playwright
from pytest_django.live_server_helper import LiveServer

from tests.cast import PASSWORD, Cast, cast
from tests.makers import ready_aircraft

CHROMIUM = Path(os.environ.get("TAREBOOK_CHROMIUM", "/usr/bin/chromium"))
FLAGS = (
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
)
PATIENCE = 20_000  # milliseconds


@dataclass(frozen=True, slots=True)
class Site:
    """The server's address and who works there."""

    address: str
    people: Cast


@pytest.fixture(scope="module")
def site(own_database: str) -> Iterator[Site]:
    """This fixture will serve a database of its own with the cast and the ready twin."""
    people = cast()
    ready_aircraft(people)
    server = LiveServer("127.0.0.1")
    yield Site(str(server), people)
    server.stop()


@pytest.fixture(scope="module")
def chromium() -> Iterator[Browser]:
    """This fixture will start the browser, once a module."""
    if not CHROMIUM.exists():
        pytest.fail(
            f"There is no browser at {CHROMIUM}. Install Debian's chromium, or name one in TAREBOOK_CHROMIUM."
        )
    with pytest.MonkeyPatch.context() as patch, sync_playwright() as playwright:
        # The driver keeps an event loop in this thread, which Django takes for asynchronous code.
        patch.setenv("DJANGO_ALLOW_ASYNC_UNSAFE", "true")
        browser = playwright.chromium.launch(executable_path=str(CHROMIUM), args=list(FLAGS))
        yield browser
        browser.close()


class Visit:
    """One visitor: a window of their own. What goes wrong in it is kept, and fails the test at its end."""

    def __init__(self, context: BrowserContext, site: Site) -> None:
        self.site = site
        self.context = context
        self.context.set_default_timeout(PATIENCE)
        self.wrong: list[str] = []
        self.requests: list[str] = []
        context.on("console", lambda said: self._said(said.type, said.text))
        context.on("weberror", lambda error: self.wrong.append(f"error in a script: {error.error}"))
        context.on("request", lambda request: self._asked(request.url))
        self.page: Page = context.new_page()

    def open(self, path: str) -> None:
        """This function will go to a path."""
        self.page.goto(f"{self.site.address}{path}")

    def sign_in(self, login: str) -> None:
        """This function will sign in by the form and end on the page asked for."""
        self.open("/sign-in")
        self.page.fill("#login", login)
        self.page.fill("#password", PASSWORD)
        self.page.click("main button")
        self.page.wait_for_selector("nav")

    def _said(self, kind: str, text: str) -> None:
        # A browser reports every answer of 400 and more; the tests expect those themselves.
        if kind in {"error", "warning"} and "the server responded with a status of 4" not in text:
            self.wrong.append(f"console {kind}: {text}")

    def _asked(self, address: str) -> None:
        self.requests.append(address)
        parts = urlsplit(address)
        if parts.scheme not in {"data", "blob"} and f"{parts.scheme}://{parts.netloc}" != self.site.address:
            self.wrong.append(f"asked somebody else: {address}")


@pytest.fixture(params=[pytest.param({}, id="")])
def visit(request: pytest.FixtureRequest, chromium: Browser, site: Site) -> Iterator[Visit]:
    """This fixture will give a visitor; its parameters are those of the browser's window."""
    context = chromium.new_context(**request.param)
    visitor = Visit(context, site)
    yield visitor
    context.close()
    assert visitor.wrong == []

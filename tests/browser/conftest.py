"""A real browser: a phone with touch and a desk, logged in, with pictures kept on demand."""

import os
from pathlib import Path

import pytest
from django.conf import settings
from django.test import Client
from playwright.sync_api import sync_playwright

PHONE = {
    "viewport": {"width": 390, "height": 844},
    "has_touch": True,
    "is_mobile": True,
    "device_scale_factor": 2,
}
DESK = {"viewport": {"width": 1440, "height": 900}}
ARGUMENTS = ["--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage"]

# Anything to press that is smaller than a thumb, except links within a sentence and what only a
# screen reader meets.
SMALL_TARGETS = """() => [...document.querySelectorAll(
    'a[href], button, input:not([type=hidden]), select, textarea, summary')]
  .filter((one) => one.checkVisibility({visibilityProperty: true}) && !one.closest('p, dd, del'))
  .map((one) => [one, (one.labels && ['checkbox', 'radio'].includes(one.type) && one.labels[0])
    ? one.closest('.checkbox-row, label, td') || one.labels[0] : one])
  .map(([one, box]) => [one.outerHTML.slice(0, 90), box.getBoundingClientRect()])
  .filter(([, box]) => box.bottom > 0 && (box.width < 44 || box.height < 43.5))
  .map(([text, box]) => `${Math.round(box.width)}×${Math.round(box.height)} ${text}`)"""


@pytest.fixture(scope="session")
def chromium():
    """Start one browser for all tests."""
    os.environ["DJANGO_ALLOW_ASYNC_UNSAFE"] = "true"
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(
            executable_path=os.environ.get("CHROMIUM", "/usr/bin/chromium"), args=ARGUMENTS
        )
        yield browser
        browser.close()
    del os.environ["DJANGO_ALLOW_ASYNC_UNSAFE"]


@pytest.fixture
def open_page(chromium, live_server):
    """Return a function (person, device) that gives a logged-in page; faults on it fail the test.

    The page's `faults` lists script errors and refusals of the Content-Security-Policy.
    """
    opened = []

    def open_for(person, device):
        client = Client()
        client.force_login(person)
        context = chromium.new_context(base_url=live_server.url, **device)
        session = client.cookies[settings.SESSION_COOKIE_NAME].value
        context.add_cookies(
            [{"name": settings.SESSION_COOKIE_NAME, "value": session, "url": live_server.url}]
        )
        page = context.new_page()
        page.set_default_timeout(15_000)
        page.faults = []
        page.on("pageerror", lambda error: page.faults.append(str(error)))
        page.on("console", lambda said: _note_refusal(page, said))
        opened.append((context, page))
        return page

    yield open_for
    faults = [fault for _context, page in opened for fault in page.faults]
    for context, _page in opened:
        context.close()
    assert faults == []


def _note_refusal(page, said):
    if said.type == "error" and "Content Security Policy" in said.text:
        page.faults.append(said.text)


@pytest.fixture
def phone(open_page, agency, field_person):
    """A phone, 390 × 844 with touch, in the hands of a field person."""
    return open_page(field_person, PHONE)


@pytest.fixture
def desk(open_page, agency, manager):
    """A desktop browser of the manager."""
    return open_page(manager, DESK)


@pytest.fixture
def picture(tmp_path_factory):
    """Return a function (page, name) that saves a full-page screenshot.

    Pictures go to a temporary folder, or to the one the variable SCREENSHOTS names.
    """
    named = os.environ.get("SCREENSHOTS")
    folder = Path(named) if named else tmp_path_factory.mktemp("screenshots")

    def save(page, name):
        path = folder / f"{name}.png"
        page.screenshot(path=path, full_page=True)
        return path

    return save


@pytest.fixture
def fits_a_phone():
    """Return a check of a page: nothing scrolls sideways, nothing to press is under 44 px."""

    def check(page):
        wide = page.evaluate("document.documentElement.scrollWidth")
        assert wide <= page.viewport_size["width"], f"{page.url} is {wide} px wide"
        assert page.evaluate(SMALL_TARGETS) == [], page.url

    return check

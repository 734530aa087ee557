"""The rating sheet and before and after in a real browser, on a phone and at a desk."""

import pytest
from django.urls import reverse

from network.models import Curve, Note
from tests.browser.conftest import DESK, PHONE, SMALL_TARGETS
from tests.rated_world import approved, gauge_along, in_force, recorded

pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]
STAGES = [0.5, 0.6, 0.7, 0.8, 0.9, 1.1, 1.3, 1.5, 1.8, 2.1, 2.4, 2.8]


@pytest.fixture(params=[PHONE, DESK], ids=["phone", "desk"])
def page(request, open_page, record_keeper, agency, station):
    gauge_along(station, STAGES, errors=[0.02, -0.02] * 6)
    recorded(station, [1.2] * (24 * 10 + 1))
    in_force(station, approved(station))
    found = open_page(record_keeper, request.param)
    found.width = request.param["viewport"]["width"]
    return found


def fits(page):
    return page.evaluate("document.documentElement.scrollWidth") <= page.width


def test_a_curve_is_fitted_and_kept_with_nothing_wider_than_the_screen(page, station):
    page.goto(reverse("admin:network_curve_add") + f"?station={station.pk}")
    page.click(".chosen summary")
    assert fits(page)
    assert page.evaluate(SMALL_TARGETS) == []
    page.fill("#id_zero_1_m", "0,2")
    page.fill("#id_number", "B")
    page.fill("#id_reason", "new gaugings")
    page.click("input[name=_keep]")
    page.wait_for_url("**/change/")
    assert fits(page)
    assert Curve.objects.get(number="B").gaugings.count() == 12
    assert page.faults == []


def test_a_note_is_confirmed_after_its_differences_and_its_draft_forgotten(page, station):
    page.goto(reverse("admin:network_note_add") + f"?station={station.pk}")
    for name, day in (("start_at", "2020-01-04"), ("end_at", "2020-01-06")):
        page.fill(f"#id_{name}_0", day)
        page.fill(f"#id_{name}_1", "00:00")
    page.select_option("#id_cause", "ice")
    page.select_option("#id_flows", "withheld")
    page.click("input[name=_save]")
    page.wait_for_selector(".changes")
    assert "2 days would lose their figure." in page.inner_text(".changes")
    assert page.locator(".draft-notice").count() == 0
    assert fits(page)
    assert page.evaluate(SMALL_TARGETS) == []
    page.click("input.default")
    page.wait_for_selector(".messagelist")
    assert Note.objects.count() == 1
    kept = "Object.keys(localStorage).filter((key) => key.startsWith('draft:')).length"
    assert page.evaluate(kept) == 0
    assert page.faults == []

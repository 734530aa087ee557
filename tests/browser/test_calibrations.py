"""The pages of a calibration and of its instrument, on a phone and at a desk."""

import uuid
from datetime import UTC, datetime

import pytest
from django.urls import reverse

from network.services import calibrations, gaugings
from network.services.roles import MANAGER
from tests import field_world as world
from tests.browser.conftest import DESK, PHONE
from tests.people import make_person

pytestmark = [pytest.mark.browser, pytest.mark.django_db(transaction=True)]
AUTUMN = datetime(2024, 9, 1, tzinfo=UTC)


@pytest.fixture
def newer(agency, station):
    """A calibration by tow runs that drifted by 4 % from the one a gauging rests on."""
    pair = world.rated_meter()
    row = gaugings.save(
        sheet=world.sheet(station, pair), form_id=uuid.uuid4(), by=world.person(), at=world.NOON
    )
    gaugings.sign(gauging=row, version=1, by=world.person(), at=world.NOON)
    slips = (0.002, -0.001, 0.0, 0.003, -0.002, 0.001, -0.003, 0.0, 0.002, -0.001)
    runs = [
        calibrations.Run(speed_ms=0.26 * k / 2 + slip, revolutions=25.0 * k, seconds=50.0)
        for k, slip in enumerate(slips, start=1)
    ]
    return calibrations.from_tow_runs(
        owner=pair, effective_from=AUTUMN, runs=runs, pieces=1, by=world.person(), at=AUTUMN
    )


@pytest.mark.parametrize("device", [PHONE, DESK], ids=["phone", "desk"])
def test_calibration_and_instrument_fit(newer, office, open_page, device, picture, fits_a_phone):
    page = open_page(make_person(MANAGER, office=office, username="m"), device)
    name = "phone" if device is PHONE else "desk"
    for what, address in (
        ("calibration", reverse("admin:network_calibration_change", args=[newer.pk])),
        ("calibration-new", reverse("admin:network_calibration_add")),
        ("instrument", reverse("admin:network_instrument_change", args=[newer.pair.body.pk])),
        ("gaugings", reverse("admin:network_gauging_changelist")),
    ):
        page.goto(address)
        picture(page, f"{what}-{name}")
        if device is PHONE:
            fits_a_phone(page)
    assert page.locator("#result_list").count() == 1

"""Calibrations in the staff site: runs pasted and fitted, certificates kept, drift shown."""

import uuid
from datetime import UTC, datetime

import pytest
from django.core.files.uploadedfile import SimpleUploadedFile
from django.urls import reverse

from network.models import Calibration, Instrument
from network.numerics.meters.meter_rating import Piece
from network.services import calibrations, gaugings
from tests import field_world as world

pytestmark = pytest.mark.django_db
ADD = reverse("admin:network_calibration_add")


@pytest.fixture
def client(client, agency, manager):
    client.force_login(manager)
    return client


def typed(pair, **changes):
    return {
        "pair": pair.pk,
        "effective_from_0": "2024-03-01",
        "effective_from_1": "09:00",
        "outcome": "passed",
        "laboratory": "Tank hall",
        "count": "1",
        "pieces-TOTAL_FORMS": "0",
        "pieces-INITIAL_FORMS": "0",
    } | changes


def page_of(row):
    return reverse("admin:network_calibration_change", args=[row.pk])


def test_pasted_runs_are_fitted_and_shown_with_their_residuals(client):
    runs = "\n".join(
        f"{0.02 + 0.25 * k / 2:.4f}\t{25 * k}\t50".replace(".", ",") for k in range(1, 9)
    )
    assert client.post(ADD, typed(world.meter(), runs=runs)).status_code == 302
    row = Calibration.objects.get()
    assert row.pieces.get().b_m == pytest.approx(0.25)
    page = client.get(page_of(row)).content.decode()
    assert page.count('class="run"') == 8
    assert "Residual of each run" in page


def test_a_bad_line_of_runs_is_named_and_the_rest_is_kept(client):
    page = client.post(ADD, typed(world.meter(), runs="0,5 25 50\nfast 25 50"))
    text = page.content.decode()
    assert page.status_code == 200
    assert "Line 2, “fast 25 50”" in text
    assert "0,5 25 50" in text
    assert not Calibration.objects.exists()


def test_a_certificate_is_typed_and_its_paper_kept_by_hash(client, settings):
    pieces = {
        "pieces-TOTAL_FORMS": "2",
        "pieces-0-lowest_n": "0", "pieces-0-highest_n": "0,684",
        "pieces-0-a_ms": "0,019", "pieces-0-b_m": "0,233",
        "pieces-1-lowest_n": "0,684", "pieces-1-a_ms": "0,006", "pieces-1-b_m": "0,252",
    }  # fmt: skip
    paper = SimpleUploadedFile("paper.pdf", b"%PDF-1.7 certificate")
    sent = typed(world.meter(), certificate=paper, runs="", **pieces)
    assert client.post(ADD, sent).status_code == 302
    row = Calibration.objects.get()
    assert [piece.a_ms for piece in row.pieces.all()] == [0.019, 0.006]
    assert (settings.MEDIA_ROOT / row.certificate.name).read_bytes() == b"%PDF-1.7 certificate"
    wrong = SimpleUploadedFile("paper.pdf", b"<script>")
    sent = typed(world.meter("2"), certificate=wrong, runs="", **pieces)
    assert "A certificate is a PDF" in client.post(ADD, sent).content.decode()


def test_a_drifted_meter_lists_its_gaugings_and_the_instrument_says_so(client, station):
    pair = world.rated_meter()
    row = gaugings.save(
        sheet=world.sheet(station, pair), form_id=uuid.uuid4(), by=world.person(), at=world.NOON
    )
    gaugings.sign(gauging=row, version=1, by=world.person(), at=world.NOON)
    autumn = datetime(2024, 9, 1, tzinfo=UTC)
    newer = calibrations.from_certificate(
        owner=pair, effective_from=autumn, pieces=[Piece(0.0, 0.26, 0.0, 20.0)],
        by=world.person(), at=autumn,
    )  # fmt: skip
    page = client.get(page_of(newer)).content.decode()
    assert "what each would become" in page
    assert "+4.0" in page
    assert "10.6" in page  # 10.2 m³/s · 1.04
    about = client.get(reverse("admin:network_instrument_change", args=[pair.body.pk]))
    text = about.content.decode()
    assert "Gaugings made with it" in text
    assert "overdue" in text  # by months: the calibration is of 2024


def test_a_status_is_changed_by_its_own_act(client):
    pair = world.meter()
    address = reverse("admin:network_instrument_status", args=[pair.body.pk])
    assert client.post(address, {"status": "calibration"}).status_code == 302
    assert Instrument.objects.get(pk=pair.body.pk).status == "calibration"

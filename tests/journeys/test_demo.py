"""Two stations of the demo go the whole way through the services, and their flows are the truth."""

from dataclasses import replace
from datetime import UTC, date, datetime, timedelta
from io import StringIO
from pathlib import Path

import numpy as np
import pytest
from django.core.management import call_command
from django.db import transaction
from django.test import override_settings

from network.formats.demo_scenario import read_scenario
from network.management.commands.load_demo import PASSWORD
from network.models import (
    Curve,
    Gauging,
    LoggerImport,
    Person,
    PlateZero,
    RatingPeriod,
    Series,
    Station,
    StationYear,
    Visit,
)
from network.numerics.marks import Mark
from network.queries import flows
from network.services import blocks, demo_loader
from network.services.acts import Refusal
from network.services.demo_world import make_truths

SCENARIO = read_scenario(Path(__file__).resolve().parents[2] / "fixtures_demo")
pytestmark = pytest.mark.django_db
CODES = ("VE-030", "VE-040")
QUICK_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]  # as in conftest.py


@pytest.fixture(scope="module")
def demo(django_db_setup, django_db_blocker, tmp_path_factory):
    """The two stations, loaded once and taken back at the end."""
    folder = tmp_path_factory.mktemp("demo")
    told = []
    with (
        django_db_blocker.unblock(),
        override_settings(MEDIA_ROOT=folder / "media", PASSWORD_HASHERS=QUICK_HASHERS),
        transaction.atomic(),
    ):
        demo_loader.load(
            SCENARIO,
            password=PASSWORD,
            folder=folder / "logger_files",
            tell=lambda *line: told.append(line),
            only=CODES,
        )
        yield folder, told
        transaction.set_rollback(True)


def truth_by_day(code):
    """Daily means of the invented flow (m³/s), by trapezoid over 96 steps, and their days."""
    truth = make_truths(SCENARIO)[code]
    n_days = (truth.time_s.size - 1) // 96
    steps = (truth.flow_m3s[1:] + truth.flow_m3s[:-1]) / 2
    return SCENARIO.basin.first_day, steps[: n_days * 96].reshape(n_days, 96).mean(axis=1)


@pytest.mark.parametrize("code", CODES)
def test_recorded_flows_are_the_invented_ones(demo, code):
    first, truth = truth_by_day(code)
    # from here on a correction at Marlowend is proposed but not accepted
    first_doubtful = date(2024, 7, 24)
    n = (first_doubtful - first).days
    days = flows.days_of(Station.objects.get(code=code), first, first_doubtful - timedelta(days=1))
    recorded = days.marks == 0
    assert recorded.mean() > 0.9
    # 1 mm of sensor noise and 1 mm of resolution leave 0.03 % in a mean of 96 readings; at the
    # lowest flows the resolution is worth 0.6 %
    off = np.abs(days.flow_m3s[recorded] / truth[:n][recorded] - 1)
    assert np.median(off) < 0.001
    assert off.max() < 0.01


def test_a_gap_is_estimated_from_the_neighbour(demo):
    station = Station.objects.get(code="VE-030")
    # its battery failed from 8 March 04:30 to 12 March 11:15
    days = flows.days_of(station, date(2022, 3, 7), date(2022, 3, 13))
    assert [bool(mark & Mark.ESTIMATED) for mark in days.marks] == [False, *[True] * 5, False]
    assert (days.flow_m3s > 0).all()


def test_the_lifted_plate_is_adopted_from_the_break_up(demo):
    zero = PlateZero.objects.get(level_check__isnull=False)
    assert (zero.plate.station.code, zero.plate.label) == ("VE-040", "P2")
    # levels.toml: zero found 1.273 m, to the millimetre
    assert zero.zero_m == pytest.approx(1.273, abs=0.001)
    assert zero.effective_from == datetime(2024, 1, 30, 5, tzinfo=UTC)


def test_the_scour_brings_a_new_version_that_rests_on_gaugings(demo):
    scoured = RatingPeriod.objects.get(station__code="VE-030", effective_from__year=2023)
    rests_on = scoured.curve.gaugings.select_related("gauging")
    assert scoured.curve.state == Curve.State.APPROVED
    assert scoured.curve.approved_by != scoured.curve.recorded_by
    assert len(rests_on) >= 3
    # 3 % of scatter and the sheets' own 1.5 %
    assert all(abs(row.deviation_percent) < 10 for row in rests_on)


def test_gaugings_give_back_the_invented_flow(demo):
    truths = make_truths(SCENARIO)
    signed = Gauging.objects.exclude(state=Gauging.State.DRAFT).select_related("station")
    off = [
        gauging.discharge_m3s
        / truths[gauging.station.code].flow_at(
            gauging.started_at + (gauging.ended_at - gauging.started_at) / 2
        )
        - 1
        for gauging in signed
    ]
    assert len(off) > 30
    # scatter 3 % (demo_field.FLOW_SCATTER), whole revolutions and a drifted meter on top
    assert abs(float(np.median(off))) < 0.03
    assert float(np.std(off)) < 0.06


def test_every_reading_is_in_an_import_that_can_be_read_again(demo, settings):
    folder, _told = demo
    settings.MEDIA_ROOT = folder / "media"
    for series in Series.objects.filter(station__code="VE-030"):
        assert series.imports.exists()
        assert blocks.months_that_differ(series) == []
    names = {path.name for path in (folder / "logger_files").iterdir()}
    assert names == set(LoggerImport.objects.values_list("original_name", flat=True))


def test_nothing_is_dated_after_the_day_the_demo_stands_still(demo):
    still = datetime(2024, 11, 6, tzinfo=UTC)
    assert LoggerImport.objects.filter(recorded_at__gt=still).count() == 0
    assert Visit.objects.filter(recorded_at__gt=still).count() == 0
    assert Curve.objects.filter(approved_at__gt=still).count() == 0


def test_people_log_in_and_hold_their_roles(demo):
    ines = Person.objects.get(username="ines.tallow")
    assert ines.check_password(PASSWORD)
    assert [group.name for group in ines.groups.all()] == ["manager"]
    assert not Person.objects.filter(is_superuser=True).exists()


def test_daily_figures_are_ready_and_progress_was_told(demo):
    _folder, told = demo
    # each of three water years of two stations
    assert StationYear.objects.count() == 6
    assert ("stations", 1, 2) in told
    assert ("logger files", 2, 2) in told


def test_a_loaded_demo_is_left_alone(demo):
    said = StringIO()
    assert demo_loader.is_loaded(SCENARIO)
    with override_settings(DATA_DIR=demo[0], SECRET_KEY_FILE=demo[0] / "secret_key"):
        call_command("load_demo", stdout=said)
    assert "The demo is loaded already." in said.getvalue()
    assert Station.objects.count() == 2


def test_the_books_of_another_agency_are_refused(demo):
    other = replace(SCENARIO, agency=replace(SCENARIO.agency, name="Someone Else's"))
    with pytest.raises(Refusal, match="the books of “Veldra Basin Water Survey”"):
        demo_loader.is_loaded(other)

"""Instruments are added, paired, moved about and withdrawn, each by an act."""

from datetime import timedelta

import pytest

from network.models import Act, Instrument, Office, SensorSetting
from network.queries import instruments as answers
from network.services import instruments, series
from network.services.acts import Refusal
from tests import field_world as world

pytestmark = pytest.mark.django_db

WHO = {"at": world.NOON}


def recorder(serial="P1", kind=Instrument.Kind.PRESSURE):
    office = Office.objects.get_or_create(name="North")[0]
    return instruments.add(kind=kind, serial=serial, office=office, by=world.person(), **WHO)


@pytest.fixture
def stage():
    return series.open_series(station=world.station(), label="stage", by=world.person(), **WHO)


def deployed(instrument, stage, **changes):
    given = {"installed_at": world.NOON, "scale": 1.0, "offset_m": 0.4, "reason": "first set-up"}
    return instruments.deploy(
        instrument=instrument, series=stage, by=world.person(), **WHO, **given | changes
    )


def test_a_serial_number_stands_once():
    recorder()
    with pytest.raises(Refusal, match="already an instrument"):
        recorder()
    assert Act.objects.count() == 1


def test_a_pair_needs_a_body_and_a_rotor():
    body = recorder("B", Instrument.Kind.METER_BODY)
    with pytest.raises(Refusal, match="is not a current meter rotor") as refused:
        instruments.pair(body=body, rotor=body, by=world.person(), **WHO)
    assert refused.value.field == "rotor"


def test_setting_a_recorder_up_starts_its_sensor_setting_and_raises_the_record(stage):
    before = stage.station.record_version
    row = deployed(recorder(), stage)
    setting = SensorSetting.objects.get(deployment=row)
    assert (setting.effective_from, setting.offset_m) == (world.NOON, 0.4)
    stage.station.refresh_from_db()
    assert stage.station.record_version > before
    assert answers.standing_place(row.instrument, world.NOON).series == stage


def test_two_recorders_do_not_feed_one_series_at_once(stage):
    deployed(recorder(), stage)
    with pytest.raises(Refusal, match="remove it first"):
        deployed(recorder("P2"), stage, installed_at=world.NOON + timedelta(days=1))


def test_a_recorder_is_removed_before_it_is_withdrawn(stage):
    row = deployed(recorder(), stage)
    withdrawn = {"status": Instrument.Status.WITHDRAWN, "reason": "drowned"}
    with pytest.raises(Refusal, match="still stands"):
        instruments.change_status(instrument=row.instrument, by=world.person(), **withdrawn, **WHO)
    later = world.NOON + timedelta(days=1)
    instruments.remove(
        deployment=row, removed_at=later, reason="flood", by=world.person(), at=later
    )
    instruments.change_status(instrument=row.instrument, by=world.person(), **withdrawn, **WHO)
    assert answers.standing_place(row.instrument, later) is None

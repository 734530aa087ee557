"""A sheet is saved once, signed as computed, checked, and reopened with a reason."""

import uuid
from dataclasses import replace

import pytest

from network.models import Act, Gauging, Infill
from network.numerics.gaugings.gauging_input import Vertical
from network.queries import field_sheets
from network.queries import gaugings as answers
from network.services import gaugings
from network.services.acts import Overtaken, Refusal
from tests import field_world as world

pytestmark = pytest.mark.django_db


@pytest.fixture
def where():
    found = world.station()
    world.rate(found)
    return found


@pytest.fixture
def pair():
    return world.rated_meter()


def saved(sheet, **changes):
    given = {"form_id": uuid.uuid4(), "by": world.person(), "at": world.NOON} | changes
    return gaugings.save(sheet=sheet, **given)


def signed(row):
    return gaugings.sign(gauging=row, version=row.version, by=world.person(), at=world.NOON)


def test_a_sheet_comes_back_from_the_rows_as_it_was_typed(where, pair):
    sheet = world.sheet(where, pair)
    assert field_sheets.of_gauging(saved(sheet)) == sheet


def test_a_double_tap_saves_once(where, pair):
    form_id, sheet = uuid.uuid4(), world.sheet(where, pair)
    first, second = (saved(sheet, form_id=form_id) for _tap in range(2))
    assert (first.pk, second.version) == (second.pk, 1)
    assert Act.objects.filter(verb="saved a gauging").count() == 1


def test_the_second_of_two_people_is_told_and_the_first_sheet_stands(where, pair):
    form_id, sheet = uuid.uuid4(), world.sheet(where, pair)
    saved(sheet, form_id=form_id)
    saved(world.sheet(where, pair, remarks="one"), form_id=form_id, version=1)
    with pytest.raises(Overtaken):
        saved(world.sheet(where, pair, remarks="two"), form_id=form_id, version=1)
    assert Gauging.objects.get().remarks == "one"


def test_signing_stores_what_was_shown(where, pair):
    # 20 verticals, v = 0.25·(120/60) = 0.5 m/s, d = 1 m, panels of 1 m, edge panels of 1.5 m with
    # bank velocity (2·0.7 − 1)·0.5 = 0.2 over half a metre: 20·0.5·1 + 2·0.5·0.2 = 9.7 + ...
    sheet = world.sheet(where, pair)
    shown = answers.answer(sheet)
    row = signed(saved(sheet))
    row.refresh_from_db()
    assert row.discharge_m3s == shown.discharge_m3s == pytest.approx(10.2)
    assert row.u95_percent == shown.u95_percent
    assert row.signed_stage_m == shown.stage.stage_m == 1.5
    # Rating 10·1.5² = 22.5: (10.2 − 22.5)/22.5 = −54.67 %; shift √1.02 − 1.5.
    assert row.signed_deviation_percent == pytest.approx(-54.667, abs=0.001)
    assert row.signed_shift_m == pytest.approx(1.02**0.5 - 1.5)
    shares = [v.panel_share_percent for v in gaugings._verticals_of(row)]
    assert sum(shares) == pytest.approx(100)
    assert {f.kind for f in row.findings.all()} == {f.kind for f in shown.findings}
    assert "rating_deviation" in {f.kind for f in row.findings.all()}


def test_signing_names_every_fault_and_writes_nothing(where, pair):
    channel = world.twenty_verticals()
    slipped = replace(channel.verticals[11], distance_m=125.0)
    channel = replace(
        channel, verticals=(*channel.verticals[:11], slipped, *channel.verticals[12:])
    )
    row = saved(world.sheet(where, pair, channels=[channel]))
    with pytest.raises(gaugings.SheetRefused) as refused:
        signed(row)
    assert refused.value.field == "0.11.distance_m"
    assert "12.5" in refused.value.sentence
    row.refresh_from_db()
    assert (row.state, row.version, row.discharge_m3s) == ("draft", 1, None)


def test_a_draft_is_refused_where_no_row_can_hold_a_cell(where, pair):
    channel = world.twenty_verticals()
    half = replace(channel.verticals[0].points[0], seconds=None)
    broken = (
        replace(channel.verticals[0], points=(half, channel.verticals[0].points[1])),
        replace(channel.verticals[1], depth_m=-0.5),
        *channel.verticals[2:],
    )
    with pytest.raises(gaugings.SheetRefused) as refused:
        saved(world.sheet(where, pair, channels=[replace(channel, verticals=broken)]))
    assert {gaugings.path_of(fault) for fault in refused.value.faults} == {
        "0.0.0.seconds",
        "0.1.depth_m",
    }
    assert not Gauging.objects.exists()


def test_a_signed_sheet_is_not_changed_but_reopened_with_a_reason(where, pair):
    row = signed(saved(world.sheet(where, pair)))
    with pytest.raises(Refusal, match="reopen"):
        saved(world.sheet(where, pair, remarks="x"), form_id=row.form_id, version=row.version)
    row = gaugings.check(gauging=row, version=row.version, by=world.person(), at=world.NOON)
    with pytest.raises(Refusal, match="reason"):
        gaugings.reopen(
            gauging=row, version=row.version, by=world.person(), at=world.NOON, reason=""
        )
    row = gaugings.reopen(
        gauging=row, version=row.version, by=world.person(), at=world.NOON, reason="slip"
    )
    assert (row.state, row.discharge_m3s, row.calibration) == ("draft", None, None)
    assert not row.findings.exists()
    assert [h.state for h in row.history.order_by("pk")][-3:] == ["signed", "checked", "draft"]


def test_reopening_raises_the_record_version_only_where_a_winter_estimate_uses_it(where, pair):
    row = signed(saved(world.sheet(where, pair)))
    where.refresh_from_db()
    before = where.record_version
    Infill.objects.create(
        station=where, first_day="2024-05-10", last_day="2024-05-20", method="winter",
        reason="ice", recorded_by=world.person(), recorded_at=world.NOON,
    )  # fmt: skip
    gaugings.reopen(
        gauging=row, version=row.version, by=world.person(), at=world.NOON, reason="slip"
    )
    where.refresh_from_db()
    assert where.record_version == before + 1


def test_a_sounding_alone_stays_a_sounding(where, pair):
    channel = world.twenty_verticals()
    more = (*channel.verticals[:3], Vertical(3.5, 1.2), *channel.verticals[3:])
    sheet = world.sheet(where, pair, channels=[replace(channel, verticals=more)])
    row = signed(saved(sheet))
    assert row.area_m2 == pytest.approx(21.0 + 0.1)

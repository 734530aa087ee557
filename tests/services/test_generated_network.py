"""A network of any size comes from its seed alone, and its records give the flows of its curves."""

from datetime import UTC, date, datetime
from io import StringIO

import numpy as np
import pytest
from django.core.management import call_command
from django.core.management.base import CommandError
from django.db import transaction

from network.models import Block, Office, Person, Station
from network.numerics.synthetic.basin import make_weather
from network.numerics.synthetic.station import make_station
from network.queries import flows
from network.services.generated_network import generate

pytestmark = pytest.mark.django_db


def blocks():
    rows = Block.objects.order_by("series__station__code", "month")
    return [bytes(data) for data in rows.values_list("data", flat=True)]


def test_the_same_seed_gives_the_same_bytes():
    seen = []
    for seed in (3, 3, 4):
        with transaction.atomic():
            generate(stations=2, years=1, seed=seed)
            seen.append(blocks())
            transaction.set_rollback(True)
    assert len(seen[0]) == 24
    assert seen[0] == seen[1]
    assert seen[0] != seen[2]


def test_a_network_grows_and_keeps_what_it_has():
    generate(stations=1, years=1, seed=3)
    before = blocks()
    assert generate(stations=3, years=1, seed=3) == 2
    assert blocks()[: len(before)] == before
    assert generate(stations=3, years=1, seed=3) == 0
    assert [s.code for s in Station.objects.all()] == ["S-00001", "S-00002", "S-00003"]


def test_its_record_gives_the_flow_of_its_curve():
    generate(stations=1, years=1, seed=3)
    start, end = datetime(2024, 1, 1, tzinfo=UTC), datetime(2025, 1, 1, tzinfo=UTC)
    ends = {"start_s": int(start.timestamp()), "end_s": int(end.timestamp())}
    made = make_station(
        1, weather=make_weather(seed=3, **ends), seed=3, start_s=int(start.timestamp())
    )
    days = flows.days_of(Station.objects.get(), date(2024, 1, 1), date(2024, 12, 30))
    assert (days.marks == 0).all()
    rated = made.curve.flow_at(made.stage_m)
    means = ((rated[1:] + rated[:-1]) / 2)[: 365 * 96].reshape(365, 96).mean(axis=1)
    # the same arithmetic on the same millimetres; rounding in the last places only
    assert np.allclose(days.flow_m3s, means, rtol=1e-9)


def test_its_maker_cannot_log_in():
    generate(stations=1, years=1, seed=3)
    assert not Person.objects.get(username="generator").is_active


def test_real_stations_are_left_alone():
    office = Office.objects.create(name="Real")
    Station.objects.create(code="A1", name="Real", latitude_deg=1, longitude_deg=1, office=office)
    with pytest.raises(CommandError, match="holds real stations"):
        call_command("generate", stations=1, years=1, stdout=StringIO())
    assert Station.objects.count() == 1


def test_a_network_has_a_size():
    with pytest.raises(CommandError, match="at least one station"):
        call_command("generate", stations=0, stdout=StringIO())


def test_the_command_tells_its_progress():
    said = StringIO()
    call_command("generate", stations=1, years=1, seed=3, stdout=said)
    assert "stations: 1 of 1" in said.getvalue()
    assert "1 stations were made." in said.getvalue()

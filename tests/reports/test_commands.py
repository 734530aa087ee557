"""The commands: compile, issue, verify, bind; a sentence where something is refused."""

import io
from datetime import datetime

import pytest
from django.core.management import CommandError, call_command

from network.services import typed_flows
from reports import rendering
from reports.models import Edition, Volume
from tests.records import AT
from tests.records import make_person as make_keeper
from tests.reports import world

pytestmark = pytest.mark.django_db


@pytest.fixture
def keeper(monkeypatch, agency, publisher):
    monkeypatch.setattr(rendering, "render", world.small_pdf)
    keeper = make_keeper("keeper")
    world.make_flow_station(keeper, make_keeper("approver"))
    return keeper


def run(name, *args, **options):
    out = io.StringIO()
    call_command(name, *args, stdout=out, stderr=out, **options)
    return out.getvalue()


def test_a_year_is_compiled_issued_verified_and_bound(keeper):
    assert "open points: 1" in run("compile_year", world.YEAR, by="publisher")
    run("issue_year", world.YEAR, by="publisher", reason="the review follows")
    assert Edition.objects.get().state == Edition.State.ISSUED
    assert "1 issued editions hold." in run("verify_editions")
    assert ".pdf" in run("bind_volume", world.YEAR, by="publisher", title="Quill basin")
    assert Volume.objects.get().title == "Quill basin"
    typed_flows.type_flow(
        station=Edition.objects.get().station, day=datetime(2023, 3, 3).date(), flow_m3s=9.99,
        method="by eye", reason="test", by=keeper, at=AT,
    )  # fmt: skip
    with pytest.raises(CommandError, match="1 of 1"):
        run("verify_editions")


def test_issuing_without_the_reason_owed_ends_in_an_error(keeper):
    run("compile_year", world.YEAR, by="publisher")
    with pytest.raises(CommandError, match="1 yearbooks were not issued"):
        run("issue_year", world.YEAR, by="publisher")


@pytest.mark.parametrize(
    ("command", "args", "sentence"),
    [
        ("compile_year", [world.YEAR, "QA-999"], "There is no station QA-999."),
        ("compile_year", [2010], "has a record in 2010"),
        ("issue_year", [2010], "0 were compiled"),
        ("bind_volume", [2010], "no issued edition"),
    ],
)
def test_what_is_not_there_is_named(keeper, command, args, sentence):
    with pytest.raises(CommandError, match=sentence):
        run(command, *args, by="publisher")


def test_nobody_compiles_who_is_not_there(keeper):
    with pytest.raises(CommandError, match="no active person"):
        run("compile_year", world.YEAR, by="stranger")


def test_sweeping_removes_nothing_young(keeper):
    run("compile_year", world.YEAR, by="publisher")
    assert run("sweep_editions") == ""

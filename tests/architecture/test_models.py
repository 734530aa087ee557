"""Every model guards its rows, and says so in the same way."""

import pytest
from django.apps import apps
from django.core.management import call_command
from django.db import models

MODELS = [
    model
    for label in ("network", "reports")
    for model in apps.get_app_config(label).get_models()
    if not model.__name__.startswith("Historical")
]


@pytest.mark.django_db
def test_models_and_migrations_agree():
    call_command("makemigrations", "--check", "--dry-run")


@pytest.mark.parametrize("model", MODELS, ids=lambda m: m.__name__)
def test_constraint_names_carry_app_and_model(model):
    prefix = f"{model._meta.app_label}_{model._meta.model_name}_"
    assert all(c.name.startswith(prefix) for c in model._meta.constraints)


# Rows that have no meaning without their owner and go when it goes.
OWNED = {
    "BoatTrack.gauging",
    "CalibrationPiece.calibration",
    "Channel.gauging",
    "CurveBand.curve",
    "CurveGauging.curve",
    "CurvePoint.curve",
    "CurveSegment.curve",
    "FloatReach.gauging",
    "GaugingFinding.gauging",
    "ImportFault.logger_import",
    "OperationPeriod.station",
    "PegTest.level_check",
    "Photograph.visit",
    "RecorderCheck.visit",
    "ShiftPoint.table",
    "Sight.level_check",
    "SiteCriterion.survey",
    "SpinTest.visit",
    "StageReading.gauging",
    "StationYear.station",
    "Stop.round",
    "StopTask.stop",
    "TimedFloat.reach",
    "TowRun.calibration",
    "TracerInjection.gauging",
    "TracerSample.injection",
    "Transect.gauging",
    "Vertical.channel",
    "VerticalPoint.vertical",
    "VesselFill.gauging",
    "VisitReading.visit",
    "WeirHead.gauging",
    "WorkLeft.visit",
}


@pytest.mark.parametrize("model", MODELS, ids=lambda m: m.__name__)
def test_every_foreign_key_protects_unless_the_row_is_owned(model):
    unprotected = {
        f"{model.__name__}.{field.name}"
        for field in model._meta.fields
        if isinstance(field, models.ForeignKey)
        and field.remote_field.on_delete is not models.PROTECT
    }
    assert unprotected <= OWNED


@pytest.mark.parametrize("model", MODELS, ids=lambda m: m.__name__)
def test_at_and_by_fields_come_in_pairs(model):
    names = {f.name for f in model._meta.fields}
    stems = {n[:-3] for n in names if n.endswith("_by")}
    assert {s + "_at" for s in stems} <= names

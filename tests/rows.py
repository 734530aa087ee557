"""Makes a plausible row of any model, so that tests can walk pages that others will add."""

import uuid
from datetime import UTC, date, datetime, timedelta

from django.core.files.base import ContentFile
from django.db import models

from network.models import Agency, MeterPair, Person, WorkingRules

START = datetime(2024, 3, 5, 12, 0, tzinfo=UTC)
# What the kinds of the fields alone do not tell.
SPECIAL = {
    "Note": lambda: {"flows": "withheld"},
    "Calibration": lambda: {"instrument": a_row(model_named("Instrument"))},
    "VisitReading": lambda: {"plate": a_row(model_named("StaffPlate")), "reading_m": 1.0},
    "FeedLink": lambda: {"secret_sha256": uuid.uuid4().hex},
}


def model_named(name):
    """Return a model of the network by its name."""
    return Agency._meta.apps.get_model("network", name)


def a_row(model, **given):
    """Return a saved row of a model, with what it needs; stations, people and agency are shared."""
    if model in (Agency, WorkingRules):
        return model.objects.get(pk=1)
    if model in (Person, model_named("Station"), model_named("Office")) and not given:
        return model.objects.order_by("pk").first()
    values = {**SPECIAL.get(model.__name__, dict)(), **given}
    floor = 0.0
    for field in model._meta.concrete_fields:
        if field.name in values or not _wanted(field):
            continue
        values[field.name] = _value(field, floor)
        if isinstance(field, models.FloatField):
            floor += 1  # highest above lowest
    return model.objects.create(**values)


def _wanted(field):
    return not (field.primary_key or field.null or field.has_default() or field.blank)


def _value(field, floor):
    if field.is_relation:
        if field.related_model is model_named("Instrument") and field.model is MeterPair:
            return a_row(field.related_model, kind=field.name)
        return a_row(field.related_model)
    if field.choices:
        return field.flatchoices[0][0]
    if isinstance(field, models.FileField):
        return ContentFile(b"x", name="paper.txt")
    if isinstance(field, models.DateTimeField):
        late = field.name.startswith(("last", "ended", "end", "removed"))
        return START + timedelta(hours=2 if late else 0)
    if isinstance(field, models.DateField):
        return date(2024, 3, 1)
    if isinstance(field, models.FloatField):
        return floor + 1
    if isinstance(field, models.IntegerField):
        return 1
    if isinstance(field, models.BooleanField):
        return True
    if isinstance(field, models.BinaryField):
        return b""
    return uuid.uuid4().hex[: field.max_length or 32]

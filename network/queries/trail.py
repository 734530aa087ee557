"""The trail: acts with the rows they changed, field by field, old and new."""

from collections import defaultdict
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any

from django.apps import apps
from django.db import models
from django.db.models import Q
from django.utils import timezone
from django.utils.translation import gettext as _

from network.models import Act

# Bookkeeping that says nothing to a reader.
HOUSEKEEPING = {"id", "version", "record_version", "form_id", "password", "last_login"}
ADDED, CHANGED = "+", "~"


@dataclass(frozen=True)
class FieldChange:
    """One field: its label, and its old and new value as text."""

    label: str
    old: str
    new: str


@dataclass(frozen=True)
class RowChange:
    """One row that an act added, changed or removed."""

    model: type[models.Model]
    row: str
    kind: str  # "+", "~" or "-"
    fields: tuple[FieldChange, ...]

    @property
    def name(self) -> str:
        """What kind of row it is, in words."""
        return str(self.model._meta.verbose_name)


@dataclass
class Entry:
    """One act and the rows it changed."""

    act: Act
    rows: list[RowChange] = field(default_factory=list)


def acts_on(row: models.Model) -> models.QuerySet[Act]:
    """Return the acts that changed a row or what it owns, newest first.

    For a station these are also all acts on the station.
    """
    touching = Q(pk__in={record.act_id for record in _records_of(row)})
    if row._meta.label == "network.Station":
        touching |= Q(station=row.pk)
    return Act.objects.filter(touching).select_related("done_by", "station")


def entries(acts: Sequence[Act]) -> list[Entry]:
    """Return the acts with every row they changed; a handful of queries for a page of acts."""
    by_act = {act.pk: Entry(act) for act in acts}
    for model in _kept_models():
        records = list(_histories(model).filter(act_id__in=by_act))
        before = _records_before(model, records)
        for record in records:
            old = before.get(record.history_id)
            by_act[record.act_id].rows.append(_row_change(model, record=record, old=old))
    return list(by_act.values())


def _kept_models() -> list[type[models.Model]]:
    return [m for m in apps.get_models() if hasattr(m._meta, "simple_history_manager_attribute")]


def _histories(model: type[models.Model]) -> models.QuerySet[Any]:
    history = getattr(model, model._meta.simple_history_manager_attribute)
    return history.model.objects.order_by("history_date", "history_id")


def _records_of(row: models.Model) -> Iterable[Any]:
    """Yield the history records of a row and of the rows it owns, however deep."""
    yield from _records_below(type(row), {row.pk})


def _records_below(model: type[models.Model], keys: set[Any]) -> Iterable[Any]:
    if model in _kept_models():
        yield from _histories(model).filter(**{f"{model._meta.pk.attname}__in": keys})
    for relation in model._meta.related_objects:
        child = relation.related_model
        if relation.on_delete is not models.CASCADE or child not in _kept_models():
            continue
        name = relation.field.attname
        owned = _histories(child).filter(**{f"{name}__in": keys})
        children = set(owned.values_list(child._meta.pk.attname, flat=True))
        if children:
            yield from _records_below(child, children)


def _records_before(model: type[models.Model], records: Sequence[Any]) -> dict[int, Any]:
    """Return for each changed record the one before it of the same row, by its history id."""
    key = model._meta.pk.attname
    changed = {getattr(record, key) for record in records if record.history_type == CHANGED}
    before: dict[int, Any] = {}
    latest: dict[Any, Any] = defaultdict(lambda: None)
    if changed:
        for record in _histories(model).filter(**{f"{key}__in": changed}):
            before[record.history_id] = latest[getattr(record, key)]
            latest[getattr(record, key)] = record
    return before


def _row_change(model: type[models.Model], *, record: Any, old: Any) -> RowChange:
    names = [f.name for f in record.tracked_fields if f.name not in HOUSEKEEPING]
    attributes = [(name, model._meta.get_field(name).attname) for name in names]
    if record.history_type == CHANGED and old is not None:
        both = [(name, getattr(old, at), getattr(record, at)) for name, at in attributes]
        changed = [item for item in both if item[1] != item[2]]
    elif record.history_type == ADDED:
        changed = [(name, None, getattr(record, at)) for name, at in attributes]
        changed = [item for item in changed if item[2] not in (None, "", False)]
    else:
        changed = []
    fields = tuple(_field_change(model, name=n, old=o, new=v) for n, o, v in changed)
    return RowChange(model=model, row=_row_text(record), kind=record.history_type, fields=fields)


def _row_text(record: Any) -> str:
    """Name a row as it was; where what it named is gone, by its number."""
    try:
        return str(record.instance)
    except models.ObjectDoesNotExist:
        return f"#{record.pk}"


def _field_change(model: type[models.Model], *, name: str, old: Any, new: Any) -> FieldChange:
    about = model._meta.get_field(name)
    return FieldChange(str(about.verbose_name), _text(about, old), _text(about, new))


def _text(about: Any, value: Any) -> str:
    """Write a stored value for a reader: choices by their label, rows by their name."""
    if value is None or value == "":
        return "–"
    if about.is_relation:
        named = about.related_model._base_manager.filter(pk=value).first()
        return str(named or value)
    if about.choices:
        return str(dict(about.flatchoices).get(value, value))
    if isinstance(value, bool):
        return _("yes") if value else _("no")
    if isinstance(value, datetime):
        return timezone.localtime(value).strftime("%Y-%m-%d %H:%M")
    return str(value)

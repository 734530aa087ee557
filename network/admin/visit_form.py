"""The form of a visit: what it is about, work earlier visits left, photographs."""

from collections.abc import Mapping, Sequence
from datetime import datetime
from typing import Any, ClassVar

from django import forms
from django.core.exceptions import ValidationError
from django.utils.translation import gettext_lazy as _

from network.admin.live import LiveForm
from network.models import Instrument, Person, Station, Visit, WorkLeft
from network.queries.visit_sheet import (
    COLUMNS,
    CheckRow,
    ReadingRow,
    SpinRow,
    VisitSheet,
    WorkRow,
    across_midnight,
)
from network.queries.visits import work_left
from network.services import photographs
from network.services.acts import Refusal

MOST_PHOTOGRAPHS = 20


class ManyFilesInput(forms.ClearableFileInput):
    """A file input that takes several pictures."""

    allow_multiple_selected = True


class PhotographsField(forms.FileField):
    """Several photographs, each kept as soon as it is read: a refused form need not send it again.

    Cleans to the names of the kept files.
    """

    def __init__(self, **options: Any) -> None:
        widget = ManyFilesInput(attrs={"accept": "image/*"})
        super().__init__(**{"widget": widget, "required": False, **options})

    def clean(self, data: Any, initial: Any = None) -> list[str]:
        """Keep each picture under its hash; refuse what is none."""
        uploads = data if isinstance(data, list | tuple) else [data] if data else []
        if len(uploads) > MOST_PHOTOGRAPHS:
            raise ValidationError(
                _("At most %(n)d photographs at a time."), params={"n": MOST_PHOTOGRAPHS}
            )
        try:
            return [_kept(upload) for upload in uploads if upload]
        except Refusal as refusal:
            raise ValidationError(refusal.sentence) from refusal


def _kept(upload: Any) -> str:
    upload.seek(0)  # a form that was refused is read again
    return photographs.keep(upload)


class VisitForm(LiveForm):
    """A visit, with what earlier visits left to do and the photographs chosen now."""

    station_of_page: ClassVar[Station | None] = None
    work_finished = forms.ModelMultipleChoiceField(
        label=_("left by earlier visits, done now"),
        queryset=WorkLeft.objects.none(),
        required=False,
        widget=forms.CheckboxSelectMultiple,
    )
    photographs = PhotographsField(
        label=_("photographs"),
        help_text=_("Made smaller; place and device are taken out."),
    )
    caption = forms.CharField(label=_("caption of these"), required=False, max_length=200)

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        if "work_finished" in self.fields:
            left = earlier_work(self.station_of_page, self.instance)
            self.fields["work_finished"].queryset = left
        for name, rows in (("party", people()), ("instruments", instruments())):
            if name in self.fields:
                self.fields[name].queryset = rows | self.fields[name].queryset.filter(
                    pk__in=self._stored_keys(name)
                )

    @property
    def kept(self) -> list[str]:
        """The photographs that came with this form or with the same form before."""
        before = self.data.getlist("kept") if self.is_bound else []
        now = self.cleaned_data.get("photographs") or [] if hasattr(self, "cleaned_data") else []
        return list(dict.fromkeys(name for name in (*before, *now) if photographs.is_kept(name)))

    def _get_validation_exclusions(self) -> set[str]:
        """Leave the departure to the service: it knows of midnight, and refuses at the field."""
        return super()._get_validation_exclusions() | {"departed_at"}

    def _stored_keys(self, name: str) -> list[int]:
        if not self.instance.pk:
            return []
        return list(getattr(self.instance, name).values_list("pk", flat=True))


def earlier_work(station: Station | None, visit: Visit | None) -> Any:
    """Return the work other visits to a station left that nobody has done yet."""
    if station is None:
        return WorkLeft.objects.none()
    keys = [row.pk for row in work_left(station) if visit is None or row.visit_id != visit.pk]
    return WorkLeft.objects.filter(pk__in=keys)


def people() -> Any:
    """Return those who can be of a party."""
    return Person.objects.filter(is_active=True)


def instruments() -> Any:
    """Return the instruments that can be used."""
    return Instrument.objects.exclude(
        status__in=[Instrument.Status.WITHDRAWN, Instrument.Status.IN_CALIBRATION]
    )


# What makes a child a row; while it is typed, lines that lack it are left out.
NEEDED: dict[str, tuple[type, tuple[str, ...]]] = {
    "readings": (ReadingRow, ("read_at",)),
    "recorder_checks": (CheckRow, ("checked_at", "series")),
    "spin_tests": (SpinRow, ("pair", "seconds")),
    "work_left": (WorkRow, ("text",)),
}


def sheet_of(values: Mapping[str, Any], children: Mapping[str, Sequence[Any]]) -> VisitSheet | None:
    """Put a sheet together from what is cleaned; None without station or arrival."""
    station, arrived_at = values.get("station"), values.get("arrived_at")
    if station is None or arrived_at is None:
        return None
    columns = _on_their_day({name: values[name] for name in COLUMNS if name in values}, arrived_at)
    rows: dict[str, Any] = {
        name: tuple(
            _row(kind, _on_their_day(row, arrived_at))
            for row in children.get(name, ())
            if is_row(name, row)
        )
        for name, (kind, _needed) in NEEDED.items()
    }
    party, used = values.get("party") or (), values.get("instruments") or ()
    return VisitSheet(
        station=station, party=tuple(party), instruments=tuple(used), **columns, **rows
    )


def is_row(name: str, cleaned: Mapping[str, Any]) -> bool:
    """Tell whether a child has what makes it a row."""
    gauged = name != "readings" or cleaned.get("plate") or cleaned.get("other_gauge")
    return bool(gauged) and all(cleaned.get(field) not in (None, "") for field in NEEDED[name][1])


def _on_their_day(cleaned: Mapping[str, Any], arrived_at: datetime) -> dict[str, Any]:
    """Roll times typed on the day of arrival past midnight, where they are meant so."""
    return {
        name: across_midnight(value, arrived_at=arrived_at)
        if isinstance(value, datetime)
        else value
        for name, value in cleaned.items()
    }


def _row(kind: Any, cleaned: Mapping[str, Any]) -> Any:
    stored = cleaned.get("id")
    names = [name for name in kind.__dataclass_fields__ if name in cleaned]
    return kind(**{name: cleaned[name] for name in names}, key=stored.pk if stored else None)

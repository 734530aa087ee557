"""The form of a visit: what it is about, work earlier visits left, photographs."""

from collections.abc import Mapping, Sequence
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
            raise ValidationError(_("At most %(n)d photographs at a time."), params={"n": 20})
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


def sheet_of(
    values: Mapping[str, Any], children: Mapping[str, Sequence[Mapping[str, Any]]]
) -> VisitSheet | None:
    """Put a sheet together from what is cleaned; None without station or arrival.

    Rows that lack what makes them a row are left out: the form itself asks for it.
    """
    station, arrived_at = values.get("station"), values.get("arrived_at")
    if station is None or arrived_at is None:
        return None
    columns = {name: values[name] for name in COLUMNS if name in values}
    if columns.get("departed_at"):
        columns["departed_at"] = across_midnight(columns["departed_at"], arrived_at=arrived_at)
    return VisitSheet(
        station=station,
        **columns,
        party=tuple(values.get("party") or ()),
        instruments=tuple(values.get("instruments") or ()),
        readings=tuple(
            _row(ReadingRow, row, read_at=across_midnight(row["read_at"], arrived_at=arrived_at))
            for row in children.get("readings", ())
            if row.get("read_at") and (row.get("plate") or row.get("other_gauge"))
        ),
        recorder_checks=tuple(
            _row(
                CheckRow,
                row,
                checked_at=across_midnight(row["checked_at"], arrived_at=arrived_at),
            )
            for row in children.get("recorder_checks", ())
            if row.get("checked_at") and row.get("series")
        ),
        spin_tests=tuple(
            _row(SpinRow, row)
            for row in children.get("spin_tests", ())
            if row.get("pair") and row.get("seconds") is not None
        ),
        work_left=tuple(
            _row(WorkRow, row) for row in children.get("work_left", ()) if row.get("text")
        ),
    )


def _row(kind: Any, cleaned: Mapping[str, Any], **changes: Any) -> Any:
    stored = cleaned.get("id")
    names = [name for name in kind.__dataclass_fields__ if name in cleaned]
    values = {name: cleaned[name] for name in names} | changes
    return kind(**values, key=stored.pk if stored else None)

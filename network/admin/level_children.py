"""Children on the page of a level check: the peg test and the lines of the book."""

from collections.abc import Mapping, Sequence
from typing import Any, ClassVar

from django import forms
from django.core.exceptions import ValidationError
from django.http import HttpRequest
from django.utils.translation import gettext_lazy as _

from network.admin.children import ChildCards, ChildRows
from network.admin.fields import WholeNumberField
from network.admin.visit_children import station_of
from network.models import Benchmark, PegTest, Sight, StaffPlate, Station
from network.queries.level_sheet import LevelSheet, PegRow, SightRow

Choices = list[tuple[str, Any]]
BLANK_LINES = 8
SHORT_LABELS = {
    "graduation_m": _("plate at, m"),
    "backsight_m": _("backsight, m"),
    "intermediate_m": _("intermediate, m"),
    "foresight_m": _("foresight, m"),
}


class PegTests(ChildCards):
    """The peg test before the run."""

    model = PegTest
    prefix = "peg_test"
    max_num = extra = 1


class SightForm(forms.ModelForm):
    """One line of the book; benchmarks, plates, turning points and water stand in one list."""

    point_choices: ClassVar[Choices] = []
    on = forms.ChoiceField(label=_("on"), required=False)
    after = WholeNumberField(label=_("after line"), required=False, signed=False)

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        self.fields["on"].choices = [("", "–"), *self.point_choices]
        for name, label in SHORT_LABELS.items():
            if name in self.fields:
                self.fields[name].label = label
        if self.instance.pk:
            self.fields["on"].initial = point_value(self.instance)

    def clean(self) -> dict[str, Any]:
        """Read which point is meant."""
        cleaned = super().clean() or self.cleaned_data
        kind, _mark, key = str(cleaned.get("on", "")).partition(":")
        cleaned |= {"point": kind, "benchmark": None, "plate": None}
        model: Any = {"benchmark": Benchmark, "plate": StaffPlate}.get(kind)
        if model is not None:
            cleaned[kind] = model.objects.filter(pk=key).first()
        if not kind and self.has_changed():
            raise ValidationError({"on": _("Say what the staff stood on.")})
        return cleaned


class Sights(ChildRows):
    """The lines of the level book."""

    model = Sight
    form = SightForm
    prefix = "sights"
    fields = (
        *("on", "graduation_m", "backsight_m", "intermediate_m", "foresight_m"),
        *("after", "remark"),
    )
    can_delete = True

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer a page of lines to a new book."""
        return 1 if obj is not None and obj.pk and obj.sights.exists() else BLANK_LINES

    def get_formset(self, request: HttpRequest, obj: Any = None, **options: Any) -> Any:
        """Offer the points of this station."""
        made = super().get_formset(request, obj, **options)
        station = station_of(request, obj)
        choices = point_choices(station) if station else []
        made.form = type(made.form.__name__, (made.form,), {"point_choices": choices})
        return made


def point_value(row: Sight) -> str:
    """Name the point of a stored line as the list does."""
    key = {"benchmark": row.benchmark_id, "plate": row.plate_id}.get(row.point)
    return f"{row.point}:{key}" if key else row.point


def point_choices(station: Station) -> Choices:
    """List the points of a station: benchmarks, plates, turning point, water."""
    marks = station.benchmarks.order_by("-is_main", "label")
    plates = station.plates.filter(removed_at__isnull=True)
    gone = station.plates.filter(removed_at__isnull=False)
    return [
        *((f"benchmark:{mark.pk}", mark.label) for mark in marks),
        *((f"plate:{plate.pk}", plate.label) for plate in plates),
        (str(Sight.Point.TURNING), Sight.Point.TURNING.label),
        (str(Sight.Point.WATER), Sight.Point.WATER.label),
        *((f"plate:{plate.pk}", _("%s (taken down)") % plate.label) for plate in gone),
    ]


def sheet_of(
    values: Mapping[str, Any], children: Mapping[str, Sequence[Mapping[str, Any]]]
) -> LevelSheet | None:
    """Put a sheet together from what is cleaned; None without station or time."""
    if values.get("station") is None or values.get("levelled_at") is None:
        return None
    pegs = [row for row in children.get("peg_test", ()) if _is_whole(row)]
    lines = sorted(enumerate(children.get("sights", ()), start=1), key=_place)
    return LevelSheet(
        station=values["station"],
        levelled_at=values["levelled_at"],
        party=tuple(values.get("party") or ()),
        instrument=values.get("instrument"),
        remarks=values.get("remarks", ""),
        peg=PegRow(**{name: pegs[0][name] for name in PegRow.__dataclass_fields__})
        if pegs
        else None,
        sights=tuple(_line(row) for _number, row in lines),
    )


def _line(row: Mapping[str, Any]) -> SightRow:
    values: dict[str, Any] = {name: row.get(name) for name in SightRow.__dataclass_fields__}
    return SightRow(**values)


def _is_whole(row: Mapping[str, Any]) -> bool:
    return all(row.get(name) is not None for name in PegRow.__dataclass_fields__)


def _place(numbered: tuple[int, Mapping[str, Any]]) -> float:
    """Put a forgotten line after the one it names."""
    number, row = numbered
    after = row.get("after")
    return number if after is None else after + number / 10_000

"""Calibrations: entered by tow runs or from a certificate, looked at, withdrawn."""

from typing import Any, Literal

from django import forms
from django.contrib import admin
from django.core.exceptions import ValidationError
from django.db import models
from django.http import HttpRequest, HttpResponse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.acting import Filled, ServedAdmin
from network.admin.children import ChildRows
from network.admin.figure_columns import column
from network.admin.forms import StaffForm
from network.admin.gauging_form import numbers_of
from network.admin.records import stands
from network.admin.verbs import Verb
from network.models import Calibration, CalibrationPiece
from network.queries.calibrations import Piece
from network.queries.meter_changes import look_back
from network.queries.printed import fixed_writer
from network.queries.tow_run_residuals import rating_plot, residuals
from network.services import calibrations, certificates
from network.services.acts import Refusal

NO_END = 1e6


class CalibrationForm(StaffForm):
    """A calibration with its tow runs as lines of text, which a spreadsheet pastes."""

    runs = forms.CharField(
        label=_("tow runs"),
        required=False,
        widget=forms.Textarea(attrs={"rows": 12}),
        help_text=_(
            "One run a line: carriage speed m/s, revolutions, seconds. Leave blank to type the "
            "pieces of a certificate below."
        ),
    )
    count = forms.TypedChoiceField(
        label=_("straight pieces to fit"), choices=[(1, "1"), (2, "2"), (3, "3")], coerce=int,
        required=False, empty_value=1,
    )  # fmt: skip

    def clean_runs(self) -> list[calibrations.Run]:
        """Read the runs line by line."""
        rows = numbers_of(self.cleaned_data["runs"], 3, _t("speed, revolutions and seconds"))
        runs = [
            calibrations.Run(speed_ms=v, revolutions=r, seconds=s)
            for v, r, s in rows
            if v is not None and r is not None and s is not None
        ]
        if len(runs) < len(rows):
            raise ValidationError(_t("A tow run has a speed, revolutions and seconds."))
        return runs


class Pieces(ChildRows):
    """Pieces of a certificate."""

    model = CalibrationPiece
    prefix = "pieces"
    fields = ("lowest_n", "highest_n", "a_ms", "b_m")
    max_num = 3

    def get_extra(self, request: HttpRequest, obj: Any = None, **options: Any) -> int:
        """Offer two lines on a new one."""
        return 0 if obj is not None and obj.pk else 2


@admin.register(Calibration)
class CalibrationAdmin(ServedAdmin):
    """Calibrations are added and withdrawn, never edited."""

    form = CalibrationForm
    change_form_template = "admin/network/calibration/change_form.html"
    list_filter = ("source", "outcome")
    list_select_related = ("pair__body", "pair__rotor", "group", "instrument")
    date_hierarchy = "effective_from"
    inlines = (Pieces,)
    fieldsets = (
        (None, {"fields": ("pair", "group", "instrument", "effective_from", "outcome")}),
        (
            _("Certificate"),
            {
                "fields": (
                    *("laboratory", "certificate_number", "certificate", "uncertainty_percent"),
                    *("standard_error_ms", "lowest_velocity_ms", "highest_velocity_ms", "reason"),
                )
            },
        ),
        (_("Tow runs"), {"fields": ("runs", "count")}),
    )
    verbs = (
        Verb(
            name="withdraw",
            label=_("withdraw"),
            permission="network.change_calibration",
            applies=stands,
            run=lambda row, **who: calibrations.withdraw(calibration=row, **who),
            caution=_(
                "The calibration before then holds on; gaugings already signed keep what they "
                "had and are reopened one by one."
            ),
        ),
    )

    def has_change_permission(self, request: HttpRequest, obj: Any = None) -> bool:
        """Edit no calibration: withdraw it and enter it again."""
        return obj is None and super().has_change_permission(request)

    def get_list_display(self, request: HttpRequest) -> list[Any]:
        """Write the standard error as the agency writes numbers."""
        own = request.agency
        return [
            *("__str__", "effective_from", "laboratory", "certificate_number", "source"),
            column("standard_error_ms", _("standard error, m/s"), fixed_writer(own, 4)),
            *("outcome", "withdrawn_at"),
        ]

    def get_fieldsets(self, request: HttpRequest, obj: Any = None) -> Any:
        """Leave out the box of runs once they are stored."""
        return self.fieldsets if obj is None or obj.pk is None else self.fieldsets[:2]

    def serve(self, request: HttpRequest, filled: Filled) -> models.Model:
        """Fit the runs, or keep the pieces of the certificate."""
        values = filled.values
        owners = [values[name] for name in ("pair", "group", "instrument") if values[name]]
        if len(owners) != 1:
            raise Refusal(
                _t("Name one meter, one group of meters or one instrument."), field="pair"
            )
        upload = values["certificate"]
        given = {
            "owner": owners[0],
            "effective_from": values["effective_from"],
            "certificate": calibrations.Certificate(
                certificate=certificates.keep(upload) if upload else "",
                remarks=values["reason"],
                **{name: values[name] for name in CERTIFICATE},
            ),
            "by": request.user,
            "at": timezone.now(),
        }
        if values["runs"]:
            count: Literal[1, 2, 3] = values["count"] or 1
            return calibrations.from_tow_runs(runs=values["runs"], pieces=count, **given)
        return calibrations.from_certificate(pieces=_pieces(filled.children["pieces"]), **given)

    def render_change_form(
        self, request: HttpRequest, context: dict[str, Any], **options: Any
    ) -> HttpResponse:
        """Add residuals, plot, and the comparison with the calibration before."""
        row = options.get("obj")
        if row is not None and row.pk is not None:
            context["residuals"] = residuals(row)
            context["plot"] = rating_plot(row)
            context["look_back"] = look_back(row) if row.stands else None
        return super().render_change_form(request, context, **options)


CERTIFICATE = (
    *("laboratory", "certificate_number", "lowest_velocity_ms", "highest_velocity_ms"),
    *("standard_error_ms", "uncertainty_percent", "outcome"),
)


def _pieces(rows: list[dict[str, Any]]) -> list[Piece]:
    """Give the pieces as the kernel wants them; one without an upper end runs on to the next."""
    rows = sorted(rows, key=lambda row: row["lowest_n"])
    starts = [*(row["lowest_n"] for row in rows[1:]), NO_END]
    return [
        Piece(
            row["a_ms"],
            row["b_m"],
            row["lowest_n"],
            end if row["highest_n"] is None else row["highest_n"],
        )
        for row, end in zip(rows, starts, strict=True)
    ]

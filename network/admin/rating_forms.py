"""The forms of a rating sheet: which gaugings, and a curve by fit, segments, table or weir."""

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from django import forms
from django.http import QueryDict
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.fields import DayInput, DecimalTextField
from network.models import Curve, CurvePoint, CurveSegment, Gauging
from network.queries import rating_sheet, typed_ratings
from network.queries.rating_points import Choice, Points
from network.queries.rating_sheet import Sheet
from network.queries.typed_ratings import Range

MOST_SEGMENTS, MOST_FITTED = 4, 3


def size(label: Any, **options: Any) -> DecimalTextField:
    """Return a field for a figure that is not negative."""
    return DecimalTextField(label=label, signed=False, **options)


def level(label: Any, **options: Any) -> DecimalTextField:
    """Return a field for a stage, which may lie below the station zero."""
    return DecimalTextField(label=label, required=False, **options)


class GaugingsForm(forms.Form):
    """Ask which gaugings may serve at all; what is said of each comes beside the form."""

    first_day = forms.DateField(label=_("gaugings from"), required=False, widget=DayInput)
    last_day = forms.DateField(label=_("gaugings to"), required=False, widget=DayInput)
    methods = forms.MultipleChoiceField(
        label=_("methods"),
        choices=Gauging.Method.choices,
        required=False,
        widget=forms.CheckboxSelectMultiple,
        help_text=_("None ticked: all."),
    )
    checked_only = forms.BooleanField(label=_("checked gaugings only"), required=False)

    def choice(self, answers: Mapping[int, str]) -> Choice:
        """Return the choice of gaugings."""
        told = self.cleaned_data
        return Choice(
            first_day=told["first_day"],
            last_day=told["last_day"],
            methods=frozenset(told["methods"]),
            checked_only=told["checked_only"],
            answers=answers,
        )


class VersionForm(forms.Form):
    """Ask for what every version says of itself; empty ends of the range follow the gaugings."""

    lowest_use_m = level(_("used from stage, m"))
    highest_use_m = level(_("used up to stage, m"))
    extrapolate_low_m = level(_("extrapolated down to, m"))
    extrapolate_high_m = level(_("extrapolated up to, m"))
    number = forms.CharField(label=_("rating version"), max_length=20, required=False)
    reason = forms.CharField(
        label=_("reason"), required=False, widget=forms.Textarea(attrs={"rows": 2})
    )

    @property
    def use(self) -> Range:
        """Return the range of use as typed."""
        told = self.cleaned_data
        return Range(
            told["lowest_use_m"],
            told["highest_use_m"],
            told["extrapolate_low_m"],
            told["extrapolate_high_m"],
        )


class FitForm(forms.Form):
    """Ask how many segments, and what of them is given."""

    segments = forms.TypedChoiceField(
        label=_("segments"), choices=[(n, n) for n in (1, 2, 3)], coerce=int, initial=1
    )
    zero_1_m = level(_("segment 1: h₀, m"), help_text=_("Left empty, it is searched."))
    break_1_m = level(_("segment 2: from stage, m"), help_text=_("Left empty, it is searched."))
    zero_2_m = level(_("segment 2: h₀, m"))
    break_2_m = level(_("segment 3: from stage, m"))
    zero_3_m = level(_("segment 3: h₀, m"))
    joints_may_gap = forms.BooleanField(
        label=_("the segments need not meet within 0.5 %"), required=False
    )

    def sheet(self, points: Points, use: Range) -> Sheet:
        """Fit."""
        told, n = self.cleaned_data, self.cleaned_data["segments"]
        choice = rating_sheet.FitChoice(
            zeros_m=tuple(told[f"zero_{k}_m"] for k in range(1, n + 1)),
            breaks_m=tuple(told[f"break_{k}_m"] for k in range(1, n)),
            must_meet=not told["joints_may_gap"],
        )
        return rating_sheet.fitted(
            points,
            choice,
            lowest_use_m=use.lowest_use_m,
            highest_use_m=use.highest_use_m,
            extrapolate=(use.extrapolate_low_m, use.extrapolate_high_m),
        )


class SegmentsForm(forms.Form):
    """Ask for segments as they are."""

    joints_may_gap = forms.BooleanField(
        label=_("the segments need not meet within 0.5 %"), required=False
    )

    def __init__(self, *args: Any, **options: Any) -> None:
        super().__init__(*args, **options)
        for n in range(1, MOST_SEGMENTS + 1):
            label = _t("segment %(n)d: ") % {"n": n}
            names = {"lower": _t("from stage, m"), "c": "C", "h0": _t("h₀, m"), "b": "b"}
            for name, what in names.items():
                signed = name in {"lower", "h0"}
                self.fields[f"{name}_{n}"] = DecimalTextField(
                    label=label + what, signed=signed, required=n == 1
                )
        self.order_fields([*(name for name in self.fields if "_" in name and name[-1].isdigit())])

    def clean(self) -> dict[str, Any]:
        """Ask for all four figures of a segment, or none."""
        told = super().clean() or {}
        for n in range(2, MOST_SEGMENTS + 1):
            row = {f"{name}_{n}": told.get(f"{name}_{n}") for name in ("lower", "c", "h0", "b")}
            if any(value is not None for value in row.values()):
                for name, value in row.items():
                    if value is None and name not in self.errors:
                        self.add_error(name, _t("A segment has all four figures, or none."))
        return told

    def sheet(self, points: Points, use: Range) -> Sheet:
        """Hold the gaugings against the segments."""
        told = self.cleaned_data
        rows = [
            tuple(told[f"{name}_{n}"] for name in ("lower", "c", "h0", "b"))
            for n in range(1, MOST_SEGMENTS + 1)
            if told[f"lower_{n}"] is not None
        ]
        return typed_ratings.of_segments(rows, points, use)

    @staticmethod
    def initial_of(rows: Sequence[CurveSegment]) -> dict[str, float]:
        """Return the fields of stored segments."""
        return {
            f"{name}_{n}": value
            for n, row in enumerate(rows, start=1)
            for name, value in (
                ("lower", row.lower_stage_m), ("c", row.c), ("h0", row.h0_m), ("b", row.b)
            )
        }  # fmt: skip


class TableForm(forms.Form):
    """Ask for a table, pasted or typed a line a stage."""

    rule = forms.ChoiceField(
        label=_("between the points"),
        choices=[
            (Curve.Form.TABLE_LOG, _("linear in ln Q against ln(h − h₀)")),
            (Curve.Form.TABLE_LINEAR, _("linear")),
        ],
    )
    h0_m = level(_("h₀, m"), help_text=_("Stage of zero flow, for the logarithmic rule."))
    rows = forms.CharField(
        label=_("stage, m, and flow, m³/s"),
        widget=forms.Textarea(attrs={"rows": 12, "placeholder": "0.50 0.12"}),
        help_text=_("A line each, rising; a blank, a tab or a semicolon between the two."),
    )

    def clean_rows(self) -> list[tuple[float, float]]:
        """Read the lines; name the first that cannot be read."""
        number = DecimalTextField()
        rows: list[tuple[float, float]] = []
        for n, line in enumerate(self.cleaned_data["rows"].splitlines(), start=1):
            cells = [cell for cell in re.split(r"[;\s]+", line.strip()) if cell]
            if not cells:
                continue
            try:
                stage_m, flow_m3s = (number.clean(cell) for cell in cells)
            except (ValueError, forms.ValidationError):
                text = _t("Line %(n)d is not a stage and a flow: “%(line)s”.")
                raise forms.ValidationError(text % {"n": n, "line": line}) from None
            rows.append((stage_m, flow_m3s))
        return rows

    def sheet(self, points: Points, use: Range) -> Sheet:
        """Hold the gaugings against the table."""
        told = self.cleaned_data
        return typed_ratings.of_table(
            told["rows"], points, use, rule=told["rule"], h0_m=told["h0_m"] or 0.0
        )

    @staticmethod
    def initial_of(rows: Sequence[CurvePoint]) -> str:
        """Return the text of a stored table."""
        return "\n".join(f"{row.stage_m:g} {row.flow_m3s:g}" for row in rows)


class WeirForm(forms.Form):
    """Ask for a thin-plate weir by ISO 1438."""

    kind = forms.ChoiceField(
        label=_("thin-plate weir"),
        choices=[("v-notch", _("V-notch")), ("rectangular", _("rectangular notch"))],
    )
    crest_stage_m = DecimalTextField(label=_("stage of the notch or the crest, m"))
    height_m = size(_("height of the notch or the crest above the bed, m"))
    channel_width_m = size(_("width of the approach channel, m"))
    angle_deg = size(_("angle of the V-notch, °"), required=False)
    notch_width_m = size(_("width of the rectangular notch, m"), required=False)

    def clean(self) -> dict[str, Any]:
        """Ask for what the kind needs."""
        told = super().clean() or {}
        needed = "angle_deg" if told.get("kind") == "v-notch" else "notch_width_m"
        if told.get(needed) is None and needed not in self.errors:
            self.add_error(needed, _t("This kind of weir needs it."))
        return told

    def sheet(self, points: Points, use: Range) -> Sheet:
        """Hold the gaugings against the weir's flow."""
        return typed_ratings.of_weir(points, use, **self.cleaned_data)


@dataclass(frozen=True)
class Way:
    """A way to a curve: its name in the address, its label and its form."""

    name: str
    label: Any
    form: type[Any]


WAYS = (
    Way("fit", _("fit to gaugings"), FitForm),
    Way("segments", _("type segments"), SegmentsForm),
    Way("table", _("type a table"), TableForm),
    Way("weir", _("thin-plate weir"), WeirForm),
)


def answers_of(sent: QueryDict) -> tuple[dict[int, str], dict[int, str]]:
    """Return what was said of each gauging: the reason for leaving it out, empty for used.

    The second dictionary names the gaugings that lack their reason, with the sentence.
    """
    answers, faults = {}, {}
    for key in sent.getlist("gauging"):
        if not key.isdigit():
            continue
        because = sent.get(f"because-{key}", "").strip()[:200]
        used = f"use-{key}" in sent
        answers[int(key)] = "" if used else because or "–"
        if not used and not because:
            faults[int(key)] = _t("A gauging is left out with a reason.")
    return answers, faults

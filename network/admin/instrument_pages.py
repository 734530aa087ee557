"""What an instrument's page says: where it is, when it is due, its history, what it measured."""

from dataclasses import dataclass
from typing import Any

from django import forms
from django.urls import NoReverseMatch, reverse
from django.utils import timezone
from django.utils.translation import gettext as _t
from django.utils.translation import gettext_lazy as _

from network.admin.verbs import Verb
from network.models import Instrument, MeterPair
from network.queries import clock, instruments, working_rules
from network.queries.instruments import CalibrationDue
from network.services import instruments as acts

SHOWN = 20


@dataclass(frozen=True)
class Due:
    """A calibration due, with whether it is late today."""

    due: CalibrationDue
    overdue: bool

    def __getattr__(self, name: str) -> Any:
        return getattr(self.due, name)


class StatusForm(forms.Form):
    """The new status, and why."""

    status = forms.ChoiceField(label=_("status"), choices=Instrument.Status.choices)
    reason = forms.CharField(
        label=_("reason"), required=False, widget=forms.Textarea(attrs={"rows": 2})
    )


STATUS_VERB = Verb(
    name="status",
    label=_("change status"),
    permission="network.change_instrument",
    form=StatusForm,
    run=lambda row, **filled: acts.change_status(instrument=row, **filled),
)


def about(instrument: Instrument) -> dict[str, Any]:
    """Return the context of the page of an instrument."""
    now = timezone.now()
    pairs = list(instruments.pairs_of(instrument))
    lists = (
        (_t("Calibrations"), instruments.calibrations_of(instrument), "calibration"),
        (_t("Gaugings made with it"), instruments.gaugings_with(instrument), "gauging"),
        (_t("Visits it was taken along to"), instruments.visits_with(instrument), "visit"),
    )
    return {
        "about": {
            "place": instruments.standing_place(instrument, now),
            "dues": list(_dues(instrument, pairs)),
            "lists": [
                (title, [(_address(kind, row.pk), _text(row)) for row in rows[:SHOWN]])
                for title, rows, kind in lists
            ],
        }
    }


def _dues(instrument: Instrument, pairs: list[MeterPair]) -> Any:
    now = timezone.now()
    today, rules = clock.record_day(now, of=clock.agency()), working_rules.rules()
    for pair in pairs:
        due = instruments.pair_due(pair, now, of=rules)
        yield pair, Due(due, due.is_due(today))
    if not pairs:
        due = instruments.instrument_due(instrument, now)
        if due.last or due.months:
            yield None, Due(due, due.is_due(today))


def _text(row: Any) -> str:
    withdrawn = getattr(row, "withdrawn_at", None) is not None
    return f"{row} ({_t('withdrawn')})" if withdrawn else str(row)


def _address(kind: str, key: int) -> str:
    try:
        return reverse(f"admin:network_{kind}_change", args=[key])
    except NoReverseMatch:  # this noun has no page of its own
        return ""

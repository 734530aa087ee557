"""Why an item is due, in words: what was done last, how long ago, and how often it is wanted."""

from datetime import date

from django.utils.translation import gettext as _
from django.utils.translation import ngettext

from network.models import Gauging
from network.numerics.due_dates import whole_months
from network.queries.work_due.items import Item, Kind


def reason(item: Item, *, today: date) -> str:
    """Return the sentence for an item, without its last full stop."""
    return _SENTENCES[item.kind](item, today)


def days_text(days: int) -> str:
    """Return "1 day" or "42 days"."""
    return ngettext("%(n)d day", "%(n)d days", days) % {"n": days}


def months_text(months: int) -> str:
    """Return "1 month" or "41 months"."""
    return ngettext("%(n)d month", "%(n)d months", months) % {"n": months}


def _visit(item: Item, today: date) -> str:
    if item.since is None:
        return _("no routine visit yet; every %(every)d days") % {"every": item.every}
    ago = {"ago": days_text((today - item.since).days), "every": item.every}
    return _("last routine visit %(ago)s ago; every %(every)d") % ago


def _levels(item: Item, today: date) -> str:
    if item.since is None:
        return _("no level check yet; every %(every)d months") % {"every": item.every}
    ago = {"ago": months_text(whole_months(item.since, today)), "every": item.every}
    return _("last level check %(ago)s ago; every %(every)d") % ago


def _gauging(item: Item, today: date) -> str:
    if item.since is None:
        return _("no gauging yet; %(every)d a year wanted") % {"every": item.every}
    ago = {"ago": days_text((today - item.since).days), "every": item.every}
    return _("last gauging %(ago)s ago; %(every)d a year wanted") % ago


def _silence(item: Item, today: date) -> str:
    if item.since is None:
        return _("no readings yet; expected every %(every)d days") % {"every": item.every}
    ago = {"ago": days_text((today - item.since).days), "every": item.every}
    return _("last reading %(ago)s ago; expected every %(every)d") % ago


def _review(item: Item, today: date) -> str:
    waits = days_text((today - item.due_on).days + (item.every or 0))
    if item.since is None:
        return _("never reviewed; the record has waited for %(waits)s") % {"waits": waits}
    said = {"day": item.since.isoformat(), "waits": waits, "every": item.every}
    return _("reviewed through %(day)s, %(waits)s ago; every %(every)d") % said


def _calibration(item: Item, today: date) -> str:
    if item.since is None:
        return _("never calibrated")
    if len(item.facts) > 2:
        said = {"hours": item.facts[2], "every": item.every}
        return _("%(hours).0f hours of use since the calibration; every %(every)d") % said
    ago = {"ago": months_text(whole_months(item.since, today)), "every": item.every}
    return _("calibrated %(ago)s ago; every %(every)d") % ago


def _safety(item: Item, today: date) -> str:
    kind, label, is_safe = item.facts
    said = {"what": f"{kind.label} {label}", "every": item.every}
    if item.since is None:
        return _("%(what)s: never inspected; every %(every)d months") % said
    if not is_safe:
        return _("%(what)s: found unsafe on %(day)s, not inspected since") % {
            **said,
            "day": item.since.isoformat(),
        }
    ago = months_text(whole_months(item.since, today))
    return _("%(what)s: last inspection %(ago)s ago; every %(every)d") % {**said, "ago": ago}


def _open(item: Item, today: date) -> str:
    assert item.since is not None
    said = {
        "day": item.since.isoformat(),
        "ago": days_text((today - item.since).days),
        "every": item.every,
    }
    if item.kind == Kind.VISIT_OPEN:
        return _("visit of %(day)s not checked for %(ago)s; within %(every)d") % said
    if item.kind == Kind.LEVELS_OPEN:
        return _("level check of %(day)s not checked for %(ago)s; within %(every)d") % said
    if item.facts[0] == Gauging.State.DRAFT:
        return _("gauging of %(day)s not signed for %(ago)s; within %(every)d") % said
    return _("gauging of %(day)s signed, not checked for %(ago)s; within %(every)d") % said


def _left(item: Item, today: date) -> str:
    assert item.since is not None
    said = {"text": item.facts[0], "day": item.since.isoformat()}
    return _("left at the visit of %(day)s: %(text)s") % said


def _doubt(item: Item, today: date) -> str:
    apart = ", ".join(f"{deviation:+.0f} %" for deviation in item.facts).replace("-", "−")
    said = {"n": item.every, "apart": apart}
    return _("the last %(n)d gaugings lie on one side, beyond their uncertainty: %(apart)s") % said


_SENTENCES = {
    Kind.SAFETY: _safety,
    Kind.SILENCE: _silence,
    Kind.VISIT: _visit,
    Kind.GAUGING: _gauging,
    Kind.LEVELS: _levels,
    Kind.CALIBRATION: _calibration,
    Kind.INSTRUMENT: _calibration,
    Kind.DOUBT: _doubt,
    Kind.REVIEW: _review,
    Kind.VISIT_OPEN: _open,
    Kind.GAUGING_OPEN: _open,
    Kind.LEVELS_OPEN: _open,
    Kind.LEFT: _left,
}

"""Reviews of a record and findings of the screening that were looked at and let stand."""

from datetime import date, datetime
from typing import get_args

from django.utils.translation import gettext as _

from network.models import Dismissal, Person, RecordReview, Series, Station
from network.numerics.records.screening_findings import Kind
from network.queries import clock
from network.services.acts import Refusal, lock_station, open_act, required_reason, withdraw

# No published figure depends on these rows, so none of these acts raises the record version.


def dismiss_finding(
    *,
    series: Series,
    finding: str,
    start_at: datetime,
    end_at: datetime,
    reason: str,
    by: Person,
    at: datetime,
) -> Dismissal:
    """Let a finding of the screening stand as it is, with the reason."""
    if finding not in get_args(Kind):
        raise Refusal(_("There is no finding of this kind."), field="finding")
    if end_at < start_at:
        raise Refusal(_("The period does not end before it starts."), field="end_at")
    with open_act(
        _("dismiss finding"), by=by, at=at, reason=reason.strip(), station=series.station
    ):
        row = Dismissal(
            series=series,
            finding=finding,
            start_at=start_at,
            end_at=end_at,
            reason=required_reason(reason),
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        row.save()
    return row


def withdraw_dismissal(*, dismissal: Dismissal, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a dismissal; the finding is shown again."""
    station = dismissal.series.station
    with open_act(_("withdraw dismissal"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = Dismissal.objects.get(pk=dismissal.pk)
        withdraw(row, by=by, at=at, reason=reason)


def review_record(
    *, station: Station, reviewed_through: date, by: Person, at: datetime, remarks: str = ""
) -> RecordReview:
    """State that the record was reviewed up to and including a day that is over."""
    if reviewed_through >= clock.record_day(at, of=clock.agency()):
        raise Refusal(_("Only days that are over can be reviewed."), field="reviewed_through")
    with open_act(_("review record"), by=by, at=at, reason=remarks.strip(), station=station):
        lock_station(station)
        latest = RecordReview.objects.standing().filter(station=station).first()
        if latest is not None and latest.reviewed_through >= reviewed_through:
            raise Refusal(
                _("The record is already reviewed through %(day)s.")
                % {"day": latest.reviewed_through},
                field="reviewed_through",
            )
        row = RecordReview(
            station=station,
            reviewed_through=reviewed_through,
            remarks=remarks.strip(),
            recorded_at=at,
            recorded_by=by,
        )
        row.full_clean()
        row.save()
    return row


def withdraw_review(*, review: RecordReview, by: Person, at: datetime, reason: str) -> None:
    """Withdraw a review; the days after the one before it are unreviewed again."""
    station = review.station
    with open_act(_("withdraw review"), by=by, at=at, reason=reason.strip(), station=station):
        lock_station(station)
        row = RecordReview.objects.get(pk=review.pk)
        withdraw(row, by=by, at=at, reason=reason)

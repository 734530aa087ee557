"""Turn what recorder checks propose into corrections that wait to be accepted."""

from datetime import datetime

from django.utils.translation import gettext as _

from network.models import Correction, Person, Series, Visit
from network.queries import recorder_checks
from network.queries.sentences import said
from network.services.acts import open_act
from network.services.corrections import propose_correction


def propose_from_checks(*, series: Series, by: Person, at: datetime) -> list[Correction]:
    """Propose a correction for each span between checks that has none yet; none is applied."""
    verb = _("proposed corrections from recorder checks")
    with open_act(verb, by=by, at=at, station=series.station):
        return [
            propose_correction(
                series=series,
                start_at=row.start_at,
                end_at=row.end_at,
                start_offset_m=row.correction.start_offset_m,
                end_offset_m=row.correction.end_offset_m,
                reason=said(row.correction.sentence),
                by=by,
                at=at,
                recorder_check=row.check,
            )
            for row in recorder_checks.open_proposals(series)
        ]


def propose_from_visit(*, visit: Visit, by: Person, at: datetime) -> list[Correction]:
    """Propose what the recorder checks of a visit, and those before them, still leave open."""
    series = Series.objects.filter(recorder_checks__visit=visit).distinct()
    return [row for one in series for row in propose_from_checks(series=one, by=by, at=at)]

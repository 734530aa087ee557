"""What a benchmark of ratings measures side by side: before and after, against the chain itself."""

from collections.abc import Callable, Mapping

from network.models import Person, RatingPeriod, Station
from network.queries import flows, station_years
from network.services import ratings, trial


def works(station: Station) -> Mapping[str, Callable[[], object]]:
    """Return a shift tried over the whole record, and twice the days of it from the database.

    The station has a rating in force and readings; nothing is written.
    """
    years, calendar = station_years.years_on_record(station), station_years.calendar()
    span = calendar.first_day(years[0]), calendar.last_day(years[-1])
    period = RatingPeriod.objects.standing().filter(station=station).earliest("effective_from")
    by = Person.objects.earliest("pk")

    def shift() -> None:
        ratings.add_shift_table(
            period=period,
            effective_from=period.effective_from,
            points=[(0.0, 0.02)],
            by=by,
            at=period.effective_from,
            reason="benchmark",
        )

    return {
        "trial": lambda: trial.before_and_after(station, shift),
        "twice": lambda: [flows.days_of(station, *span) for _side in range(2)],
    }

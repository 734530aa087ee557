"""Estimates for days without a record, each by its stated method."""

from collections.abc import Callable
from contextlib import suppress
from dataclasses import dataclass
from datetime import date, timedelta

import numpy as np
import numpy.typing as npt

from network.models import Infill, Station
from network.numerics.arrays import Floats
from network.numerics.years import infill
from network.queries.station_inputs import InfillSpan


@dataclass(frozen=True, eq=False)
class CommonDays:
    """Daily flows of a station and its neighbour on the same days from first_day on."""

    first_day: date
    flow_m3s: Floats
    neighbour_m3s: Floats

    @classmethod
    def none(cls) -> "CommonDays":
        """Return common days where there are none."""
        return cls(date(1970, 1, 1), np.empty(0), np.empty(0))


@dataclass(frozen=True, eq=False)
class Estimator:
    """One infill and what it may draw on; costly records are functions, asked only when needed."""

    station: Station
    span: InfillSpan
    days: npt.NDArray[np.datetime64]
    flow_m3s: Floats
    open_water_m3s: Callable[[], Floats]
    other_series_m3s: Callable[[], Floats]
    gauged: tuple[Floats, Floats]
    neighbour_days: Callable[[Station, Station], CommonDays]

    def estimate(self) -> Floats:
        """Return the estimated flows, one a day, NaN outside the infill or where it gives none.

        A method that the record no longer carries gives none: the days stay missing.
        """
        inside = self._inside()
        estimate = np.full(len(self.days), np.nan)
        with suppress(infill.InfillRefused):
            estimate[inside] = self._by_method()[inside]
        return estimate

    def _inside(self) -> npt.NDArray[np.bool_]:
        first, last = (np.datetime64(day) for day in (self.span.first_day, self.span.last_day))
        return (self.days >= first) & (self.days <= last)

    def _by_method(self) -> Floats:
        match self.span.method:
            case Infill.Method.LINE | Infill.Method.RECESSION:
                return self._between_ends()
            case Infill.Method.OTHER_SERIES:
                return self.other_series_m3s()
            case Infill.Method.NEIGHBOUR:
                return self._from_neighbour()
            case _:
                return self._winter()

    def _between_ends(self) -> Floats:
        """Join the days before and after; a gap at the end of the record gets no estimate."""
        inside = np.flatnonzero(self._inside())
        before, after = int(inside[0]) - 1, int(inside[-1]) + 1
        ends = self.flow_m3s[[before, after]]
        estimate = np.full(len(self.days), np.nan)
        if np.isnan(ends).any():
            return estimate
        method = (
            infill.straight_line if self.span.method == Infill.Method.LINE else infill.recession
        )
        estimate[inside] = method(
            inside.astype(np.float64),
            before=(float(before), float(ends[0])),
            after=(float(after), float(ends[1])),
        ).flow_m3s
        return estimate

    def _from_neighbour(self) -> Floats:
        assert self.span.neighbour is not None  # by constraint
        common = self.neighbour_days(self.station, self.span.neighbour)
        regression = infill.neighbour_regression(common.flow_m3s, common.neighbour_m3s)
        whole = infill.from_neighbour(
            common.neighbour_m3s, regression, neighbour=self.span.neighbour.name
        ).flow_m3s
        estimate = np.full(len(self.days), np.nan)
        at = (self.days - np.datetime64(common.first_day)).astype(int)
        known = (at >= 0) & (at < len(whole))
        estimate[known] = whole[at[known]]
        return estimate

    def _winter(self) -> Floats:
        """Carry the ratio between the gaugings of the period, held before the first and after."""
        first, last = (
            (day - self.days[0].astype(date)).days
            for day in (self.span.first_day, self.span.last_day + timedelta(days=1))
        )
        times, ratios = self.gauged
        inside = (times > first) & (times < last)
        if not inside.any():
            return np.full(len(self.days), np.nan)
        held = ratios[inside]
        return infill.winter_ratio(
            np.arange(len(self.days), dtype=np.float64) + 0.5,  # the middle of each day
            self.open_water_m3s(),
            gauged_times=np.array([first, *times[inside], last], np.float64),
            ratios=np.array([held[0], *held, held[-1]]),
        ).flow_m3s

"""Two invented station years as finished content: one of flow with floods and ice, one of stage.

The numbers are synthetic (a fixed seed), the names invented; nothing here stands for a real place.
"""

from datetime import date, datetime, timedelta, timezone

import numpy as np
from django.utils import translation

from network.numerics.marks import Mark
from reports import notes
from reports import particulars as p
from reports import yearbook as y
from reports.figures import inputs
from reports.printed import NO_NUMBER, RECORDED, Event, Number, to_decimals, to_figures

CLOCK = timezone(timedelta(hours=1))
FIRST, LAST = date(2019, 10, 1), date(2020, 9, 30)
DAYS = np.arange(np.datetime64(FIRST), np.datetime64(LAST) + 1)
C, H0, B = 14.2, 0.18, 1.72


def at(text: str) -> datetime:
    """Return an instant of the record clock."""
    return datetime.fromisoformat(text).replace(tzinfo=CLOCK)


def day_index(text: str) -> int:
    """Return the place of a day in the year."""
    return int((np.datetime64(text) - DAYS[0]).astype(int))


def synthetic_flow(seed: int) -> np.ndarray:
    """Return 366 daily flows in m³/s: a season, recessions, and storms that rise in a day."""
    rng = np.random.default_rng(seed)
    n = len(DAYS)
    season = 2.6 + 1.7 * np.cos(2 * np.pi * (np.arange(n) - 165) / 366)
    store, flows = 2.0, []
    for base in season:
        storm = rng.gamma(0.9, 9.0) if rng.random() < 0.07 else 0.0
        store = store * 0.84 + storm
        flows.append(base * np.exp(rng.normal(0, 0.03)) + store)
    return np.array(flows) * np.exp(rng.normal(0, 0.25))


def stage_of(flow_m3s: np.ndarray) -> np.ndarray:
    """Return the stage in m of a flow by the sample's rating."""
    return H0 + (flow_m3s / C) ** (1 / B)


class Sample:
    """Builds one sample; ``sign`` and ``language`` as the agency would have them."""

    def __init__(self, *, language: str = "en", stage_only: bool = False) -> None:
        self.language = language
        self.sign = "," if language == "de" else "."
        self.stage_only = stage_only
        self.flow = synthetic_flow(3)
        self.flow[day_index("2020-02-03") : day_index("2020-02-06")] *= [4.2, 6.1, 2.6]
        self.marks = [RECORDED] * len(DAYS)
        self._mark("2020-01-10", "2020-01-24", Mark.ESTIMATED | Mark.ICE_OR_BACKWATER)
        self._mark("2020-02-04", "2020-02-04", Mark.EXTRAPOLATED)
        self._mark("2020-06-08", "2020-06-12", Mark.MISSING)
        self._mark("2020-06-07", "2020-06-07", Mark.PARTIAL)
        self._mark("2020-06-13", "2020-06-15", Mark.ESTIMATED)
        self._mark("2020-08-02", "2020-08-02", Mark.TYPED)
        self.flow[[Mark.MISSING in mark for mark in self.marks]] = np.nan
        self.value = stage_of(self.flow) if stage_only else self.flow
        years = np.array([synthetic_flow(seed) for seed in range(100, 120)])
        self.earlier = stage_of(years) if stage_only else years

    def _mark(self, first: str, last: str, mark: Mark) -> None:
        for index in range(day_index(first), day_index(last) + 1):
            self.marks[index] |= mark

    def m(self, value: float | None, decimals: int = 3, *, plus: bool = False) -> Number:
        return to_decimals(value, decimals, decimal_sign=self.sign, plus=plus)

    def q(self, value: float | None, marks: Mark = RECORDED, *, at_least: bool = False) -> Number:
        """Return a daily value as the station prints it: flow to 3 figures, stage to the cm."""
        if value is not None and np.isnan(value):
            return Number(marks=marks)
        if self.stage_only:
            return to_decimals(value, 2, decimal_sign=self.sign, marks=marks)
        return to_figures(value, decimal_sign=self.sign, marks=marks, at_least=at_least)

    def month(self, first: np.datetime64) -> y.Month:
        here = np.flatnonzero(DAYS.astype("datetime64[M]") == first.astype("datetime64[M]"))
        values, start = self.value[here], first.astype(object)
        whole = not np.isnan(values).any()
        high, low = int(np.nanargmax(values)), int(np.nanargmin(values))
        earlier = self.earlier[:, here]
        top = np.unravel_index(earlier.argmax(), earlier.shape)
        bottom = np.unravel_index(earlier.argmin(), earlier.shape)
        volume = values.sum() * 0.0864 if whole and not self.stage_only else None
        return y.Month(
            first=start,
            cells=tuple(self.q(self.value[i], self.marks[i]) for i in here),
            mean=self.q(values.mean()) if whole else NO_NUMBER,
            highest=Event(
                self.q(values[high], RECORDED if whole else Mark.PARTIAL),
                start + timedelta(days=high),
            ),
            lowest=Event(self.q(values[low]), start + timedelta(days=low))
            if whole
            else Event(NO_NUMBER),
            volume_hm3=to_figures(volume, decimal_sign=self.sign),
            runoff_mm=to_figures(volume and volume * 1000 / 214, decimal_sign=self.sign),
            earlier_mean=self.q(earlier.mean()),
            earlier_highest=Event(self.q(earlier.max()), date(1999 + int(top[0]), start.month, 1)),
            earlier_lowest=Event(
                self.q(earlier.min()), date(1999 + int(bottom[0]), start.month, 1)
            ),
        )

    def year_figures(self, values: np.ndarray, days: list[date]) -> y.YearFigures:
        """Return the figures of one or several whole years; gaps leave only the highest."""
        whole = not np.isnan(values).any()
        high, low = int(np.nanargmax(values)), int(np.nanargmin(values))
        seven = np.convolve(values, np.full(7, 1 / 7), "valid")
        volume = values.mean() * 366 * 0.0864 if whole and not self.stage_only else None
        return y.YearFigures(
            mean=self.q(values.mean()) if whole else NO_NUMBER,
            highest_day=Event(self.q(values[high], at_least=not whole), days[high]),
            lowest_day=Event(self.q(values[low]), days[low]) if whole else Event(NO_NUMBER),
            lowest_seven_days=Event(self.q(seven.min()), days[int(seven.argmin()) + 6])
            if whole
            else Event(NO_NUMBER),
            volume_hm3=to_figures(volume, decimal_sign=self.sign),
            runoff_mm=to_figures(volume and volume * 1000 / 214, decimal_sign=self.sign),
            specific_ls_km2=to_figures(
                values.mean() * 1000 / 214 if volume else None, decimal_sign=self.sign
            ),
        )

    def extreme(self, flow_m3s: float, when: datetime | date, *, at_least: bool = False):
        stage = self.m(float(stage_of(np.array(flow_m3s))))
        flow = NO_NUMBER
        if not self.stage_only:
            flow = to_figures(flow_m3s, decimal_sign=self.sign, at_least=at_least)
        return y.Extreme(stage_m=stage, flow_m3s=flow, at=when)

    def daily(self) -> y.DailyTable:
        days = [day.astype(object) for day in DAYS]
        earlier_days = [
            day.replace(year=day.year - 20 + k, day=min(day.day, 28))
            for k in range(20)
            for day in days
        ]
        known = self.value[~np.isnan(self.value)]
        percents = (5, 10, 25, 50, 75, 90, 95, 99)
        return y.DailyTable(
            months=tuple(
                self.month(month) for month in np.unique(DAYS.astype("datetime64[M]"))[:12]
            ),
            year=self.year_figures(self.value, days),
            earlier=self.year_figures(self.earlier.ravel(), earlier_days),
            earlier_years="1999–2018",
            earlier_count=20,
            leap_years=5,
            extremes=y.Extremes(
                year_highest=self.extreme(83.4, at("2020-02-04 05:45"), at_least=True),
                year_lowest=self.extreme(0.871, at("2020-08-29 18:15")),
                record_highest=self.extreme(141.0, at("2005-08-23 02:30")),
                record_lowest=self.extreme(0.392, date(2003, 8, 29)),
                record_since="1961",
            ),
            duration=tuple(
                y.DurationRow(
                    percent=percent,
                    value=self.q(float(np.percentile(known, 100 - percent))),
                    earlier=self.q(float(np.percentile(self.earlier, 100 - percent))),
                )
                for percent in percents
            ),
        )

    def earlier_range(self) -> inputs.EarlierRange:
        low, q1, middle, q3, high = np.percentile(self.earlier, (0, 25, 50, 75, 100), axis=0)
        return inputs.EarlierRange(
            years="1999–2018",
            count=20,
            lowest=low,
            lower_quartile=q1,
            median=middle,
            upper_quartile=q3,
            highest=high,
        )

    def figures(self) -> y.Figures:
        estimated = np.array([bool(mark & (Mark.ESTIMATED | Mark.TYPED)) for mark in self.marks])
        stage = stage_of(self.flow)
        known = np.sort(self.value[~np.isnan(self.value)])[::-1]
        before = np.sort(self.earlier.ravel())[::-1][::20]
        read_at = np.array([np.datetime64(v.arrived.replace(tzinfo=None)) for v in self.visits()])
        flow_only = not self.stage_only
        return y.Figures(
            stage=inputs.StageYear(
                days=DAYS,
                mean_m=stage,
                lowest_m=stage * 0.96,
                highest_m=stage * 1.09,
                estimated=estimated,
                earlier=None if flow_only else self.earlier_range(),
                read_at=read_at,
                read_m=np.array([v.stage_m.value for v in self.visits()]),
            ),
            duration=inputs.DurationCurves(
                percent=np.arange(1, known.size + 1) / (known.size + 1) * 100,
                value=known,
                earlier_percent=np.arange(1, before.size + 1) / (before.size + 1) * 100,
                earlier_value=before,
                earlier_years="1999–2018",
                of_stage=self.stage_only,
            ),
            sketch=inputs.LocationSketch(
                station=inputs.Place(name="Aldermere", latitude=47.412, longitude=12.884),
                neighbours=(
                    inputs.Place(name="Upper Fenwater", latitude=47.298, longitude=12.801),
                    inputs.Place(name="Quarry Weir", latitude=47.455, longitude=13.021),
                    inputs.Place(name="Sorrel Bridge", latitude=47.521, longitude=12.772),
                ),
            ),
            plates=inputs.PlateStack(
                plates=tuple(
                    inputs.PlateBar(label=f"P{k + 1}", lowest_m=0.9 * k, highest_m=0.9 * k + 1.0)
                    for k in range(4)
                ),
                year_lowest_m=0.38,
                year_highest_m=2.98,
                cease_to_flow_m=np.nan if self.stage_only else H0,
            ),
            flow=self.flow_year(estimated) if flow_only else None,
            rating=self.rating_sheet() if flow_only else None,
        )

    def flow_year(self, estimated: np.ndarray) -> inputs.FlowYear:
        gaugings = self.gaugings()
        return inputs.FlowYear(
            days=DAYS,
            flow_m3s=self.flow,
            estimated=estimated,
            earlier=self.earlier_range(),
            gauged_at=np.array([np.datetime64(g.at.replace(tzinfo=None)) for g in gaugings]),
            gauged_m3s=np.array([g.flow_m3s.value for g in gaugings]),
        )

    def rating_sheet(self) -> inputs.RatingSheet:
        rng = np.random.default_rng(5)
        stage = np.geomspace(0.3, 3.2, 60)
        flow = C * (stage - H0) ** B
        old_stage = rng.uniform(0.35, 2.1, 26)
        old = C * (old_stage - H0) ** B * np.exp(rng.normal(0, 0.04, 26))
        new = self.gaugings()
        second = C * 0.93 * (stage - H0 - 0.03) ** B
        return inputs.RatingSheet(
            curves=(
                inputs.RatingCurve(
                    label="Rating 7",
                    stage_m=stage,
                    flow_m3s=flow,
                    lower_m3s=flow * 0.96,
                    upper_m3s=flow * 1.04,
                    extrapolated=stage > 2.4,
                ),
                inputs.RatingCurve(
                    label="Rating 8",
                    stage_m=stage,
                    flow_m3s=second,
                    lower_m3s=second * 0.95,
                    upper_m3s=second * 1.05,
                    extrapolated=stage > 2.4,
                ),
            ),
            gauged_stage_m=np.append(old_stage, [g.stage_m.value for g in new]),
            gauged_m3s=np.append(old, [g.flow_m3s.value for g in new]),
            gauged_u95_percent=np.append(np.full(26, 6.0), [g.u95_percent.value for g in new]),
            in_year=np.arange(26 + len(new)) >= 26,
            numbers=tuple(str(n) for n in range(200, 226)) + tuple(g.number for g in new),
        )

    def on(self, when: str) -> float:
        """Return the flow of a day, one where it is missing."""
        return float(np.nan_to_num(self.flow[day_index(when[:10])], nan=1.0))

    def gaugings(self) -> tuple[p.Gauging, ...]:
        rows = (
            ("226", "2019-10-22 10:40", "wading", 5.8, "7", -1.2, ""),
            ("227", "2019-12-03 11:15", "wading", 5.5, "7", 2.6, ""),
            ("228", "2020-02-04 14:20", "cableway", 6.2, "7", 2.9, "falling stage"),
            ("229", "2020-02-07 09:50", "cableway", 5.4, "7", -1.0, ""),
            ("230", "2020-04-21 13:05", "wading", 5.6, "8", 1.8, ""),
            ("231", "2020-07-14 10:30", "wading", 6.4, "8", -3.4, "weed cut before"),
            ("232", "2020-09-08 15:10", "wading", 7.1, "8", 0.9, ""),
        )
        return tuple(
            p.Gauging(
                number=number,
                at=at(when),
                method=method,
                party="Ilva Torn, R. Maes",
                stage_m=self.m(float(stage_of(np.array(self.on(when))))),
                area_m2=to_figures(flow / 0.62, decimal_sign=self.sign),
                velocity_ms=self.m(0.62, 2),
                flow_m3s=to_figures(flow, decimal_sign=self.sign),
                u95_percent=self.m(u95, 1),
                rating=rating,
                deviation_percent=self.m(deviation, 1, plus=True),
                remark=remark,
            )
            for number, when, method, u95, rating, deviation, remark in rows
            for flow in [self.on(when) * (1 + deviation / 100)]
        )

    def visits(self) -> tuple[p.Visit, ...]:
        rows = (
            ("2019-10-22 09:50", "gauging, download", "clear", ""),
            ("2019-12-03 10:30", "gauging, download", "clear", ""),
            ("2020-01-15 11:20", "inspection", "ice", "ice along both banks, hole cut"),
            ("2020-02-04 12:10", "flood gauging", "clear", "drift wood, stopped at dusk"),
            ("2020-02-07 09:00", "gauging, download", "scoured", "bed lower below the sill"),
            ("2020-04-21 12:20", "gauging, level check", "clear", ""),
            ("2020-06-16 08:40", "repair", "clear", "battery replaced, recorder restarted"),
            ("2020-07-14 09:30", "gauging, weed cutting", "weed", ""),
            ("2020-09-08 14:20", "gauging, download", "clear", ""),
        )
        return tuple(
            p.Visit(
                arrived=at(when),
                party="Ilva Torn, R. Maes",
                purposes=purposes,
                stage_m=self.m(float(stage_of(np.array(self.on(when))))),
                control=control,
                remark=remark,
            )
            for when, purposes, control, remark in rows
        )

    def ratings(self) -> tuple[p.Rating, ...]:
        def rating(label: str, since: str, until: str | None, h0: float, c: float, reason: str):
            return p.Rating(
                label=label,
                since=at(since),
                until=at(until) if until else None,
                use_lowest_m=self.m(0.3, 2),
                use_highest_m=self.m(3.2, 2),
                gauged_lowest_m=self.m(0.34, 2),
                gauged_highest_m=self.m(2.4, 2),
                gaugings=33,
                standard_error_percent=self.m(3.9, 1),
                segments=(
                    p.Segment(
                        from_stage_m=self.m(h0, 2),
                        coefficient=self.m(c, 2),
                        zero_flow_m=self.m(h0, 2),
                        exponent=self.m(B, 2),
                    ),
                ),
                reason=reason,
            )

        return (
            rating("Rating 7", "2016-03-11 12:00", "2020-02-04 18:00", H0, C, "new sill"),
            rating("Rating 8", "2020-02-04 18:00", None, H0 + 0.03, C * 0.93, "bed scoured"),
        )

    def completeness(self) -> tuple[y.CompletenessRow, ...]:
        months = DAYS.astype("datetime64[M]")
        rows = []
        for mark in (RECORDED, *Mark):
            bears = np.array([m == RECORDED if mark == RECORDED else mark in m for m in self.marks])
            days = tuple(int(bears[months == month].sum()) for month in np.unique(months))
            if any(days):
                rows.append(y.CompletenessRow(mark=mark, days=days, year=sum(days)))
        return tuple(rows)

    def facts(self) -> notes.Facts:
        ice = notes.Spell(
            first=date(2020, 1, 10),
            last=date(2020, 1, 24),
            cause="ice",
            method="winter ratio",
            percent=self.m(25, 0),
        )
        gap = notes.Spell(first=date(2020, 6, 8), last=date(2020, 6, 12), cause="battery")
        flow_only = not self.stage_only
        return notes.Facts(
            days=366,
            stage_only=self.stage_only,
            missing=(gap,),
            estimated=(ice, notes.Spell(first=date(2020, 6, 13), last=date(2020, 6, 15))),
            partial_days=1,
            extrapolated_days=1,
            extrapolated_volume_percent=self.m(1.9, 1),
            ratings=(
                notes.RatingUse(label="Rating 7", first=FIRST, last=date(2020, 2, 4)),
                notes.RatingUse(label="Rating 8", first=date(2020, 2, 4), last=LAST),
            ),
            highest_stage_m=self.m(2.979),
            highest_gauged_m=self.m(2.4, 2),
            gaugings=7 if flow_only else 0,
            lowest_deviation_percent=self.m(-3.4, 1, plus=True),
            highest_deviation_percent=self.m(2.9, 1, plus=True),
            corrections=1,
            printed_notes=("The mill took in no water in July 2020.",),
        )

    def build(self, edition: p.Edition | None = None) -> y.Yearbook:
        flow_only = not self.stage_only
        return y.Yearbook(
            language=self.language,
            agency=p.Agency(
                name="Water Office of the Sample Uplands",
                address="4 Mill Lane, Aldermere",
                licence="Free to use when the source is named.",
                decimal_sign=self.sign,
                record_clock=CLOCK,
                record_clock_text="UTC+01:00",
                day_starts_at=0,
            ),
            year=p.WaterYear(label="2019/20", first=FIRST, last=LAST),
            edition=edition
            or p.Edition(
                number=2,
                compiled_on=date(2021, 3, 1),
                issued_on=date(2021, 3, 12),
                issued_by="Marta Quill",
                supersedes="rating 8 extended to 3.20 m after the survey of the sill.",
                open_points=(
                    p.OpenPoint(
                        text="The visit of 16 June 2020 is not checked.",
                        reason="it read no stage that the record rests on.",
                    ),
                ),
            ),
            station=p.Station(
                code="FEN-031",
                name="Aldermere",
                river="Fenwater",
                basin="Great Sorrel",
                latitude=47.412,
                longitude=12.884,
                coordinates="47.4120° N, 12.8840° E",
                catchment_km2=Number(214.0, "214"),
                stage_only=self.stage_only,
                open_periods=((date(1961, 11, 1), None),),
                office="Aldermere",
                control="Concrete sill 30 m below the gauge; above 1.8 m the channel controls.",
                regulation="Mill intake 2 km upstream, up to 0.2 m³/s, returned above the gauge.",
                description="Left bank, stilling well and cableway; straight reach of 180 m.",
            ),
            highlights=(
                "The flood of 4 February 2020 was the third highest since 1961.",
                "The river carried ice from 10 to 24 January 2020.",
                "The recorder stood still from 8 to 12 June 2020.",
            ),
            zeros=(
                p.Zero(
                    since=date(1998, 5, 4),
                    elevation_m=self.m(642.318),
                    datum="national height 1990",
                    reason="elevation determined anew, the mark did not move",
                ),
            ),
            plates=tuple(
                p.Plate(
                    label=f"P{k + 1}",
                    lowest_m=self.m(0.0, 2),
                    highest_m=self.m(1.0, 2),
                    zero_m=self.m(0.9 * k),
                    since=date(2011, 8, 30),
                )
                for k in range(4)
            ),
            recorders=(
                p.Recorder(
                    instrument="Float recorder no. 1182",
                    kind="float in a stilling well",
                    series="primary",
                    since=date(2014, 6, 2),
                    until=None,
                    interval="15 min",
                    setting=f"stage = 1{self.sign}000 × raw + 0{self.sign}215 m",
                ),
            ),
            ratings=self.ratings() if flow_only else (),
            daily=self.daily(),
            figures=self.figures(),
            gaugings=self.gaugings() if flow_only else (),
            visits=self.visits(),
            level_checks=(
                p.LevelCheck(
                    on=date(2020, 4, 21),
                    party="R. Maes",
                    setups=4,
                    misclosure_mm=self.m(1.1, 1),
                    allowed_mm=self.m(1.8, 1),
                    outcome="within the limit; plates P1 to P4 within 2 mm, zeros kept",
                ),
            ),
            calibrations=(
                p.Calibration(
                    instrument="Current meter 41, rotor 2",
                    on=date(2019, 9, 2),
                    laboratory="Towing tank at Long Mill",
                    certificate="T-2019-118",
                    valid_ms=f"0{self.sign}03–3{self.sign}00",
                    standard_error=f"0{self.sign}004 m/s",
                    gaugings=7,
                ),
            )
            if flow_only
            else (),
            corrections=(
                p.Correction(
                    since=at("2019-12-03 10:30"),
                    until=at("2020-01-09 00:00"),
                    start_mm=self.m(0, 0),
                    end_mm=self.m(-12, 0, plus=True),
                    reason="float line slipped: staff reading of 15 January 2020",
                ),
            ),
            completeness=self.completeness(),
            notes=notes.write(self.facts()),
            uncertainty=(
                y.UncertaintyRow(within_percent=5, days=248, volume_percent=self.m(61.2, 1)),
                y.UncertaintyRow(within_percent=10, days=92, volume_percent=self.m(24.6, 1)),
                y.UncertaintyRow(within_percent=20, days=18, volume_percent=self.m(12.8, 1)),
                y.UncertaintyRow(within_percent=None, days=3, volume_percent=self.m(1.4, 1)),
            )
            if flow_only
            else (),
        )


def flow_station(language: str = "en") -> y.Yearbook:
    """Return the flow station's year: floods, ice, a gap, estimated days, two ratings."""
    with translation.override(language):
        return Sample(language=language).build()


def stage_station(language: str = "en") -> y.Yearbook:
    """Return the year of a station that keeps stage only, compiled and not yet issued."""
    with translation.override(language):
        return Sample(language=language, stage_only=True).build(
            p.Edition(number=1, compiled_on=date(2021, 3, 1))
        )

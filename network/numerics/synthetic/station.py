"""Makes one station of an invented network of any size: its place, its curve and its record."""

from dataclasses import dataclass

import numpy as np

from network.numerics.arrays import Floats, Seconds
from network.numerics.ratings.curves import Segment, SegmentCurve
from network.numerics.ratings.rating import RatingPeriod
from network.numerics.synthetic.basin import Catchment, Weather, make_runoff, stream
from network.numerics.synthetic.record import raw_values, recorder_noise, stage_of_flow

MEAN_RUNOFF_M3S_KM2 = 0.024  # what the model's weather gives about, for scaling the curve
JOINT_HEAD_M = 0.40


@dataclass(frozen=True, eq=False)
class SyntheticStation:
    """A station made from a number: stages (m, to 1 mm) every 15 minutes and their curve."""

    code: str
    latitude_deg: float
    longitude_deg: float
    catchment: Catchment
    curve: SegmentCurve
    time_s: Seconds
    stage_m: Floats


def make_station(number: int, *, weather: Weather, seed: int, start_s: int) -> SyntheticStation:
    """Make station `number` under a weather made once for all, from `start_s` (epoch seconds) on.

    Deterministic for (seed, number), whatever other stations are made. Source: own model.
    """
    code = f"S-{number:05d}"
    rng = stream(seed, f"{code} site")
    lowest_m = float(rng.uniform(200, 700))
    area_km2 = round(float(np.exp(rng.uniform(np.log(8), np.log(600)))), 1)
    catchment = Catchment(
        area_km2=area_km2,
        lowest_m=lowest_m,
        highest_m=lowest_m + float(rng.uniform(200, 800)),
        quick_h=2.0 + 0.35 * area_km2**0.5,
        base_days=float(rng.uniform(50, 90)),
    )
    curve = _curve(MEAN_RUNOFF_M3S_KM2 * area_km2, rng=rng)
    inside = slice(int(np.searchsorted(weather.time_s, start_s)), None)
    time_s = weather.time_s[inside]
    flow_m3s = make_runoff(weather, catchment=catchment, seed=seed, station=code)[inside]
    stage_m = stage_of_flow(time_s, flow_m3s, periods=[RatingPeriod(0, curve)])
    stage_m = stage_m + recorder_noise(time_s.size, sd_m=0.001, seed=seed, name=code)
    return SyntheticStation(
        code=code,
        latitude_deg=round(float(rng.uniform(55.5, 57.0)), 4),
        longitude_deg=round(float(rng.uniform(3.0, 5.5)), 4),
        catchment=catchment,
        curve=curve,
        time_s=time_s,
        stage_m=raw_values(stage_m, scale=1.0, offset_m=0.0, resolution=0.001),
    )


def _curve(mean_m3s: float, *, rng: np.random.Generator) -> SegmentCurve:
    """Give a curve of two segments that carries the mean flow at 0.55 m above its zero."""
    h0_m = round(float(rng.uniform(0.05, 0.4)), 2)
    upper_c = round(mean_m3s / 0.55**1.75, 6)
    # both give the same flow at the joint: C₁·h^2.1 = C₂·h^1.75
    lower_c = upper_c * JOINT_HEAD_M**1.75 / JOINT_HEAD_M**2.1
    joint_m = round(h0_m + JOINT_HEAD_M, 2)
    return SegmentCurve(
        lowest_use_m=h0_m,
        highest_use_m=h0_m + 6.0,
        segments=[Segment(h0_m, lower_c, h0_m, 2.1), Segment(joint_m, upper_c, h0_m, 1.75)],
    )

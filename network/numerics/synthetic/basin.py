"""Makes the weather and the flow of an invented temperate upland basin from a seed."""

import zlib
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from scipy.signal import lfilter

from network.numerics.arrays import Floats, Seconds

STEP_S = 900
DAY_S = 86_400
SPIN_UP_S = 400 * DAY_S  # five times the slowest usual store, so that the start is forgotten
REFERENCE_M = 500.0  # elevation for which the basin's temperature and rain are made
BANDS = 4


@dataclass(frozen=True)
class Storm:
    """A storm that is part of the story: when, how much (mm) and over how many hours."""

    at_s: int
    rain_mm: float
    hours: float


@dataclass(frozen=True)
class Spell:
    """A stretch of unusual weather: rain multiplied, temperature raised or lowered."""

    start_s: int
    end_s: int
    rain_factor: float = 1.0
    warmer_c: float = 0.0


@dataclass(frozen=True)
class Weather:
    """Rain (mm a step) and air temperature (°C) at the reference elevation, every 15 minutes."""

    time_s: Seconds
    rain_mm: Floats
    temperature_c: Floats


@dataclass(frozen=True)
class Catchment:
    """What makes one catchment answer differently from the next."""

    area_km2: float
    lowest_m: float
    highest_m: float
    quick_h: float = 6.0
    slow_days: float = 3.0
    base_days: float = 70.0
    rain_factor: float = 1.0


def stream(seed: int, name: str) -> np.random.Generator:
    """Return the random numbers that belong to one name under one seed, on every machine."""
    return np.random.default_rng([seed, zlib.crc32(name.encode())])


def make_weather(
    *,
    seed: int,
    start_s: int,
    end_s: int,
    storms: Sequence[Storm] = (),
    spells: Sequence[Spell] = (),
) -> Weather:
    """Make 15-minute rain and temperature from `start_s` minus the spin-up to `end_s`.

    Times are epoch seconds UTC, both ends multiples of 900 s. Frontal rain in winter, short
    showers in summer, a yearly and a daily wave of temperature with persistent departures.
    Raises ValueError when the period is empty or off the 15-minute grid. Source: own model.
    """
    if start_s % STEP_S or end_s % STEP_S or end_s <= start_s:
        raise ValueError("start_s and end_s must lie on the 15-minute grid, start before end")
    time_s = np.arange(start_s - SPIN_UP_S, end_s + 1, STEP_S, dtype=np.int64)
    rain_mm = _rain(time_s, rng=stream(seed, "rain"))
    temperature_c = _temperature(time_s, rng=stream(seed, "temperature"))
    for spell in spells:
        here = slice(*np.searchsorted(time_s, (spell.start_s, spell.end_s)))
        rain_mm[here] *= spell.rain_factor
        temperature_c[here] += spell.warmer_c
    for storm in storms:
        start = (np.arange(3) * storm.hours / 4 * 3600 + storm.at_s).astype(np.int64)
        rain_mm += _bursts(
            time_s,
            start_s=start,
            length_s=np.full(3, storm.hours * 1800.0),
            depth_mm=storm.rain_mm * np.array([0.25, 0.5, 0.25]),
        )
    return Weather(time_s=time_s, rain_mm=rain_mm, temperature_c=temperature_c)


def _season(time_s: Seconds | Floats) -> Floats:
    """Return a yearly wave, −1 in mid-January and +1 in mid-July."""
    wave: Floats = -np.cos(2 * np.pi * (time_s / DAY_S - 14.0) / 365.2425)
    return wave


def _rain(time_s: Seconds, *, rng: np.random.Generator) -> Floats:
    days = (time_s[-1] - time_s[0]) / DAY_S
    count = rng.poisson(0.36 * days)
    start = time_s[0] + rng.random(count) * days * DAY_S
    summer = (1 + _season(start)) / 2
    hours = np.exp(rng.normal(np.log(14 - 8 * summer), 0.6))
    depth = rng.gamma(0.8, 11.5, count)
    # four bursts of one event each, so that no hyetograph is a plain rectangle
    share = rng.dirichlet(np.full(4, 2.0), count)
    begin = start[:, None] + rng.random((count, 4)) * 0.7 * hours[:, None] * 3600
    length = (0.2 + 0.3 * rng.random((count, 4))) * hours[:, None] * 3600
    return _bursts(
        time_s,
        start_s=begin.ravel().astype(np.int64),
        length_s=length.ravel(),
        depth_mm=(depth[:, None] * share).ravel(),
    )


def _bursts(time_s: Seconds, *, start_s: Seconds, length_s: Floats, depth_mm: Floats) -> Floats:
    """Spread depths evenly over their bursts: the running sum of starts and ends."""
    steps = np.maximum(1, np.rint(length_s / STEP_S)).astype(np.int64)
    first = np.clip((start_s - time_s[0]) // STEP_S, 0, time_s.size)
    last = np.minimum(first + steps, time_s.size)
    rate = depth_mm / steps
    change = np.bincount(first, rate, time_s.size + 1) - np.bincount(last, rate, time_s.size + 1)
    # the running sum of floats leaves dust where it should be dry
    rain: Floats = np.maximum(np.cumsum(change)[:-1], 0.0)
    rain[rain < 1e-9] = 0.0
    return rain


def _temperature(time_s: Seconds, *, rng: np.random.Generator) -> Floats:
    day = np.arange(time_s[0], time_s[-1] + 2 * DAY_S, DAY_S)
    departure = lfilter([1.0], [1.0, -0.82], rng.normal(0.0, 1.75, day.size))
    season = _season(time_s)
    hour = time_s % DAY_S / 3600
    daily = (3.0 + 1.3 * season) * np.cos(2 * np.pi * (hour - 13.5) / 24)
    temperature: Floats = 6.8 + 8.8 * season + np.interp(time_s, day, departure) + daily
    return temperature


def _store(inflow: Floats, *, hours: float) -> Floats:
    """Let water through a linear store that empties with the given time constant."""
    keep = np.exp(-STEP_S / (hours * 3600))
    out: Floats = lfilter([1 - keep], [1.0, -keep], inflow)
    return out


def _snow_and_rain(weather: Weather, *, height_m: float) -> Floats:
    """Return the water that leaves the snow cover or passes it, mm a step, at one elevation."""
    rain_mm = weather.rain_mm * (1 + 0.0004 * (height_m - REFERENCE_M))
    temperature_c = weather.temperature_c - 0.0065 * (height_m - REFERENCE_M)
    snow_mm = rain_mm * np.clip((2.0 - temperature_c) / 2.0, 0.0, 1.0)
    could_melt_mm = np.maximum(temperature_c - 0.3, 0.0) * (3.4 * STEP_S / DAY_S)
    # S = X − min(0, least X so far), X = Σ(snow − possible melt): the bounded sum, no loop
    run = np.cumsum(snow_mm - could_melt_mm)
    cover_mm = run - np.minimum(np.minimum.accumulate(run), 0.0)
    water: Floats = rain_mm - np.diff(cover_mm, prepend=0.0)
    return np.maximum(water, 0.0)


def make_runoff(weather: Weather, *, catchment: Catchment, seed: int, station: str) -> Floats:
    """Make the flow (m³/s) of one catchment at every step of the weather.

    Snow by degree-days in four elevation bands, wetness that decides how much of the water runs
    off, and linear stores from quick to base flow. Deterministic for (seed, station).
    Source: own model from textbook parts (degree-day melt, linear reservoirs).
    """
    local = _local_weather(weather, factor=catchment.rain_factor, rng=stream(seed, station))
    edges = np.linspace(catchment.lowest_m, catchment.highest_m, BANDS + 1)
    middle = (edges[1:] + edges[:-1]) / 2
    water = np.mean([_snow_and_rain(local, height_m=float(m)) for m in middle], axis=0)
    warm_c = local.temperature_c - 0.0065 * (float(middle.mean()) - REFERENCE_M)
    evaporation = np.maximum(_store(warm_c, hours=120) + 2.5, 0.0) * (0.17 * STEP_S / DAY_S)
    per_day = DAY_S / STEP_S
    wet = _store(water - evaporation, hours=18 * 24) * per_day
    filled = 1 / (1 + np.exp(-(wet - 1.3) / 0.8))
    soaked = 1 - np.exp(-_store(water, hours=20) * per_day / 38.0)
    quick = water * (0.02 + 0.11 * filled + 0.20 * soaked)
    deep = water * (0.10 + 0.20 * filled)
    depth = (
        _store(_store(quick, hours=catchment.quick_h / 2), hours=catchment.quick_h)
        + _store(water * (0.03 + 0.25 * filled), hours=catchment.slow_days * 24)
        + _store(0.45 * deep, hours=catchment.base_days * 24 / 5)
        + _store(0.55 * deep, hours=catchment.base_days * 24)
    )
    # mm a step on km² → m³/s
    flow: Floats = depth * catchment.area_km2 * 1000.0 / STEP_S
    return flow


def _local_weather(weather: Weather, *, factor: float, rng: np.random.Generator) -> Weather:
    """Vary the basin's rain from day to day, since no two valleys get the same."""
    day = np.arange(weather.time_s[0], weather.time_s[-1] + 2 * DAY_S, DAY_S)
    vary = np.clip(1 + 0.22 * rng.standard_normal(day.size), 0.3, 1.7)
    rain_mm = weather.rain_mm * np.interp(weather.time_s, day, vary) * factor
    return Weather(
        time_s=weather.time_s,
        rain_mm=rain_mm,
        temperature_c=weather.temperature_c + rng.normal(0.0, 0.3),
    )


def route(flow_m3s: Floats, *, travel_h: float, storage_h: float) -> Floats:
    """Carry flow down a reach: later by the travel time, flatter by the storage (hours).

    A lake is a reach of long storage. Volume is kept but for what is on its way at either end.
    """
    shift = round(travel_h * 3600 / STEP_S)
    late = np.concatenate([np.full(shift, flow_m3s[0]), flow_m3s[: flow_m3s.size - shift]])
    return _store(late, hours=storage_h) if storage_h else late

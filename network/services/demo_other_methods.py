"""Make the field notes of the demo's gaugings by other methods, so that they give its results."""

import re

import numpy as np

from network.numerics.gaugings.other_methods import Fill
from network.numerics.synthetic.basin import stream
from network.queries.field_sheets import (
    Boat,
    Crossing,
    Floats,
    Other,
    Sample,
    TimedFloat,
    Tracer,
    Weir,
)
from network.queries.field_sheets import Fills as FillsSheet
from network.services.demo_field import MadeResult, section_at
from network.services.demo_world import Truth, seconds

COUNTS = {"five": 5, "six": 6, "seven": 7, "two": 2}
FLOAT_FACTOR = 0.86
# Three parts of a section: of its area, of its mean velocity, and how many floats each had.
PARTS = ((0.3, 0.85, 2), (0.4, 1.225, 3), (0.3, 0.85, 2))
SALT_KG_PER_M3S = 5.0
BACKGROUND_KGM3 = 0.0004
FIRST_SALT_S, PEAK_AFTER_S, SAMPLED_EVERY_S = 180.0, 110.0, 20.0


def notes_of(truth: Truth, made: MadeResult) -> Other:
    """Return what was noted at the river; deterministic for a station and an instant."""
    rng = stream(truth.seed, f"{truth.station.station.code} notes {seconds(made.plan.at)}")
    match made.plan.method:
        case "acoustic":
            return _boat(truth, made)
        case "float":
            return _floats(truth, made, rng)
        case "dilution":
            return _tracer(made, rng)
        case "volumetric":
            return _fills(made, rng)
        case _:
            return _weir(made)


def _number(pattern: str, text: str) -> float:
    found = re.search(pattern, text)
    return float(found.group(1)) if found else 0.0


def _count(text: str, *, before: str) -> int:
    found = re.search(rf"(\w+) {before}", text)
    return COUNTS.get(found.group(1).lower(), 1) if found else 1


def _boat(truth: Truth, made: MadeResult) -> Boat:
    section = section_at(truth, made.plan.at)
    water_ms = round(made.flow_m3s / (section.width_m * section.depth_m), 2)
    bed_ms = _number(r"([\d.]+) m/s", made.plan.moving_bed)
    # the crossings show too little where the bed moves
    shown = 1 + bed_ms / water_ms
    each_s = round(60 * made.plan.minutes / max(len(made.transects_m3s), 1))
    return Boat(
        tuple(
            Crossing(float(f"{flow / shown:.4g}"), each_s, from_left_bank=n % 2 == 0)
            for n, flow in enumerate(made.transects_m3s)
        ),
        bed_velocity_ms=bed_ms,
        water_velocity_ms=water_ms,
    )


def _floats(truth: Truth, made: MadeResult, rng: np.random.Generator) -> Floats:
    section = section_at(truth, made.plan.at)
    area_m2 = section.width_m * section.depth_m
    length_m = _number(r"over ([\d.]+) m", made.plan.details)
    return Floats(
        length_m,
        tuple(
            TimedFloat(
                panel,
                round(area_m2 * share, 2),
                round(length_m / (speed * made.flow_m3s / area_m2 / FLOAT_FACTOR * spread), 1),
            )
            for panel, (share, speed, count) in enumerate(PARTS, start=1)
            for spread in 1 + rng.normal(0.0, 0.03, count)
        ),
    )


def _tracer(made: MadeResult, rng: np.random.Generator) -> Tracer:
    """One mass of salt; each probe sees c = c₀·(t/T)·exp(1 − t/T), whose area is c₀·T·e."""
    mass_kg = round(SALT_KG_PER_M3S * made.flow_m3s, 1)
    samples = []
    probes = _count(made.plan.details, before="probes")
    for probe in range(1, probes + 1):
        peak_s = PEAK_AFTER_S * float(rng.uniform(0.95, 1.05))
        peak_kgm3 = mass_kg / (made.flow_m3s * peak_s * np.e)
        times_s = np.arange(0.0, 11 * peak_s, SAMPLED_EVERY_S)
        cloud = peak_kgm3 * times_s / peak_s * np.exp(1 - times_s / peak_s)
        cloud *= 1 + rng.normal(0.0, 0.01, times_s.size)
        samples += [
            Sample(probe, round(float(c) + BACKGROUND_KGM3, 6), FIRST_SALT_S + float(t))
            for t, c in zip(times_s, cloud, strict=True)
        ]
    return Tracer(tuple(samples), background_kgm3=BACKGROUND_KGM3, mass_kg=mass_kg)


def _fills(made: MadeResult, rng: np.random.Generator) -> FillsSheet:
    volume_m3 = _number(r"([\d.]+) l\b", made.plan.details) / 1000
    count = _count(made.plan.details, before="fillings")
    return FillsSheet(
        tuple(
            Fill(volume_m3, round(volume_m3 / made.flow_m3s * spread, 1))
            for spread in 1 + rng.normal(0.0, 0.012, count)
        )
    )


def _weir(made: MadeResult) -> Weir:
    """The head is the stage: the station zero is the foot of the notch."""
    return Weir("v", made.stages_m[0][1], crest_height_m=0.3, channel_width_m=1.2, angle_deg=90.0)

"""Discharge from the dilution of a tracer: constant-rate injection and sudden injection."""

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from network.numerics.gaugings.gauging_faults import BadSheet, Fault
from network.numerics.gaugings.other_methods import (
    FEW_REPEATS,
    REPEATS,
    OtherGauging,
    positive,
    repeats_percent,
)
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import gettext_noop, sentence

MIXING_SOURCE = gettext_noop("ISO 9555, from memory")
COMMON = gettext_noop("common practice")


@dataclass(frozen=True)
class DilutionSettings:
    """Standard uncertainties in % and limits, in %."""

    tracer_percent: float = 1.0  # mass, or rate and strength of the solution
    concentration_percent: float = 2.0  # calibration of the probe or the laboratory
    scatter_percent: float = 3.0  # one sample or probe
    mixing_percent: float = 5.0
    tail_percent: float = 2.0
    least_samples: int = 3
    least_rise: float = 5.0  # plateau or peak over background


@dataclass(frozen=True)
class Probe:
    """A record of concentration downstream, from before the tracer came until it had passed."""

    times_s: tuple[float, ...]
    concentration_kgm3: tuple[float, ...]
    background_kgm3: float


def constant_rate(
    samples_kgm3: Sequence[float],
    *,
    injection_m3s: float,
    injected_kgm3: float,
    background_kgm3: float,
    settings: DilutionSettings = DilutionSettings(),
) -> OtherGauging:
    """Compute the discharge from the plateau that a constant injection gives.

    samples_kgm3: plateau concentrations from across the section; injection in m³/s of a solution of
    injected_kgm3. The discharge is the mean over the samples.
    Raises BadSheet naming row and field. Source: ISO 9555 (constant-rate injection), from memory.
    """
    text = gettext_noop("The injection must be more than 0 m³/s.")
    faults = [*positive([injection_m3s], "injection_m3s", text), *_background(background_kgm3)]
    if not samples_kgm3:
        faults.append(Fault("samples_kgm3", sentence(gettext_noop("No sample is noted."))))
    text = gettext_noop("Sample {row}: the plateau must lie above the background.")
    for row, c in enumerate(samples_kgm3):
        if not background_kgm3 < c < math.inf:
            faults.append(Fault("samples_kgm3", sentence(text, row=row + 1), row=row))
        elif not c < injected_kgm3 < math.inf:
            low = gettext_noop("Sample {row}: it is stronger than the solution injected.")
            faults.append(Fault("injected_kgm3", sentence(low, row=row + 1), row=row))
    if faults:
        raise BadSheet(tuple(faults))
    plateau = np.array(samples_kgm3, dtype=np.float64)
    # Q = q·(c₁ − c₂)/(c₂ − c₀)
    flows = injection_m3s * (injected_kgm3 - plateau) / (plateau - background_kgm3)
    rise = float(plateau.mean() / background_kgm3) if background_kgm3 else math.inf
    return _result("constant_rate", flows.tolist(), rise, settings, ())


def sudden(
    mass_kg: float, probes: Sequence[Probe], settings: DilutionSettings = DilutionSettings()
) -> OtherGauging:
    """Compute the discharge from a mass of tracer thrown in at once, and the cloud's passage.

    mass_kg of tracer; one probe or more, best one near each bank. The discharge is the mean over
    the probes. Raises BadSheet naming row and field.
    Source: ISO 9555 (integration method), from memory.
    """
    text = gettext_noop("The mass of tracer must be more than 0 kg.")
    faults = [*positive([mass_kg], "mass_kg", text), *_probe_faults(probes)]
    if faults:
        raise BadSheet(tuple(faults))
    excess = [np.array(p.concentration_kgm3) - p.background_kgm3 for p in probes]
    # Q = M / ∫(c − c₀) dt
    flows = [
        mass_kg / float(np.trapezoid(c, p.times_s)) for p, c in zip(probes, excess, strict=True)
    ]
    rises = [
        max(p.concentration_kgm3) / p.background_kgm3 if p.background_kgm3 else math.inf
        for p in probes
    ]
    tails = [
        (row, 100 * max(abs(float(c[0])), abs(float(c[-1]))) / float(c.max()))
        for row, c in enumerate(excess)
    ]
    return _result("sudden", flows, min(rises), settings, _tail_findings(tails, settings))


def _result(
    method: str,
    flows: list[float],
    rise: float,
    settings: DilutionSettings,
    more: Sequence[Finding] | Iterator[Finding],
) -> OtherGauging:
    parts = (
        (gettext_noop("tracer put in"), settings.tracer_percent),
        (gettext_noop("concentration"), settings.concentration_percent),
        (
            gettext_noop("scatter across the section"),
            repeats_percent(flows, settings.scatter_percent),
        ),
    )
    stated = (parts[0][0], parts[1][0], *((REPEATS,) if len(flows) < FEW_REPEATS else ()))
    findings = (*_mixing_findings(flows, rise, settings), *more)
    return OtherGauging(method, float(np.mean(flows)), parts, tuple(flows), findings, stated)


def _background(background_kgm3: float) -> Iterator[Fault]:
    if not 0 <= background_kgm3 < math.inf:
        text = gettext_noop("The background concentration must be 0 or more.")
        yield Fault("background_kgm3", sentence(text))


def _probe_faults(probes: Sequence[Probe]) -> Iterator[Fault]:
    if not probes:
        yield Fault("probes", sentence(gettext_noop("No probe is noted.")))
    for row, probe in enumerate(probes):
        times, values = np.array(probe.times_s), np.array(probe.concentration_kgm3)
        if len(times) != len(values) or len(times) < 3:
            text = gettext_noop("Probe {row}: at least 3 times, each with a concentration.")
            yield Fault("times_s", sentence(text, row=row + 1), row=row)
        elif not (np.diff(times) > 0).all():
            text = gettext_noop("Probe {row}: the times do not rise.")
            yield Fault("times_s", sentence(text, row=row + 1), row=row)
        elif not np.isfinite(values).all() or not (
            np.trapezoid(values - probe.background_kgm3, times) > 0
        ):
            text = gettext_noop("Probe {row}: the concentrations do not rise above the background.")
            yield Fault("concentration_kgm3", sentence(text, row=row + 1), row=row)


def _mixing_findings(
    flows: list[float], rise: float, settings: DilutionSettings
) -> Iterator[Finding]:
    mean, limit = float(np.mean(flows)), settings.mixing_percent
    apart = 100 * (max(flows) - min(flows)) / mean
    if len(flows) == 1:
        text = gettext_noop("One place of sampling shows nothing about mixing; two are the least.")
        yield Finding("mixing_unknown", "samples", sentence(text), None, MIXING_SOURCE)
    elif apart > limit:
        text = gettext_noop(
            "The discharges across the section spread by {value} %, more than {limit} %: the "
            "tracer may not be mixed."
        )
        said = sentence(text, value=round(apart, 1), limit=limit)
        yield Finding("mixing", "samples", said, limit, MIXING_SOURCE)
    if rise < settings.least_rise:
        text = gettext_noop("The tracer rose to {value} times the background; {limit} are wanted.")
        said = sentence(text, value=round(rise, 1), limit=settings.least_rise)
        yield Finding("low_rise", "samples", said, settings.least_rise, COMMON)


def _tail_findings(
    tails: Sequence[tuple[int, float]], settings: DilutionSettings
) -> Iterator[Finding]:
    limit = settings.tail_percent
    text = gettext_noop(
        "Probe {row}: the record begins or ends {value} % of the peak away from the background; "
        "the limit is {limit} %."
    )
    for row, value in tails:
        if value > limit:
            said = sentence(text, row=row + 1, value=round(value, 1), limit=limit)
            yield Finding("tail", "concentration_kgm3", said, limit, COMMON, row=row)

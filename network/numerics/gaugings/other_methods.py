"""Discharge by float and by volume, and what every other method states with its discharge."""

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np
from scipy.special import stdtrit

from network.numerics.gaugings.gauging_faults import BadSheet, Fault
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.sentences import gettext_noop, sentence

COMMON = gettext_noop("common practice")
FLOAT_SOURCE = gettext_noop("ISO 748, from memory")
FEW_REPEATS = 4  # from here on the scatter is judged by its own figures
REPEATS = gettext_noop("scatter of fewer than four repeats")
SYSTEMATIC = gettext_noop("systematic part")


@dataclass(frozen=True)
class OtherGauging:
    """A discharge by another method, with its own stated uncertainty.

    parts: standard uncertainties in % by cause, whose squares add up to u²; u95_percent = 2u, None
    at zero flow. repeats_m3s: the discharges whose mean it is,
    none for floats. agency_values: causes that rest on a
    figure of the agency.
    """

    method: str
    discharge_m3s: float
    parts: tuple[tuple[str, float], ...]
    repeats_m3s: tuple[float, ...]
    findings: tuple[Finding, ...]
    agency_values: tuple[str, ...]

    @property
    def u95_percent(self) -> float | None:
        """Give the expanded uncertainty (k = 2) in %."""
        if self.discharge_m3s == 0:
            return None
        # U₉₅ = 2·√Σu²
        return 2 * math.sqrt(sum(u**2 for _, u in self.parts))

    @property
    def u95_m3s(self) -> float | None:
        """Give the expanded uncertainty (k = 2) in m³/s, None at zero flow."""
        percent = self.u95_percent
        return None if percent is None else abs(self.discharge_m3s) * percent / 100


def repeats_percent(repeats: Sequence[float], agency_percent: float) -> float:
    """Give the standard uncertainty in % of the mean of some repeats, by their scatter.

    Four or more: s/√n, widened so that k = 2 gives Student's 95 % interval. Fewer say little about
    their own scatter: not less than agency_percent (of one) over √n. 0 at a mean of zero.
    Source: GUM 4.2; the agency value: own rule.
    """
    n, mean = len(repeats), abs(float(np.mean(repeats)))
    if mean == 0:
        return 0.0
    s_percent = 100 * float(np.std(repeats, ddof=1)) / mean if n > 1 else 0.0
    if n < FEW_REPEATS:
        return max(s_percent, agency_percent) / math.sqrt(n)
    # u = t₀.₉₇₅(n − 1)/2 · s/√n
    return float(stdtrit(n - 1, 0.975)) / 2 * s_percent / math.sqrt(n)


def positive(rows: Sequence[float | None], field: str, text: str) -> Iterator[Fault]:
    """Find the rows whose value is missing, no number, or not above 0; text names {row}."""
    for row, value in enumerate(rows):
        if value is None or not (0 < value < math.inf):
            yield Fault(field, sentence(text, row=row + 1), row=row)


@dataclass(frozen=True)
class FloatPanel:
    """A part of the section: its area (mean of the upper and lower end) and its floats' times."""

    area_m2: float | None
    seconds: tuple[float, ...]


@dataclass(frozen=True)
class FloatSettings:
    """Factor from the floats' to the mean velocity, standard uncertainties in %, limits."""

    factor: float = 0.86  # natural; 0.90 lined (USGS WSP 2175 p. 170)
    factor_percent: float = 7.5
    length_percent: float = 1.0
    area_percent: float = 3.0
    scatter_percent: float = 15.0  # one float of a panel; u_p of a surface velocity in ISO 748:2007
    least_seconds: float = 20.0
    least_panels: int = 3


def by_float(
    length_m: float, panels: Sequence[FloatPanel], settings: FloatSettings = FloatSettings()
) -> OtherGauging:
    """Compute the discharge from floats timed over a reach.

    length_m: of the reach; panels across the section, each with one time or more in s.
    Raises BadSheet naming row and field. Source: ISO 748 (floats), from memory.
    """
    faults = [*_float_faults(length_m, panels)]
    if faults:
        raise BadSheet(tuple(faults))
    # Q = k·Σ A·mean(L/t)
    speeds_ms = [length_m / np.array(panel.seconds) for panel in panels]
    pairs = list(zip(panels, speeds_ms, strict=True))
    flows = [settings.factor * (p.area_m2 or 0) * v.mean() for p, v in pairs]
    total = float(np.sum(flows))
    of_panels = [
        q * repeats_percent(v.tolist(), settings.scatter_percent)
        for q, v in zip(flows, speeds_ms, strict=True)
    ]
    parts = (
        (gettext_noop("float factor"), settings.factor_percent),
        (gettext_noop("length of the reach"), settings.length_percent),
        (gettext_noop("area"), settings.area_percent),
        (gettext_noop("scatter of the floats"), float(np.hypot.reduce(of_panels)) / total),
    )
    few = any(len(panel.seconds) < FEW_REPEATS for panel in panels)
    stated = (*(cause for cause, _ in parts[:3]), *((REPEATS,) if few else ()))
    findings = tuple(_float_findings(panels, settings))
    return OtherGauging("float", total, parts, (), findings, stated)


def _float_faults(length_m: float, panels: Sequence[FloatPanel]) -> Iterator[Fault]:
    yield from positive(
        [length_m], "length_m", gettext_noop("The length of the reach must be more than 0 m.")
    )
    if not panels:
        said = sentence(gettext_noop("A float gauging needs at least one panel."))
        yield Fault("panels", said)
    areas = [panel.area_m2 for panel in panels]
    yield from positive(areas, "area_m2", gettext_noop("Panel {row}: the area must be above 0 m²."))
    text = gettext_noop("Panel {row}: every float needs a time of more than 0 seconds.")
    for row, panel in enumerate(panels):
        if not panel.seconds or not all(0 < s < math.inf for s in panel.seconds):
            yield Fault("seconds", sentence(text, row=row + 1), row=row)


def _float_findings(panels: Sequence[FloatPanel], settings: FloatSettings) -> Iterator[Finding]:
    limit = settings.least_seconds
    text = gettext_noop("Panel {row}: a float of {value} s is short; the least is {limit} s.")
    for row, panel in enumerate(panels):
        if min(panel.seconds) < limit:
            said = sentence(text, row=row + 1, value=min(panel.seconds), limit=limit)
            yield Finding("exposure", "seconds", said, limit, FLOAT_SOURCE, row=row)
    if len(panels) < settings.least_panels:
        text = gettext_noop("{count} panels; at least {limit} are wanted for floats.")
        said = sentence(text, count=len(panels), limit=settings.least_panels)
        yield Finding("few_panels", "panels", said, settings.least_panels, FLOAT_SOURCE)


@dataclass(frozen=True)
class Fill:
    """A volume caught in a time."""

    volume_m3: float | None
    seconds: float | None


@dataclass(frozen=True)
class VolumetricSettings:
    """Standard uncertainties in % and limits."""

    volume_percent: float = 1.0
    reaction_s: float = 0.2  # starting and stopping the watch by hand
    scatter_percent: float = 2.0
    least_fills: int = 3
    least_seconds: float = 5.0


def volumetric(
    fills: Sequence[Fill], settings: VolumetricSettings = VolumetricSettings()
) -> OtherGauging:
    """Compute the discharge from a vessel filled several times: mean of volume over time.

    fills: m³ and s. Raises BadSheet naming row and field. Source: common practice.
    """
    volumes, times = [f.volume_m3 for f in fills], [f.seconds for f in fills]
    no_volume = gettext_noop("Fill {row}: the volume must be more than 0 m³.")
    no_time = gettext_noop("Fill {row}: the time must be more than 0 seconds.")
    faults = [*positive(volumes, "volume_m3", no_volume), *positive(times, "seconds", no_time)]
    if not fills:
        faults.append(Fault("fills", sentence(gettext_noop("No fill is noted."))))
    if faults:
        raise BadSheet(tuple(faults))
    seconds = np.array(times, dtype=np.float64)
    # Q = mean(V/t)
    flows = np.array(volumes, dtype=np.float64) / seconds
    parts = (
        (gettext_noop("volume"), settings.volume_percent),
        (gettext_noop("timing"), float(100 * settings.reaction_s / seconds.sum())),
        (
            gettext_noop("scatter of the fills"),
            repeats_percent(flows.tolist(), settings.scatter_percent),
        ),
    )
    stated = (parts[0][0], parts[1][0], *((REPEATS,) if len(fills) < FEW_REPEATS else ()))
    findings = tuple(_fill_findings(seconds.tolist(), settings))
    repeats = tuple(flows.tolist())
    return OtherGauging("volumetric", float(flows.mean()), parts, repeats, findings, stated)


def _fill_findings(seconds: list[float], settings: VolumetricSettings) -> Iterator[Finding]:
    if len(seconds) < settings.least_fills:
        text = gettext_noop("{count} fills; at least {limit} are wanted.")
        said = sentence(text, count=len(seconds), limit=settings.least_fills)
        yield Finding("few_fills", "fills", said, settings.least_fills, COMMON)
    limit = settings.least_seconds
    text = gettext_noop("Fill {row}: {value} s is short; the least is {limit} s.")
    for row, value in enumerate(seconds):
        if value < limit:
            said = sentence(text, row=row + 1, value=value, limit=limit)
            yield Finding("exposure", "seconds", said, limit, COMMON, row=row)

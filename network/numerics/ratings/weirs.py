"""Flow over thin-plate weirs: V-notch and rectangular, with the limits of the standard.

Source: ISO 1438 (thin-plate weirs). Coefficients and limits are from memory of the standard and of
the figures it shares with Kulin and Compton (1975); heads are above the notch or the crest.
"""

from dataclasses import dataclass
from typing import Protocol

import numpy as np

from network.numerics.arrays import Floats
from network.numerics.sentences import Sentence, gettext_noop, sentence

G_MS2 = 9.80665
SOURCE = "ISO 1438"

# Kindsvater-Carter by b/B: Cd = a + a'·h/p, width added k_b in metres
WIDTH_RATIO = np.array([0.0, 0.2, 0.4, 0.6, 0.7, 0.8, 0.9, 1.0])
CARTER_A = np.array([0.587, 0.589, 0.591, 0.593, 0.594, 0.596, 0.598, 0.602])
CARTER_SLOPE = np.array([-0.0023, -0.0018, 0.0058, 0.018, 0.030, 0.045, 0.064, 0.075])
CARTER_KB_M = np.array([2.4, 2.4, 2.7, 3.6, 4.1, 4.2, 3.7, -0.9]) / 1000
CARTER_KH_M = 0.001


@dataclass(frozen=True)
class WeirFinding:
    """Say that a limit of the standard is passed: the value found, the limit and its source."""

    what: Sentence
    value: float
    limit: float
    source: str = SOURCE


class Weir(Protocol):
    """What the weirs have in common."""

    def flow_m3s(self, head_m: Floats) -> Floats:
        """Give the flow at each head."""

    def findings(self, *, lowest_head_m: float, highest_head_m: float) -> tuple[WeirFinding, ...]:
        """Name the limits passed between two heads."""


@dataclass(frozen=True)
class VNotch:
    """A triangular notch in a thin plate: angle in degrees, height p of the notch above the bed.

    channel_width_m is the width B of the approach channel. A calibrated notch brings its own
    coefficient and head correction; otherwise both follow from the angle (fully contracted).
    Raises ValueError for a size that is not positive or an angle outside 0–180°.
    """

    angle_deg: float
    notch_height_m: float
    channel_width_m: float
    coefficient: float | None = None
    head_correction_m: float | None = None

    def __post_init__(self) -> None:
        _positive(notch_height_m=self.notch_height_m, channel_width_m=self.channel_width_m)
        if not 0 < self.angle_deg < 180:
            raise ValueError(f"angle_deg lies between 0 and 180, not {self.angle_deg}.")

    def flow_m3s(self, head_m: Floats) -> Floats:
        """Give the flow at each head by Kindsvater-Shen, float64[n]; 0 at and below the notch."""
        a = self.angle_deg
        # Cd and k_h: polynomials through the published curves for 20° to 100° (k_h in feet there)
        cd = 0.607165 - 8.74467e-4 * a + 6.10393e-6 * a**2
        kh_m = 0.3048 * (0.01449027 - 3.395553e-4 * a + 3.298190e-6 * a**2 - 1.062154e-8 * a**3)
        cd = cd if self.coefficient is None else self.coefficient
        kh_m = kh_m if self.head_correction_m is None else self.head_correction_m
        # Q = Cd · 8/15 · √(2g) · tan(α/2) · (h + k_h)^(5/2)
        factor = cd * 8 / 15 * np.sqrt(2 * G_MS2) * np.tan(np.radians(a / 2))
        return np.where(head_m > 0, factor * np.maximum(head_m + kh_m, 0) ** 2.5, 0.0)

    def findings(self, *, lowest_head_m: float, highest_head_m: float) -> tuple[WeirFinding, ...]:
        """Name the limits passed between two heads (ISO 1438, V-notch; contraction as USBR)."""
        p, width, right = self.notch_height_m, self.channel_width_m, self.angle_deg == 90
        h_p, p_b = highest_head_m / p, p / width
        checks = (
            _below(gettext_noop("notch angle {value:.3g}° below {limit:g}°"), self.angle_deg, 20),
            _above(gettext_noop("notch angle {value:.3g}° above {limit:g}°"), self.angle_deg, 100),
            _below(gettext_noop("head {value:.3g} m below {limit:g} m"), lowest_head_m, 0.06),
            _below(gettext_noop("notch height {value:.3g} m below {limit:g} m"), p, 0.09),
            _above(gettext_noop("h/p {value:.3g} above {limit:g}"), h_p, 0.4 if right else 0.35),
            _above(gettext_noop("p/B {value:.3g} above {limit:g}"), p_b, 1.5),
            None if right else _below(gettext_noop("p/B {value:.3g} below {limit:g}"), p_b, 0.1),
            _above(
                gettext_noop("h/B {value:.3g} above {limit:g}: the notch is not fully contracted"),
                highest_head_m / width,
                0.2,
                source="USBR Water Measurement Manual",
            ),
        )
        return tuple(found for found in checks if found)


@dataclass(frozen=True)
class RectangularNotch:
    """A rectangular notch in a thin plate: width b, crest height p, approach channel width B.

    Over the full width (b = B) the flow is by Rehbock, otherwise by Kindsvater-Carter.
    Raises ValueError for a size that is not positive or a notch wider than its channel.
    """

    notch_width_m: float
    crest_height_m: float
    channel_width_m: float

    def __post_init__(self) -> None:
        _positive(notch_width_m=self.notch_width_m, crest_height_m=self.crest_height_m)
        if self.notch_width_m > self.channel_width_m:
            raise ValueError("The notch is wider than its channel.")

    @property
    def full_width(self) -> bool:
        """Say whether the crest spans the channel from wall to wall."""
        return self.notch_width_m == self.channel_width_m

    def flow_m3s(self, head_m: Floats) -> Floats:
        """Give the flow at each head, float64[n]; 0 at and below the crest."""
        h = np.maximum(head_m, 0.0)
        if self.full_width:
            # Cd = 0.602 + 0.083·h/p, h_e = h + 1.2 mm
            cd, width_m, kh_m = 0.602 + 0.083 * h / self.crest_height_m, self.notch_width_m, 0.0012
        else:
            ratio = self.notch_width_m / self.channel_width_m
            slope = np.interp(ratio, WIDTH_RATIO, CARTER_SLOPE)
            # Cd = a + a'·h/p, b_e = b + k_b, h_e = h + 1 mm
            cd = np.interp(ratio, WIDTH_RATIO, CARTER_A) + slope * h / self.crest_height_m
            width_m = self.notch_width_m + float(np.interp(ratio, WIDTH_RATIO, CARTER_KB_M))
            kh_m = CARTER_KH_M
        # Q = Cd · 2/3 · √(2g) · b_e · h_e^(3/2)
        flow = cd * 2 / 3 * np.sqrt(2 * G_MS2) * width_m * (h + kh_m) ** 1.5
        return np.where(h > 0, flow, 0.0)

    def findings(self, *, lowest_head_m: float, highest_head_m: float) -> tuple[WeirFinding, ...]:
        """Name the limits passed between two heads (ISO 1438, rectangular notches)."""
        b, p = self.notch_width_m, self.crest_height_m
        least_b, most_h_p = (0.30, 1.0) if self.full_width else (0.15, 2.5)
        side_m = (self.channel_width_m - b) / 2
        checks = (
            _below(gettext_noop("head {value:.3g} m below {limit:g} m"), lowest_head_m, 0.03),
            _below(gettext_noop("notch width {value:.3g} m below {limit:g} m"), b, least_b),
            _below(gettext_noop("crest height {value:.3g} m below {limit:g} m"), p, 0.10),
            _above(gettext_noop("h/p {value:.3g} above {limit:g}"), highest_head_m / p, most_h_p),
            _above(gettext_noop("head {value:.3g} m above {limit:g} m"), highest_head_m, 0.75)
            if self.full_width
            else _below(gettext_noop("side {value:.3g} m below {limit:g} m"), side_m, 0.10),
        )
        return tuple(found for found in checks if found)


@dataclass(frozen=True, eq=False)
class WeirTable:
    """Hold the points of a rating version and the limits of the standard that they pass."""

    stage_m: Floats
    flow_m3s: Floats
    findings: tuple[WeirFinding, ...]


def weir_table(
    weir: Weir,
    *,
    crest_stage_m: float,
    lowest_stage_m: float,
    highest_stage_m: float,
    step_m: float = 0.01,
) -> WeirTable:
    """Give stage and flow from the crest (flow 0) to the highest stage for a rating version.

    crest_stage_m is the stage of the crest or the notch; the last point is the highest stage even
    where the step does not meet it. The limits are looked for between the lowest and the highest
    stage of use. Raises ValueError unless crest < lowest ≤ highest stage and the step is positive.
    """
    _positive(step_m=step_m)
    if not crest_stage_m < lowest_stage_m <= highest_stage_m:
        raise ValueError("The stages of use do not rise from above the crest.")
    steps = int(np.ceil((highest_stage_m - crest_stage_m) / step_m - 1e-9))
    head_m = np.append(np.arange(steps) * step_m, highest_stage_m - crest_stage_m)
    findings = weir.findings(
        lowest_head_m=lowest_stage_m - crest_stage_m, highest_head_m=float(head_m[-1])
    )
    # stages to a tenth of a millimetre, the finest unit stages are kept in
    return WeirTable(np.round(crest_stage_m + head_m, 4), weir.flow_m3s(head_m), findings)


def _positive(**sizes: float) -> None:
    for name, size in sizes.items():
        if not size > 0:
            raise ValueError(f"{name} must be positive, not {size}.")


def _below(text: str, value: float, limit: float) -> WeirFinding | None:
    found = WeirFinding(sentence(text, value=value, limit=limit), value, limit)
    return found if value < limit else None


def _above(text: str, value: float, limit: float, source: str = SOURCE) -> WeirFinding | None:
    found = WeirFinding(sentence(text, value=value, limit=limit), value, limit, source)
    return found if value > limit else None

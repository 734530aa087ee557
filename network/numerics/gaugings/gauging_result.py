"""What a computed gauging holds: the number and everything that explains it."""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from network.numerics.gaugings.channel_flows import Flow
from network.numerics.gaugings.gauging_columns import Columns
from network.numerics.gaugings.gauging_faults import Fault
from network.numerics.gaugings.gauging_input import DischargeMethod
from network.numerics.gaugings.gauging_uncertainty import Uncertainty
from network.numerics.gaugings.mean_stage import MeanStage
from network.numerics.gaugings.measured_verticals import Measured
from network.numerics.gaugings.velocity_area import Section
from network.numerics.gaugings.vertical_findings import Finding

GRAVITY_MS2 = 9.80665


class Panel(NamedTuple):
    """A part of the section: ends in the sheet's distances, area, mean velocity, flow and share.

    Places count from 0. vertical is None in the edge zone that begins at a bank; share is the part
    of the discharge (0 where there is none).
    """

    channel: int
    vertical: int | None
    from_m: float
    to_m: float
    area_m2: float
    velocity_ms: float
    flow_m3s: float
    share: float


class VerticalResult(NamedTuple):
    """A vertical computed: corrected depth of flowing water; the rest None in a sounding."""

    channel: int
    vertical: int
    distance_m: float
    depth_m: float
    velocity_ms: float | None
    wading_product_m2s: float | None


@dataclass(frozen=True)
class Gauging:
    """The complete result of a gauging by velocity and area."""

    method: DischargeMethod
    mid_section_m3s: float
    mean_section_m3s: float
    section: Section
    uncertainty: Uncertainty
    stage: MeanStage | None
    mid_panels: tuple[Panel, ...]
    mean_panels: tuple[Panel, ...]
    verticals: tuple[VerticalResult, ...]
    findings: tuple[Finding, ...]

    @property
    def discharge_m3s(self) -> float:
        """Give the discharge by the method that is the agency's result."""
        mid = self.method == DischargeMethod.MID_SECTION
        return self.mid_section_m3s if mid else self.mean_section_m3s

    @property
    def panels(self) -> tuple[Panel, ...]:
        """Give the panels of the same method."""
        mid = self.method == DischargeMethod.MID_SECTION
        return self.mid_panels if mid else self.mean_panels

    @property
    def mean_velocity_ms(self) -> float:
        """Give v = Q / A, 0 without water."""
        return self.discharge_m3s / self.section.area_m2 if self.section.area_m2 else 0.0

    @property
    def froude(self) -> float:
        """Give the Froude number of the section, 0 without water."""
        if not self.section.area_m2:
            return 0.0
        # Fr = |v| / √(g·A/B)
        mean_depth_m = self.section.area_m2 / self.section.width_m
        return abs(self.mean_velocity_ms) / math.sqrt(GRAVITY_MS2 * mean_depth_m)


@dataclass(frozen=True)
class Preview:
    """What an unfinished sheet gives so far; result is None until a velocity can be used.

    With faults the result rests on the faultless rows only.
    """

    result: Gauging | None
    section: Section
    faults: tuple[Fault, ...]


def panels_of(
    c: Columns, flows: Sequence[Flow], *, total_m3s: float, mid: bool
) -> tuple[Panel, ...]:
    """List the panels of all channels by one method; total_m3s: its discharge, for the shares."""
    panels: list[Panel] = []
    for flow in flows:
        p = flow.panels.mid if mid else flow.panels.mean
        places = (flow.rows - c.first_of_channel[flow.channel]).tolist()
        area = np.where(p.area_m2 > 0, p.area_m2, 1)
        columns = (
            [flow.channel] * len(p.flow_m3s),
            places if mid else [None, *places],
            p.from_m.tolist(),
            p.to_m.tolist(),
            p.area_m2.tolist(),
            (p.flow_m3s / area).tolist(),
            p.flow_m3s.tolist(),
            (p.flow_m3s / (total_m3s or np.inf)).tolist(),
        )
        panels += map(Panel._make, zip(*columns, strict=True))
    return tuple(panels)


def verticals_of(m: Measured) -> tuple[VerticalResult, ...]:
    """List the verticals that took part, soundings too."""
    c = m.columns
    place = np.arange(len(c.channel)) - c.first_of_channel[c.channel]
    velocity_ms = [None if v != v else v for v in m.velocity_ms.tolist()]
    product = [None if w != w else w for w in (m.depth_m * np.abs(m.velocity_ms)).tolist()]
    rows = zip(
        *(c.channel.tolist(), place.tolist(), c.distance_m.tolist(), m.depth_m.tolist()),
        *(velocity_ms, product, c.used.tolist()),
        strict=True,
    )
    return tuple(VerticalResult._make(row[:-1]) for row in rows if row[-1])

"""Rating sheets of curves that are no fit: typed segments, a typed table, a thin-plate weir."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from network.models import Curve as CurveRow
from network.numerics.ratings.curves import Segment, SegmentCurve, TableCurve
from network.numerics.ratings.weirs import RectangularNotch, VNotch, weir_table
from network.numerics.sentences import Refused, gettext_noop, sentence
from network.queries.rating_points import Points
from network.queries.rating_sheet import Sheet, examined
from network.queries.sentences import said


@dataclass(frozen=True)
class Range:
    """The range of use as typed; an empty end follows the gaugings or the table."""

    lowest_use_m: float | None = None
    highest_use_m: float | None = None
    extrapolate_low_m: float | None = None
    extrapolate_high_m: float | None = None

    def over(self, points: Points, low: float, high: float) -> dict[str, Any]:
        """Return what a kernel curve takes: the ends typed, else those given, and the gaugings'."""
        stages = points.stage_m[points.used]
        gauged = (float(stages.min()), float(stages.max())) if len(stages) else (None, None)
        return {
            "lowest_use_m": low if self.lowest_use_m is None else self.lowest_use_m,
            "highest_use_m": high if self.highest_use_m is None else self.highest_use_m,
            "extrapolate_to_low_m": self.extrapolate_low_m,
            "extrapolate_to_high_m": self.extrapolate_high_m,
            "gauged_lowest_m": gauged[0],
            "gauged_highest_m": gauged[1],
        }


def of_segments(
    rows: Sequence[tuple[float, float, float, float]], points: Points, use: Range
) -> Sheet:
    """Hold gaugings against typed segments (from stage, C, h₀, b); raises Refused for no curve."""
    stages = points.stage_m[points.used]
    high = use.highest_use_m if use.highest_use_m is not None else _highest(stages)
    segments = [Segment(*row) for row in rows]
    curve = SegmentCurve(segments=segments, **use.over(points, segments[0].lower_stage_m, high))
    return examined(curve, points)


def of_table(
    rows: Sequence[tuple[float, float]], points: Points, use: Range, *, rule: str, h0_m: float
) -> Sheet:
    """Hold gaugings against a typed table of stage and flow; raises Refused where it falls."""
    stage_m, flow_m3s = np.array(rows, np.float64).reshape(-1, 2).T
    if len(stage_m) < 2:
        raise Refused(sentence(gettext_noop("A table needs at least two points.")))
    curve = TableCurve(
        stages_m=stage_m,
        flows_m3s=flow_m3s,
        rule="log" if rule == CurveRow.Form.TABLE_LOG else "linear",
        h0_m=h0_m,
        **use.over(points, float(stage_m[0]), float(stage_m[-1])),
    )
    return examined(curve, points)


def of_weir(
    points: Points,
    use: Range,
    *,
    kind: str,
    crest_stage_m: float,
    height_m: float,
    channel_width_m: float,
    angle_deg: float | None,
    notch_width_m: float | None,
) -> Sheet:
    """Fill a table from a thin-plate weir by ISO 1438; limits passed come as findings.

    Raises Refused or ValueError with a sentence.
    """
    if use.lowest_use_m is None or use.highest_use_m is None:
        raise Refused(
            sentence(gettext_noop("Say from which to which stage the weir's curve is used."))
        )
    weir: VNotch | RectangularNotch
    if kind == "v-notch":
        weir = VNotch(
            angle_deg=angle_deg or 0.0, notch_height_m=height_m, channel_width_m=channel_width_m
        )
    else:
        weir = RectangularNotch(
            notch_width_m=notch_width_m or 0.0,
            crest_height_m=height_m,
            channel_width_m=channel_width_m,
        )
    table = weir_table(
        weir,
        crest_stage_m=crest_stage_m,
        lowest_stage_m=max(use.lowest_use_m, crest_stage_m + 0.001),
        highest_stage_m=use.highest_use_m,
    )
    ends = use.over(points, use.lowest_use_m, use.highest_use_m)
    curve = TableCurve(
        stages_m=table.stage_m,
        flows_m3s=table.flow_m3s,
        rule="log",
        h0_m=crest_stage_m,
        # a weir's curve rests on the standard: it is no extrapolation outside the gaugings
        **{**ends, "gauged_lowest_m": None, "gauged_highest_m": None},
    )
    found = [f"{said(finding.what)} ({finding.source})" for finding in table.findings]
    return examined(curve, points, findings=found)


def _highest(stages: Any) -> float:
    if not len(stages):
        raise Refused(sentence(gettext_noop("Say up to which stage the curve is used.")))
    return float(np.ceil(stages.max() * 100) / 100)

"""A gauging from its typed sheet to its result: the one way of making the number."""

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.gaugings import gauging_uncertainty as tables
from network.numerics.gaugings.channel_flows import channel_flows, whole_section
from network.numerics.gaugings.gauging_columns import Columns, lay_out
from network.numerics.gaugings.gauging_faults import BadSheet, find_faults
from network.numerics.gaugings.gauging_findings import Totals, of_whole
from network.numerics.gaugings.gauging_input import DischargeMethod, GaugingSettings, Meter, Sheet
from network.numerics.gaugings.gauging_result import Gauging, Preview, panels_of, verticals_of
from network.numerics.gaugings.gauging_uncertainty import Uncertainty
from network.numerics.gaugings.mean_stage import MeanStage, mean_stage
from network.numerics.gaugings.measured_verticals import Measured, flowing_depth_m, measure
from network.numerics.gaugings.unfinished_sheet import faultless_part
from network.numerics.gaugings.vertical_findings import of_verticals

COMMON_PRACTICE = GaugingSettings()


def compute(sheet: Sheet, settings: GaugingSettings = COMMON_PRACTICE) -> Gauging:
    """Compute a gauging from a complete sheet.

    Screen, stored row, workbook and PDF all take their numbers from here. Islands and piers:
    several channels, their discharges summed. SI units as in the field names.
    Raises BadSheet with every fault, by channel, vertical, point and field.
    Source: ISO 748 (verticals, both methods, uncertainty), ISO 9196 (ice); see each module.
    """
    columns = lay_out(sheet, settings)
    if faults := find_faults(sheet, columns):
        raise BadSheet(faults)
    return _computed(sheet, columns, settings)


def preview(sheet: Sheet, settings: GaugingSettings = COMMON_PRACTICE) -> Preview:
    """Give what a sheet gives so far, and its faults; a finished sheet gives compute's result.

    Raises nothing: rows at fault are left out, verticals without a usable velocity count as
    soundings.
    """
    try:
        done = compute(sheet, settings)
        return Preview(done, done.section, ())
    except BadSheet as bad:
        faults = bad.faults
    sheet, columns = faultless_part(sheet, lay_out(sheet, settings), faults)
    section = whole_section(columns, flowing_depth_m(columns))
    result = _computed(sheet, columns, settings) if (columns.method >= 0).any() else None
    return Preview(result, section, faults)


def _computed(sheet: Sheet, columns: Columns, settings: GaugingSettings) -> Gauging:
    measured = measure(sheet, columns, settings)
    section = whole_section(columns, measured.depth_m)
    flows = channel_flows(measured)
    mid = np.concatenate([f.panels.mid.flow_m3s for f in flows])
    mean = np.concatenate([f.panels.mean.flow_m3s for f in flows])
    rows = np.concatenate([f.rows for f in flows])
    mid_m3s, mean_m3s = float(mid.sum()), float(mean.sum())
    by_mid = settings.method == DischargeMethod.MID_SECTION
    stage = _stage(sheet, columns.time_s[rows], mid, settings)
    mid_panels = panels_of(columns, flows, total_m3s=mid_m3s, mid=True)
    mean_panels = panels_of(columns, flows, total_m3s=mean_m3s, mid=False)
    panels = mid_panels if by_mid else mean_panels
    totals = Totals(mid_m3s, mean_m3s, section.width_m, len(rows), panels)
    meter = sheet.meter
    # Mid-section shares of the result, whichever method gives it.
    shares_m3s = mid if by_mid or not mid_m3s else mid * (mean_m3s / mid_m3s)
    uncertainty = _uncertainty(
        measured,
        meter,
        rows=rows,
        flow_m3s=shares_m3s,
        width_m=section.width_m,
        settings=settings,
    )
    return Gauging(
        method=DischargeMethod(settings.method),
        mid_section_m3s=mid_m3s,
        mean_section_m3s=mean_m3s,
        section=section,
        uncertainty=uncertainty,
        stage=stage,
        mid_panels=mid_panels,
        mean_panels=mean_panels,
        verticals=verticals_of(measured),
        findings=(
            *of_whole(totals, meter=meter, stage=stage, settings=settings),
            *of_verticals(measured, meter=meter, wading=sheet.wading, settings=settings),
        ),
    )


def _uncertainty(
    m: Measured,
    meter: Meter | None,
    *,
    rows: Indices,
    flow_m3s: Floats,
    width_m: float,
    settings: GaugingSettings,
) -> Uncertainty:
    c, method, depth_m = m.columns, m.columns.method[rows], m.depth_m[rows]
    under_ice = c.ice_m[rows] > 0
    u_c, u_e = (_of_points(c, u)[rows] for u in _point_percent(m, meter, settings))
    return tables.combine(
        flow_m3s,
        verticals_percent=tables.verticals_percent(len(rows)),
        systematic_percent=settings.systematic_percent,
        random_percent=np.array(
            [
                np.full(len(rows), tables.width_percent(width_m)),
                tables.depth_percent(depth_m, settings.shallow_depth_percent),
                tables.points_percent(method, under_ice, settings),
                u_c,
                u_e,
            ]
        ),
        agency_values=tables.agency_values(depth_m, method, under_ice=under_ice, seconds=c.seconds),
    )


def _point_percent(
    m: Measured, meter: Meter | None, settings: GaugingSettings
) -> tuple[Floats, Floats]:
    """Give u_c and u_e of every point; an unknown meter counts as one of a group rating."""
    speed_ms, stated_s = m.point_velocity_ms, m.columns.seconds
    seconds = np.where(np.isnan(stated_s), settings.unstated_exposure_s, stated_s)
    if meter is not None and meter.standard_uncertainty_percent is not None:
        u_c = np.full(len(speed_ms), meter.standard_uncertainty_percent)
    else:
        single = meter is not None and meter.calibrated_singly
        u_c = tables.meter_percent(speed_ms, calibrated_singly=single)
    return u_c, tables.exposure_percent(speed_ms, seconds, m.columns.fraction)


def _of_points(c: Columns, u_percent: Floats) -> Floats:
    """Give √(mean of u² / n) over the n points of every vertical, 0 in a sounding."""
    count = np.maximum(np.bincount(c.point_vertical, minlength=len(c.method)), 1)
    squares = np.bincount(c.point_vertical, weights=u_percent**2, minlength=len(c.method))
    return np.asarray(np.sqrt(squares) / count, dtype=np.float64)


def _stage(
    sheet: Sheet, vertical_s: Floats, flow_m3s: Floats, settings: GaugingSettings
) -> MeanStage | None:
    if not sheet.stages:
        return None
    whole = sheet.started_s is not None and sheet.ended_s is not None
    return mean_stage(
        np.array([s.time_s for s in sheet.stages], dtype=np.float64),
        np.array([s.stage_m for s in sheet.stages], dtype=np.float64),
        vertical_s=vertical_s,
        flow_m3s=flow_m3s,
        period_s=(float(sheet.started_s or 0), float(sheet.ended_s or 0)) if whole else None,
        limit_m=settings.stage_change_m,
    )

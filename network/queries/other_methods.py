"""From what another method noted to its discharge: the sheet's rows given to the kernel."""

from itertools import groupby

import numpy as np

from network.numerics.gaugings import dilution, moving_boat, other_methods
from network.numerics.gaugings.gauging_faults import BadSheet, Fault
from network.numerics.gaugings.other_methods import OtherGauging
from network.numerics.gaugings.vertical_findings import Finding
from network.numerics.ratings.weirs import RectangularNotch, VNotch
from network.numerics.ratings.weirs import Weir as Notch
from network.numerics.sentences import gettext_noop, sentence
from network.queries.field_sheets import Boat, FieldSheet, Fills, Floats, Tracer, Weir

STATED = gettext_noop("stated with the result")
COMMON = gettext_noop("common practice")


def discharge(sheet: FieldSheet) -> OtherGauging:
    """Compute a gauging by another method, or take the result the heading states.

    Raises BadSheet naming row and field.
    """
    heading, other = sheet.heading, sheet.other
    if other is None:
        return _stated(heading.stated_discharge_m3s, heading.stated_u95_percent, heading.method)
    if isinstance(other, Weir):
        return _weir(other, heading.stated_u95_percent)
    if isinstance(other, Boat):
        return _boat(other)
    if isinstance(other, Floats):
        return _floats(other)
    if isinstance(other, Fills):
        return other_methods.volumetric(other.fills)
    return _tracer(other)


def _stated(
    flow_m3s: float | None,
    u95_percent: float | None,
    method: str,
    findings: tuple[Finding, ...] = (),
) -> OtherGauging:
    faults = []
    if flow_m3s is None:
        text = gettext_noop("Note what was measured, or state the discharge.")
        faults.append(Fault("stated_discharge_m3s", sentence(text)))
    if u95_percent is None or not 0 < u95_percent < np.inf:
        text = gettext_noop("State the uncertainty of the result in %, above 0.")
        faults.append(Fault("stated_u95_percent", sentence(text)))
    if flow_m3s is None or u95_percent is None or faults:
        raise BadSheet(tuple(faults))
    return OtherGauging(method, flow_m3s, ((STATED, u95_percent / 2),), (), findings, (STATED,))


def _weir(weir: Weir, u95_percent: float | None) -> OtherGauging:
    missing = [
        Fault(name, sentence(gettext_noop("This size of the weir is missing.")))
        for name in _sizes_of(weir)
        if getattr(weir, name) is None
    ]
    if missing:
        raise BadSheet(tuple(missing))
    head_m, crest_m, channel_m, opening = (float(getattr(weir, n)) for n in _sizes_of(weir))
    try:
        notch: Notch = (
            VNotch(opening, crest_m, channel_m)
            if weir.shape == "v"
            else RectangularNotch(opening, crest_m, channel_m)
        )
    except ValueError as error:
        text = gettext_noop("These are no sizes of a weir: {error}")
        raise BadSheet((Fault("shape", sentence(text, error=str(error))),)) from error
    flow_m3s = float(notch.flow_m3s(np.array([head_m]))[0])
    limits = notch.findings(lowest_head_m=head_m, highest_head_m=head_m)
    findings = tuple(Finding("weir", "head_m", f.what, f.limit, f.source) for f in limits)
    return _stated(flow_m3s, u95_percent, "weir", findings)


def _sizes_of(weir: Weir) -> tuple[str, ...]:
    width = "angle_deg" if weir.shape == "v" else "notch_width_m"
    return ("head_m", "crest_height_m", "channel_width_m", width)


def _boat(boat: Boat) -> OtherGauging:
    test = None
    if boat.bed_velocity_ms is not None and boat.water_velocity_ms is not None:
        test = moving_boat.MovingBedTest(boat.bed_velocity_ms, boat.water_velocity_ms)
    return moving_boat.by_moving_boat(
        [
            moving_boat.Transect(c.flow_m3s, c.seconds, c.from_left_bank)
            for c in boat.crossings
            if c.is_used
        ],
        bed_test=test,
        tracks_the_bed=boat.tracks_the_bed,
    )


def _floats(sheet: Floats) -> OtherGauging:
    in_order = sorted(sheet.floats, key=lambda row: row.panel)
    panels = []
    for _panel, rows in groupby(in_order, key=lambda row: row.panel):
        found = list(rows)
        areas = [row.area_m2 for row in found if row.area_m2 is not None]
        seconds = tuple(np.nan if row.seconds is None else row.seconds for row in found)
        panels.append(other_methods.FloatPanel(areas[0] if areas else None, seconds))
    length_m = np.nan if sheet.length_m is None else sheet.length_m
    return other_methods.by_float(length_m, panels)


def _tracer(tracer: Tracer) -> OtherGauging:
    values = [
        np.nan if sample.concentration_kgm3 is None else sample.concentration_kgm3
        for sample in tracer.samples
    ]
    if tracer.mass_kg is None:
        return dilution.constant_rate(
            values,
            injection_m3s=_number(tracer.injection_m3s),
            injected_kgm3=_number(tracer.injected_kgm3),
            background_kgm3=tracer.background_kgm3,
        )
    probes = []
    for probe in sorted({sample.probe for sample in tracer.samples}):
        pairs = [
            (_number(sample.seconds), value)
            for sample, value in zip(tracer.samples, values, strict=True)
            if sample.probe == probe
        ]
        times, concentrations = zip(*pairs, strict=True)
        probes.append(dilution.Probe(times, concentrations, tracer.background_kgm3))
    return dilution.sudden(tracer.mass_kg, probes)


def _number(value: float | None) -> float:
    return np.nan if value is None else value

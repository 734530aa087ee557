"""Raw recorder values to stage: the sensor setting in force, then the accepted corrections."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from network.numerics.arrays import Floats, Seconds
from network.numerics.sentences import Refused, gettext_noop, sentence

CHUNK = 8192  # readings worked on at a time, so that they stay in the cache


@dataclass(frozen=True, eq=False)
class SensorSettings:
    """A chain of settings, stage = scale × raw + offset, each in force until the next begins.

    starts_s int64[k] rising; scale float64[k], NaN where none is in force; offset_m float64[k].
    Raises Refused where the arrays differ in number or the starts do not rise.
    """

    starts_s: Seconds
    scale: Floats
    offset_m: Floats

    def __post_init__(self) -> None:
        if not self.starts_s.shape == self.scale.shape == self.offset_m.shape:
            raise Refused(
                sentence(
                    gettext_noop("Starts, scales and offsets of the settings differ in number.")
                )
            )
        if (np.diff(self.starts_s) <= 0).any():
            raise Refused(sentence(gettext_noop("The settings do not follow one another in time.")))


@dataclass(frozen=True)
class StageCorrection:
    """An offset added to stage for start_s ≤ t < end_s, linear in time between its two ends.

    The end is not included, so of two adjoining corrections only the second holds at the instant
    they share; this is also the rule of every chain: one ends when the next begins.
    Raises Refused where the end is not after the start.
    """

    start_s: int
    end_s: int
    start_offset_m: float
    end_offset_m: float

    def __post_init__(self) -> None:
        if self.end_s <= self.start_s:
            raise Refused(sentence(gettext_noop("A correction ends after it starts.")))

    def offset_at(self, times_s: Seconds) -> Floats:
        """Give the offset, in m, at times inside the correction."""
        slope = (self.end_offset_m - self.start_offset_m) / (self.end_s - self.start_s)
        # offset(t) = offset at start + slope · (t − start)
        offset_m = (times_s - self.start_s).astype(np.float64)
        offset_m *= slope
        offset_m += self.start_offset_m
        return offset_m


def to_stage(
    times_s: Seconds,
    raw_m: Floats,
    *,
    settings: SensorSettings,
    corrections: Sequence[StageCorrection] = (),
) -> Floats:
    """Turn raw values into stage above station zero.

    times_s int64[n] rising, raw_m float64[n]; gives stage_m float64[n], NaN where no setting is in
    force. Corrections may overlap and then add up. Source: common practice (linear drift between
    two checks of the recorder).
    """
    stage_m = np.empty(len(raw_m))
    edges = [*np.searchsorted(times_s, settings.starts_s).tolist(), len(times_s)]
    stage_m[: edges[0]] = np.nan
    for i, (start, stop) in enumerate(pairwise(edges)):
        for at in range(start, stop, CHUNK):
            part = slice(at, min(at + CHUNK, stop))
            # stage = scale · raw + offset
            np.multiply(raw_m[part], settings.scale[i], out=stage_m[part])
            stage_m[part] += settings.offset_m[i]
    starts = times_s.searchsorted([correction.start_s for correction in corrections])
    stops = times_s.searchsorted([correction.end_s for correction in corrections])
    for correction, start, stop in zip(corrections, starts, stops, strict=True):
        stage_m[start:stop] += correction.offset_at(times_s[start:stop])
    return stage_m

"""Whether the highest reading of a period may have been passed where nothing was read."""

import numpy as np

from network.numerics.arrays import Floats, MarkBits
from network.numerics.marks import Mark

UNRECORDED = Mark.MISSING | Mark.WITHHELD | Mark.PARTIAL
NOT_READ = Mark.ESTIMATED | Mark.TYPED


def may_hide_peak(mean: Floats, highest: Floats, marks: MarkBits) -> bool:
    """Tell whether a peak above the highest reading may have fallen where nothing was read.

    mean float64[n] of the days and highest float64[n], their highest reading, in one unit, NaN
    where there is none; marks uint8[n]. True where a day is missing, withheld or partly recorded,
    and where the mean of an estimated or typed day, raised as far above it as the peak of any
    recorded day lies above its own mean, would pass the highest reading. Own rule.
    """
    if (marks & UNRECORDED).any():
        return True
    not_read = (marks & NOT_READ) > 0
    recorded = ~not_read & (mean > 0) & ~np.isnan(highest)
    if not not_read.any() or not recorded.any():
        return bool(not_read.any())
    # r = max(peak / mean) of recorded days; hidden where r · mean > highest
    ratio = float((highest[recorded] / mean[recorded]).max())
    return bool(ratio * np.nanmax(mean[not_read], initial=0.0) > np.nanmax(highest))

"""Names for the array types the kernel takes and gives."""

import numpy as np
import numpy.typing as npt

Floats = npt.NDArray[np.float64]
Bools = npt.NDArray[np.bool_]
Seconds = npt.NDArray[np.int64]  # epoch seconds UTC, or lengths of time in seconds
MarkBits = npt.NDArray[np.uint8]  # bits of network.numerics.marks.Mark
Indices = npt.NDArray[np.intp]

"""The marks a reading, a flow or a day can carry; several at once, none meaning recorded."""

from enum import IntFlag


class Mark(IntFlag):
    """Say how a value came about; the bits are stored in blocks, so they never change meaning."""

    ESTIMATED = 1
    PARTIAL = 2
    EXTRAPOLATED = 4
    ICE_OR_BACKWATER = 8
    TYPED = 16
    WITHHELD = 32
    MISSING = 64

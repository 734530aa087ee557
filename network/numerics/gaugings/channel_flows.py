"""The measured verticals of a gauging, channel by channel, to section and flow."""

from typing import NamedTuple

import numpy as np

from network.numerics.arrays import Floats, Indices
from network.numerics.gaugings.gauging_columns import Columns
from network.numerics.gaugings.measured_verticals import Measured
from network.numerics.gaugings.velocity_area import ChannelFlow, Section, discharge, joined, section


class Flow(NamedTuple):
    """One channel's panels; rows: its velocity verticals among all."""

    channel: int
    rows: Indices
    panels: ChannelFlow

    @property
    def zone_rows(self) -> Indices:
        """Give the vertical with which each zone begins, the first one for the zone at a bank."""
        return np.concatenate((self.rows[:1], self.rows))


def _nodes(c: Columns, channel: int) -> Indices:
    rows = c.of_channel(channel)
    return np.asarray(rows.start + c.used[rows].nonzero()[0], dtype=np.intp)


def _across(banks: Floats, values: Floats) -> Floats:
    return np.concatenate((banks[:1], values, banks[1:]))


def whole_section(c: Columns, depth_m: Floats) -> Section:
    """Measure the section of all channels; depth_m float64[n] of flowing water at the verticals."""
    channels = range(len(c.bank_distance_m))
    return joined([_section_of(c, channel, depth_m) for channel in channels])


def _section_of(c: Columns, channel: int, depth_m: Floats) -> Section:
    rows = _nodes(c, channel)
    return section(
        _across(c.bank_distance_m[channel], c.distance_m[rows]),
        _across(c.bank_depth_m[channel], depth_m[rows]),
        _across(np.zeros(2), c.ice_m[rows]),
    )


def channel_flows(m: Measured) -> list[Flow]:
    """Compute the panels of every channel in which a velocity was measured."""
    c, flows = m.columns, []
    for channel in range(len(c.bank_distance_m)):
        rows = _nodes(c, channel)
        if not (c.method[rows] >= 0).any():
            continue
        panels = discharge(
            _across(c.bank_distance_m[channel], c.distance_m[rows]),
            _across(c.bank_depth_m[channel], m.depth_m[rows]),
            _across(c.bank_velocity_ms[channel], m.velocity_ms[rows]),
            (float(c.bank_factor[channel, 0]), float(c.bank_factor[channel, 1])),
        )
        flows.append(Flow(channel, rows[panels.verticals - 1], panels))
    return flows

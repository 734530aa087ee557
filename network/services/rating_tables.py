"""The table of a rating version as a file to hand on."""

from network.formats import rating_csv
from network.models import Curve
from network.queries import clock, curves, rating_table


def csv(row: Curve) -> bytes:
    """Return every centimetre of a version's range as CSV, headed by what it is.

    Raises Refused where the row is no curve.
    """
    cells = rating_table.centimetres(curves.kernel_curve(row))
    about = (
        clock.agency().name,
        str(row.station),
        f"rating version {row.number}, {row.state}",
        f"used from {row.lowest_use_m:g} to {row.highest_use_m:g} m above station zero",
    )
    rows = ((cell.stage_m, cell.flow_m3s, cell.extrapolated) for cell in cells)
    return rating_csv.write(rows, about=about)


def file_name(row: Curve, ending: str) -> str:
    """Return the name of a file about a version, such as "VE-010_rating_3.csv"."""
    name = f"{row.station.code}_rating_{row.number}"
    return "".join(c if c.isalnum() or c in "-_" else "-" for c in name) + ending

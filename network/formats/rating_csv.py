"""A rating table as CSV: a stage and its flow on each line."""

import csv
import io
from collections.abc import Iterable

HEADER = ("stage_m", "flow_m3s", "extrapolated")
Row = tuple[float, float | None, bool]


def write(rows: Iterable[Row], *, about: Iterable[str] = ()) -> bytes:
    """Return the rows as UTF-8 CSV, each line of about before them behind a #.

    Stages to the centimetre, flows with six significant digits; a flow that is not known is empty.
    """
    text = io.StringIO(newline="")
    for line in about:
        text.write(f"# {line}\r\n")
    writer = csv.writer(text)
    writer.writerow(HEADER)
    for stage_m, flow_m3s, extrapolated in rows:
        flow = "" if flow_m3s is None else f"{flow_m3s:.6g}"
        writer.writerow((f"{stage_m:.2f}", flow, "yes" if extrapolated else ""))
    return text.getvalue().encode()

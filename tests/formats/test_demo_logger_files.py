"""Logger files of the demo come back through the program's own reader as they were written."""

import io
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path

import numpy as np
import pytest

from network.formats.demo_logger_files import profile_of, write_logger_file
from network.formats.demo_scenario import read_scenario
from network.formats.logger_csv import read

FOLDER = Path(__file__).resolve().parents[2] / "fixtures_demo"
FILES = read_scenario(FOLDER).logger_files


def month_of(file):
    """About a month of readings round the file's own start, to 1 mm."""
    start_s = int(file.start.timestamp())
    times_s = np.arange(start_s - 9000, start_s + 30 * 86_400, 900)
    return times_s, np.round(0.8 + 0.3 * np.sin(times_s / 90_000), 3)


@pytest.mark.parametrize("file", FILES, ids=lambda file: file.file_name)
def test_a_file_is_read_back_to_the_millimetre(file):
    times_s, raw_m = month_of(file)
    data = write_logger_file(file, times_s=times_s.tolist(), raw_m=raw_m.tolist())
    found = read(io.BytesIO(data), profile_of(file))
    inside = times_s >= file.start.timestamp()
    assert np.array_equal(found.times_s, times_s[inside])
    assert found.values_m == pytest.approx(raw_m[inside], abs=1e-9)
    written = sum(row.before_row < inside.sum() for row in file.faulty_rows)
    assert len(found.faults) == written


def test_the_files_differ_in_their_quirks():
    for quirk in ("delimiter", "encoding", "unit", "time_format"):
        assert len({getattr(file, quirk) for file in FILES}) == len(FILES) >= 2


def test_a_civil_clock_jumps_in_spring():
    [file] = [file for file in FILES if file.zone]
    around_s = int(datetime(2023, 3, 26, 0, 45, tzinfo=UTC).timestamp())
    file = replace(file, heading=())
    text = write_logger_file(file, times_s=[around_s, around_s + 900], raw_m=[1.0, 1.0])
    before, after = text.decode(file.encoding).split(file.line_end)[:2]
    assert before.startswith("26.03.2023 01:45;1000")
    assert after.startswith("26.03.2023 03:00;1000")


def test_times_and_values_of_different_length_are_refused():
    with pytest.raises(ValueError, match="zip"):
        write_logger_file(FILES[0], times_s=[int(FILES[0].start.timestamp())] * 2, raw_m=[1.0])

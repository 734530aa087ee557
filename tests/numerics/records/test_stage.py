"""Raw values to stage: the setting in force, then corrections linear in time."""

import numpy as np
import pytest

from network.numerics.records.stage import SensorSettings, StageCorrection, to_stage
from network.numerics.sentences import Refused

HOUR_S = 3600
TIMES_S = np.arange(6, dtype=np.int64) * HOUR_S


def settings(*rows):
    starts_s, scale, offset_m = zip(*rows, strict=True)
    return SensorSettings(np.array(starts_s), np.array(scale, float), np.array(offset_m, float))


def stages(raw_m, chain, *corrections):
    raw_m = np.array(raw_m, float)
    return to_stage(TIMES_S, raw_m, settings=chain, corrections=corrections).tolist()


def test_each_setting_holds_from_its_start_until_the_next_begins():
    chain = settings((HOUR_S, 1, 0.5), (3 * HOUR_S, 2, 0), (5 * HOUR_S, np.nan, 0))
    # 0 h: none yet; 1–2 h: raw + 0.5; 3–4 h: 2 · raw; 5 h: none in force
    expected = [np.nan, 1.5, 1.5, 2.0, 2.0, np.nan]
    np.testing.assert_array_equal(stages([1] * 6, chain), expected)


def test_a_datum_move_in_mid_record_leaves_no_step_when_the_setting_follows_it():
    # The zero sinks by 0.250 m at 3 h: the same water stands 0.250 m higher above it, and the
    # setting of that instant says so; the stage jumps by exactly the move.
    chain = settings((0, 1, 0.1), (3 * HOUR_S, 1, 0.35))
    assert stages([1, 1, 1, 1, 1, 1], chain) == [1.1, 1.1, 1.1, 1.35, 1.35, 1.35]


def test_a_correction_grows_linearly_and_does_not_hold_at_its_end():
    # 0 to −0.04 m over four hours: −0.01 m an hour; the recorder was reset at 4 h
    drift = StageCorrection(0, 4 * HOUR_S, 0.0, -0.04)
    expected = [1.0, 0.99, 0.98, 0.97, 1.0, 1.0]
    assert stages([1] * 6, settings((0, 1, 0)), drift) == pytest.approx(expected, abs=1e-15)


def test_of_two_adjoining_corrections_only_the_second_holds_where_they_meet():
    first = StageCorrection(0, 3 * HOUR_S, 0.02, 0.02)
    second = StageCorrection(3 * HOUR_S, 5 * HOUR_S, 0.05, 0.05)
    expected = [1.02, 1.02, 1.02, 1.05, 1.05, 1.0]
    assert stages([1] * 6, settings((0, 1, 0)), first, second) == expected


def test_corrections_that_overlap_add_up():
    wide = StageCorrection(0, 6 * HOUR_S, 0.5, 0.5)
    narrow = StageCorrection(2 * HOUR_S, 4 * HOUR_S, 0.25, 0.25)
    expected = [1.5, 1.5, 1.75, 1.75, 1.5, 1.5]
    assert stages([1] * 6, settings((0, 1, 0)), wide, narrow) == expected


def test_a_part_of_the_record_gets_the_same_stages_to_the_last_bit():
    raw_m = np.array([1.1, 1.2, 1.7, 1.3, 1.4, 1.9])
    chain, drift = settings((0, 1.003, 0.1)), (StageCorrection(0, 21_601, 0.0, 0.017),)
    whole = to_stage(TIMES_S, raw_m, settings=chain, corrections=drift)
    part = to_stage(TIMES_S[2:5], raw_m[2:5], settings=chain, corrections=drift)
    assert (part == whole[2:5]).all()


def test_the_raw_values_stay_as_they_are():
    raw_m = np.ones(6)
    to_stage(TIMES_S, raw_m, settings=settings((0, 2, 3)))
    assert raw_m.tolist() == [1.0] * 6


def test_a_correction_that_ends_before_it_starts_is_refused():
    with pytest.raises(Refused, match="ends after it starts"):
        StageCorrection(10, 10, 0.0, 0.0)


def test_settings_out_of_order_are_refused():
    with pytest.raises(Refused, match="follow one another"):
        settings((10, 1, 0), (10, 1, 0))

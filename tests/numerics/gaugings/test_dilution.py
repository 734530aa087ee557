"""Tracer dilution: plateau and cloud."""

import math

import pytest

from network.numerics.gaugings.dilution import Probe, constant_rate, sudden
from network.numerics.gaugings.gauging_faults import BadSheet


def kinds(result):
    return [finding.kind for finding in result.findings]


def plateau(*samples, **changes):
    given = {"injection_m3s": 1e-5, "injected_kgm3": 100.0, "background_kgm3": 0.0001} | changes
    return constant_rate(samples, **given)


def test_constant_rate_by_hand():
    # Q = 1e-5·(100 − 0.0011)/(0.0011 − 0.0001) = 0.999989 m³/s.
    result = plateau(0.0011, 0.0011, 0.0011)
    assert result.discharge_m3s == pytest.approx(0.999989, abs=1e-9)
    assert result.findings == ()
    # 1 %, 2 %, and 3/√3 = 1.732 % (agency): u = √8 = 2.828 %.
    assert result.u95_percent == pytest.approx(2 * math.sqrt(8))


def test_an_unmixed_plateau_is_asked():
    assert kinds(plateau(0.0010, 0.0012)) == ["mixing"]


def test_one_sample_says_nothing_about_mixing():
    assert kinds(plateau(0.0011)) == ["mixing_unknown"]


def test_a_plateau_near_the_background_is_asked():
    assert kinds(plateau(0.0004, 0.0004)) == ["low_rise"]


def test_faults_of_a_plateau():
    with pytest.raises(BadSheet) as refused:
        plateau(0.00005, 200.0, injection_m3s=0.0, background_kgm3=0.0001)
    assert [(f.row, f.field) for f in refused.value.faults] == [
        *[(0, "injection_m3s"), (0, "samples_kgm3"), (1, "injected_kgm3")],
    ]
    with pytest.raises(BadSheet, match="No sample"):
        plateau()
    with pytest.raises(BadSheet, match="background"):
        plateau(0.001, background_kgm3=-1.0)


# A triangle of 0.01 kg/m³ over 200 s above 0.001: ∫ = 1.0 kg·s/m³.
TRIANGLE = Probe((0.0, 100.0, 200.0), (0.001, 0.011, 0.001), 0.001)


def test_sudden_injection_by_hand():
    # Q = 2 kg / 1 kg·s/m³.
    result = sudden(2.0, [TRIANGLE, TRIANGLE])
    assert result.discharge_m3s == pytest.approx(2.0)
    assert result.repeats_m3s == pytest.approx((2.0, 2.0))
    assert result.findings == ()


def test_probes_that_disagree_are_asked():
    other = Probe((0.0, 100.0, 220.0), (0.001, 0.011, 0.001), 0.001)
    assert kinds(sudden(2.0, [TRIANGLE, other])) == ["mixing"]


def test_a_cloud_cut_off_is_asked():
    cut = Probe((0.0, 100.0, 190.0), (0.001, 0.011, 0.002), 0.001)
    result = sudden(2.0, [TRIANGLE, cut])
    (tail,) = [finding for finding in result.findings if finding.kind == "tail"]
    assert (tail.row, tail.limit) == (1, 2.0)
    assert "10.0 %" in str(tail.sentence)


def test_faults_of_the_probes():
    bad = [
        Probe((0.0, 1.0), (0.0, 1.0), 0.0),
        Probe((0.0, 2.0, 1.0), (0.0, 1.0, 0.0), 0.0),
        Probe((0.0, 1.0, 2.0), (0.5, 0.5, 0.5), 0.5),
    ]
    with pytest.raises(BadSheet) as refused:
        sudden(0.0, bad)
    assert [(f.row, f.field) for f in refused.value.faults] == [
        *[(0, "mass_kg"), (0, "times_s"), (1, "times_s"), (2, "concentration_kgm3")],
    ]
    with pytest.raises(BadSheet, match="No probe"):
        sudden(1.0, [])

"""Thin-plate weirs: published flows, the limits of the standard, the table of a version."""

import numpy as np
import pytest

from network.numerics.ratings.weirs import RectangularNotch, VNotch, weir_table

FT = 0.3048


def texts(findings):
    return [str(finding.what) for finding in findings]


@pytest.mark.parametrize(
    ("angle_deg", "litres_per_s"),
    [(60, [0.7310, 1.277, 2.014]), (45, [0.5243, 0.9160, 1.445])],
)
def test_v_notch_with_the_coefficient_of_the_astm_tabulation(angle_deg, litres_per_s):
    # ASTM D5242 (read): heads 0.20, 0.25, 0.30 ft. Its one coefficient, 796.7 and 571.4 l/s, is
    # Cd = 0.584 without head correction; 3 figures of Cd allow 0.1 %.
    notch = VNotch(angle_deg, 1, 3, coefficient=0.584, head_correction_m=0.0)
    flow = notch.flow_m3s(np.array([0.20, 0.25, 0.30]) * FT)
    np.testing.assert_allclose(flow * 1000, litres_per_s, rtol=1e-3)


@pytest.mark.parametrize(("angle_deg", "within"), [(60, 0.035), (45, 0.06)])
def test_kindsvater_shen_stays_near_the_astm_tabulation(angle_deg, within):
    # at 6–9 cm the head correction, which ASTM leaves out, is worth 3–6 % and falls with the head
    heads_m = np.array([0.20, 0.25, 0.30]) * FT
    ours = VNotch(angle_deg, 1, 3).flow_m3s(heads_m)
    astm = VNotch(angle_deg, 1, 3, coefficient=0.584, head_correction_m=0.0).flow_m3s(heads_m)
    excess = ours / astm - 1
    assert (excess > 0).all()
    assert (excess < within).all()
    assert (np.diff(excess) < 0).all()


def test_the_right_angled_notch_has_its_well_known_coefficient_and_correction():
    # from memory of ISO 1438: Cd 0.578, k_h 0.85 mm for 90°; h = 0.2 m:
    # 0.578 · 8/15 · √19.6133 · 0.20085^2.5 = 0.024684 m³/s; the polynomial is good to 0.2 %
    flow = VNotch(90, 1, 3).flow_m3s(np.array([0.2]))
    assert flow[0] == pytest.approx(0.024684, rel=2e-3)


def test_rehbock_over_the_full_width():
    # reference README, section 6: h 0.3, p 0.4, b 2 m → 0.6487 m³/s. 0.1 %: the published
    # coefficients and corrections of the head (1.1 or 1.2 mm) differ by half of that.
    flow = RectangularNotch(2, 0.4, 2).flow_m3s(np.array([0.3]))
    assert flow[0] == pytest.approx(0.6487, rel=1e-3)


def test_kindsvater_carter_worked_by_hand():
    # b/B = 0.5: a = 0.592, a' = 0.0119, k_b = 3.15 mm between the tabulated ratios; h 0.2, p 0.5:
    # Cd = 0.59676; Q = 0.59676 · 2/3 · √19.6133 · 0.50315 · 0.201^1.5 = 0.079887 m³/s
    flow = RectangularNotch(0.5, 0.5, 1).flow_m3s(np.array([0.2]))
    assert flow[0] == pytest.approx(0.079887, rel=1e-4)


@pytest.mark.parametrize("weir", [VNotch(90, 1, 3), RectangularNotch(0.5, 0.5, 1)])
def test_flow_is_zero_up_to_the_crest_and_rises_above_it(weir):
    flow = weir.flow_m3s(np.array([-0.1, 0.0, 0.001, 0.01, 0.1, 0.5]))
    assert flow[:2].tolist() == [0.0, 0.0]
    assert (np.diff(flow[1:]) > 0).all()


def test_a_weir_within_the_limits_has_no_findings():
    assert VNotch(90, 1, 3).findings(lowest_head_m=0.06, highest_head_m=0.38) == ()
    assert RectangularNotch(2, 0.5, 2).findings(lowest_head_m=0.03, highest_head_m=0.5) == ()
    assert RectangularNotch(0.5, 0.5, 1).findings(lowest_head_m=0.03, highest_head_m=0.5) == ()


def test_every_limit_of_a_v_notch_is_named_with_its_source():
    found = VNotch(15, 0.05, 1).findings(lowest_head_m=0.02, highest_head_m=0.3)
    assert texts(found) == [
        "notch angle 15° below 20°",
        "head 0.02 m below 0.06 m",
        "notch height 0.05 m below 0.09 m",
        "h/p 6 above 0.35",
        "p/B 0.05 below 0.1",
        "h/B 0.3 above 0.2: the notch is not fully contracted",
    ]
    assert {finding.source for finding in found} == {"ISO 1438", "USBR Water Measurement Manual"}
    assert (found[1].value, found[1].limit) == (0.02, 0.06)
    wide = VNotch(120, 4, 2).findings(lowest_head_m=0.1, highest_head_m=0.3)
    assert texts(wide) == ["notch angle 120° above 100°", "p/B 2 above 1.5"]


def test_every_limit_of_a_rectangular_notch_is_named():
    full = RectangularNotch(0.2, 0.05, 0.2).findings(lowest_head_m=0.01, highest_head_m=0.8)
    assert texts(full) == [
        "head 0.01 m below 0.03 m",
        "notch width 0.2 m below 0.3 m",
        "crest height 0.05 m below 0.1 m",
        "h/p 16 above 1",
        "head 0.8 m above 0.75 m",
    ]
    part = RectangularNotch(0.1, 0.2, 0.2).findings(lowest_head_m=0.03, highest_head_m=0.3)
    assert texts(part) == ["notch width 0.1 m below 0.15 m", "side 0.05 m below 0.1 m"]


def test_the_table_starts_with_zero_flow_at_the_crest_and_ends_at_the_highest_stage():
    table = weir_table(
        VNotch(90, 1, 3), crest_stage_m=0.2, lowest_stage_m=0.25, highest_stage_m=0.505
    )
    assert table.stage_m[:3].tolist() == [0.2, 0.21, 0.22]
    assert table.stage_m[-2:].tolist() == [0.5, 0.505]
    assert table.flow_m3s[0] == 0
    assert (np.diff(table.flow_m3s) > 0).all()
    assert texts(table.findings) == ["head 0.05 m below 0.06 m"]


def test_impossible_sizes_and_stages_are_refused():
    with pytest.raises(ValueError, match="notch_height_m must be positive"):
        VNotch(90, 0, 3)
    with pytest.raises(ValueError, match="between 0 and 180"):
        VNotch(180, 1, 3)
    with pytest.raises(ValueError, match="wider than its channel"):
        RectangularNotch(2, 1, 1.5)
    with pytest.raises(ValueError, match="do not rise"):
        weir_table(VNotch(90, 1, 3), crest_stage_m=1, lowest_stage_m=1, highest_stage_m=2)
    with pytest.raises(ValueError, match="step_m must be positive"):
        weir_table(VNotch(90, 1, 3), crest_stage_m=0, lowest_stage_m=1, highest_stage_m=2, step_m=0)

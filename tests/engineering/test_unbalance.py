"""Unbalance against phasors: symmetrical components of voltages whose sequences are known."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.unbalance import deviation_from_mean_pct, negative_sequence_share_pct
from audit.engineering.unbalance_effect import (
    CURVE_DERATING,
    CURVE_UNBALANCE_PCT,
    negative_sequence_current_pct,
    negative_sequence_share_at_load_pct,
    open_phase_delta_winding_pu,
    unbalance_derating_by_heating_ratio,
    unbalance_derating_ratio,
)

A = np.exp(2j * np.pi / 3)
shares = st.floats(0.001, 0.9)
angles = st.floats(0, 2 * np.pi)


def magnitudes(share: float, angle: float) -> list[float]:
    """Compose three phasors of positive sequence 1 and negative sequence of the given share and angle."""
    negative = share * np.exp(1j * angle)
    return [abs(1 + negative), abs(A**2 + A * negative), abs(A + A**2 * negative)]


@given(shares, angles, st.floats(0.1, 10_000))
def test_share_of_negative_sequence_is_found_in_three_magnitudes(share, angle, scale):
    three = [scale * magnitude for magnitude in magnitudes(share, angle)]
    assert negative_sequence_share_pct(*three).item() == pytest.approx(100 * share, rel=1e-5)


@given(st.floats(0.001, 0.05), angles)
def test_deviation_from_the_mean_lies_a_little_below_for_small_unbalance(share, angle):
    # the ratio lies between 1 and 2 / sqrt(3) = 1.155 for small unbalance
    three = magnitudes(share, angle)
    ratio = negative_sequence_share_pct(*three) / deviation_from_mean_pct(*three)
    assert 1 - 2 * share < ratio < 2 / np.sqrt(3) + 2 * share


def test_balanced_lines_have_no_unbalance():
    assert negative_sequence_share_pct(400, 400, 400).item() == pytest.approx(0, abs=1e-4)
    assert deviation_from_mean_pct(400, 400, 400).item() == 0


def test_three_values_that_close_no_triangle_are_no_voltages():
    assert np.isnan(negative_sequence_share_pct(400, 400, 900))


def test_three_dead_lines_have_no_unbalance():
    assert np.isnan(negative_sequence_share_pct(0, 0, 0))
    assert np.isnan(deviation_from_mean_pct(0, 0, 0))


def test_order_of_the_lines_does_not_matter():
    given_ = (460, 467, 450)
    for order in ((0, 2, 1), (2, 0, 1)):
        turned = [given_[place] for place in order]
        assert deviation_from_mean_pct(*turned) == pytest.approx(deviation_from_mean_pct(*given_))
        assert negative_sequence_share_pct(*turned) == pytest.approx(negative_sequence_share_pct(*given_))


def test_heating_model_follows_the_published_curve():
    # q = 8 and 6 times full load: a weight in use against points read off NEMA MG 1 figure 14-1
    by_heating = unbalance_derating_by_heating_ratio(CURVE_UNBALANCE_PCT, 8, 6)
    assert by_heating == pytest.approx(CURVE_DERATING, abs=0.02)


@given(st.floats(0, 5), st.floats(0, 5))
def test_more_unbalance_never_lets_more_load_be_carried(one, other):
    low, high = sorted((one, other))
    assert unbalance_derating_ratio(high) <= unbalance_derating_ratio(low)
    assert unbalance_derating_by_heating_ratio(high, 6, 6) <= unbalance_derating_by_heating_ratio(low, 6, 6)


def test_curve_ends_where_a_motor_should_not_run():
    assert unbalance_derating_ratio(5).item() == 0.76
    assert np.isnan(unbalance_derating_ratio([5.01, -0.1])).all()


@given(st.floats(0.1, 5), st.floats(3, 9), st.floats(0.2, 1.2))
def test_negative_sequence_current_is_voltage_over_locked_rotor_impedance(percent, multiple, load):
    impedance = 1 / multiple
    of_full_load = percent / impedance
    assert negative_sequence_current_pct(percent, multiple).item() == pytest.approx(of_full_load)
    share = negative_sequence_share_at_load_pct(percent, multiple, load).item()
    assert share == pytest.approx(of_full_load / load)


@given(st.floats(0.1, 3))
def test_open_line_splits_the_delta_two_to_one(line_pu):
    # node equations of three equal impedances in delta, fed between two corners, the third corner open
    laplacian = np.array([[2, -1, -1], [-1, 2, -1], [-1, -1, 2]], dtype=float)
    corner = np.linalg.solve(laplacian[:2, :2], [line_pu, 0.0])  # third corner at zero takes the current out
    across = abs(corner[0] - 0.0)
    rated_winding = 1 / np.sqrt(3)
    assert open_phase_delta_winding_pu(line_pu).item() == pytest.approx(across / rated_winding)

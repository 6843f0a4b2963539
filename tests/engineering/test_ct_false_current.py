"""Bounds of false residual and false differential against many random sets of transformers."""

from __future__ import annotations

import numpy as np
import pytest

from audit.engineering.ct_false_current import (
    false_differential_a,
    false_differential_composite_a,
    false_residual_a,
    false_residual_composite_a,
    false_residual_one_sided_a,
    false_residual_rms_a,
)

SETS = 400_000
CURRENT_A = 600.0
ERROR = 0.01
PHASES = CURRENT_A * np.exp(2j * np.pi * np.arange(3) / 3)


@pytest.fixture(scope="module")
def chance():
    return np.random.default_rng(20240501)


def residual(errors):
    return np.abs((errors * PHASES).sum(axis=1))


def test_errors_either_way_stay_within_the_bound_and_reach_it(chance):
    bound = false_residual_a(CURRENT_A, 100 * ERROR).item()
    drawn = residual(chance.uniform(-ERROR, ERROR, (SETS, 3)))
    assert drawn.max() <= bound
    assert drawn.max() > 0.97 * bound
    assert residual(np.array([[ERROR, -ERROR, -ERROR]])).item() == pytest.approx(bound, rel=1e-12)


def test_errors_one_way_stay_within_the_bound_and_reach_it(chance):
    bound = false_residual_one_sided_a(CURRENT_A, 100 * ERROR).item()
    drawn = residual(chance.uniform(-ERROR, 0, (SETS, 3)))
    assert drawn.max() <= bound
    assert drawn.max() > 0.97 * bound
    assert residual(np.array([[-ERROR, 0, 0]])).item() == pytest.approx(bound, rel=1e-12)


def test_composite_errors_at_any_angle_stay_within_the_bound_and_reach_it(chance):
    bound = false_residual_composite_a(CURRENT_A, 5).item()
    angles = chance.uniform(0, 2 * np.pi, (SETS, 3))
    drawn = residual(0.05 * np.exp(1j * angles))
    assert drawn.max() <= bound
    assert drawn.max() > 0.97 * bound


def test_root_mean_square_of_independent_errors(chance):
    drawn = residual(chance.uniform(-ERROR, ERROR, (SETS, 3)))
    root_mean_square = np.sqrt((drawn**2).mean())
    # 400,000 sets: the estimate scatters by about 0.1 per cent
    assert false_residual_rms_a(CURRENT_A, 100 * ERROR).item() == pytest.approx(root_mean_square, rel=0.005)


def test_differential_stays_within_the_bounds_and_reaches_them(chance):
    ratio = chance.uniform(-ERROR, ERROR, (SETS, 2))
    drawn = CURRENT_A * np.abs(ratio[:, 0] - ratio[:, 1])
    bound = false_differential_a(CURRENT_A, 100 * ERROR).item()
    assert 0.97 * bound < drawn.max() <= bound
    composite = 0.05 * np.exp(1j * chance.uniform(0, 2 * np.pi, (SETS, 2)))
    drawn = CURRENT_A * np.abs(composite[:, 0] - composite[:, 1])
    bound = false_differential_composite_a(CURRENT_A, 5).item()
    assert 0.97 * bound < drawn.max() <= bound * (1 + 1e-12)

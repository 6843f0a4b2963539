"""Functions over child rows: which rows count, which one decides, and what stays missing."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.expression import rows

ALL = np.zeros(4, dtype=np.int64)
NAN = np.nan


def test_a_condition_leaves_rows_out_of_the_median_and_the_count():
    values, on = np.array([1.0, 2.0, 9.0, 100.0]), np.array([1.0, 1.0, 1.0, 0.0])
    assert rows.median([values, on], ALL, 1)[0].tolist() == [2.0]
    assert rows.count([values, on], ALL, 1)[0].tolist() == [3.0]


def test_a_row_that_is_off_is_no_outlier():
    values, on = np.array([100.0, 100.0, 100.0, 900.0]), np.array([1.0, 1.0, 1.0, 0.0])
    assert rows.greatest_deviation([values, on], ALL, 1)[0].tolist() == [0.0]
    assert rows.greatest_robust_score([values, on], ALL, 1)[0].tolist() == [0.0]


@pytest.mark.parametrize(
    ("on", "expected"),
    [
        pytest.param([1.0, 0.0, 0.0, 0.0], 0.0, id="alone, the others are off"),
        pytest.param([1.0, NAN, 0.0, 0.0], NAN, id="alone, another one may be on"),
        pytest.param([0.0, 0.0, 0.0, 0.0], 0.0, id="all are off"),
    ],
)
def test_a_row_alone_deviates_from_nothing_only_if_no_other_could_count(on: list[float], expected: float):
    found = rows.greatest_deviation([np.array([5.0, 7.0, 7.0, 7.0]), np.array(on)], ALL, 1)[0]
    assert found.tolist() == pytest.approx([expected], nan_ok=True)


def test_the_robust_score_follows_its_definition():
    # by hand: values 10, 10, 11, 14: median 10.5, distances 0.5 0.5 0.5 3.5, their median 0.5; 1.4826 x 0.5 = 0.741
    # is above 5 % of 10.5 = 0.525; 3.5 / 0.741 = 4.72
    score, deciding = rows.greatest_robust_score([np.array([10.0, 10.0, 11.0, 14.0])], ALL, 1)
    assert score.tolist() == pytest.approx([4.72], abs=0.005)
    assert deciding.tolist() == [3]


def test_copies_count_from_three_on_and_only_within_one_group():
    pickup = np.array([600.0, 600.0, 600.0, 600.0, 600.0])
    size = np.array([100.0, 150.0, 300.0, 10.0, 900.0])
    spread, deciding = rows.greatest_spread_of_copies([pickup, size], np.array([0, 0, 0, 1, 1]), 2)
    assert spread.tolist() == [3.0, 1.0]
    assert deciding.tolist() == [0, 3]


def test_a_copy_survives_the_rounding_of_a_conversion():
    # written to seven figures, as multiples and secondary values are
    pickup = np.array([600.0, 600.00004, 599.99996])
    spread, _ = rows.greatest_spread_of_copies([pickup, np.array([100.0, 150.0, 300.0])], np.zeros(3, np.int64), 1)
    assert spread.tolist() == [3.0]


@given(st.lists(st.floats(0.1, 1e4), min_size=2, max_size=12))
def test_deviation_and_score_do_not_depend_on_the_scale_or_the_order(values: list[float]):
    numbers, parent = np.array(values), np.zeros(len(values), dtype=np.int64)
    for function in (rows.greatest_deviation, rows.greatest_robust_score):
        first = function([numbers], parent, 1)[0]
        assert function([numbers[::-1] * 7.5], parent, 1)[0] == pytest.approx(first, rel=1e-9, nan_ok=True)

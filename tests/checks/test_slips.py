"""Slips: the factor that explains a value, and when it explains nothing."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.checks.slips import NO_SLIP, explaining_slip, unit_name
from audit.vocabulary.units import UNITS

FACTORS = {"thousand": 1000.0, "sixty": 60.0, "ten": 10.0, "root": 3**0.5}


def explained(present: float, low: float, high: float) -> tuple[str, float]:
    arrays = [np.array([factor]) for factor in FACTORS.values()]
    slip = explaining_slip(np.array([present]), np.array([low]), np.array([high]), arrays)
    place = int(slip.which[0])
    return ("" if place == NO_SLIP else list(FACTORS)[place]), float(slip.factor[0])


@pytest.mark.parametrize(
    ("present", "low", "high", "name", "factor"),
    [
        # by hand: 100 ms entered as 100 s; 0.1 s lies within 0.05 to 0.2 s
        pytest.param(100.0, 0.05, 0.2, "thousand", 1e-3, id="milliseconds"),
        # 0.1 min entered as 0.1 s; 6 s lies within 5 to 8 s
        pytest.param(0.1, 5.0, 8.0, "sixty", 60.0, id="minutes"),
        # 57.7 A in the phase for 100 A in the line
        pytest.param(57.7, 95.0, 102.0, "root", 3**0.5, id="phase for line"),
        pytest.param(1500.0, 145.0, 155.0, "ten", 0.1, id="decimal point"),
    ],
)
def test_a_slip_is_named_with_the_factor_that_puts_it_right(
    present: float, low: float, high: float, name: str, factor: float
):
    found = explained(present, low, high)
    assert found[0] == name
    assert found[1] == pytest.approx(factor)


@pytest.mark.parametrize("present", [0.0, -5.0, np.nan])
def test_what_is_no_positive_number_is_not_explained(present: float):
    assert explained(present, 5.0, 8.0)[0] == ""


def test_without_any_bound_nothing_is_explained():
    assert explained(5.0, np.nan, np.nan)[0] == ""


def test_of_several_factors_the_one_nearest_to_the_middle_counts():
    # 10 and 17.3 both lie within 9 to 200; 60 is nearest to the middle, sqrt(9 x 200) = 42
    assert explained(1.0, 9.0, 200.0)[0] == "sixty"


@given(st.floats(1.0, 1e5), st.sampled_from(sorted(FACTORS)), st.booleans())
def test_a_value_that_was_slipped_is_always_found_again(value: float, name: str, multiplied: bool):
    factor = FACTORS[name]
    wrong = value * factor if multiplied else value / factor
    found = explained(wrong, value * 0.99, value * 1.01)
    assert found[0] == name
    assert found[1] == pytest.approx(1 / factor if multiplied else factor)


def test_units_go_by_their_short_names():
    assert {unit_name(UNITS[name]) for name in ("a", "v", "s", "pct", "1")} == {"a", "v", "s", "pct", "1"}

"""Bases of voltage settings: there and back."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.voltage_base import (
    line_to_line_v,
    pickup_from_pct_v,
    pickup_from_secondary_pct_v,
    pickup_from_secondary_v,
    pickup_in_pct,
    pickup_in_secondary_v,
)

percents = st.floats(10, 150)
primaries = st.floats(400, 15_000)
secondaries = st.floats(100, 120)


@given(percents, primaries)
def test_per_cent_comes_back(percent, base):
    assert pickup_in_pct(pickup_from_pct_v(percent, base), base).item() == pytest.approx(percent)


@given(st.floats(1, 200), primaries, secondaries)
def test_secondary_volts_come_back(volts, primary, secondary):
    there = pickup_from_secondary_v(volts, primary, secondary)
    assert pickup_in_secondary_v(there, primary, secondary).item() == pytest.approx(volts)


@given(percents, primaries, secondaries)
def test_per_cent_of_the_secondary_rating_is_per_cent_of_the_primary_rating(percent, primary, secondary):
    by_secondary = pickup_from_secondary_pct_v(percent, secondary, primary, secondary)
    assert by_secondary.item() == pytest.approx(pickup_from_pct_v(percent, primary).item())


def test_connection_taken_for_the_other_is_a_factor_of_root_three():
    # by hand: 63.5 V to neutral are 110 V between lines
    assert line_to_line_v(63.5085).item() == pytest.approx(110.0, abs=5e-4)

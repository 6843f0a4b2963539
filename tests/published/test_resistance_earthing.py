"""Neutral resistors and charging current against published values (IEEE 142)."""

from __future__ import annotations

import pytest

from audit.engineering.earth_fault import charging_current_a, resistor_current_a
from tests.published.rows import Row, cases_of, unclaimed, value_of

NAME = "12-resistance-earthing"
FORMULAS = {
    "current of the neutral resistor (A)": resistor_current_a,
    "charging current (A)": charging_current_a,
}
# what counts as high and as low resistance: figures for limits, nothing to compute
LIMITS = {"high-resistance band", "low-resistance band"}


@pytest.mark.parametrize("row", cases_of(NAME, FORMULAS))
def test_published_value_is_reproduced(row: Row):
    assert value_of(row, FORMULAS) == row.allowed()


def test_every_row_is_claimed():
    assert unclaimed(NAME, FORMULAS, LIMITS) == set()

"""Rated point of a motor against published values (power equation, definition of synchronous speed)."""

from __future__ import annotations

import pytest

from audit.engineering.rated_point import (
    full_load_from_power_a,
    poles_from_speed,
    power_from_hp_kw,
    slip_pct,
    synchronous_speed_rpm,
)
from tests.published.rows import Row, cases_of, unclaimed, value_of

NAME = "17-rated-point"
FORMULAS = {
    "full-load current (A)": full_load_from_power_a,
    "synchronous speed (rpm)": synchronous_speed_rpm,
    "slip (%)": slip_pct,
    "horsepower (kW)": power_from_hp_kw,
}


@pytest.mark.parametrize("row", cases_of(NAME, FORMULAS))
def test_published_value_is_reproduced(row: Row):
    assert value_of(row, FORMULAS) == row.allowed()


def test_every_row_is_claimed():
    assert unclaimed(NAME, FORMULAS) == set()


@pytest.mark.parametrize("row", cases_of(NAME, {"synchronous speed (rpm)": None}))
def test_poles_are_read_back_from_the_published_synchronous_speed(row: Row):
    inputs = row.arguments()
    assert poles_from_speed(float(row.expected), inputs["frequency_hz"]).item() == inputs["poles"]

"""Short-circuit withstand of cables against published values (IEC 60364, IEC 60949, ICEA P-32-382)."""

from __future__ import annotations

import pytest

from audit.engineering.cable_withstand import (
    adiabatic_constant,
    adiabatic_constant_icea,
    adiabatic_constant_printed,
    least_section_mm2,
)
from tests.published.rows import Row, cases_of, unclaimed, value_of

NAME = "15-short-circuit-and-cable"
FORMULAS = {
    "adiabatic constant, printed": adiabatic_constant_printed,
    "adiabatic constant, computed": adiabatic_constant,
    "adiabatic constant, ICEA form": adiabatic_constant_icea,
    "least section (mm2)": least_section_mm2,
}


@pytest.mark.parametrize("row", cases_of(NAME, FORMULAS))
def test_published_value_is_reproduced(row: Row):
    assert value_of(row, FORMULAS) == row.allowed()


def test_every_row_is_claimed():
    assert unclaimed(NAME, FORMULAS) == set()

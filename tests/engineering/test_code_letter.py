"""Code letters: bands without gaps, and currents that lead back to their letter."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.engineering.code_letter import (
    LETTERS,
    letter_code,
    letter_code_from_current,
    letter_greatest_kva_per_hp,
    letter_least_kva_per_hp,
    locked_rotor_from_letter_greatest_a,
    locked_rotor_from_letter_least_a,
)

codes = st.integers(0, len(LETTERS) - 1)


def test_each_band_ends_a_hundredth_below_the_next():
    # published: Table 430.7(B) prints to 0.01
    code = np.arange(len(LETTERS) - 1)
    assert letter_least_kva_per_hp(code + 1) - letter_greatest_kva_per_hp(code) == pytest.approx(0.01, rel=1e-6)


@given(codes, st.floats(0.5, 500), st.floats(200, 6600))
def test_least_and_greatest_current_lead_back_to_their_letter(code, power_kw, voltage_v):
    greatest = locked_rotor_from_letter_greatest_a(code, power_kw, voltage_v)
    least = locked_rotor_from_letter_least_a(code, power_kw, voltage_v)
    for current in (least * (1 + 1e-9), greatest):
        if 0 < current < np.inf:
            assert letter_code_from_current(current, power_kw, voltage_v) == code


def test_the_first_band_begins_at_nothing_and_the_last_never_ends():
    assert locked_rotor_from_letter_least_a(letter_code("A"), 75, 460) == 0
    assert locked_rotor_from_letter_greatest_a(letter_code("V"), 75, 460) == np.inf


@pytest.mark.parametrize("letter", ["I", "O", "Q", "W", "", "AB"])
def test_what_is_no_code_letter_is_refused(letter):
    with pytest.raises(ValueError, match="is not a code letter"):
        letter_code(letter)


def test_missing_or_impossible_gives_missing():
    for current in (locked_rotor_from_letter_least_a, locked_rotor_from_letter_greatest_a):
        assert np.isnan(current([-1, np.nan, 19, 5, 5], [75, 75, 75, np.nan, 0], [460, 460, 460, 460, 460])).all()
    assert np.isnan(letter_code_from_current([np.nan, 700], [75, 75], [460, np.nan])).all()

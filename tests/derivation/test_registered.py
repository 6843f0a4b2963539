"""Functions that rules may name: found under one name only, and the formula behind each is the one that is called."""

from __future__ import annotations

import numpy as np
import pytest

from audit.derivation.functions import FUNCTIONS
from audit.derivation.registered import OF_MODULE

NAMES = [(module, name) for module, names in OF_MODULE for name in names.split()]


def test_no_name_stands_twice():
    names = [name for _, name in NAMES]
    assert len(names) == len(set(names))


@pytest.mark.parametrize(("module", "name"), NAMES)
def test_each_formula_is_its_modules_own(module, name):
    assert getattr(module, name).__module__ == module.__name__


@pytest.mark.parametrize(
    ("name", "operands", "wanted"),
    [
        # by hand: 2 pi / 60 x 10 kg m2 x 1500 r/min / 500 N m
        ("run_up_time_constant_torque_s", (10.0, 1500.0, 500.0), 3.1416),
        # by hand: a third of the torque with the windings in star
        ("star_delta_start_torque_nm", (300.0,), 100.0),
        # by hand: 120 V x 6600 / 110
        ("pickup_from_secondary_v", (120.0, 6600.0, 110.0), 7200.0),
    ],
)
def test_rules_reach_formulas_by_name(name, operands, wanted):
    assert float(FUNCTIONS[name].call(*operands)) == pytest.approx(wanted, rel=1e-4)


def test_words_stand_for_codes_and_other_words_for_nothing():
    # IEC 60255-151, very inverse: 13.5 / (5 - 1) = 3.375 s at five times pickup and a multiplier of 1
    time = FUNCTIONS["inverse_time_s"].call
    words = np.array(["iec_very_inverse", "no such curve"], dtype=object)
    names = [operand.name for operand in FUNCTIONS["inverse_time_s"].operands if operand.required]
    given = {"current_a": 500.0, "pickup_a": 100.0, "time_multiplier": 1.0, "curve_code": words}
    first, second = time(*[given[name] for name in names])
    assert first == pytest.approx(3.375)
    assert np.isnan(second)

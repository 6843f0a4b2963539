"""Thermal classes: how their figures must hang together."""

from __future__ import annotations

import numpy as np
import pytest

from audit.engineering.insulation_class import (
    class_temperature_c,
    rapid_overload_limit_c,
    rise_by_detector_k,
    rise_by_resistance_k,
    slow_overload_limit_c,
)

LETTERS = ["B", "F", "H"]


def test_slow_overload_may_exceed_the_class_by_fifteen_kelvin():
    # IEC 60034-11 table 1: class temperature and 15 K, for every class it lists
    assert (slow_overload_limit_c([*LETTERS, "N"]) - class_temperature_c([*LETTERS, "N"]) == 15).all()


def test_rapid_overload_may_go_further_than_a_slow_one():
    assert (rapid_overload_limit_c(LETTERS) > slow_overload_limit_c(LETTERS)).all()


def test_ambient_and_rise_leave_room_for_the_hot_spot():
    # IEC 60034-1: 40 C and the rise by resistance stay 5 to 15 K below the class
    room = class_temperature_c(["A", "E", *LETTERS]) - 40 - rise_by_resistance_k(["A", "E", *LETTERS])
    assert ((room >= 5) & (room <= 15)).all()


def test_detector_near_the_hot_spot_may_read_five_kelvin_more():
    assert (rise_by_detector_k(LETTERS) - rise_by_resistance_k(LETTERS) == 5).all()


@pytest.mark.parametrize(("letter", "number"), [("A", "105"), ("B", "130"), ("F", "155"), ("H", "180")])
def test_letter_and_number_name_one_class(letter, number):
    assert class_temperature_c(letter) == class_temperature_c(number)
    assert class_temperature_c(letter) == float(number)


def test_class_without_a_figure_is_missing():
    assert np.isnan(class_temperature_c(["X", "", None])).all()
    assert np.isnan(slow_overload_limit_c("A"))

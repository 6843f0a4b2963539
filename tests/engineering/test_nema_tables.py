"""US tables: voltages and powers that they answer for, and slips of the pen."""

from __future__ import annotations

import numpy as np
import pytest

from audit.engineering.nema_tables import table_full_load_current_a, table_locked_rotor_a
from audit.engineering.unit_factors import KW_PER_HP

LISTED_HP = [0.5, 0.75, 1, 1.5, 2, 3, 5, 7.5, 10, 15, 20, 25, 30, 40, 50, 60, 75, 100, 125, 150, 200]
LARGE_HP = [250, 300, 350, 400, 450, 500]
VOLTAGES_V = [200, 208, 230, 460, 575, 2300]


def test_efficiency_times_power_factor_behind_each_entry_is_that_of_a_motor():
    # P = sqrt3 V I eta pf: a wrong digit in any entry throws this product out of the range of real motors
    power_kw = np.array(LISTED_HP + LARGE_HP)[:, None] * KW_PER_HP
    current = table_full_load_current_a(power_kw, VOLTAGES_V)
    product = power_kw * 1000 / (3**0.5 * np.array(VOLTAGES_V) * current)
    # a 1 hp motor of that time: 0.45; the largest at 2300 V: above 1 on paper for rounding to the ampere
    assert (np.nanmin(product, axis=1) > 0.4).all()
    assert (np.nanmax(product, axis=1) < 0.98).all()
    # larger motors are better, a slip of a tenth between neighbours would show
    at_460_v = product[:, 3]
    assert (np.diff(at_460_v) > -0.06).all()


def test_columns_of_lower_voltage_hold_the_current_of_the_same_power():
    power_kw = np.array(LISTED_HP)[:, None] * KW_PER_HP
    apparent = table_full_load_current_a(power_kw, [200, 208, 230, 460, 575]) * np.array([200, 208, 230, 460, 575])
    spread = apparent / apparent[:, [3]]
    # printed to 0.1 A below 10 A and to the ampere above
    assert (np.abs(spread - 1) < 0.06).all()


def test_every_listed_power_has_both_currents_and_the_larger_motor_the_larger_ones():
    power_kw = np.array(LISTED_HP + LARGE_HP) * KW_PER_HP
    for table in (table_full_load_current_a, table_locked_rotor_a):
        assert (np.diff(table(power_kw, 460)) > 0).all()


@pytest.mark.parametrize(("voltage_v", "like_v"), [(220, 230), (240, 230), (440, 460), (480, 460), (600, 575)])
def test_voltages_within_the_tables_ranges_read_its_column(voltage_v, like_v):
    assert table_full_load_current_a(37.28, voltage_v) == table_full_load_current_a(37.28, like_v)


def test_other_voltages_and_powers_are_missing():
    assert np.isnan(table_full_load_current_a(74.57, [190, 215, 380, 400, 415, 690, 3300, 4000, np.nan])).all()
    assert np.isnan(table_locked_rotor_a(74.57, [380, 400, 415, 690, 3300, 6600, np.nan])).all()
    for power_kw in (0.18, 4.0, 55.0, 90.0, 500.0, np.nan, 0.0, -74.57):
        assert np.isnan(table_full_load_current_a(power_kw, 460))
        assert np.isnan(table_locked_rotor_a(power_kw, 460))


def test_a_nameplate_rounded_to_the_kilowatt_finds_its_horsepower():
    # 100 hp = 74.57 kW, on plates 75 kW; 50 hp = 37.28 kW, on plates 37 kW
    assert table_full_load_current_a([75, 37], 460).tolist() == [124, 65]


def test_where_the_table_has_no_entry_it_is_missing():
    assert np.isnan(table_full_load_current_a([50 * KW_PER_HP, 250 * KW_PER_HP], [2300, 230])).all()

"""Spelled units against pint, a general-purpose unit library, and the words of bases."""

from __future__ import annotations

import pint
import pytest

from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import UnitReading, conversion, dimension_of, read_unit, read_units, spellings

KNOWN = vocabulary().quantities
PINT_NAMES = {
    ("current", "a"): "ampere",
    ("current", "ka"): "kiloampere",
    ("current", "ma"): "milliampere",
    ("voltage", "v"): "volt",
    ("voltage", "kv"): "kilovolt",
    ("voltage", "mv"): "millivolt",
    ("time", "s"): "second",
    ("time", "ms"): "millisecond",
    ("time", "min"): "minute",
    ("time", "h"): "hour",
    ("time", "days"): "day",
    ("active_power", "kw"): "kilowatt",
    ("active_power", "w"): "watt",
    ("active_power", "mw"): "megawatt",
    ("active_power", "hp"): "horsepower",
    ("active_power", "ps"): "metric_horsepower",
    ("apparent_power", "va"): "volt_ampere",
    ("apparent_power", "kva"): "kilovolt_ampere",
    ("apparent_power", "mva"): "megavolt_ampere",
    ("ratio", "x"): "dimensionless",
    ("ratio", "pct"): "percent",
    ("ratio", "permille"): "permille",
    ("angle", "deg"): "degree",
    ("angle", "rad"): "radian",
    ("frequency", "hz"): "1 / second",
    ("speed", "rpm"): "1 / minute",
    ("speed", "rps"): "1 / second",
    ("rate", "per_hour"): "1 / hour",
    ("rate", "per_day"): "1 / day",
    ("temperature", "c"): "degree_Celsius",
    ("temperature", "f"): "degree_Fahrenheit",
    ("temperature", "k"): "kelvin",
    ("temperature_difference", "k"): "kelvin",
    ("temperature_difference", "c"): "delta_degree_Celsius",
    ("temperature_difference", "f"): "delta_degree_Fahrenheit",
    ("length", "m"): "metre",
    ("length", "km"): "kilometre",
    ("length", "ft"): "foot",
    ("length", "yd"): "yard",
    ("area", "mm2"): "millimetre ** 2",
    ("area", "kcmil"): "1000 * circular_mil",
    ("inertia", "kgm2"): "kilogram * metre ** 2",
    ("inertia", "lbft2"): "pound * foot ** 2",
    ("torque", "nm"): "newton * metre",
    ("torque", "knm"): "kilonewton * metre",
    ("torque", "lbft"): "pound_force * foot",
    ("torque", "kgfm"): "kilogram_force * metre",
    ("resistance", "ohm"): "ohm",
    ("resistance", "mohm"): "milliohm",
    ("resistance", "kohm"): "kiloohm",
    ("capacitance", "uf"): "microfarad",
    ("capacitance", "nf"): "nanofarad",
    ("capacitance_per_length", "uf_per_km"): "microfarad / kilometre",
    ("capacitance_per_length", "nf_per_km"): "nanofarad / kilometre",
    ("capacitance_per_length", "uf_per_kft"): "microfarad / (1000 * foot)",
    ("let_through", "a2s"): "ampere ** 2 * second",
    ("let_through", "ka2s"): "kiloampere ** 2 * second",
    ("let_through", "thousand_a2s"): "1000 * ampere ** 2 * second",
}
NO_CONSTANT = {("time", "cycles"), ("area", "awg"), ("inertia", "gd2")}
"""Cycles need the frequency, gauges a formula, and GD² is a definition (four times the inertia)."""
ALL = [(name, unit) for name, dimension in spellings().dimensions.items() for unit in dimension.units]


def test_every_unit_is_compared_with_the_unit_library():
    assert set(ALL) - NO_CONSTANT == set(PINT_NAMES)


@pytest.mark.parametrize(("dimension", "unit"), sorted(PINT_NAMES))
def test_factor_and_offset_agree_with_the_unit_library(dimension, unit):
    registry = pint.UnitRegistry()
    table = spellings().dimensions[dimension]
    spelled, target = table.units[unit], table.targets[0]
    target = "x" if target == "1" else target
    for number in (0.0, 1.0, 37.5):
        expected = (
            registry.Quantity(number, PINT_NAMES[dimension, unit])
            if "*" not in PINT_NAMES[dimension, unit]
            else number * registry.parse_expression(PINT_NAMES[dimension, unit])
        )
        wanted = PINT_NAMES[dimension, target]
        assert (number + spelled.offset) * spelled.factor == pytest.approx(
            expected.to(wanted).magnitude, rel=1e-12, abs=1e-12
        )


@pytest.mark.parametrize(
    ("quantity", "unit", "number", "value"),
    [
        ("rated_power_kw", "hp", 150, 111.855),  # 550 ft lbf/s
        ("stator_temperature_trip_c", "f", 311, 155.0),  # (311 - 32) / 1.8
        ("temperature_rise_k", "f", 144, 80.0),
        ("fault_max_ka", "a", 25000, 25.0),
        ("start_interval_min", "h", 0.5, 30.0),
        ("heating_time_constant_s", "min", 20, 1200.0),
        ("efficiency_pct", "x", 0.945, 94.5),
        ("power_factor", "pct", 86, 0.86),
        ("cable_length_m", "ft", 1000, 304.8),
        ("motor_inertia_kgm2", "gd2", 4.0, 1.0),
    ],
)
def test_a_number_becomes_the_quantitys_own_unit(quantity, unit, number, value):
    factor, offset = conversion(unit, KNOWN[quantity])
    assert (number + offset) * factor == pytest.approx(value, rel=1e-5)


@pytest.mark.parametrize(
    ("text", "unit", "base"),
    [
        ("A", "a", ""),
        ("Amps", "a", ""),
        ("mA", "ma", ""),
        ("x FLA", "x", "full_load"),
        ("xFLC", "x", "full_load"),
        ("% of motor FLA", "pct", "full_load"),
        ("FLA %", "pct", "full_load"),
        ("pu FLA", "x", "full_load"),
        ("×In", "x", ""),
        ("% In", "pct", ""),
        ("p.u.", "x", ""),
        ("x CT", "x", "ct"),
        ("% CT", "pct", "ct"),
        ("x CBCT", "x", "earth_ct"),
        ("A sec", "a", "secondary"),
        ("A (sec.)", "a", "secondary"),
        ("sec A", "a", "secondary"),
        ("A pri", "a", "primary"),
        ("primary amps", "a", "primary"),
    ],
)
def test_pickup_units_tell_unit_and_base(text, unit, base):
    assert read_unit(text, KNOWN["earth_fault_trip_pickup_a"]) == UnitReading(unit, base)


@pytest.mark.parametrize(
    ("text", "unit", "base"),
    [
        ("V", "v", ""),
        ("V sec", "v", "secondary"),
        ("kV", "kv", ""),
        ("% Un", "pct", ""),
        ("% motor Un", "pct", "motor_voltage"),
        ("% of system voltage", "pct", "system_voltage"),
        ("% VT", "pct", "vt"),
        ("pu", "x", ""),
    ],
)
def test_voltage_units_tell_unit_and_base(text, unit, base):
    assert read_unit(text, KNOWN["undervoltage_trip_pickup_v"]) == UnitReading(unit, base)


def test_the_quantity_decides_what_a_letter_means():
    assert read_unit("m", KNOWN["cable_length_m"]).unit == "m"
    assert read_unit("m", KNOWN["heating_time_constant_s"]).unit == "min"
    assert read_unit("c", KNOWN["jam_trip_delay_s"]).unit == "cycles"
    assert read_unit("C", KNOWN["stator_temperature_trip_c"]).unit == "c"
    assert read_unit("sec", KNOWN["jam_trip_delay_s"]) == UnitReading("s")
    assert read_unit("sec", KNOWN["jam_trip_pickup_a"]) == UnitReading("a", "secondary")


@pytest.mark.parametrize("text", ["Description", "Tag", "", "Rev", "7", "x y z", "see note", "pri"])
def test_words_are_no_units(text):
    assert read_unit(text, KNOWN["jam_trip_delay_s"]) is None


def test_a_unit_of_something_else_does_not_fit():
    assert read_unit("kV", KNOWN["jam_trip_pickup_a"]) is None
    assert read_unit("kVA", KNOWN["rated_power_kw"]) is None
    assert conversion("kva", KNOWN["rated_power_kw"]) is None


def test_every_spelling_is_read_in_its_dimension():
    for name, dimension in spellings().dimensions.items():
        for spelled, unit in dimension.spellings.items():
            assert (name, UnitReading(unit)) in read_units(spelled), spelled


def test_every_number_of_the_vocabulary_has_a_dimension():
    numbers = [quantity for quantity in KNOWN.values() if quantity.kind == "number" and quantity.role != "derived"]
    without = [quantity.name for quantity in numbers if quantity.unit is None]
    assert without == []
    assert all(dimension_of(quantity) is not None for quantity in numbers)

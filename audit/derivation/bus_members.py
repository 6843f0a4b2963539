"""Functions over the motors of a bus: how long the start lasts that draws most, or that pulls the voltage lowest."""

from __future__ import annotations

from audit.expression.functions import Function, Operand
from audit.expression.rows import beside_greatest, beside_least
from audit.vocabulary.units import UNITS

_DURATION = Operand("duration", "number", UNITS["s"])

BUS_FUNCTIONS: dict[str, Function] = {
    "start_time_of_greatest_start_of": Function(
        "start_time_of_greatest_start_of",
        beside_greatest,
        (Operand("current", "number", UNITS["a"]), _DURATION),
        _DURATION,
        of_rows=True,
        reads="start time of the motor with the greatest",
    ),
    "start_time_at_lowest_voltage_of": Function(
        "start_time_at_lowest_voltage_of",
        beside_least,
        (Operand("voltage", "number", UNITS["v"]), _DURATION),
        _DURATION,
        of_rows=True,
        reads="start time of the motor with the least",
    ),
}

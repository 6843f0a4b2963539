"""Trip classes against published values (IEC 60947-4-1, NEMA ICS 2)."""

from __future__ import annotations

from audit.engineering.trip_class import (
    TRIP_CLASS_10A,
    trip_class_greatest_time_s,
    trip_class_least_time_s,
    trip_class_warm_time_s,
    trip_standard_code,
)

VALUES = "09-trip-classes"


def class_number(trip_class: float | str) -> float:
    return TRIP_CLASS_10A if trip_class == "10A" else float(trip_class)


FORMULAS = {
    "least trip time (s)": lambda standard, trip_class, multiple: trip_class_least_time_s(
        multiple, class_number(trip_class), trip_standard_code(standard)
    ),
    "greatest trip time (s)": lambda standard, trip_class, multiple: trip_class_greatest_time_s(
        multiple, class_number(trip_class), trip_standard_code(standard)
    ),
    "greatest trip time from equilibrium at 1.5 (s)": lambda trip_class: trip_class_warm_time_s(
        class_number(trip_class)
    ),
}


def test_published_value_is_reproduced(row):
    row.reproduced_by(FORMULAS[row.quantity](**row.arguments()))

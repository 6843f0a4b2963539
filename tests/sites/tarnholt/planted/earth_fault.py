"""Defects of earth-fault and differential settings."""

from __future__ import annotations

from tests.sites.families import lettered
from tests.sites.tarnholt.planted.defect import Defect, nuisance, observation, unsafe

EARTH_FAULT = (
    Defect(
        lettered("C-401"),
        "earth_fault_trip_on",
        False,
        (unsafe("earth-fault-trip-on", "resistance-earthed system"),),
        alongside={"earth_fault_trip_pickup_a": None, "earth_fault_trip_delay_s": None, "earth_fault_opens": None},
    ),
    Defect(
        ("KM-202",),
        "earth_fault_trip_pickup_a",
        100.0,
        (unsafe("earth-fault-sees-limited-current", "a quarter of the least earth-fault current"),),
    ),
    Defect(
        lettered("F-501"),
        "earth_fault_trip_pickup_a",
        6.0,
        (nuisance("earth-fault-residual-above-false-current", "CT ratio errors of +-1 % give 6.5 A while starting"),),
    ),
    Defect(
        lettered("P-115"),
        "earth_fault_trip_pickup_a",
        0.5,
        (
            nuisance(
                "earth-fault-above-charging-current", "an earth fault elsewhere draws the feeder's own charging current"
            ),
        ),
    ),
    Defect(
        ("KM-210",),
        "earth_fault_trip_delay_s",
        0.6,
        (unsafe("earth-fault-fast-enough", "0.6 s on a low-resistance earthed system"),),
    ),
)

DIFFERENTIAL = (
    Defect(
        ("CR-102",),
        "differential_trip_on",
        True,
        (unsafe("differential-needs-both-ends", "three leads and no CTs at the star point"),),
        alongside={
            "differential_kind": "two_sets",
            "differential_run_pickup_a": 15.0,
            "differential_start_pickup_a": 25.0,
            "differential_run_delay_s": 0.04,
            "differential_start_delay_s": 0.1,
        },
    ),
    Defect(
        ("KM-202",),
        "differential_trip_on",
        False,
        (observation("differential-on-for-large", "1650 kW, six leads, CTs at both ends"),),
        alongside={
            "differential_run_pickup_a": None,
            "differential_start_pickup_a": None,
            "differential_run_delay_s": None,
            "differential_start_delay_s": None,
        },
    ),
    Defect(
        ("KM-201",),
        "differential_start_pickup_a",
        15.0,
        (
            nuisance(
                "differential-start-pickup-above-false-current", "CT ratio errors of +-1 % give 18.7 A while starting"
            ),
        ),
        alongside={"differential_run_pickup_a": 12.5},
    ),
    Defect(
        ("F-301",),
        "differential_run_pickup_a",
        24.0,
        (unsafe("differential-run-pickup-sensitive", "24 A where flux balance allows 20 A and less"),),
    ),
    Defect(
        ("F-301",), "differential_run_delay_s", 0.14, (unsafe("differential-fast-enough", "0.14 s; 0.1 s at most"),)
    ),
)

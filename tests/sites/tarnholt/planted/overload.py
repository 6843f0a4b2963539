"""Defects of thermal and unbalance settings."""

from __future__ import annotations

from tests.sites.families import lettered, numbered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

THERMAL = (
    Defect(
        ("KM-210",),
        "thermal_trip_on",
        False,
        (unsafe("thermal-trip-on", "the relay is the only overload protection"),),
        alongside={"thermal_pickup_a": None, "thermal_opens": None},
    ),
    Defect(
        ("FP-901",),
        "unbalance_trip_on",
        True,
        (unsafe("must-run-motor-not-tripped", "a fire pump has to run; unbalance may only alarm"),),
        alongside={"unbalance_trip_pickup_pct": 20.0, "unbalance_trip_delay_s": 5.0, "unbalance_opens": "breaker"},
    ),
    Defect(
        (*lettered("P-140"), *lettered("P-150")),
        "thermal_pickup_a",
        Of("full_load_a", 1.25),
        (unsafe("thermal-pickup-within-service-factor", "1.25 x full load at service factor 1.0; 1.15 x at most"),),
    ),
    Defect(
        lettered("P-160"),
        "thermal_pickup_a",
        Of("full_load_a", 0.85),
        (nuisance("thermal-pickup-carries-load", "below 1.05 x the greatest running current"),),
    ),
    Defect(
        lettered("C-401"),
        "heating_time_constant_s",
        Of("heating_time_constant_s", 0.3),
        (
            nuisance("thermal-rides-through-hot-start", "trips from hot before the start is over"),
            observation("thermal-permits-listed-starts", "does not permit one start from hot"),
        ),
        alongside={"hot_cold_ratio": 0.2},
    ),
    Defect(
        lettered("F-303"),
        "heating_time_constant_s",
        Of("heating_time_constant_s", 1.5),
        (
            unsafe("thermal-beats-cold-stall", "trips from cold after the safe stall time"),
            unsafe("thermal-beats-hot-stall", "trips from hot after the safe stall time"),
            unsafe("stall-is-covered", "no other element sees a rotor stalled while running"),
        ),
        alongside={"cooling_time_constant_s": Of("cooling_time_constant_s", 1.5)},
    ),
    Defect(
        lettered("F-620"),
        "hot_cold_ratio",
        1.0,
        (
            unsafe("thermal-beats-hot-stall", "no memory of the running load: trips from hot as late as from cold"),
            unsafe("stall-is-covered", "no other element sees a rotor stalled while running"),
        ),
    ),
    Defect(
        ("F-370",),
        "heating_time_constant_s",
        Of("heating_time_constant_s", 1.4),
        (unsafe("thermal-beats-te", "trips from cold after tE"),),
    ),
    Defect(
        lettered("C-410"),
        "cooling_time_constant_s",
        Of("heating_time_constant_s", 0.5),
        (unsafe("thermal-cools-slower-stopped", "a stopped motor without its fan cools slower, not faster"),),
    ),
    Defect(
        lettered("F-310"),
        "unbalance_weight",
        0.0,
        (observation("thermal-counts-unbalance", "the thermal element ignores negative-sequence current"),),
    ),
    Defect(
        ("HM-601",),
        "thermal_alarm_pct",
        100.0,
        (observation("thermal-alarm-before-trip", "the alarm comes with the trip"),),
    ),
    Defect(
        lettered("P-120"),
        "overcurrent_trip_on",
        True,
        (inconsistent("element-doubled", "a 51 element beside the thermal element trips before the start is over"),),
        alongside={
            "overcurrent_trip_pickup_a": 165.0,
            "overcurrent_curve": "iec_extremely_inverse",
            "overcurrent_time_multiplier": 0.2,
        },
    ),
)

UNBALANCE = (
    Defect(
        lettered("F-620"),
        "unbalance_trip_on",
        False,
        (unsafe("unbalance-trip-on", "fuse-fed: a blown fuse leaves two phases"),),
        alongside={"unbalance_trip_pickup_pct": None, "unbalance_trip_delay_s": None},
    ),
    Defect(
        lettered("P-705"),
        "unbalance_trip_on",
        False,
        (
            unsafe("unbalance-trip-on", "fuse-fed: a blown fuse leaves two phases"),
            unsafe("open-phase-is-covered", "nor does the thermal element count negative-sequence current"),
            observation("thermal-counts-unbalance", "the thermal element ignores negative-sequence current"),
        ),
        alongside={"unbalance_trip_pickup_pct": None, "unbalance_trip_delay_s": None, "unbalance_weight": 0.0},
    ),
    Defect(
        numbered("SC-", 601, 3),
        "unbalance_trip_on",
        False,
        (unsafe("unbalance-trip-on", "fuse-fed: a blown fuse leaves two phases"),),
        alongside={"unbalance_trip_pickup_pct": None, "unbalance_trip_delay_s": None},
    ),
    Defect(
        lettered("P-110"),
        "unbalance_trip_on",
        False,
        (observation("unbalance-trip-on-beside-model", "only the thermal model counts unbalance"),),
        alongside={"unbalance_trip_pickup_pct": None, "unbalance_trip_delay_s": None},
    ),
    Defect(
        ("KM-202",),
        "unbalance_trip_pickup_pct",
        40.0,
        (unsafe("unbalance-pickup-catches-open-phase", "40 %; an open phase at part load can give less"),),
    ),
    Defect(
        ("F-330",),
        "unbalance_trip_pickup_pct",
        5.0,
        (nuisance("unbalance-pickup-above-supply", "the standing unbalance of the supply draws more"),),
        alongside={"unbalance_alarm_pickup_pct": 4.0},
    ),
    Defect(
        lettered("P-140"),
        "unbalance_trip_delay_s",
        33.0,
        (unsafe("unbalance-delay-limits-heating", "33 s; 30 s at most"),),
    ),
    Defect(
        ("KM-210",),
        "unbalance_trip_delay_s",
        0.6,
        (nuisance("unbalance-delay-outlasts-faults", "a fault elsewhere takes 0.5 s to clear, and 0.3 s to settle"),),
    ),
    Defect(
        ("F-370",),
        "unbalance_alarm_pickup_pct",
        25.0,
        (inconsistent("unbalance-alarm-before-trip", "the alarm lies above the trip"),),
    ),
    Defect(
        ("CR-101",),
        "unbalance_trip_delay_s",
        36.0,
        (unsafe("unbalance-delay-limits-heating", "36 s; 30 s at most"),),
    ),
)

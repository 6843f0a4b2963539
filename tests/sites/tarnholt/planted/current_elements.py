"""Defects of the short-circuit, overload, unbalance and earth-fault settings."""

from __future__ import annotations

from tests.sites.curves import clearing_curve, melting_curve
from tests.sites.families import lettered, numbered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

SHORT_CIRCUIT = (
    Defect(
        ("CR-103", *lettered("F-501")),
        "short_circuit_trip_pickup_a",
        Of("locked_rotor_a", 1.5),
        (nuisance("short-circuit-rides-through-start", "1.5 x the start current; an offset start reaches 1.7 x"),),
    ),
    Defect(
        ("KM-201",),
        "short_circuit_trip_pickup_a",
        6250.0,
        (
            unsafe("short-circuit-sees-least-fault", "above 0.8 x the least phase-to-phase fault at the motor"),
            observation("short-circuit-sees-least-fault-well", "above half of the same fault"),
            observation("setting-typical-of-fleet", "33 x full load where the fleet has 7 to 11 x"),
        ),
    ),
    Defect(
        lettered("C-401"),
        "short_circuit_trip_delay_s",
        0.3,
        (observation("short-circuit-fast-enough", "0.3 s of intended delay on a breaker feeder"),),
    ),
    Defect(
        ("F-330",),
        "short_circuit_trip_on",
        False,
        (unsafe("short-circuit-trip-on", "the breaker has no trip unit of its own"),),
        alongside={"short_circuit_trip_pickup_a": None, "short_circuit_trip_delay_s": None},
    ),
    Defect(
        numbered("BC-", 201, 6),
        "short_circuit_trip_on",
        True,
        (
            unsafe("short-circuit-left-to-fuse", "opens before the fuse has cleared what the contactor cannot break"),
            unsafe("takeover-inside-contactor-rating", "the contactor has to break more than it can"),
        ),
        alongside={
            "short_circuit_trip_pickup_a": Of("locked_rotor_a", 1.85),
            "short_circuit_trip_delay_s": 0.0,
            "short_circuit_filter": "rms",
            "short_circuit_blocked_above_device_rating": None,
            "short_circuit_opens": None,
        },
    ),
)

FUSES = (
    Defect(
        lettered("P-705"),
        "fuse_melting_curve",
        melting_curve(31.5),
        (
            nuisance("fuse-carries-start", "the curve of a 31.5 A fuse: melts before the start is over"),
            unsafe("takeover-inside-contactor-rating", "the fuse takes over below the start current"),
        ),
        table="motor",
        alongside={"fuse_clearing_curve": clearing_curve(31.5)},
    ),
    Defect(
        ("CR-101",),
        "interrupting_rating_ka",
        0.8,
        (unsafe("takeover-inside-contactor-rating", "the contactor has to break more than its 0.8 kA"),),
        table="motor",
    ),
    Defect(
        lettered("P-115"),
        "backup_fuse_melting_curve",
        melting_curve(250.0),
        (observation("relay-ahead-of-upstream-fuse", "the fuse melts before relay and breaker have cleared"),),
        table="motor",
    ),
)

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
CURRENT_ELEMENTS = (*SHORT_CIRCUIT, *FUSES, *THERMAL, *UNBALANCE, *EARTH_FAULT, *DIFFERENTIAL)

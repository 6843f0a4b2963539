"""Defects of start timers, jam, undercurrent, voltage, starts and temperature settings."""

from __future__ import annotations

from tests.sites.families import lettered, numbered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

STARTING = (
    Defect(
        ("CR-102",),
        "start_timer_delay_s",
        3.5,
        (
            nuisance("start-timer-outlasts-start", "shorter than the recorded starts"),
            unsafe("recorded-start-completed", "recorded starts took longer than the timer allows"),
        ),
    ),
    Defect(
        numbered("BC-", 101, 4),
        "start_timer_delay_s",
        3.5,
        (nuisance("start-timer-outlasts-start", "shorter than a start at the lowest permitted voltage"),),
    ),
    Defect(
        lettered("MX-640"),
        "start_timer_on",
        False,
        (observation("start-timer-on", "no start timer on a direct-on-line motor"),),
        alongside={"start_timer_delay_s": None, "start_timer_pickup_a": None},
    ),
    Defect(
        ("CR-103",),
        "start_timer_delay_s",
        15.0,
        (
            unsafe("start-timer-inside-stall-limit", "longer than the safe stall time"),
            observation("start-timer-not-slack", "more than twice the longest start"),
        ),
    ),
    Defect(
        lettered("P-120"),
        "start_timer_delay_s",
        9.5,
        (observation("start-timer-not-slack", "more than twice the longest start"),),
    ),
    Defect(
        lettered("P-190"),
        "start_timer_pickup_a",
        Of("full_load_a", 3.0),
        (unsafe("start-timer-sees-start", "the soft starter's limit of 4.0 x is not 1.5 x the start pickup"),),
    ),
    Defect(
        ("BC-401",),
        "start_timer_pickup_a",
        Of("full_load_a", 0.8),
        (unsafe("start-timer-pickup-placed", "below the running current"),),
    ),
    Defect(
        ("F-301",),
        "speed_switch_delay_s",
        16.0,
        (
            unsafe("speed-switch-time-inside-stall-limit", "longer than the safe stall time"),
            unsafe(
                "stall-is-covered",
                "thermal element and timer let the long start through; the speed switch acts too late",
            ),
        ),
        table="motor",
    ),
    Defect(
        ("F-630",),
        "speed_switch_fitted",
        None,
        (
            unsafe("speed-switch-where-start-outlasts-stall", "the start outlasts the safe stall time"),
            unsafe(
                "thermal-beats-cold-stall", "set to let the long start through, nothing else guards the stalled motor"
            ),
            unsafe(
                "thermal-beats-hot-stall", "set to let the long start through, nothing else guards the stalled motor"
            ),
            unsafe("stall-is-covered", "neither thermal element nor start timer acts in time"),
            inconsistent("range-not-empty", "nothing rides through the start and acts within the stall time"),
        ),
        table="motor",
        alongside={"speed_switch_delay_s": None},
    ),
)

JAM = (
    Defect(
        ("CR-101",),
        "jam_trip_on",
        False,
        (observation("jam-trip-on", "a crusher can jam"),),
        alongside={"jam_trip_pickup_a": None, "jam_trip_delay_s": None, "jam_block_s": None},
    ),
    Defect(
        lettered("C-410"),
        "jam_trip_pickup_a",
        Of("full_load_a", 1.15),
        (nuisance("jam-pickup-above-load", "1.15 x full load; 1.2 x at least"),),
    ),
    Defect(
        ("KM-201",),
        "jam_trip_pickup_a",
        Of("full_load_a", 4.0),
        (unsafe("jam-pickup-below-stall", "above 0.75 x the locked-rotor current"),),
    ),
    Defect(
        numbered("BC-", 201, 6),
        "jam_block_s",
        2.0,
        (nuisance("jam-blocked-while-starting", "released before a slow start is over"),),
    ),
    Defect(
        lettered("MX-640"), "jam_trip_delay_s", 12.0, (unsafe("jam-delay-inside-stall-limit", "12 s; 10 s at most"),)
    ),
)

UNDERCURRENT = (
    Defect(
        lettered("P-160"),
        "undercurrent_trip_on",
        False,
        (observation("undercurrent-on-for-dry-run", "a submersible pump cannot run dry"),),
        alongside={
            "undercurrent_alarm_on": False,
            "undercurrent_trip_pickup_a": None,
            "undercurrent_trip_delay_s": None,
            "undercurrent_block_s": None,
        },
    ),
    Defect(
        lettered("F-310"),
        "undercurrent_trip_pickup_a",
        Of("full_load_a", 0.49),
        (nuisance("undercurrent-below-least-load", "within reach of the least running current"),),
    ),
    Defect(
        lettered("P-120"),
        "undercurrent_trip_pickup_a",
        Of("full_load_a", 0.18),
        (observation("undercurrent-above-idle", "below the no-load current: never acts"),),
    ),
    Defect(
        ("F-330",),
        "undercurrent_block_s",
        2.2,
        (nuisance("undercurrent-blocked-while-starting", "released before the start is over"),),
    ),
)

VOLTAGE = (
    Defect(
        ("KM-203",),
        "overvoltage_trip_pickup_v",
        4200.0,
        (
            nuisance("overvoltage-pickup-above-bus", "the bus runs above it all the time"),
            observation("overvoltage-pickup-near-hundred-ten", "far from the usual figure"),
            inconsistent("setting-unit-slip", "110 % taken from phase to neutral: short of it by root three"),
        ),
    ),
    Defect(
        lettered("P-110"),
        "undervoltage_trip_on",
        False,
        (observation("undervoltage-trip-on", "the breaker stays closed through a loss of voltage"),),
        alongside={"undervoltage_trip_pickup_v": None, "undervoltage_trip_delay_s": None},
    ),
    Defect(
        lettered("P-130"),
        "undervoltage_trip_pickup_v",
        Of("rated_voltage_v", 0.91),
        (nuisance("undervoltage-pickup-not-high", "91 %; 90 % at most"),),
    ),
    Defect(
        ("CR-103",),
        "undervoltage_trip_pickup_v",
        Of("rated_voltage_v", 0.50),
        (
            observation("undervoltage-pickup-not-low", "50 %; 60 % at least"),
            observation("undervoltage-pickup-near-ninety", "far from the usual figure"),
        ),
    ),
    Defect(
        ("KM-201",),
        "undervoltage_trip_delay_s",
        0.6,
        (
            nuisance(
                "undervoltage-outlasts-fault-clearing", "a fault elsewhere takes 0.5 s to clear, and 0.3 s to settle"
            ),
        ),
    ),
    Defect(
        ("CR-102",),
        "undervoltage_trip_delay_s",
        15.0,
        (observation("undervoltage-delay-bounded", "15 s; 10 s at most"),),
    ),
    Defect(
        ("CR-102",),
        "overvoltage_trip_pickup_v",
        Of("rated_voltage_v", 1.25),
        (
            unsafe("overvoltage-pickup-not-high", "125 %; 120 % at most"),
            observation("overvoltage-pickup-near-hundred-ten", "far from the usual figure"),
        ),
    ),
    Defect(
        ("KM-201",),
        "overvoltage_trip_pickup_v",
        6960.0,
        (nuisance("overvoltage-pickup-above-bus", "the bus itself comes up to 6860 V"),),
    ),
)

STARTS = (
    Defect(
        lettered("C-401"),
        "starts_limit_on",
        False,
        (observation("starts-limit-on", "three starts an hour stated, no limit set"),),
        alongside={"starts_limit_per_hour": None, "start_interval_min": None},
    ),
    Defect(
        lettered("F-620"),
        "starts_limit_per_hour",
        4.0,
        (unsafe("starts-limit-within-data-sheet", "four; the data sheet permits three"),),
    ),
    Defect(
        ("HM-601",),
        "start_interval_min",
        15.0,
        (unsafe("start-interval-within-data-sheet", "15 min; the data sheet asks for 20"),),
    ),
    Defect(
        lettered("P-701", "AB"),
        "restart_delay_s",
        50.0,
        (unsafe("restart-delay-outlasts-backspin", "the pump can spin back for 60 s"),),
    ),
)

TEMPERATURE = (
    Defect(
        ("KM-202",),
        "stator_temperature_trip_on",
        False,
        (observation("stator-temperature-trip-on", "above 1120 kW the sensors should trip"),),
        alongside={"stator_temperature_trip_c": None},
    ),
    Defect(
        ("KM-210",),
        "stator_temperature_trip_c",
        165.0,
        (unsafe("stator-temperature-trip-within-class", "class F ends at 155 C"),),
    ),
    Defect(
        ("KM-201",),
        "stator_temperature_alarm_c",
        143.0,
        (inconsistent("stator-temperature-alarm-before-trip", "2 K below the trip"),),
    ),
    Defect(
        lettered("F-501"),
        "stator_temperature_alarm_c",
        110.0,
        (nuisance("stator-temperature-alarm-above-running", "the winding has reached 112 C in service"),),
    ),
    Defect(
        ("F-301",),
        "bearing_temperature_trip_on",
        False,
        (observation("bearing-temperature-trip-on", "sleeve bearings"),),
        alongside={"bearing_temperature_trip_c": None},
    ),
    Defect(
        lettered("P-120"),
        "bearing_temperature_trip_c",
        125.0,
        (unsafe("bearing-temperature-trip-within-limit", "rolling bearings: 120 C at most"),),
    ),
    Defect(
        ("CR-101",),
        "bearing_temperature_alarm_c",
        103.0,
        (inconsistent("bearing-temperature-alarm-before-trip", "2 K below the trip"),),
    ),
)
OTHER_ELEMENTS = (*STARTING, *JAM, *UNDERCURRENT, *VOLTAGE, *STARTS, *TEMPERATURE)

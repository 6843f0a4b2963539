"""Defects of start timers, jam and undercurrent settings."""

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

"""Defects of overload relays, moulded-case breakers, cables, devices and buses."""

from __future__ import annotations

from tests.sites.families import lettered, numbered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

OVERLOAD = (
    Defect(
        lettered("P-170"),
        "overload_device",
        "none",
        (
            unsafe("overload-device-present", "a magnetic trip alone sees no overload"),
            unsafe("stall-is-covered", "nothing acts on a stalled rotor"),
        ),
        table="motor",
        alongside=dict.fromkeys(
            (
                "overload_dial_a",
                "overload_range_low_a",
                "overload_range_high_a",
                "overload_trip_class",
                "overload_class_standard",
                "overload_phase_loss_on",
            )
        ),
    ),
    Defect(
        lettered("P-710", "ABCD"),
        "overload_dial_a",
        Of("full_load_a", 1.15),
        (unsafe("overload-dial-not-high", "15 % above full load"),),
        table="motor",
    ),
    Defect(
        ("CR-120",),
        "overload_dial_a",
        22.0,
        (nuisance("overload-dial-not-low", "below the greatest running current"),),
        table="motor",
    ),
    Defect(
        lettered("F-650"),
        "overload_trip_class",
        10.0,
        (nuisance("overload-class-rides-through-start", "the fan takes longer than the class allows"),),
        table="motor",
    ),
    Defect(
        lettered("P-720"),
        "overload_trip_class",
        30.0,
        (
            unsafe("overload-class-inside-stall", "may trip after the safe stall time"),
            unsafe("stall-is-covered", "no other element acts on a stalled rotor"),
        ),
        table="motor",
    ),
    Defect(
        (*lettered("F-660"), *numbered("BC-", 301, 6)),
        "magnetic_trip_a",
        Of("locked_rotor_a", 1.85),
        (nuisance("magnetic-trip-rides-through-start", "its lower edge is 1.5 x the start current"),),
        table="motor",
    ),
    Defect(
        lettered("P-180", "ABC"),
        "earth_conductor_mm2",
        1.5,
        (
            unsafe("magnetic-trip-sees-least-fault", "the earth-fault loop is too long for the trip"),
            inconsistent("range-not-empty", "no trip rides through the start and sees this fault"),
        ),
        table="motor",
    ),
)

SPREAD = (
    Defect(
        ("MX-650",),
        "magnetic_trip_a",
        470.0,
        (observation("setting-typical-of-fleet", "26 x full load where the fleet has 13 to 16 x"),),
        table="motor",
    ),
)

PLANT = (
    Defect(
        ("CR-110",),
        "cable_ampacity_a",
        115.0,
        (unsafe("cable-carries-overload-pickup", "the cable carries less than the overload trip lets pass"),),
        table="motor",
    ),
    Defect(
        ("HM-601",),
        "fuse_let_through_a2s",
        4e8,
        (unsafe("cable-survives-fault", "the fuse lets more energy through than the cable bears"),),
        table="motor",
    ),
    Defect(
        lettered("P-110"),
        "ct_connected_burden_ohm",
        45.0,
        (
            unsafe("ct-carries-short-circuit-pickup", "the CT saturates below twice the pickup"),
            inconsistent("range-not-empty", "no pickup rides through the start and is carried by this CT"),
        ),
        table="motor",
    ),
    Defect(
        lettered("P-110"),
        "interrupting_rating_ka",
        12.0,
        (unsafe("device-interrupts-bus-fault", "12 kA on a bus of 12.9 kA"),),
        table="motor",
    ),
    Defect(
        lettered("P-150"),
        "lowest_start_voltage_pct",
        96.0,
        (unsafe("start-voltage-enough", "the motor gets less while it starts"),),
        table="motor",
    ),
    Defect(
        lettered("P-730"),
        "bypass_overload_fitted",
        False,
        (unsafe("drive-fed-motor-protected-by-drive", "no overload device in the bypass"),),
        table="motor",
    ),
    Defect(
        lettered("P-140"),
        "locked_rotor_a",
        None,
        (observation("high-efficiency-start-current-stated", "IE3 motor without a stated start current"),),
        table="motor",
    ),
)

BUSES = (
    Defect(
        ("MCC-42",),
        "incomer_pickup_a",
        1200.0,
        (
            nuisance(
                "incomer-carries-largest-start", "running load and the largest start exceed it for longer than 0.6 s"
            ),
        ),
        table="bus",
        alongside={"incomer_curve": "definite_time", "incomer_delay_s": 0.6, "incomer_time_multiplier": None},
    ),
    Defect(
        ("SWB-6A",),
        "incomer_delay_s",
        0.25,
        (inconsistent("incomer-waits-for-motor", "the motors' breakers need 0.12 s and more"),),
        table="bus",
        alongside={"incomer_curve": "definite_time", "incomer_pickup_a": 2500.0, "incomer_time_multiplier": None},
    ),
    Defect(
        ("SWB-6B",),
        "incomer_earth_fault_delay_s",
        0.35,
        (inconsistent("bus-earth-fault-waits-for-motor", "motors with residual connection take 0.28 s"),),
        table="bus",
    ),
)
LOW_VOLTAGE = (*OVERLOAD, *SPREAD, *PLANT, *BUSES)

"""Defects of voltage, starts and temperature settings."""

from __future__ import annotations

from tests.sites.families import lettered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

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

"""Defects of short-circuit settings and fuses."""

from __future__ import annotations

from tests.sites.curves import clearing_curve, melting_curve
from tests.sites.families import lettered, numbered
from tests.sites.tarnholt.planted.defect import Defect, Of, nuisance, observation, unsafe

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

"""Low-voltage motors of the Tarnholt works with overload relays and motor-protective breakers."""

from __future__ import annotations

from tests.sites.families import Family, lettered, numbered
from tests.sites.plant import Value
from tests.sites.tarnholt.areas import KILNS, QUARRY

OVERLOAD = {"switching_device": "moulded_case_breaker", "overload_device": "overload_relay"}
SMALL = {"switching_device": "motor_protective_breaker", "overload_device": "motor_protective_breaker"}
LETTER: dict[str, Value] = {"code_letter_on_plate": True}

FAMILIES_OVERLOAD = (
    Family(
        lettered("P-710", "ABCD"),
        "Softened water pump",
        KILNS,
        "pump",
        "MCC-42",
        37,
        4,
        facts=LETTER,
        starts=12,
        **OVERLOAD,
    ),
    Family(
        lettered("F-650"),
        "Hydrator exhaust fan",
        KILNS,
        "fan",
        "MCC-42",
        55,
        4,
        inertia=1.75,
        facts={"safe_stall_hot_s": 28.0, "safe_stall_cold_s": 40.0},
        **OVERLOAD,
    ),
    Family(
        numbered("BC-", 301, 6),
        "Stockpile conveyor",
        QUARRY,
        "conveyor",
        "MCC-42",
        30,
        4,
        load="constant",
        loading=0.80,
        **OVERLOAD,
    ),
    Family(numbered("SC-", 621, 4), "Dust return screw", KILNS, "screw", "MCC-42", 22, 4, load="unloaded", **OVERLOAD),
    Family(lettered("P-170"), "Weighbridge drain pump", QUARRY, "pump", "MCC-42", 18.5, 2, premium=False, **OVERLOAD),
    Family(
        lettered("F-660"), "Silo aeration blower", KILNS, "fan", "MCC-42", 45, 2, inertia=0.38, starts=14, **OVERLOAD
    ),
    Family(("CR-120",), "Sample crusher", QUARRY, "crusher", "MCC-42", 15, 4, load="unloaded", **OVERLOAD),
    Family(
        lettered("VS-110"), "Vibrating screen", QUARRY, "other", "MCC-43", 15, 4, load="unloaded", inertia=0.64, **SMALL
    ),
    Family(lettered("P-180", "ABC"), "Dust suppression pump", QUARRY, "pump", "MCC-43", 11, 2, **SMALL),
    Family(
        numbered("FD-", 101, 4),
        "Belt feeder",
        QUARRY,
        "conveyor",
        "MCC-43",
        7.5,
        6,
        load="constant",
        loading=0.75,
        **SMALL,
    ),
    Family(lettered("P-720"), "Dosing transfer pump", KILNS, "pump", "MCC-43", 5.5, 4, **SMALL),
    Family(("MX-650",), "Lime putty agitator", KILNS, "mixer", "MCC-43", 9, 6, load="unloaded", premium=False, **SMALL),
    Family(lettered("F-670"), "Switchroom fan", KILNS, "fan", "MCC-43", 4, 4, inertia=0.8, **SMALL),
    Family(
        lettered("MX-660"),
        "Slurry tank agitator",
        QUARRY,
        "mixer",
        "MCC-44",
        45,
        6,
        starting_method="star_delta",
        load="unloaded",
        inertia=0.16,
        facts={"relay_inside_delta": True},
        **OVERLOAD,
    ),
)

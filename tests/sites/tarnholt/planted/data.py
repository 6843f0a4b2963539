"""Defects of the data: records that disagree with each other or with the plant."""

from __future__ import annotations

from datetime import date

from tests.sites.families import lettered
from tests.sites.tarnholt.planted.defect import Defect, Of, inconsistent, nuisance, observation, unsafe

RELAY_DATA = (
    Defect(
        ("CR-101",),
        "relay_full_load_a",
        Of("full_load_a", 1.10),
        (unsafe("register-relay-full-load-agrees", "10 % above the plate"),),
    ),
    Defect(
        lettered("F-310"),
        "relay_full_load_a",
        Of("full_load_a", 0.90),
        (nuisance("register-relay-full-load-not-low", "10 % below the plate, no derating stated"),),
    ),
    Defect(
        ("HM-601",), "relay_ct_primary_a", 100.0, (unsafe("register-relay-ct-agrees", "told 100/1, fitted are 75/1"),)
    ),
    Defect(
        lettered("F-620"),
        "relay_earth_ct_primary_a",
        50.0,
        (unsafe("register-relay-earth-ct-agrees", "told 50/1, fitted is 20/1"),),
    ),
    Defect(
        lettered("P-130"),
        "relay_vt_primary_v",
        660.0,
        (unsafe("register-relay-vt-agrees", "told 660/110, fitted are 690/110"),),
    ),
    Defect(("CR-102",), "relay_frequency_hz", 60.0, (unsafe("register-relay-frequency-agrees", "a 50 Hz site"),)),
    Defect(
        ("HM-602",),
        "settings_export_date",
        date(2025, 1, 15),
        (inconsistent("register-relay-file-current", "export older than 400 days"),),
    ),
    Defect(lettered("C-410"), "relay_phase_rotation", "acb", (unsafe("phase-rotation-agrees", "the bus turns ABC"),)),
    Defect(lettered("P-160"), "relay_ct_count", 2.0, (unsafe("ct-connection-agrees", "three CTs are fitted"),)),
    Defect(
        ("KM-202",),
        "earth_fault_opens",
        "nothing",
        (unsafe("register-trip-reaches-output", "the earth-fault trip is assigned to no output"),),
    ),
    Defect(
        ("BC-104",),
        "unbalance_trip_delay_s",
        8.0,
        (observation("sisters-agree", "8 s; its sisters have 4 s"),),
    ),
)

MOTOR_DATA = (
    Defect(
        ("VS-110A",),
        "frequency_hz",
        60.0,
        (inconsistent("frequency-fits-bus", "a 60 Hz motor of 400 V on 50 Hz: a fifth too much flux"),),
        table="motor",
        alongside={"rated_speed_rpm": 1764.0},
    ),
    Defect(
        ("FD-302",),
        "full_load_a",
        Of("full_load_a", 1.341),
        (
            inconsistent(
                "register-full-load-plausible", "power, efficiency and power factor give less: as if the kW were hp"
            ),
        ),
        table="motor",
    ),
    Defect(
        ("F-680A",),
        "locked_rotor_a",
        1200.0,
        (inconsistent("register-start-current-plausible", "more than 20 x full load"),),
        table="motor",
    ),
    Defect(
        ("P-710B",),
        "locked_rotor_kva_letter",
        "C",
        (inconsistent("register-locked-rotor-letter-agrees", "the start current belongs to another letter"),),
        table="motor",
    ),
    Defect(
        ("FD-103",),
        "safe_stall_hot_s",
        27.0,
        (inconsistent("register-stall-times-ordered", "hot and cold are swapped"),),
        table="motor",
        alongside={"safe_stall_cold_s": 19.0},
    ),
    Defect(
        ("FD-104",),
        "rated_voltage_v",
        430.0,
        (inconsistent("register-motor-voltage-fits-bus", "430 V on a 400 V bus"),),
        table="motor",
    ),
    Defect(
        ("FD-301",),
        "running_current_a",
        Of("full_load_a", 1.12),
        (observation("register-running-load-plausible", "runs above full load"),),
        table="motor",
    ),
    Defect(
        ("VS-110B",),
        "rated_speed_rpm",
        1500.0,
        (inconsistent("register-speed-plausible", "synchronous speed: no slip"),),
        table="motor",
    ),
    Defect(
        ("F-680B",),
        "bus",
        "MCC-45",
        (inconsistent("register-bus-known", "the bus list has no such board"),),
        table="motor",
    ),
)
DATA = (*RELAY_DATA, *MOTOR_DATA)

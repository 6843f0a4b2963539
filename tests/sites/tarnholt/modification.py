"""The Tarnholt works after a modification: what was changed, and what that does to the findings."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from datetime import date

import numpy as np

from tests.sites.design import add_family
from tests.sites.families import Family
from tests.sites.machine import make_machine
from tests.sites.plant import Record, Site, Value, number
from tests.sites.rounding import printed
from tests.sites.tarnholt.areas import BREAKER, QUARRY, SMALL
from tests.sites.tarnholt.planted.defect import shown
from tests.sites.tarnholt.sample import Rows, sample_site

CHANGED_ON = date(2026, 10, 20)
READ_AGAIN_ON = date(2026, 11, 10)


@dataclass
class Modified:
    """A site after its modification, what was changed, and which findings come and go with it."""

    site: Site
    changes: Rows
    findings: Rows

    def put(self, record: Record, subject: str, key: str, datum: str, value: Value, why: str) -> None:
        """Change one value and note it."""
        before = shown(record.get(datum))
        if before == shown(value):
            return
        record[datum] = value
        self.note(subject, key, datum, before, shown(value), why)

    def note(self, subject: str, key: str, datum: str, before: str, after: str, why: str) -> None:
        """Note a change."""
        row = {"subject": subject, "subject_key": key, "datum": datum, "before": before, "after": after, "why": why}
        self.changes.append(row)

    def expect(self, key: str, check: str, turn: str, cause: str) -> None:
        """Note a finding that comes or goes."""
        self.findings.append({"subject_key": key, "check": check, "turn": turn, "cause": cause})


def _raise_fault_level(state: Modified) -> None:
    bus = state.site.bus("SWB-6B")
    why = "second intake transformer runs in parallel"
    state.put(bus, "bus", "SWB-6B", "fault_max_ka", 25.8, why)
    state.put(bus, "bus", "SWB-6B", "fault_study_date", date(2026, 9, 30), why)
    state.put(bus, "bus", "SWB-6B", "supply_changed_date", date(2026, 9, 20), why)
    for motor in state.site.motors:
        if motor["bus"] == "SWB-6B":
            state.expect(str(motor["motor"]), "device-interrupts-bus-fault", "comes", "25 kA breakers on 25.8 kA")


def _replace_motor(state: Modified) -> None:
    motor = state.site.motor("SC-622")
    machine = make_machine(22, 4, 400, 8.4, premium=True, scatter=0.4)
    # IE4 saves a good fifth of the losses of IE3
    efficiency = round(machine.efficiency_pct + 1.6, 1)
    full_load = printed(machine.full_load_a * machine.efficiency_pct / efficiency)
    why = "replaced by an IE4 motor"
    for datum, value in (
        ("motor_make", "Vexmoor Electric"),
        ("motor_type", "LV22-4 IE4"),
        ("efficiency_class", "ie4"),
        ("efficiency_pct", efficiency),
        ("power_factor", machine.power_factor),
        ("full_load_a", full_load),
        ("locked_rotor_a", printed(8.4 * full_load)),
        ("rated_speed_rpm", machine.speed_rpm),
        ("running_current_a", printed(0.85 * full_load)),
        ("motor_replaced_date", CHANGED_ON),
        ("motor_data_date", CHANGED_ON),
    ):
        state.put(motor, "motor", "SC-622", datum, value, why)
    state.expect("SC-622", "magnetic-trip-rides-through-start", "comes", "the new motor draws 8.4 x full load")


def _change_ct(state: Modified) -> None:
    motor = state.site.motor("KM-203")
    why = "failed CTs replaced by 100/1"
    state.put(motor, "motor", "KM-203", "ct_primary_a", 100.0, why)
    state.put(motor, "motor", "KM-203", "ct_changed_date", date(2026, 10, 12), why)
    state.expect("KM-203", "register-relay-ct-agrees", "comes", "the relay is still told 75/1")
    state.expect("KM-203", "register-relay-file-current", "comes", "the export is older than the CTs")


def _change_settings(state: Modified) -> None:
    site = state.site
    for tag, quantity, value, why in (
        ("CR-103", "short_circuit_trip_pickup_a", _above_offset(site, "CR-103"), "raised above an offset start"),
        ("CR-102", "start_timer_delay_s", 8.0, "raised above the longest start"),
        ("KM-202", "undervoltage_trip_delay_s", 12.0, "lengthened to ride through the transfer"),
    ):
        relay = site.relay_of(tag)
        state.put(relay, "relay", str(relay["relay_tag"]), quantity, value, why)
        state.put(relay, "relay", str(relay["relay_tag"]), "settings_export_date", READ_AGAIN_ON, "read again")
    state.expect("CR-103", "short-circuit-rides-through-start", "goes", "raised to 1.8 x the start current")
    state.expect("CR-102", "start-timer-outlasts-start", "goes", "8 s is above the longest start")
    state.expect("CR-102", "recorded-start-completed", "goes", "8 s is above the longest start")
    state.expect("KM-202", "undervoltage-delay-bounded", "comes", "12 s; 10 s at most")


def _above_offset(site: Site, tag: str) -> float:
    """Pickup of 1.8 times the locked-rotor current, on the next tenth of the CT's primary current."""
    motor = site.motor(tag)
    tenths = 1.8 * number(motor, "locked_rotor_a") / number(motor, "ct_primary_a") * 10
    return round((int(tenths) + 1) / 10 * number(motor, "ct_primary_a"), 1)


def _add_motor(state: Modified) -> None:
    family = Family(
        ("P-117",),
        "Storm water pump",
        QUARRY,
        "pump",
        "SWB-6A",
        315,
        4,
        start_multiple=5.8,
        inertia=0.25,
        length_m=(180, 240),
        facts=SMALL,
        **(BREAKER | {"starts": 0}),
    )
    add_family(state.site, family, np.random.default_rng(117))
    for record in (state.site.motor("P-117"), state.site.relay_of("P-117")):
        for dated in ("motor_data_date", "settings_export_date"):
            if dated in record:
                record[dated] = CHANGED_ON
    state.note("motor", "P-117", "motor", "", "P-117", "new pump with breaker, relay and cable")


def _remove_motor(state: Modified) -> None:
    state.site.motors.remove(state.site.motor("P-170B"))
    state.note("motor", "P-170B", "motor", "P-170B", "", "taken out of service")
    for check in ("overload-device-present", "stall-is-covered"):
        state.expect("P-170B", check, "goes", "the motor is gone")


STEPS: tuple[Callable[[Modified], None], ...] = (
    _raise_fault_level,
    _replace_motor,
    _change_ct,
    _change_settings,
    _add_motor,
    _remove_motor,
)


def modified_site() -> Modified:
    """Make the site as found and modify it."""
    state = Modified(sample_site().site, [], [])
    for step in STEPS:
        step(state)
    return state

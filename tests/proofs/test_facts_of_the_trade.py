"""Facts that the trade works by, each held by the checks. All common practice: no source is claimed for any of them.

The figures are worked by hand beside each; where a limit of the rules has a margin of its own, the figures keep
clear of it, so that it is the fact that is held and not the margin.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from audit.checks.catalogue import load_catalogue
from audit.checks.verdicts import VERDICT_NAMES, evaluate_check
from audit.derivation.groups import with_groups
from audit.derivation.register_facts import with_register_facts
from audit.derivation.workings import Workings
from audit.fleet.build import fleet_of
from audit.fleet.column import ASSUMED

CATALOGUE = load_catalogue()
Row = Mapping[str, Any]

pytestmark = pytest.mark.common_practice


def workings(motors: Sequence[Row], bus: Row | None = None, starts: Sequence[Row] = ()) -> Workings:
    """Give the workings of motors on one bus; settings stand in the rows of their motors."""
    settings_of = [quantity.name for quantity in CATALOGUE.quantities.values() if quantity.subject == "relay"]
    plant = [{name: value for name, value in row.items() if name not in settings_of} for row in motors]
    relays = [{name: value for name, value in row.items() if name in settings_of} for row in motors]
    fleet = fleet_of(motor=plant, relay=relays, bus=[bus or {}], start=starts)
    return Workings(
        with_register_facts(with_groups(fleet)),
        CATALOGUE.quantities,
        CATALOGUE.recipes,
        CATALOGUE.limits,
        CATALOGUE.functions,
    )


def verdict(check: str, *motors: Row, bus: Row | None = None, starts: Sequence[Row] = ()) -> str:
    """Give the verdict of a check on the first motor, or on the bus."""
    outcome = evaluate_check(CATALOGUE.named(check)[0], workings(motors, bus, starts))
    return VERDICT_NAMES[outcome.verdict[0]]


DIRECT: Row = {"motor": "P-1", "starting_method": "direct_on_line", "overload_device": "motor_relay"}


def test_a_start_draws_typically_six_times_full_load() -> None:
    # 6 x 85 A = 510 A, and it is said to be assumed
    column = workings([{**DIRECT, "full_load_a": 85.0}]).column("motor", "locked_rotor_to_detect_a")
    assert column.values.tolist() == pytest.approx([510.0])
    assert column.basis.tolist() == [ASSUMED]


@settings(max_examples=40, deadline=None)
@given(start=st.floats(50, 5000), margin=st.floats(0.002, 0.5))
def test_a_pickup_of_1_7_times_the_greatest_start_lets_the_motor_start_and_a_lower_one_is_reported(
    start: float, margin: float
) -> None:
    motor = {
        **DIRECT,
        "locked_rotor_a": start,
        "short_circuit_trip_on": True,
        "short_circuit_filter": "rms",
        "short_circuit_trip_delay_s": 0.0,
    }
    check = "short-circuit-rides-through-start"
    assert verdict(check, {**motor, "short_circuit_trip_pickup_a": 1.7 * start}) == "meets"
    assert verdict(check, {**motor, "short_circuit_trip_pickup_a": 1.7 * start * (1 - margin)}) == "breach"


def test_one_phase_of_an_offset_start_reaches_1_7_times_its_symmetrical_value() -> None:
    # by integration: i = sqrt 2 (sin(wt - pi/2) + exp(-t/T)), r.m.s. over the first half period; X/R of 40: T = 40 / w
    angle = np.linspace(0.0, np.pi, 20_001)
    offset = np.sqrt(2) * np.exp(-angle / 40)
    current = np.sqrt(2) * -np.cos(angle) + offset
    half_period = np.sqrt(np.trapezoid(current**2, angle) / np.pi)
    assert half_period == pytest.approx(1.7, abs=0.03)


@pytest.mark.parametrize(("rating_ka", "found"), [(25.0, "meets"), (24.0, "breach"), (31.5, "meets")])
def test_the_device_that_opens_must_interrupt_the_greatest_fault(rating_ka: float, found: str) -> None:
    bus = {"fault_max_ka": 25.0, "fault_includes_motors": True}
    motor = {**DIRECT, "switching_device": "breaker", "interrupting_rating_ka": rating_ka}
    assert verdict("device-interrupts-bus-fault", motor, bus=bus) == found


@pytest.mark.parametrize(
    ("ohm", "found"),
    [
        # 6600 V / 1.732 / 10 A = 381 ohm
        pytest.param(385.0, "meets", id="9.9 A"),
        pytest.param(370.0, "breach", id="10.3 A"),
    ],
)
def test_a_resistance_that_limits_the_earth_fault_to_ten_amperes_spares_the_core(ohm: float, found: str) -> None:
    bus = {"bus_name": "B", "earthing": "high_resistance", "bus_nominal_v": 6600.0, "neutral_resistor_ohm": ohm}
    assert verdict("earth-fault-limit-spares-core", DIRECT, bus=bus) == found


def test_a_residual_connection_cannot_be_set_as_low_as_a_core_balance_ct() -> None:
    # full load 100 A, start 600 A; CTs within +-1 %: up to 2 x 1 % x 600 A = 12 A of mismatch look like earth fault
    motor = {
        **DIRECT,
        "full_load_a": 100.0,
        "locked_rotor_a": 600.0,
        "ct_ratio_error_pct": 1.0,
        "earth_fault_trip_on": True,
        "earth_fault_trip_delay_s": 0.2,
    }
    check = "earth-fault-residual-above-false-current"
    residual = {**motor, "earth_ct_kind": "residual"}
    assert verdict(check, {**residual, "earth_fault_trip_pickup_a": 5.0}) == "breach"
    assert verdict(check, {**residual, "earth_fault_trip_pickup_a": 13.0}) == "meets"
    # over a core-balance CT the three currents add up before they are transformed, and 5 A is a sound pickup
    core_balance = {**motor, "earth_ct_kind": "core_balance", "earth_fault_trip_pickup_a": 5.0}
    assert verdict(check, core_balance) == "not applicable"
    assert verdict("earth-fault-sensitive-on-solid", core_balance, bus={"earthing": "solid"}) == "meets"


DIFFERENTIAL: Row = {
    **DIRECT,
    "full_load_a": 200.0,
    "locked_rotor_a": 1200.0,
    "stated_start_time_s": 5.0,
    "ct_ratio_error_pct": 1.0,
    "differential_trip_on": True,
}


@pytest.mark.parametrize(
    ("leads", "cts", "found"),
    [
        (6.0, "both_ends", "meets"),
        (3.0, "both_ends", "breach"),
        (6.0, "none", "breach"),
        (6.0, "flux_balance", "meets"),
    ],
)
def test_differential_protection_needs_both_ends_of_each_phase(leads: float, cts: str, found: str) -> None:
    motor = {**DIFFERENTIAL, "stator_leads": leads, "differential_cts": cts}
    assert verdict("differential-needs-both-ends", motor) == found


def test_differential_protection_has_pickups_and_delays_of_its_own_for_starting_and_running() -> None:
    # 2 x 1 % x 1200 A = 24 A of mismatch in the start; running 20 A is sensitive, starting 30 A lets the start pass
    sound = {
        **DIFFERENTIAL,
        "differential_kind": "two_sets",
        "differential_run_pickup_a": 20.0,
        "differential_run_delay_s": 0.04,
        "differential_start_pickup_a": 30.0,
        "differential_start_delay_s": 0.1,
    }
    for check in (
        "differential-start-pickup-above-false-current",
        "differential-run-pickup-sensitive",
        "differential-start-not-below-run",
        "differential-fast-enough",
    ):
        assert verdict(check, sound) == "meets", check
    one_pickup = {name: value for name, value in sound.items() if not name.startswith("differential_start")}
    assert verdict("differential-start-pickup-above-false-current", one_pickup) == "breach"


def test_flux_balance_is_the_most_sensitive_form() -> None:
    # 50 A are sensitive enough for two sets of CTs on a motor of 200 A, and too much for flux balance: all three
    # currents of a core cancel in one CT, so nothing of the start is left to be let through
    motor = {**DIFFERENTIAL, "differential_run_pickup_a": 50.0}
    assert verdict("differential-run-pickup-sensitive", {**motor, "differential_kind": "two_sets"}) == "meets"
    flux_balance = {**motor, "differential_kind": "flux_balance"}
    assert verdict("differential-run-pickup-sensitive", flux_balance) == "breach"
    low = {**flux_balance, "differential_run_pickup_a": 5.0, "differential_run_delay_s": 0.04}
    assert verdict("differential-run-pickup-sensitive", low) == "meets"
    assert verdict("differential-start-pickup-above-false-current", low) == "not applicable"


@pytest.mark.parametrize(
    ("check", "element", "usual", "away", "stated"),
    [
        ("undervoltage-pickup-near-ninety", "undervoltage", 0.90, 0.70, 70.0),
        ("overvoltage-pickup-near-hundred-ten", "overvoltage", 1.10, 1.20, 120.0),
    ],
)
def test_voltage_pickups_are_ninety_and_hundred_ten_per_cent_of_the_plate_unless_the_data_sheet_says_otherwise(
    check: str, element: str, usual: float, away: float, stated: float
) -> None:
    def motor(share: float) -> dict[str, Any]:
        return {
            **DIRECT,
            "rated_voltage_v": 6600.0,
            f"{element}_trip_on": True,
            f"{element}_trip_pickup_v": share * 6600.0,
        }

    assert verdict(check, motor(usual)) == "meets"
    assert verdict(check, motor(away)) == "breach"
    assert verdict(check, {**motor(away), f"stated_{element}_pickup_pct": stated}) == "meets"


@pytest.mark.parametrize(("delay_s", "found"), [(9.0, "meets"), (7.5, "breach"), (1.0, "breach")])
def test_the_undervoltage_delay_outlasts_the_dip_of_another_motors_start(delay_s: float, found: str) -> None:
    # the neighbour starts in 8 s and draws 1000 A from a supply of 5 kA: the bus stays at 5 / 6 of 6600 V = 5500 V,
    # below the pickup of 5940 V
    own = {
        **DIRECT,
        "rated_voltage_v": 6600.0,
        "locked_rotor_a": 100.0,
        "stated_start_time_s": 2.0,
        "undervoltage_trip_on": True,
        "undervoltage_trip_pickup_v": 5940.0,
        "undervoltage_trip_delay_s": delay_s,
    }
    neighbour = {
        "motor": "C-1",
        "starting_method": "direct_on_line",
        "rated_voltage_v": 6600.0,
        "locked_rotor_a": 1000.0,
        "stated_start_time_s": 8.0,
    }
    bus = {"bus_nominal_v": 6600.0, "fault_min_ka": 5.0}
    assert verdict("undervoltage-outlasts-starting-dip", own, neighbour, bus=bus) == found
    if delay_s < 8.0:
        # without the neighbour the same delay is long enough: its own start hardly pulls the voltage down
        assert verdict("undervoltage-outlasts-starting-dip", own, bus=bus) == "meets"


TIMED: Row = {**DIRECT, "start_timer_on": True, "device_opening_time_s": 0.05}


def test_a_motor_that_starts_in_2_s_and_bears_8_s_of_stall_is_sound_with_a_timer_of_3_s_and_spared_5_s() -> None:
    motor = {**TIMED, "stated_start_time_s": 2.0, "safe_stall_hot_s": 8.0, "start_timer_delay_s": 3.0}
    for check in ("start-timer-outlasts-start", "start-timer-inside-stall-limit", "start-timer-not-slack"):
        assert verdict(check, motor) == "meets", check
    seen = workings([motor])
    stall = seen.column("motor", "stall_limit_in_start_s").values
    assert (stall - seen.column("motor", "start_timer_delay_s").values).tolist() == pytest.approx([5.0])
    # a timer as long as the stall time spares nothing, one as short as the start breaks it off
    assert verdict("start-timer-inside-stall-limit", {**motor, "start_timer_delay_s": 8.0}) == "breach"
    assert verdict("start-timer-not-slack", {**motor, "start_timer_delay_s": 7.0}) == "breach"
    assert verdict("start-timer-outlasts-start", {**motor, "start_timer_delay_s": 2.0}) == "breach"


@settings(max_examples=40, deadline=None)
@given(longest=st.floats(2.5, 25))
def test_the_timer_goes_slightly_above_the_longest_start(longest: float) -> None:
    motor = {**TIMED, "safe_stall_hot_s": 4 * longest}
    starts = [{"start_motor": "P-1", "start_time_s": share * longest} for share in (0.8, 1.0, 0.9)]
    slightly = {**motor, "start_timer_delay_s": 1.2 * longest}
    below = {**motor, "start_timer_delay_s": 0.95 * longest}
    far = {**motor, "start_timer_delay_s": 2.5 * longest}
    assert verdict("start-timer-outlasts-start", slightly, starts=starts) == "meets"
    assert verdict("start-timer-not-slack", slightly, starts=starts) == "meets"
    assert verdict("start-timer-outlasts-start", below, starts=starts) == "breach"
    assert verdict("start-timer-not-slack", far, starts=starts) == "breach"


@pytest.mark.parametrize(
    ("limit_a", "found"),
    [
        pytest.param(95.0, "breach", id="below full load: the timer never runs"),
        pytest.param(350.0, "meets", id="3.5 times full load"),
    ],
)
def test_a_soft_start_below_full_load_is_never_seen_as_a_start_by_the_timer(limit_a: float, found: str) -> None:
    motor = {
        **TIMED,
        "starting_method": "soft_starter",
        "relay_on_supply_side": True,
        "full_load_a": 100.0,
        "soft_start_current_limit_a": limit_a,
    }
    assert verdict("start-timer-sees-start", motor) == found

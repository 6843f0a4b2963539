"""A bound under a condition is like 'condition is no, or the bound is met': either alone settles it."""

from __future__ import annotations

from audit.checks.catalogue import Catalogue
from audit.checks.verdicts import BREACH, MEETS, UNPROVEN, data_lacking, evaluate_check
from audit.derivation.workings import Workings
from audit.fleet.build import fleet_of

MOTOR = {"motor": "P-1", "starting_method": "direct_on_line", "locked_rotor_a": 600.0}


def judged(catalogue: Catalogue, check: str, motor: dict, relay: dict, bus: dict | None = None):
    fleet = fleet_of(motor=[motor], relay=[relay], bus=[bus or {}])
    workings = Workings(fleet, catalogue.quantities, catalogue.recipes, catalogue.limits, catalogue.functions)
    return evaluate_check(catalogue.named(check)[0], workings), workings


def pickup(amperes: float) -> dict:
    return {"short_circuit_trip_on": True, "short_circuit_trip_pickup_a": amperes, "short_circuit_trip_delay_s": 0.0}


def test_a_pickup_above_every_bound_does_not_rest_on_the_condition_that_was_assumed(catalogue: Catalogue) -> None:
    # 1.7 x 600 = 1020 A: met whatever the element measures
    outcome, _ = judged(catalogue, "short-circuit-rides-through-start", MOTOR, pickup(1025))
    assert outcome.verdict.tolist() == [MEETS]
    assert outcome.provisional.tolist() == [False]


def test_a_pickup_that_fails_only_by_the_assumed_condition_is_a_provisional_breach(catalogue: Catalogue) -> None:
    # 1.3 x 600 = 780 A would do if the offset were rejected; nothing says so
    outcome, _ = judged(catalogue, "short-circuit-rides-through-start", MOTOR, pickup(900))
    assert outcome.verdict.tolist() == [BREACH]
    assert outcome.provisional.tolist() == [True]


def test_a_pickup_that_is_met_only_by_an_assumed_start_current_stays_provisional(catalogue: Catalogue) -> None:
    motor = {"motor": "P-1", "starting_method": "direct_on_line", "full_load_a": 100.0, "efficiency_class": "ie2"}
    outcome, _ = judged(catalogue, "short-circuit-rides-through-start", motor, pickup(1100))
    assert outcome.verdict.tolist() == [MEETS]
    assert outcome.provisional.tolist() == [True]


def test_what_a_bus_lacks_is_named_by_the_datum_of_its_motor(catalogue: Catalogue) -> None:
    relay = {"short_circuit_trip_on": True}
    motor = {"motor": "P-1", "switching_device": "breaker", "device_opening_time_s": 0.06}
    bus = {"incomer_overcurrent_on": True, "fault_max_ka": 20.0, "incomer_pickup_a": 2000.0, "incomer_delay_s": 0.5}
    outcome, workings = judged(catalogue, "incomer-waits-for-motor", motor, relay, bus)
    assert outcome.verdict.tolist() == [UNPROVEN]
    assert list(data_lacking(outcome, workings)) == ["short_circuit_trip_delay_s"]

"""Invented fleets: their size, their independence of the audit, and physics that holds on every motor."""

from __future__ import annotations

import ast
import math
from pathlib import Path

import pytest

from tests.sites.fleets import FLEETS, write_fleet
from tests.sites.machine import make_machine, run_up_time_s
from tests.sites.plant import Site, number
from tests.sites.tarnholt.sound import sound_site

HERE = Path(__file__).parent


@pytest.fixture(scope="module", params=[*FLEETS, "tarnholt"])
def site(request: pytest.FixtureRequest) -> Site:
    """Make each of the sound sites."""
    return sound_site() if request.param == "tarnholt" else FLEETS[request.param](1)


def test_generator_imports_nothing_of_the_audit():
    modules = set()
    for path in HERE.rglob("*.py"):
        for node in ast.walk(ast.parse(path.read_text("utf-8"))):
            if isinstance(node, ast.Import):
                modules |= {alias.name.split(".")[0] for alias in node.names}
            elif isinstance(node, ast.ImportFrom):
                modules.add((node.module or "").split(".")[0])
    assert "tests" in modules
    assert "audit" not in modules
    assert "rules" not in modules


@pytest.mark.parametrize("name", FLEETS)
def test_fleet_has_two_hundred_motors_under_tags_of_their_own(name: str):
    made = FLEETS[name](1)
    assert len({motor["motor"] for motor in made.motors}) == len(made.motors) == 200


@pytest.mark.parametrize("name", FLEETS)
def test_same_seed_gives_the_same_fleet_and_another_seed_another(name: str):
    assert FLEETS[name](5) == FLEETS[name](5)
    assert FLEETS[name](5) != FLEETS[name](6)


def test_workbooks_of_a_seed_are_the_same_to_the_byte(tmp_path: Path):
    for folder in ("first", "second"):
        write_fleet("mixed_starters", tmp_path / folder, seed=2)
    names = sorted(path.name for path in (tmp_path / "first").iterdir())
    assert names
    for name in names:
        assert (tmp_path / "first" / name).read_bytes() == (tmp_path / "second" / name).read_bytes()


def test_full_load_current_follows_from_the_plate(site: Site):
    # power equation: P = sqrt3 V I eff pf; plates print three figures
    for motor in site.motors:
        output = math.sqrt(3) * number(motor, "rated_voltage_v") * number(motor, "full_load_a")
        output *= number(motor, "efficiency_pct") / 100 * number(motor, "power_factor") / 1e3
        assert output == pytest.approx(number(motor, "rated_power_kw"), rel=0.03), motor["motor"]


def test_slip_is_that_of_a_cage_motor(site: Site):
    for motor in site.motors:
        synchronous = 120 * number(motor, "frequency_hz") / number(motor, "poles")
        assert 0.003 < 1 - number(motor, "rated_speed_rpm") / synchronous < 0.06, motor["motor"]


def test_relays_are_told_what_is_fitted(site: Site):
    for relay in site.relays:
        motor = site.motor(str(relay["motor"]))
        assert relay["relay_ct_primary_a"] == motor["ct_primary_a"]
        assert number(relay, "relay_full_load_a") == pytest.approx(number(motor, "full_load_a"), rel=0.02)


def test_recorded_starts_last_no_longer_than_the_timer_and_the_stall_time_allow(site: Site):
    for relay in site.relays:
        motor = site.motor(str(relay["motor"]))
        for start in site.starts_of(str(motor["motor"])):
            if relay["start_timer_on"]:
                assert number(start, "start_time_s") < number(relay, "start_timer_delay_s")
            if not motor.get("speed_switch_fitted"):
                assert number(start, "start_time_s") < number(motor, "safe_stall_hot_s")


def test_run_up_against_no_load_matches_energy():
    # by hand, edge case: nearly constant torque. The kinetic energy at the end equals the work of the net torque,
    # so a run-up at twice the inertia takes twice as long
    machine = make_machine(90, 4, 400, 6.8, premium=True)
    once = run_up_time_s(machine, 10 - machine.inertia_kgm2, "unloaded", 1.0, 0.8)
    twice = run_up_time_s(machine, 20 - machine.inertia_kgm2, "unloaded", 1.0, 0.8)
    assert twice == pytest.approx(2 * once)


def test_lower_voltage_never_starts_faster():
    machine = make_machine(400, 4, 6600, 5.5, premium=True)
    times = [run_up_time_s(machine, 12.0, "square", voltage, 0.85) for voltage in (1.0, 0.95, 0.9, 0.85, 0.8)]
    assert times == sorted(times)

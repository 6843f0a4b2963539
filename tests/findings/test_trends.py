"""Start times and currents that drift toward a limit, with the day on which they reach it."""

from __future__ import annotations

from datetime import date, timedelta
from typing import Any

import pytest

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.findings.trends import Drift, drifts
from audit.fleet.build import fleet_of
from audit.pipeline import audit_fleet

FIRST = date(2026, 1, 1)
MOTOR = {
    "motor": "P-1", "full_load_a": 82, "locked_rotor_a": 490, "starting_method": "direct_on_line",
    "overload_device": "motor_relay",
}  # fmt: skip
RELAY = {"start_timer_on": True, "start_timer_delay_s": 7.0, "short_circuit_trip_on": True,
         "short_circuit_trip_pickup_a": 900, "short_circuit_filter": "offset_rejected"}  # fmt: skip


@pytest.fixture(scope="module")
def catalogue() -> Catalogue:
    return load_catalogue()


def found(catalogue: Catalogue, starts: list[dict[str, Any]], **relay: Any) -> tuple[Drift, ...]:
    fleet = fleet_of(motor=[MOTOR], relay=[{**RELAY, **relay}], start=[{"start_motor": "P-1", **one} for one in starts])
    return drifts(audit_fleet(fleet, catalogue, audited_on=date(2026, 11, 30)).workings)


def series(values: list[float], name: str = "start_time_s", days: int = 20) -> list[dict[str, Any]]:
    return [{"start_moment": FIRST + timedelta(days * place), name: value} for place, value in enumerate(values)]


def test_a_start_time_that_grows_reaches_the_timer_on_a_day(catalogue: Catalogue) -> None:
    # 0.1 s in 20 days, 0.005 s a day; 5.5 s at the last start, 100 days after the first; (7 - 5.5) / 0.005 = 300 days
    (drift,) = found(catalogue, series([5.0, 5.1, 5.2, 5.3, 5.4, 5.5]))
    assert (drift.motor, drift.quantity, drift.limit) == ("P-1", "start_time_s", 7.0)
    assert drift.level == pytest.approx(5.5)
    assert drift.per_year == pytest.approx(0.005 * 365.25)
    assert drift.last_start_on == "2026-04-11"
    assert drift.reached_on == (FIRST + timedelta(400)).isoformat()


def test_a_start_current_that_grows_reaches_the_short_circuit_pickup(catalogue: Catalogue) -> None:
    # pickup 900 A with the offset rejected: the start may reach 900 A over the multiple of the rules
    multiple = catalogue.limits["start_offset_multiple_filtered"].value
    limit = 900 / multiple
    values = [limit - 60 + 5 * place for place in range(8)]
    (drift,) = found(catalogue, series(values, "start_current_a"))
    assert drift.limit == pytest.approx(limit)
    # 5 A in 20 days; 35 A done at the last start, 25 A to go: 100 days later
    assert drift.reached_on == (FIRST + timedelta(140 + 100)).isoformat()


@pytest.mark.parametrize(
    "values",
    [
        [5.0, 5.1, 5.2, 5.3, 5.4],  # five starts are too few
        [5.5, 5.4, 5.3, 5.2, 5.1, 5.0],  # it shrinks
        [5.0, 5.4, 5.1, 5.3, 5.0, 5.2],  # no clear trend
        [7.1, 7.2, 7.3, 7.4, 7.5, 7.6],  # beyond the limit already: a finding, no forecast
        [5.0, 5.0001, 5.0002, 5.0003, 5.0004, 5.0005],  # more than five years away
    ],
)
def test_what_does_not_drift_toward_the_limit_is_left_alone(catalogue: Catalogue, values: list[float]) -> None:
    assert found(catalogue, series(values)) == ()


def test_a_timer_that_is_off_is_no_limit(catalogue: Catalogue) -> None:
    assert found(catalogue, series([5.0, 5.1, 5.2, 5.3, 5.4, 5.5]), start_timer_on=False) == ()

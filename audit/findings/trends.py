"""Start times and start currents that drift toward a limit, with the day on which they reach it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.derivation.start_records import StartTrend, start_trend
from audit.derivation.trace import day_text, shown_number
from audit.derivation.workings import Workings
from audit.expression.nodes import Node
from audit.expression.parse import parse
from audit.expression.values import YES, evaluate

Floats = NDArray[np.float64]
HORIZON_DAYS = 5 * 365.25
"""A limit that is farther away than this is left alone: no trend of starts holds that long."""


@dataclass(frozen=True, slots=True)
class _Watched:
    """A value of the starts, the limit that it must stay below, and when that limit counts."""

    value: str
    limit: Node
    limit_says: str
    setting: str
    when: Node


WATCHED = (
    _Watched(
        "start_time_s",
        parse("start_timer_delay_s"),
        "the start timer",
        "start_timer_delay_s",
        parse("start_timer_on and not drive_fed"),
    ),
    _Watched(
        "start_time_s",
        parse("safe_stall_hot_s"),
        "the safe stall time, hot",
        "safe_stall_hot_s",
        parse("not drive_fed"),
    ),
    _Watched(
        "recorded_start_current_at_rated_a",
        parse("short_circuit_trip_pickup_a / offset_of_start_multiple"),
        "the start current whose offset reaches the short-circuit pickup",
        "short_circuit_trip_pickup_a",
        parse("short_circuit_trip_on and not drive_fed"),
    ),
)


@dataclass(frozen=True, slots=True)
class Drift:
    """A value of a motor's starts that moves toward a limit."""

    motor: str
    quantity: str
    label: str
    level: float
    level_text: str
    per_year: float
    per_year_text: str
    limit: float
    limit_text: str
    limit_says: str
    setting: str
    last_start_on: str
    reached_on: str
    """The day on which the trend reaches the limit."""

    def words(self) -> str:
        """Say it."""
        return (
            f"{self.label} {self.level_text}, {self.per_year_text} a year more; reaches {self.limit_says} "
            f"({self.limit_text}) on {self.reached_on}"
        )


def drifts(workings: Workings) -> tuple[Drift, ...]:
    """Give every clear trend of start times and start currents that reaches a limit within five years."""
    fleet = workings.fleet
    parent = fleet.links.get(("start", "motor"))
    if parent is None or not fleet.rows("start"):
        return ()
    found: list[Drift] = []
    trends: dict[str, StartTrend] = {}
    for watched in WATCHED:
        if watched.value not in trends:
            moment = workings.home_column("start_moment").values
            value = workings.home_column(watched.value).values
            voltage = workings.home_column("start_voltage_pct").values
            trends[watched.value] = start_trend(moment, value, voltage, parent, fleet.rows("motor"))
        found += _reaching(watched, trends[watched.value], workings)
    return tuple(sorted(found, key=lambda drift: (drift.reached_on, drift.motor, drift.setting)))


def _reaching(watched: _Watched, trend: StartTrend, workings: Workings) -> list[Drift]:
    scope = workings.scope("motor")
    size = scope.rows()
    limit: Floats = np.array(np.broadcast_to(evaluate(watched.limit, scope).values, size), dtype=float)
    counts = np.broadcast_to(evaluate(watched.when, scope).values, size) == YES
    with np.errstate(invalid="ignore", divide="ignore"):
        drifting = counts & trend.enough & trend.clear & (trend.slope_per_day > 0)
        day = trend.level_day + (limit - trend.level) / trend.slope_per_day
        ahead = drifting & (day > trend.last_day) & (day <= trend.last_day + HORIZON_DAYS)
    return [_drift(watched, trend, workings, row, float(limit[row]), float(day[row])) for row in _rows(ahead)]


def _rows(mask: NDArray[np.bool_]) -> list[int]:
    return np.flatnonzero(mask).tolist()


def _drift(watched: _Watched, trend: StartTrend, workings: Workings, row: int, limit: float, day: float) -> Drift:
    quantity = workings.quantities[watched.value]
    now = float(trend.level[row] + trend.slope_per_day[row] * (trend.last_day[row] - trend.level_day[row]))
    per_year = float(trend.slope_per_day[row] * 365.25)
    return Drift(
        motor=workings.fleet.tables["motor"].keys[row],
        quantity=watched.value,
        label=quantity.label,
        level=now,
        level_text=shown_number(now, quantity),
        per_year=per_year,
        per_year_text=shown_number(per_year, quantity),
        limit=limit,
        limit_text=shown_number(limit, quantity),
        limit_says=watched.limit_says,
        setting=watched.setting,
        last_start_on=day_text(float(trend.last_day[row])),
        reached_on=day_text(day),
    )

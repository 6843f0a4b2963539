"""Recorded starts over two to three years: voltage, time and current scatter as on a plant."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import datetime, timedelta

import numpy as np

from tests.sites.plant import Record
from tests.sites.rounding import printed

FIRST_DAY = datetime(2024, 2, 5)
LAST_DAY = datetime(2026, 10, 23)


@dataclass(frozen=True)
class StartBehaviour:
    """How a motor starts, as functions of the voltage that it gets."""

    voltages_pu: tuple[float, float]
    times_s: tuple[float, float]
    """Run-up time at each of the two voltages; between them it runs straight against 1/V squared."""
    current_at_rated_a: float
    follows_voltage: bool = True
    rest_min: float = 35.0
    """Minutes until a second start follows, where one follows soon."""


def simulate_starts(tag: str, behaviour: StartBehaviour, count: int, random: np.random.Generator) -> list[Record]:
    """Give recorded starts of a motor: hours apart, now and then a second one soon after."""
    span = (LAST_DAY - FIRST_DAY).total_seconds()
    moments = np.sort(random.uniform(0, span, count))
    low, high = behaviour.voltages_pu
    starts: list[Record] = []
    latest = FIRST_DAY - timedelta(days=1)
    for place, seconds in enumerate(moments):
        moment = FIRST_DAY + timedelta(seconds=float(round(seconds / 60) * 60 + int(random.integers(0, 60))))
        if moment - latest < timedelta(hours=3):
            continue
        latest = moment
        voltage = float(random.uniform(low, high))
        squared = (1 / voltage**2 - 1 / low**2) / (1 / high**2 - 1 / low**2)
        time = behaviour.times_s[0] + squared * (behaviour.times_s[1] - behaviour.times_s[0])
        time *= 1 + float(np.clip(random.normal(0, 0.012), -0.025, 0.025))
        current = behaviour.current_at_rated_a * (voltage if behaviour.follows_voltage else 1.0)
        current *= 1 + float(np.clip(random.normal(-0.004, 0.006), -0.016, 0.012))
        again = place % 9 == 4
        for later in (0.0, behaviour.rest_min) if again else (0.0,):
            starts.append(
                {
                    "start_motor": tag,
                    "start_moment": moment + timedelta(minutes=later),
                    "start_time_s": round(time * (1 if not later else 0.995), 2 if time < 10 else 1),
                    "start_current_a": printed(current),
                    "start_voltage_pct": round(100 * voltage, 1),
                    "start_completed": True,
                }
            )
    return starts

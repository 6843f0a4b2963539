"""Functions over the start records of each motor: the busiest hour and the drift of start times."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.engineering.drift import kendall_probability_by_group, theil_sen_slope_by_group
from audit.engineering.start_counts import first_start_of_busiest_window, greatest_starts_in_window
from audit.expression.functions import Function, Operand
from audit.expression.rows import NO_ROW, count, greatest, least, median
from audit.vocabulary.units import UNITS

Floats = NDArray[np.float64]
Integers = NDArray[np.int64]
SECONDS_A_DAY = 86400.0
BUMP_S = 1.0
"""A start shorter than this was a bump, which the data sheet does not count."""
LEAST_STARTS = 6
LEAST_SPAN_DAYS = 60.0
VOLTAGE_BAND = 0.05
SIGNIFICANT = 0.05
HORIZON_DAYS = 365.0


def starts_in_busiest_hour(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Greatest number of starts within any 60 minutes, bumps left out, and the first start of that hour."""
    moment, duration = values
    counted = (parent >= 0) & ~np.isnan(moment) & ~(duration < BUMP_S)
    group = np.where(counted, parent, NO_ROW)
    instant = moment * SECONDS_A_DAY
    number = np.asarray(greatest_starts_in_window(group, instant, parents), dtype=float)
    number[np.bincount(group[counted], minlength=parents) == 0] = np.nan
    first = np.nan_to_num(np.asarray(first_start_of_busiest_window(group, instant, parents), dtype=float), nan=NO_ROW)
    return number, first.astype(np.int64)


@dataclass(frozen=True, slots=True)
class StartTrend:
    """How a value of the starts of each motor moves over the dates."""

    slope_per_day: Floats
    level: Floats
    """The median value, which stands at the median date."""
    level_day: Floats
    last_day: Floats
    clear: NDArray[np.bool_]
    """Whether Kendall's test calls the trend significant."""
    enough: NDArray[np.bool_]
    """Whether there are enough comparable starts over a time long enough."""
    last_start: Integers


def start_trend(moment: Floats, value: Floats, voltage: Floats, parent: Integers, parents: int) -> StartTrend:
    """Give the trend of comparable starts: those whose voltage lies within 5 % of the median."""
    usable = (parent >= 0) & ~np.isnan(moment) & ~np.isnan(value)
    group = np.where(usable, parent, NO_ROW)
    usual = np.append(median([voltage], group, parents)[0], np.nan)[group]
    with np.errstate(invalid="ignore"):
        group = np.where(np.abs(voltage / usual - 1) > VOLTAGE_BAND, NO_ROW, group)
    slope = np.asarray(theil_sen_slope_by_group(group, moment, value, parents), dtype=float)
    probability = np.asarray(kendall_probability_by_group(group, moment, value, parents), dtype=float)
    last, last_start = greatest([moment], group, parents)
    span = last - least([moment], group, parents)[0]
    with np.errstate(invalid="ignore"):
        clear = probability < SIGNIFICANT
        enough = (count([value], group, parents)[0] >= LEAST_STARTS) & (span >= LEAST_SPAN_DAYS)
    level, level_day = median([value], group, parents)[0], median([moment], group, parents)[0]
    return StartTrend(slope, level, level_day, last, clear, enough, last_start)


def drifted_start_time(values: list[Floats], parent: Integers, parents: int) -> tuple[Floats, Integers]:
    """Start time a year after the last record if the trend goes on; the present level where there is no clear trend.

    Missing where fewer than six comparable starts (voltage within 5 % of the median) over 60 days are known.
    """
    moment, duration, voltage = values
    trend = start_trend(moment, duration, voltage, parent, parents)
    ahead = trend.last_day - trend.level_day + HORIZON_DAYS
    projected = np.where(trend.clear, trend.level + trend.slope_per_day * ahead, trend.level)
    return np.where(trend.enough, projected, np.nan), trend.last_start


START_FUNCTIONS: dict[str, Function] = {
    "starts_in_busiest_hour_of": Function(
        "starts_in_busiest_hour_of",
        starts_in_busiest_hour,
        (Operand("moment", "number", UNITS["date"]), Operand("duration", "number", UNITS["s"])),
        Operand("starts", "number", UNITS["per_hour"]),
        of_rows=True,
        reads="greatest number of starts in any 60 minutes of",
    ),
    "drifted_start_time_of": Function(
        "drifted_start_time_of",
        drifted_start_time,
        (
            Operand("moment", "number", UNITS["date"]),
            Operand("duration", "number", UNITS["s"]),
            Operand("voltage", "number", UNITS["pct"]),
        ),
        Operand("time", "number", UNITS["s"]),
        of_rows=True,
        reads="start time a year on, by the trend (Theil-Sen) of",
    ),
}

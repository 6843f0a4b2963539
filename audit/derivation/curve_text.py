"""Curves written into one cell as points, '300 A: 40 s; 600 A: 10 s', read along straight lines on log-log paper."""

from __future__ import annotations

import re
from collections.abc import Callable
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from audit.engineering.point_curve import time_on_curves_s
from audit.expression.functions import Function, Operand
from audit.vocabulary.units import UNITS

Floats = NDArray[np.float64]
Reader = Callable[[Floats, Floats, Floats], Floats]
_NUMBER = r"\d+(?:[.,]\d+)?(?:e[+-]?\d+)?"
_POINT = re.compile(
    rf"(?P<current>{_NUMBER})\s*(?P<kilo>k)?a?\s*[:@/=\s]\s*(?P<time>{_NUMBER})\s*(?P<milli>m)?s?",
    re.IGNORECASE,
)


@lru_cache(maxsize=10_000)
def points_of_curve(text: str) -> tuple[tuple[float, ...], tuple[float, ...]] | None:
    """Read the points of a curve: current and time, separated by a colon; points separated by semicolons.

    >>> points_of_curve("300 A: 40 s; 0.6 kA: 900 ms")
    ((300.0, 600.0), (40.0, 0.9))
    >>> points_of_curve("1.25e+04 A: 0.008 s")
    ((12500.0,), (0.008,))
    >>> points_of_curve("see drawing 12") is None
    True
    """
    currents, times = [], []
    for part in re.split(r"[;\n]", text):
        if not part.strip():
            continue
        point = _POINT.fullmatch(part.strip())
        if point is None:
            return None
        currents.append(_number(point["current"]) * (1000.0 if point["kilo"] else 1.0))
        times.append(_number(point["time"]) * (0.001 if point["milli"] else 1.0))
    return (tuple(currents), tuple(times)) if currents else None


def _number(text: str) -> float:
    return float(text.replace(",", "."))


def _on_curves(curve: NDArray[np.object_], at: Floats, read: Reader) -> Floats:
    result = np.full(len(at), np.nan)
    texts, which = np.unique(curve.astype(str), return_inverse=True)
    for place, text in enumerate(texts):
        points = points_of_curve(str(text))
        if points is None:
            continue
        rows = np.flatnonzero(which == place)
        currents, times = (np.tile(np.array(part), (len(rows), 1)) for part in points)
        result[rows] = read(at[rows], currents, times)
    return result


def _time_held_below(current: Floats, currents: Floats, times: Floats) -> Floats:
    return time_on_curves_s(np.maximum(current, currents[:, 0]), currents, times)


def _time_held_above(current: Floats, currents: Floats, times: Floats) -> Floats:
    return time_on_curves_s(np.minimum(current, currents[:, -1]), currents, times)


def time_on_curve(curve: NDArray[np.object_], current_a: Floats) -> Floats:
    """Time at a current on a curve given as points; missing outside the points.

    >>> time_on_curve(np.array(["300 A: 40 s; 600 A: 10 s"], dtype=object), np.array([424.264])).round(2).tolist()
    [20.0]
    """
    return _on_curves(curve, current_a, time_on_curves_s)


def least_time_on_curve(curve: NDArray[np.object_], current_a: Floats) -> Floats:
    """Time that passes at least: below the first point of a falling curve it is no less than there.

    >>> least_time_on_curve(np.array(["300 A: 40 s; 600 A: 10 s"], dtype=object), np.array([200.0])).tolist()
    [40.0]
    """
    return _on_curves(curve, current_a, _time_held_below)


def greatest_time_on_curve(curve: NDArray[np.object_], current_a: Floats) -> Floats:
    """Time that passes at most: above the last point of a falling curve it is no more than there.

    >>> greatest_time_on_curve(np.array(["300 A: 40 s; 600 A: 10 s"], dtype=object), np.array([900.0])).tolist()
    [10.0]
    """
    return _on_curves(curve, current_a, _time_held_above)


def _of_curve(name: str, call: Callable[[NDArray[np.object_], Floats], Floats], reads: str) -> Function:
    operands = (Operand("curve", "text"), Operand("current_a", "number", UNITS["a"]))
    return Function(name, call, operands, Operand("time", "number", UNITS["s"]), reads=reads)


CURVE_FUNCTIONS: dict[str, Function] = {
    function.name: function
    for function in (
        _of_curve("time_on_curve_s", time_on_curve, "time on the curve"),
        _of_curve("least_time_on_curve_s", least_time_on_curve, "least time by the curve"),
        _of_curve("greatest_time_on_curve_s", greatest_time_on_curve, "greatest time by the curve"),
    )
}

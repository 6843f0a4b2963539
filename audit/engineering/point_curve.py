"""Time-current curves given as points: interpolation on log-log paper, one curve or one a row."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from audit.engineering.arrays import Floats, together


def _interpolated(at: Floats, given: Floats, wanted: Floats) -> Floats:
    """Interpolate row by row on logarithms: at is (rows, n), points are (rows, points) padded with NaN."""
    missing = np.isnan(given) | np.isnan(wanted)
    count = (~missing).sum(axis=1)
    positions = np.arange(given.shape[1])
    # a gap inside, a lone half of a pair or a falling abscissa makes the whole row unusable
    sound = (missing == (positions >= count[:, None])).all(axis=1)
    sound &= (np.isnan(given) == np.isnan(wanted)).all(axis=1)
    with np.errstate(invalid="ignore", divide="ignore"):
        drawable = (given > 0) & (wanted > 0) & np.isfinite(given) & np.isfinite(wanted)
        sound &= (missing | drawable).all(axis=1)
        sound &= ~(np.diff(given, axis=1) < 0).any(axis=1) & (count > 0)
        below = (np.where(missing, np.inf, given)[:, None, :] <= at[:, :, None]).sum(axis=2)
        last = np.maximum(count - 1, 0)[:, None]
        left = np.clip(below - 1, 0, last)
        right = np.minimum(left + 1, last)
        x, y = np.log(given), np.log(wanted)
        x_left, x_right = np.take_along_axis(x, left, 1), np.take_along_axis(x, right, 1)
        y_left, y_right = np.take_along_axis(y, left, 1), np.take_along_axis(y, right, 1)
        width = x_right - x_left
        share = np.where(width > 0, (np.log(at) - x_left) / np.where(width > 0, width, 1.0), 0.0)
        between = np.exp(y_left + share * (y_right - y_left))
        value = np.where(share == 0.0, np.take_along_axis(wanted, left, 1), between)
        ends = (at >= given[:, :1]) & (at <= np.take_along_axis(given, last, 1))
    return np.where(sound[:, None] & ends, value, np.nan)


def _by_row(at: ArrayLike, given: ArrayLike, wanted: ArrayLike) -> Floats:
    places = np.asarray(at, dtype=np.float64)
    table, result = together(given, wanted)
    rows = places if places.ndim == 2 else places.reshape(-1, 1)
    rows = np.broadcast_to(rows, (table.shape[0], rows.shape[1]))
    value = _interpolated(rows, table, result)
    return value if places.ndim == 2 else value[:, 0]


def time_on_curve_s(current_a: ArrayLike, curve_current_a: ArrayLike, curve_time_s: ArrayLike) -> Floats:
    """Time at a current on one curve given as points.

    ln t is linear in ln I between two points

    Parameters
    ----------
    current_a : array_like
        Currents to read the curve at, any shape. [A]
    curve_current_a : array_like
        Currents of the points, rising. [A]
    curve_time_s : array_like
        Times of the points. [s]

    Returns
    -------
    ndarray
        Time at each current. [s]

    Notes
    -----
    Nothing is extrapolated: missing outside the points. At a vertical step (two points at one current) the
    later point counts. Points that are not above zero or whose current falls make every reading missing.

    Examples
    --------
    A straight I^2 t line, 40 s at 300 A and 10 s at 600 A. By hand at 424.26 A: 40 / 2 = 20 s.

    >>> time_on_curve_s([424.264, 700], [300, 600], [40, 10]).round(2).tolist()
    [20.0, nan]

    References
    ----------
    Straight lines on log-log paper, common practice for limit and fuse curves; IEEE 620 for the axes.
    """
    currents = np.asarray(current_a, dtype=np.float64)
    points, times = together(curve_current_a, curve_time_s)
    value = _interpolated(currents.reshape(1, -1), points.reshape(1, -1), times.reshape(1, -1))
    return value.reshape(currents.shape)


def time_on_curves_s(current_a: ArrayLike, curve_current_a: ArrayLike, curve_time_s: ArrayLike) -> Floats:
    """Time at a current on each motor's own curve, the curves given row by row as points.

    ln t is linear in ln I between two points

    Parameters
    ----------
    current_a : array_like
        Current per row, or several currents per row in two dimensions. [A]
    curve_current_a : array_like
        Currents of the points, one curve a row, rising; shorter curves filled up with missing. [A]
    curve_time_s : array_like
        Times of the points, filled up likewise. [s]

    Returns
    -------
    ndarray
        Time per row, in the shape of the currents. [s]

    Notes
    -----
    Nothing is extrapolated: missing outside the points. A row with a gap inside, a lone half of a point, a
    value not above zero or a falling current gives missing. At a vertical step the later point counts.

    Examples
    --------
    Two motors, the second with three points. By hand: 40 * (300 / 424.264)^2 = 20 s; the point itself, 5 s.

    >>> nan = float("nan")
    >>> points = [[300, 600, nan], [100, 200, 400]]
    >>> time_on_curves_s([424.264, 200], points, [[40, 10, nan], [20, 5, 1]]).round(2).tolist()
    [20.0, 5.0]

    References
    ----------
    Straight lines on log-log paper, common practice for limit and fuse curves; IEEE 620 for the axes.
    """
    return _by_row(current_a, curve_current_a, curve_time_s)


def current_on_curves_a(time_s: ArrayLike, curve_current_a: ArrayLike, curve_time_s: ArrayLike) -> Floats:
    """Current at a time on each motor's own curve, the curves given row by row as points.

    ln I is linear in ln t between two points

    Parameters
    ----------
    time_s : array_like
        Time per row, or several times per row in two dimensions. [s]
    curve_current_a : array_like
        Currents of the points, one curve a row, rising; shorter curves filled up with missing. [A]
    curve_time_s : array_like
        Times of the points, falling or level, filled up likewise. [s]

    Returns
    -------
    ndarray
        Current per row, in the shape of the times. [A]

    Notes
    -----
    Nothing is extrapolated: missing outside the points. A row with a gap inside, a lone half of a point, a
    value not above zero or a rising time gives missing. At a level step the lower current counts.

    Examples
    --------
    A fuse that melts in 40 s at 300 A and in 10 s at 600 A. By hand at 20 s: 300 * sqrt(2) = 424.3 A.

    >>> current_on_curves_a([20], [[300, 600]], [[40, 10]]).round(1).tolist()
    [424.3]

    References
    ----------
    Straight lines on log-log paper, common practice for limit and fuse curves.
    """
    currents, times = together(curve_current_a, curve_time_s)
    # read backwards, so that the abscissa rises; padding goes back to the end of the row
    known = (~np.isnan(times)).sum(axis=1, keepdims=True)
    order = np.arange(times.shape[1])
    back = np.where(order < known, known - 1 - order, order)
    return _by_row(time_s, np.take_along_axis(times, back, 1), np.take_along_axis(currents, back, 1))

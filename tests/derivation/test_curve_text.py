"""Curves written into a cell as points."""

from __future__ import annotations

import numpy as np
import pytest

from audit.derivation.curve_text import greatest_time_on_curve, least_time_on_curve, points_of_curve, time_on_curve

FUSE = "300 A: 40 s; 1200 A: 2.5 s"


def read(call, text: str | None, *currents: float) -> list[float]:
    curve = np.array([text or ""] * len(currents), dtype=object)
    return call(curve, np.array(currents)).tolist()


@pytest.mark.parametrize(
    "text",
    [
        "300 A: 40 s; 1200 A: 2.5 s",
        "0.3 kA: 40 s; 1.2kA: 2500ms",
        "300:40;1200:2,5",
        "300 A = 40 s\n1200 A = 2.5 s",
        "3e2 A @ 40 s; 1.2e+03 A @ 2.5 s;",
    ],
)
def test_points_are_read_however_a_list_writes_them(text: str) -> None:
    assert points_of_curve(text) == ((300.0, 1200.0), (40.0, 2.5))


@pytest.mark.parametrize("text", ["", "see drawing 12", "300 A: 40 s; about 1 kA: 3 s", "300 A: -40 s"])
def test_what_is_not_a_curve_gives_no_reading(text: str) -> None:
    assert points_of_curve(text) is None
    assert np.isnan(read(time_on_curve, text, 300.0)).all()


def test_between_points_the_line_on_log_log_paper_counts() -> None:
    # by hand: from 300 A, 40 s to 1200 A, 2.5 s the square of current times time is constant; 600 A gives 10 s
    assert read(time_on_curve, FUSE, 600.0) == pytest.approx([10.0])


def test_outside_the_points_only_the_safe_side_is_known() -> None:
    # the curve falls: below the first point it takes no less, above the last no more
    assert read(least_time_on_curve, FUSE, 200.0)[0] == 40.0
    assert read(greatest_time_on_curve, FUSE, 2000.0)[0] == 2.5
    unknown = [
        *read(time_on_curve, FUSE, 200.0, 2000.0),
        *read(least_time_on_curve, FUSE, 2000.0),
        *read(greatest_time_on_curve, FUSE, 200.0),
    ]
    assert np.isnan(unknown).all()


def test_a_missing_current_gives_a_missing_time() -> None:
    for call in (time_on_curve, least_time_on_curve, greatest_time_on_curve):
        assert np.isnan(read(call, FUSE, np.nan)).all()


def test_a_curve_that_does_not_rise_in_current_is_not_used() -> None:
    assert np.isnan(read(time_on_curve, "1200 A: 2.5 s; 300 A: 40 s", 600.0)).all()

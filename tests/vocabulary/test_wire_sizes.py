"""Conductor sizes: gauges against the areas of NFPA 70 chapter 9 table 8 (from memory), notations by hand."""

from __future__ import annotations

import pytest

from audit.vocabulary.wire_sizes import WireSize, awg_mm2, wire_size


@pytest.mark.parametrize(
    ("gauge", "area_mm2"),
    [
        (14, 2.08), (12, 3.31), (10, 5.261), (8, 8.367), (6, 13.30), (4, 21.15), (2, 33.62), (1, 42.41),
        (0, 53.49), (-1, 67.43), (-2, 85.01), (-3, 107.2),
    ],
)  # fmt: skip
def test_gauges_have_the_tabulated_area(gauge, area_mm2):
    assert awg_mm2(gauge) == pytest.approx(area_mm2, rel=2e-3)


@pytest.mark.parametrize(
    ("text", "size"),
    [
        ("70", WireSize(70.0)),
        ("70 mm²", WireSize(70.0)),
        ("3C x 70 mm2", WireSize(70.0)),
        ("3x70", WireSize(70.0)),
        ("3x70+35", WireSize(70.0)),
        ("3C+E 70", WireSize(70.0)),
        ("3C 95", WireSize(95.0)),
        ("2x(3x240)", WireSize(240.0, 2)),
        ("2 x 3C x 120 mm² XLPE", WireSize(120.0, 2)),
        ("1x3c95", WireSize(95.0, 1)),
        ("2,5", WireSize(2.5)),
    ],
)
def test_metric_notations(text, size):
    assert wire_size(text) == size


@pytest.mark.parametrize(
    ("text", "area_mm2"),
    [("2/0", 67.43), ("2/0 AWG", 67.43), ("#12", 3.31), ("12 AWG", 3.31), ("2/C #12", 3.31), ("250 kcmil", 126.7),
     ("500 MCM", 253.4)],
)  # fmt: skip
def test_us_notations(text, area_mm2):
    assert wire_size(text).mm2 == pytest.approx(area_mm2, rel=2e-3)


@pytest.mark.parametrize("text", ["", "see schedule", "TBC", "70-95", "3C", "x", "12 m", "5/0"])
def test_anything_else_is_no_size(text):
    assert wire_size(text) is None

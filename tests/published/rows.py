"""Reads the published values beside the tests and holds a result against them.

Each row names its quantity, the inputs by the names of our parameters, the expected figure, the tolerance, the
source and how well the source is known: 'published copy' (read in a copy, not the publisher's own), 'second-hand'
(a text that cites it), 'derived' (worked out independently and checked numerically), 'memory' (nothing at hand).
"""

from __future__ import annotations

import csv
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np
import pytest

VALUES = Path(__file__).parent / "values"


@dataclass(frozen=True)
class Row:
    """One published value."""

    topic: str
    quantity: str
    inputs: str
    expected: str
    tolerance: str
    source: str
    known: str

    def arguments(self) -> dict[str, float | str]:
        """Give the inputs by parameter name; what is no number stays a word."""
        pairs = (part.split("=", 1) for part in self.inputs.split(";"))
        return {name.strip(): _number_or_word(value.strip()) for name, value in pairs}

    def allowed(self) -> Any:
        """Give the expected figure with its tolerance, for comparison by ==."""
        figure = float(self.expected)
        kind, _, size = self.tolerance.partition(" ")
        if kind == "exact":
            return pytest.approx(figure, rel=1e-9, abs=0)
        if kind == "rel":
            return pytest.approx(figure, rel=float(size), abs=0)
        if kind == "abs":
            return pytest.approx(figure, abs=float(size), rel=0)
        raise ValueError(f"{self.quantity}: tolerance {self.tolerance!r} is none of exact, rel, abs")


def _number_or_word(text: str) -> float | str:
    try:
        return float(text)
    except ValueError:
        return text


def rows_of(name: str) -> list[Row]:
    """Give all rows of one file of published values."""
    with (VALUES / f"{name}.csv").open(newline="", encoding="utf-8") as lines:
        return [Row(**line) for line in csv.DictReader(lines)]


def cases_of(name: str, formulas: Mapping[str, Callable[..., Any]]) -> list[Any]:
    """Give the rows whose quantity we compute, named by quantity, source and how well it is known."""
    return [
        pytest.param(row, id=f"{row.quantity}: {row.inputs} [{row.known}: {row.source}]")
        for row in rows_of(name)
        if row.quantity in formulas
    ]


def unclaimed(name: str, *quantities: Mapping[str, Any] | set[str]) -> set[str]:
    """Give the quantities of a file that nobody has claimed, so that no row is passed over in silence."""
    claimed = {quantity for group in quantities for quantity in group}
    return {row.quantity for row in rows_of(name)} - claimed


def value_of(row: Row, formulas: Mapping[str, Callable[..., Any]]) -> float:
    """Compute a row's quantity from its inputs."""
    return float(np.asarray(formulas[row.quantity](**row.arguments())))

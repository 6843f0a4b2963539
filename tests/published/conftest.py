"""Published values: one file a topic in values/, one row a value, its source and how well it is known beside it.

A test module names its file in VALUES; its test then runs once per row, as the argument `row`.
"""

from __future__ import annotations

import csv
import math
from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pytest

FOLDER = Path(__file__).parent / "values"


@dataclass(frozen=True)
class Row:
    """One published value with what it was computed from."""

    quantity: str
    inputs: dict[str, str]
    expected: str
    tolerance: str
    source: str
    known: str

    def arguments(self) -> dict[str, float | str]:
        """Give the inputs by name, as numbers where they are."""
        return {name: _number_or_word(value) for name, value in self.inputs.items()}

    @property
    def name(self) -> str:
        """Say what the row is about, in the name of the test."""
        given = ",".join(f"{name}={value}" for name, value in self.inputs.items())
        return f"{self.quantity} [{given}] ({self.known})"

    @property
    def slack(self) -> tuple[float, float]:
        """Give the relative and absolute tolerance; 'exact' leaves what float arithmetic needs."""
        if self.tolerance == "exact":
            return 1e-9, 0.0
        kind, size = self.tolerance.split()
        return (float(size), 0.0) if kind == "rel" else (0.0, float(size))

    def reproduced_by(self, value: object) -> None:
        """Demand that the computed value is the published one."""
        expected, computed = float(self.expected), float(np.asarray(value, dtype=np.float64))
        relative, absolute = self.slack
        assert math.isclose(computed, expected, rel_tol=relative, abs_tol=absolute), (
            f"{self.name}: {computed!r}, published {expected!r} within {self.tolerance}; {self.source}"
        )


def _number_or_word(text: str) -> float | str:
    try:
        return float(text)
    except ValueError:
        return text


def read_rows(name: str) -> list[Row]:
    """Read a file of published values."""
    with (FOLDER / f"{name}.csv").open(newline="", encoding="utf-8") as lines:
        return [
            Row(
                line["quantity"],
                dict(part.strip().split("=", 1) for part in line["inputs"].split(";")),
                line["expected"],
                line["tolerance"],
                line["source"],
                line["known"],
            )
            for line in csv.DictReader(lines)
        ]


def pytest_generate_tests(metafunc: pytest.Metafunc) -> None:
    """Run a test with the argument `row` once per row of its module's file."""
    name = getattr(metafunc.module, "VALUES", None)
    if name is not None and "row" in metafunc.fixturenames:
        rows = read_rows(name)
        metafunc.parametrize("row", rows, ids=[row.name for row in rows])

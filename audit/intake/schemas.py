"""pandera schemas made from the vocabulary: type, plausible range, choices, presence of a key."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import lru_cache

import pandas as pd
import pandera.pandas as pa
from pandera.errors import SchemaErrors

from audit.vocabulary.quantities import Quantity, vocabulary

KEY = "key"
SLACK = 1e-9
"""Relative slack at the ends of a plausible range, so that a converted value at the end is inside."""
FIRST_DAY, LAST_DAY = -7305.0, 47482.0
"""Dates are plausible from 1950 to 2099, in days since 1970-01-01."""
YES_NO = ("yes", "no")


@dataclass(frozen=True, slots=True)
class Failure:
    """A value that the schema refuses: its column, its row, and the rule."""

    column: str
    row: int
    rule: str


def range_of(quantity: Quantity) -> tuple[float, float] | None:
    """Give the range in which values of a quantity are plausible.

    >>> range_of(vocabulary().quantities["power_factor"])
    (0.2, 1.0)
    """
    return (FIRST_DAY, LAST_DAY) if quantity.kind == "date" else quantity.plausible


def words_of(quantity: Quantity) -> tuple[str, ...]:
    """Give the words that a column of a choice or of yes and no may hold."""
    return YES_NO if quantity.kind == "truth" else quantity.choices


@lru_cache(maxsize=64)
def schema_of(names: tuple[str, ...]) -> pa.DataFrameSchema:
    """Give the schema of a table with these quantities, and a key in each row."""
    columns: dict[str, pa.Column] = {KEY: pa.Column(nullable=False, checks=pa.Check(_filled, name="filled"))}
    for name in names:
        columns[name] = _column(vocabulary().quantities[name])
    return pa.DataFrameSchema(columns, strict=True)


def _column(quantity: Quantity) -> pa.Column:
    if quantity.kind in ("truth", "choice"):
        return pa.Column(nullable=True, checks=pa.Check.isin(words_of(quantity)))
    if quantity.kind == "text":
        return pa.Column(nullable=True, checks=pa.Check(_filled, name="filled"))
    span = range_of(quantity)
    if span is None:
        return pa.Column(float, nullable=True)
    low, high = span[0] - SLACK * abs(span[0]), span[1] + SLACK * abs(span[1])
    return pa.Column(float, nullable=True, checks=pa.Check.in_range(low, high))


def _filled(texts: pd.Series) -> pd.Series:
    return texts.astype(str).str.strip() != ""


def failures(frame: pd.DataFrame, names: Iterable[str]) -> list[Failure]:
    """Give every value that its schema refuses, by column and row; the frame's index counts the rows.

    >>> frame = pd.DataFrame({"key": ["P-1", "P-2"], "motor_kind": ["cage", "cagey"]})
    >>> [(failure.column, failure.row) for failure in failures(frame, ["motor_kind"])]
    [('motor_kind', 1)]
    """
    wanted = tuple(names)
    try:
        schema_of(wanted).validate(frame[[KEY, *wanted]], lazy=True)
    except SchemaErrors as refused:
        cases = refused.failure_cases
        unplaced = cases[cases["index"].isna()]
        if len(unplaced):
            raise TypeError(f"columns reached the schema uncoerced: {unplaced.to_dict('records')}") from refused
        order = {name: place for place, name in enumerate((KEY, *wanted))}
        found = [
            Failure(str(column), int(row), str(rule))
            for column, row, rule in zip(cases["column"], cases["index"], cases["check"], strict=True)
        ]
        return sorted(set(found), key=lambda failure: (order[failure.column], failure.row, failure.rule))
    return []

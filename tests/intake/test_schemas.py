"""Schemas made from the vocabulary refuse what is implausible, all of it, and nothing else."""

from __future__ import annotations

import numpy as np
import pandas as pd
import pytest

from audit.intake.schemas import failures, range_of, words_of
from audit.vocabulary.quantities import vocabulary

KNOWN = {name: quantity for name, quantity in vocabulary().quantities.items() if quantity.role != "derived"}
RANGED = sorted(name for name, quantity in KNOWN.items() if quantity.kind == "number" and quantity.plausible)
WORDED = sorted(name for name, quantity in KNOWN.items() if quantity.kind in ("truth", "choice"))


def frame(name: str, values: list[object]) -> pd.DataFrame:
    kind = "float64" if KNOWN[name].kind in ("number", "date") else "object"
    return pd.DataFrame({"key": [f"P-{n}" for n in range(len(values))], name: pd.Series(values, dtype=kind)})


def refused(name: str, values: list[object]) -> list[int]:
    return [failure.row for failure in failures(frame(name, values), [name])]


@pytest.mark.parametrize("name", RANGED)
def test_the_ends_of_a_plausible_range_are_inside_and_what_is_beyond_is_out(name):
    low, high = range_of(KNOWN[name])
    step = 1e-3 * max(abs(low), abs(high), 1e-9)
    assert refused(name, [low, high, np.nan, low - step, (low + high) / 2, high + step, low]) == [3, 5]


@pytest.mark.parametrize("name", WORDED)
def test_words_of_the_vocabulary_are_accepted_and_others_refused(name):
    words = list(words_of(KNOWN[name]))
    assert refused(name, [*words, None, "no such word", *words]) == [len(words) + 1]


def test_dates_before_1950_and_after_2099_are_refused():
    days = [
        (pd.Timestamp(day) - pd.Timestamp("1970-01-01")).days
        for day in ("1949-12-31", "1950-01-01", "2099-12-31", "2150-01-01")
    ]
    assert refused("motor_replaced_date", days) == [0, 3]


def test_every_bad_value_of_every_column_is_told_in_order():
    table = pd.DataFrame(
        {
            "key": ["P-1", "P-2", "P-3"],
            "poles": [4.0, 400.0, np.nan],
            "motor_kind": pd.Series(["cagey", "cage", "round"], dtype=object),
        }
    )
    told = [(failure.column, failure.row) for failure in failures(table, ["poles", "motor_kind"])]
    assert told == [("poles", 1), ("motor_kind", 0), ("motor_kind", 2)]


def test_a_row_without_a_key_is_refused():
    table = pd.DataFrame({"key": pd.Series(["P-1", None, " "], dtype=object), "poles": [4.0, 4.0, 4.0]})
    assert [(failure.column, failure.row) for failure in failures(table, ["poles"])] == [("key", 1), ("key", 2)]


def test_a_column_that_was_not_coerced_is_the_programs_own_fault():
    table = pd.DataFrame({"key": ["P-1"], "poles": pd.Series(["4"], dtype=object)})
    with pytest.raises(TypeError, match="poles"):
        failures(table, ["poles"])

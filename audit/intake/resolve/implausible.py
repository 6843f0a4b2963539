"""Values that their schema refuses: withheld, with the likely cause, and asked where a slip would explain them."""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping, Sequence

import numpy as np
import pandas as pd

from audit.intake.resolve.codes import UNREAD
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.numbers import unit_words
from audit.intake.resolve.pick import NOT_READ, VALUE, Picked
from audit.intake.schemas import KEY, failures, range_of, words_of
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.spellings import conversion, dimension_of, spellings

MOST_CAUSES = 3
MOST_CELLS = 20
"""So many cells of a quantity are complained of one by one, further ones once a column."""
MULTIPLE = "a multiple of its base"
UNIT_WORDS = {"pct": "%", "c": "°C", "f": "°F", "mm2": "mm²", "cycles": "cycles"}


def withhold_implausible(
    quantities: Sequence[Quantity],
    picked: Mapping[str, Picked],
    readings: pd.DataFrame,
    keys: Sequence[str],
    ledger: Ledger,
) -> None:
    """Check the values of some quantities of one table against their schema; complain and withhold in place.

    `readings` are all readings of the run, by the numbers that the picked values name.
    """
    told = [quantity for quantity in quantities if (picked[quantity.name].state != NOT_READ).any()]
    if not told:
        return
    columns = {quantity.name: _checkable(quantity, picked[quantity.name], readings) for quantity in told}
    frame = pd.DataFrame({KEY: pd.Series(list(keys), dtype=object), **columns})
    known = {quantity.name: quantity for quantity in told}
    slips: dict[tuple[str, str], list[int]] = {}
    shown: Counter[str] = Counter()
    more: dict[tuple[str, str], list[int]] = {}
    for failure in failures(frame, known):
        quantity, column = known[failure.column], picked[failure.column]
        number = int(column.reading[failure.row])
        causes = likely_causes(quantity, readings.at[number, "number"], str(readings.at[number, "unit"]))
        advice = _advice(causes)
        shown[quantity.name] += 1
        if shown[quantity.name] <= MOST_CELLS:
            ledger.complain(
                int(column.cell[failure.row]),
                _found(quantity).format(written=readings.at[number, "written"]),
                expected_of(quantity),
                advice,
                quantity=quantity.name,
                subject=quantity.subject,
                key=keys[failure.row],
            )
        else:
            more.setdefault((quantity.name, advice), []).append(number)
        if causes:
            slips.setdefault((quantity.name, causes[0]), []).append(number)
        column.withhold(np.array([failure.row]), np.nan if range_of(quantity) else UNREAD)
    for (name, advice), numbers in more.items():
        quantity = known[name]
        ledger.complain_by_column(readings.loc[numbers], _found(quantity), expected_of(quantity), advice, quantity=name)
    for (name, cause), numbers in slips.items():
        ledger.ask_by_column(
            readings.loc[numbers],
            f"{known[name].label}: '{{written}}' would be plausible as {cause}",
            "Is this column, or are these cells, in another unit? The values are withheld until then.",
            (f'unit = "{cause}"',) if cause != MULTIPLE else (),
        )


def _found(quantity: Quantity) -> str:
    return f"'{{written}}' is no plausible {quantity.label}" if range_of(quantity) else "'{written}' is not understood"


def expected_of(quantity: Quantity) -> str:
    """Give what a cell of a quantity may hold, as a reader writes it.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> expected_of(vocabulary().quantities["power_factor"])
    '0.2 to 1 plain numbers'
    """
    if quantity.kind == "date":
        return "a date from 1950 on"
    span = range_of(quantity)
    if span is None:
        return " or ".join((", ".join(words_of(quantity)[:-1]), words_of(quantity)[-1]))
    return f"{span[0]:g} to {span[1]:g} {unit_words(quantity)}"


def likely_causes(quantity: Quantity, number: object, unit: str) -> tuple[str, ...]:
    """Give the units in which a number would be plausible, a slip by 1000 first.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> likely_causes(vocabulary().quantities["short_circuit_trip_delay_s"], 50.0, "s")[0]
    'ms'
    """
    own, span = dimension_of(quantity), range_of(quantity)
    if own is None or span is None or not isinstance(number, float) or not np.isfinite(number) or number == 0:
        return ()
    written = conversion(unit, quantity) if unit else (1.0, 0.0)
    found = []
    for name, spelled in spellings().dimensions[own].units.items():
        factor = conversion(name, quantity)
        if factor is None or factor == written or spelled.periods or name == unit:
            continue
        if span[0] <= (number + factor[1]) * factor[0] <= span[1]:
            slip = factor[0] / written[0] if written else factor[0]
            found.append((abs(abs(np.log10(slip)) - 3.0), UNIT_WORDS.get(name, _spelled(own, name))))
    if quantity.bases and 0.05 <= number <= 15:
        found.append((3.0, MULTIPLE))
    return tuple(word for _, word in sorted(found)[:MOST_CAUSES])


def _spelled(dimension: str, unit: str) -> str:
    """Give a unit's name as the trade writes it."""
    casing = {"ka": "kA", "ma": "mA", "a": "A", "v": "V", "kv": "kV", "kw": "kW", "w": "W", "mw": "MW", "ps": "PS"}
    return casing.get(unit, unit)


def _advice(causes: Sequence[str]) -> str:
    if causes:
        meant = " or ".join(causes)
        return f"It would be plausible as {meant}: is the unit right? The value counts as missing until then."
    return "Correct the cell, or leave it empty; the value counts as missing until then."


def _checkable(quantity: Quantity, column: Picked, readings: pd.DataFrame) -> pd.Series:
    """Give a column as the schema reads it: numbers, or the words of choices and of yes and no."""
    if quantity.kind in ("number", "date"):
        return pd.Series(column.values.astype(np.float64))
    if quantity.kind == "text":
        return pd.Series(column.values, dtype=object)
    words = np.array(
        [*(("no", "unknown", "yes") if quantity.kind == "truth" else quantity.choices), None], dtype=object
    )
    shown = words[np.where(column.values == UNREAD, -1, column.values)]
    strange = np.flatnonzero((column.values == UNREAD) & (column.state == VALUE) & (column.reading >= 0))
    shown[strange] = readings["written"].astype(object).reindex(column.reading[strange]).to_numpy()
    return pd.Series(shown, dtype=object)

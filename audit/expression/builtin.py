"""Functions of every expression: greater, lesser, magnitude, choose, and the ones that look at child rows."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from audit.expression import rows
from audit.expression.functions import Function, Operand
from audit.expression.rows import RowFunction
from audit.expression.values import UNKNOWN, YES, Value, folded_text
from audit.vocabulary.units import DIMENSIONLESS, UNITS

_SAME = Operand("value", "same")
_PLAIN = Operand("result", "number", DIMENSIONLESS)
_COUNTED = Operand("counted", "truth", required=False)
"""Condition of the child rows that count, where not all do."""


def _pick(values: tuple[Value, ...], *, greatest: bool) -> Value:
    size = np.broadcast_shapes(*[v.values.shape for v in values], *[v.basis.shape for v in values])
    stacked = np.stack([np.broadcast_to(v.values, size) for v in values])
    basis = np.stack([np.broadcast_to(v.basis, size) for v in values])
    known = ~np.isnan(stacked)
    filled = np.where(known, stacked, -np.inf if greatest else np.inf)
    which = filled.argmax(axis=0) if greatest else filled.argmin(axis=0)
    result = np.where(known.any(axis=0), np.take_along_axis(stacked, which[None], axis=0)[0], np.nan)
    weakest = np.where(known, basis, np.int8(0)).max(axis=0)
    return Value("number", result, weakest.astype(np.int8))


def _greater(*values: Value) -> Value:
    """The greatest of its operands; one alone serves where the others are missing."""
    return _pick(values, greatest=True)


def _lesser(*values: Value) -> Value:
    """The least of its operands; one alone serves where the others are missing."""
    return _pick(values, greatest=False)


def _choose(condition: Value, wanted: Value, otherwise: Value) -> Value:
    """The second operand where the condition holds, the third where it does not, missing where that is unknown."""
    size = np.broadcast_shapes(condition.values.shape, wanted.values.shape, otherwise.values.shape)
    truth = np.broadcast_to(condition.values, size)
    number = wanted.sort == "number"
    lacking = np.nan if number else UNKNOWN
    values = np.where(truth == UNKNOWN, lacking, np.where(truth == YES, wanted.values, otherwise.values))
    taken = np.where(truth == YES, wanted.basis, otherwise.basis)
    basis = np.maximum(np.broadcast_to(condition.basis, size), np.broadcast_to(taken, size)).astype(np.int8)
    return Value(wanted.sort, values if number else values.astype(np.int8), basis)


def _known(value: Value) -> Value:
    """Whether there is a value; never missing itself."""
    truth = np.where(value.missing(), 0, YES).astype(np.int8)
    return Value("truth", truth, np.zeros(1, dtype=np.int8))


def _stated_or(value: Value, otherwise: Value) -> Value:
    """The first value; where it is missing, the second."""
    size = np.broadcast_shapes(value.values.shape, otherwise.values.shape)
    missing = np.broadcast_to(value.missing(), size)
    values = np.where(missing, otherwise.values, value.values)
    basis = np.where(missing, otherwise.basis, value.basis).astype(np.int8)
    return Value(value.sort, values.astype(value.values.dtype), basis)


def _count_alike(value: Value) -> Value:
    """How many rows carry the same value; padding and case of text do not count."""
    known = ~value.missing()
    keys = folded_text(value.values) if value.sort == "text" else value.values
    counts = np.full(len(keys), np.nan)
    if known.any():
        present = keys[known].astype(str) if value.sort == "text" else keys[known]
        _, place, members = np.unique(present, return_inverse=True, return_counts=True)
        counts[known] = members[place]
    return Value("number", counts, value.basis)


def _magnitude(value: NDArray[np.float64]) -> NDArray[np.float64]:
    """The value without its sign."""
    return np.abs(value)


def _of_rows(name: str, call: RowFunction, returns: Operand = _SAME, *further: Operand, reads: str = "") -> Function:
    return Function(name, call, (_SAME, *further), returns, of_rows=True, reads=reads)


BUILTIN: dict[str, Function] = {
    function.name: function
    for function in (
        Function("greater", _greater, (_SAME,), _SAME, repeated=True, tolerant=True, reads="greater of"),
        Function("lesser", _lesser, (_SAME,), _SAME, repeated=True, tolerant=True, reads="lesser of"),
        Function(
            "choose",
            _choose,
            (Operand("condition", "truth"), _SAME, _SAME),
            _SAME,
            tolerant=True,
            reads="one of",
        ),
        Function("first_known", _stated_or, (_SAME, _SAME), _SAME, tolerant=True, reads="first known of"),
        Function("is_known", _known, (_SAME,), Operand("known", "truth"), tolerant=True, reads="is known"),
        Function("count_alike", _count_alike, (_SAME,), _PLAIN, tolerant=True, reads="rows with the same"),
        Function("magnitude", _magnitude, (_SAME,), _SAME, reads="magnitude of"),
        _of_rows("greatest_of", rows.greatest),
        _of_rows("least_of", rows.least),
        _of_rows("greatest_of_all", rows.greatest_of_all),
        _of_rows("least_of_all", rows.least_of_all),
        _of_rows("total_of", rows.total),
        _of_rows("median_of", rows.median, _SAME, _COUNTED),
        _of_rows("count_of", rows.count, _PLAIN, _COUNTED),
        _of_rows(
            "greatest_deviation_of",
            rows.greatest_deviation,
            Operand("deviation", "number", UNITS["pct"]),
            _COUNTED,
            reads="greatest deviation from the median of",
        ),
        _of_rows(
            "greatest_robust_score_of",
            rows.greatest_robust_score,
            _PLAIN,
            _COUNTED,
            reads="greatest distance from the median, in scaled median absolute deviations, of",
        ),
        _of_rows(
            "greatest_spread_of_copies_of",
            rows.greatest_spread_of_copies,
            _PLAIN,
            _SAME,
            _COUNTED,
            reads="greatest ratio among three and more rows that share a figure, of",
        ),
        _of_rows("any_of", rows.any_yes, Operand("any", "truth")),
    )
}

"""Walk an expression for its values: three-valued, column-wise, each with the weakest basis beneath it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal, Protocol

import numpy as np
from numpy.typing import NDArray

from audit.expression.functions import Function, Functions
from audit.expression.nodes import Arithmetic, Call, Compare, Join, Name, Negative, Node, Not, Number, Truth

NO, UNKNOWN, YES = 0, 1, 2
SLACK = 1e-9
"""Relative slack of comparisons: a setting typed at its limit meets it."""

Sort = Literal["number", "truth", "choice", "text"]
Basis = NDArray[np.int8]


@dataclass(frozen=True, slots=True)
class Value:
    """Values with their basis; `choices` are the words behind the codes of a choice."""

    sort: Sort
    values: NDArray[Any]
    basis: Basis
    choices: tuple[str, ...] = ()

    def missing(self) -> NDArray[np.bool_]:
        """Tell which values are missing."""
        if self.sort == "number":
            return np.asarray(np.isnan(self.values))
        if self.sort == "truth":
            return np.asarray(self.values == UNKNOWN)
        if self.sort == "choice":
            return np.asarray(self.values < 0)
        return np.array([value is None for value in self.values], dtype=bool)


class Scope(Protocol):
    """What an expression can see: quantities and limits by name, and the functions it may call."""

    functions: Functions

    def rows(self) -> int:
        """Count the rows of the subject."""
        ...

    def value(self, name: str) -> Value:
        """Give a quantity or a limit."""
        ...

    def over_rows(self, function: Function, operands: tuple[Node, ...]) -> Value:
        """Evaluate a function over the rows of a child table; its operands are expressions of the child row."""
        ...


def _basis(*parts: Basis) -> Basis:
    result = parts[0]
    for part in parts[1:]:
        result = np.maximum(result, part)
    return result


def _constant(sort: Sort, values: NDArray[Any]) -> Value:
    return Value(sort, values, np.zeros(1, dtype=np.int8))


def evaluate(node: Node, scope: Scope) -> Value:
    """Evaluate an expression for every row of the subject."""
    match node:
        case Number(value):
            return _constant("number", np.array([value]))
        case Truth(value):
            return _constant("truth", np.array([YES if value else NO], dtype=np.int8))
        case Name(name):
            return scope.value(name)
        case Negative(operand):
            inner = evaluate(operand, scope)
            return Value("number", -inner.values, inner.basis)
        case Arithmetic(operator, left, right):
            return _arithmetic(operator, evaluate(left, scope), evaluate(right, scope))
        case Compare(operator, left, right):
            return _compare(operator, left, right, scope)
        case Not(operand):
            inner = evaluate(operand, scope)
            return Value("truth", (YES - inner.values).astype(np.int8), inner.basis)
        case Join(operator, operands):
            return _join(operator, [evaluate(operand, scope) for operand in operands])
        case Call(function, operands):
            return _call(function, operands, scope)


def _arithmetic(operator: str, left: Value, right: Value) -> Value:
    with np.errstate(all="ignore"):
        if operator == "+":
            values = left.values + right.values
        elif operator == "-":
            values = left.values - right.values
        elif operator == "*":
            values = left.values * right.values
        else:
            values = left.values / right.values
            values = np.where(np.broadcast_to(right.values, values.shape) == 0, np.nan, values)
    return Value("number", values, _basis(left.basis, right.basis))


def compare_numbers(operator: str, left: NDArray[np.float64], right: NDArray[np.float64]) -> NDArray[np.int8]:
    """Compare numbers with three outcomes and a relative slack.

    >>> compare_numbers(">=", np.array([1.0, 2.0, np.nan]), np.array([2.0, 2.0, 2.0]))
    array([0, 2, 1], dtype=int8)
    """
    left, right = np.broadcast_arrays(left, right)
    with np.errstate(all="ignore"):
        slack = SLACK * np.maximum(np.abs(left), np.abs(right))
        close = (left == right) | (np.isfinite(slack) & (np.abs(left - right) <= slack))
        truth = {
            "<": (left < right) & ~close,
            "<=": (left < right) | close,
            ">": (left > right) & ~close,
            ">=": (left > right) | close,
            "==": close,
            "!=": ~close,
        }[operator]
    unknown = np.isnan(left) | np.isnan(right)
    return np.where(unknown, UNKNOWN, np.where(truth, YES, NO)).astype(np.int8)


def _compare(operator: str, left: Node, right: Node, scope: Scope) -> Value:
    first = evaluate(left, scope)
    if first.sort == "choice" and isinstance(right, Name) and right.name in first.choices:
        wanted = first.choices.index(right.name)
        same = first.values == wanted
        truth = same if operator == "==" else ~same
        values = np.where(first.values < 0, UNKNOWN, np.where(truth, YES, NO)).astype(np.int8)
        return Value("truth", values, first.basis)
    second = evaluate(right, scope)
    basis = _basis(first.basis, second.basis)
    if first.sort == "number":
        return Value("truth", compare_numbers(operator, first.values, second.values), basis)
    same, unknown = _alike(first, second)
    truth = same if operator == "==" else ~same
    return Value("truth", np.where(unknown, UNKNOWN, np.where(truth, YES, NO)).astype(np.int8), basis)


def _alike(first: Value, second: Value) -> tuple[NDArray[np.bool_], NDArray[np.bool_]]:
    unknown = first.missing() | second.missing()
    if first.sort == "choice" and first.choices != second.choices:
        codes = np.array([*(first.choices.index(c) if c in first.choices else -2 for c in second.choices), -1])
        return first.values == codes[second.values], unknown
    if first.sort == "text":
        folded = [folded_text(value.values) for value in (first, second)]
        return np.asarray(folded[0] == folded[1]), unknown
    return np.asarray(first.values == second.values), unknown


def folded_text(values: NDArray[Any]) -> NDArray[Any]:
    """Fold texts for comparison: padding and case do not count, missing stays missing."""
    return np.array([text.strip().casefold() if text is not None else None for text in values], dtype=object)


def _join(operator: str, parts: list[Value]) -> Value:
    values = np.stack(np.broadcast_arrays(*[part.values for part in parts]))
    basis = np.stack(np.broadcast_arrays(*[part.basis for part in parts]))
    shape = np.broadcast_shapes(values.shape, basis.shape)
    values, basis = np.broadcast_to(values, shape), np.broadcast_to(basis, shape)
    outcome = values.min(axis=0) if operator == "and" else values.max(axis=0)
    decisive = NO if operator == "and" else YES
    # one operand suffices for a settled outcome, so the best-founded of the deciding ones gives the basis
    deciding = np.where(values == decisive, basis, np.int8(127)).min(axis=0)
    weakest = basis.max(axis=0)
    settled = outcome == decisive
    return Value("truth", outcome.astype(np.int8), np.where(settled, deciding, weakest).astype(np.int8))


def _handed_over(value: Value) -> NDArray[Any]:
    """Give a function numbers for numbers and truths, and words for choices and texts."""
    if value.sort == "text":
        return np.array([text or "" for text in value.values], dtype=object)
    if value.sort == "choice":
        return np.asarray(np.array([*value.choices, ""], dtype=str)[value.values])
    return np.asarray(value.values, dtype=float)


def _call(name: str, operands: tuple[Node, ...], scope: Scope) -> Value:
    function = scope.functions[name]
    if function.of_rows:
        return scope.over_rows(function, operands)
    given = [evaluate(operand, scope) for operand in operands]
    if function.tolerant:
        outcome: Value = function.call(*given)
        return outcome
    size = np.broadcast_shapes(*[value.values.shape for value in given])
    missing = np.zeros(size, dtype=bool)
    for value in given:
        missing = missing | value.missing()
    arrays = [np.broadcast_to(_handed_over(value), size) for value in given]
    with np.errstate(all="ignore"):
        result = np.array(function.call(*arrays), dtype=float)
    result[missing] = np.nan
    basis = _basis(*[np.broadcast_to(value.basis, size) for value in given])
    if function.returns.sort == "truth":
        truth = np.where(np.isnan(result), UNKNOWN, np.where(result > 0, YES, NO)).astype(np.int8)
        return Value("truth", truth, basis)
    return Value("number", result, basis)

"""Walk an expression for what is lacking: which names, if known, could settle an outcome that is unknown."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from audit.expression.nodes import Call, Compare, Join, Name, Node, names_in, parts_of
from audit.expression.values import UNKNOWN, Scope, evaluate

Mask = NDArray[np.bool_]


def lacking(node: Node, scope: Scope, rows: Mask) -> dict[str, Mask]:
    """Give for each name the rows (of those asked for) in which it is missing and matters.

    An operand of 'and' that is no, or of 'or' that is yes, settles the outcome: nothing is lacking there.
    """
    gathered: dict[str, Mask] = {}
    _gather(node, scope, rows, gathered)
    return {name: mask for name, mask in gathered.items() if mask.any()}


def _gather(node: Node, scope: Scope, rows: Mask, gathered: dict[str, Mask]) -> None:
    if not rows.any():
        return
    match node:
        case Name(name):
            missing = np.broadcast_to(scope.value(name).missing(), rows.shape)
            gathered[name] = gathered.get(name, np.zeros_like(rows)) | (rows & missing)
        case Join(_, operands):
            whole = np.broadcast_to(evaluate(node, scope).values, rows.shape)
            for operand in operands:
                _gather(operand, scope, rows & (whole == UNKNOWN), gathered)
        case Compare(_, left, right):
            first = evaluate(left, scope)
            _gather(left, scope, rows, gathered)
            if not (first.sort == "choice" and isinstance(right, Name) and right.name in first.choices):
                _gather(right, scope, rows, gathered)
        case Call(function, operands) if function in ("greater", "lesser", "first_known"):
            # either alone serves: only where all are missing is anything lacking
            all_missing = np.broadcast_to(evaluate(node, scope).missing(), rows.shape)
            for operand in operands:
                _gather(operand, scope, rows & all_missing, gathered)
        case Call("choose", (condition, wanted, otherwise)):
            truth = np.broadcast_to(evaluate(condition, scope).values, rows.shape)
            _gather(condition, scope, rows & (truth == UNKNOWN), gathered)
            _gather(wanted, scope, rows & (truth == 2), gathered)
            _gather(otherwise, scope, rows & (truth == 0), gathered)
        case Call(function, operands) if scope.functions[function].of_rows:
            missing = np.broadcast_to(evaluate(node, scope).missing(), rows.shape)
            for name in dict.fromkeys(name for operand in operands for name in names_in(operand)):
                gathered[name] = gathered.get(name, np.zeros_like(rows)) | (rows & missing)
        case _:
            for part in parts_of(node):
                _gather(part, scope, rows, gathered)

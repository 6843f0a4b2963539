"""Parse an expression and refuse everything that is not arithmetic, comparison, truth or a named function."""

from __future__ import annotations

import ast
import math
from typing import Literal

from audit.expression.nodes import (
    Arithmetic,
    Call,
    Compare,
    Comparison,
    Join,
    Name,
    Negative,
    Node,
    Not,
    Number,
    Operator,
    Truth,
)

LONGEST_TEXT = 1000
DEEPEST = 40

_ARITHMETIC: dict[type[ast.operator], Operator] = {ast.Add: "+", ast.Sub: "-", ast.Mult: "*", ast.Div: "/"}
_COMPARISON: dict[type[ast.cmpop], Comparison] = {
    ast.Lt: "<",
    ast.LtE: "<=",
    ast.Gt: ">",
    ast.GtE: ">=",
    ast.Eq: "==",
    ast.NotEq: "!=",
}
_TRUTHS = {"yes": True, "no": False}


class BadExpression(Exception):
    """An expression that is refused, with the reason in words."""


def parse(text: str) -> Node:
    """Parse an expression.

    >>> parse("1.7 * start_a >= 3")
    Compare(operator='>=', left=Arithmetic(operator='*', left=Number(value=1.7), right=Name(name='start_a')), \
right=Number(value=3.0))
    >>> parse("motor.__class__")
    Traceback (most recent call last):
    ...
    audit.expression.parse.BadExpression: 'motor.__class__' holds an Attribute, which expressions do not know
    """
    if not isinstance(text, str) or not text.strip():
        raise BadExpression("an expression is a text that is not empty")
    if len(text) > LONGEST_TEXT:
        raise BadExpression(f"an expression has at most {LONGEST_TEXT} characters, this one has {len(text)}")
    if "#" in text or "\\" in text or not text.isprintable():
        raise BadExpression(f"{text!r} holds a character that expressions do not know")
    try:
        tree = ast.parse(text.strip(), mode="eval")
    except (SyntaxError, ValueError, RecursionError, MemoryError) as error:
        raise BadExpression(f"{text!r} does not parse") from error
    return _convert(tree.body, text, 0)


def _convert(tree: ast.expr, text: str, depth: int) -> Node:
    if depth > DEEPEST:
        raise BadExpression(f"an expression nests at most {DEEPEST} deep")
    deeper = depth + 1
    match tree:
        case ast.Constant(value=bool()):
            raise BadExpression(f"{text!r}: write yes and no, not True and False")
        case ast.Constant(value=int() | float() as value):
            number = float(value)
            if not math.isfinite(number):
                raise BadExpression(f"{text!r} holds a number that is not finite")
            return Number(number)
        case ast.Name(id=name):
            return Truth(_TRUTHS[name]) if name in _TRUTHS else Name(name)
        case ast.BinOp(left=left, op=operator, right=right) if type(operator) in _ARITHMETIC:
            return Arithmetic(_ARITHMETIC[type(operator)], _convert(left, text, deeper), _convert(right, text, deeper))
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return Negative(_convert(operand, text, deeper))
        case ast.UnaryOp(op=ast.Not(), operand=operand):
            return Not(_convert(operand, text, deeper))
        case ast.Compare(left=left, ops=[operator], comparators=[right]) if type(operator) in _COMPARISON:
            return Compare(_COMPARISON[type(operator)], _convert(left, text, deeper), _convert(right, text, deeper))
        case ast.BoolOp(op=operator, values=values):
            word: Literal["and", "or"] = "and" if isinstance(operator, ast.And) else "or"
            return Join(word, tuple(_convert(value, text, deeper) for value in values))
        case ast.Call(func=ast.Name(id=function), args=operands, keywords=[]) if operands:
            return Call(function, tuple(_convert(operand, text, deeper) for operand in operands))
        case _:
            kind = type(tree).__name__
            article = "an" if kind[0] in "AEIOU" else "a"
            raise BadExpression(f"{text!r} holds {article} {kind}, which expressions do not know")

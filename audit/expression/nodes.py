"""The tree of an expression."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Literal

Operator = Literal["+", "-", "*", "/"]
Comparison = Literal["<", "<=", ">", ">=", "==", "!="]


@dataclass(frozen=True, slots=True)
class Number:
    """A bare number, without unit."""

    value: float


@dataclass(frozen=True, slots=True)
class Truth:
    """The words yes and no."""

    value: bool


@dataclass(frozen=True, slots=True)
class Name:
    """A quantity, a limit, or (beside a comparison) a word of a choice."""

    name: str


@dataclass(frozen=True, slots=True)
class Arithmetic:
    """Two operands and one of + - * /."""

    operator: Operator
    left: Node
    right: Node


@dataclass(frozen=True, slots=True)
class Negative:
    """A minus sign before an operand."""

    operand: Node


@dataclass(frozen=True, slots=True)
class Compare:
    """A comparison of two operands."""

    operator: Comparison
    left: Node
    right: Node


@dataclass(frozen=True, slots=True)
class Join:
    """Operands joined by 'and' or by 'or'."""

    operator: Literal["and", "or"]
    operands: tuple[Node, ...]


@dataclass(frozen=True, slots=True)
class Not:
    """The contrary of an operand."""

    operand: Node


@dataclass(frozen=True, slots=True)
class Call:
    """A named function of operands."""

    function: str
    operands: tuple[Node, ...]


Node = Number | Truth | Name | Arithmetic | Negative | Compare | Join | Not | Call


def parts_of(node: Node) -> tuple[Node, ...]:
    """Give the operands of a node, left to right."""
    match node:
        case Arithmetic(_, left, right) | Compare(_, left, right):
            return (left, right)
        case Negative(operand) | Not(operand):
            return (operand,)
        case Join(_, operands) | Call(_, operands):
            return operands
        case _:
            return ()


def walk(node: Node) -> Iterator[Node]:
    """Give a node and everything beneath it."""
    yield node
    for part in parts_of(node):
        yield from walk(part)


def names_over_rows(node: Node, of_rows: Callable[[str], bool]) -> tuple[str, ...]:
    """Give the names that an expression looks for in child rows: those beneath functions that are `of_rows`."""
    calls = (call for call in walk(node) if isinstance(call, Call) and of_rows(call.function))
    return tuple(dict.fromkeys(name for call in calls for operand in call.operands for name in names_in(operand)))


def names_in(node: Node) -> tuple[str, ...]:
    """Give the names that an expression uses, each once, in order of appearance."""
    return tuple(dict.fromkeys(n.name for n in walk(node) if isinstance(n, Name)))

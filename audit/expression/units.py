"""Walk an expression for its unit; refuse what cannot be added, compared or handed to a function."""

from __future__ import annotations

import difflib
from collections.abc import Callable, Iterable
from dataclasses import dataclass

from audit.expression.functions import Function, Functions, Operand
from audit.expression.nodes import Arithmetic, Call, Compare, Join, Name, Negative, Node, Not, Number, Truth
from audit.expression.parse import BadExpression
from audit.vocabulary.units import DIMENSIONLESS, Unit


@dataclass(frozen=True, slots=True)
class Meaning:
    """What a name or a part of an expression stands for."""

    sort: str
    unit: Unit | None = None
    choices: tuple[str, ...] = ()

    def described(self) -> str:
        """Say it in words for a message."""
        if self.sort != "number":
            return f"a {self.sort}"
        return self.unit.symbol or "a plain number" if self.unit else "a number"


Lookup = Callable[[str], Meaning | None]


def nearest(name: str, known: Iterable[str]) -> str:
    """Say which known name is nearest to an unknown one, small and capital letters counted alike.

    >>> nearest("bc101", ["FD-101", "BC-101"])
    "; the nearest known name is 'BC-101'"
    """
    by_fold = {one.casefold(): one for one in known}
    close = difflib.get_close_matches(name.casefold(), list(by_fold), n=1, cutoff=0.5)
    return f"; the nearest known name is '{by_fold[close[0]]}'" if close else ""


class UnitCheck:
    """Checks one expression against the names and functions that it may use."""

    def __init__(self, lookup: Lookup, known: Iterable[str], functions: Functions) -> None:
        self._lookup = lookup
        self._known = tuple(known)
        self._functions = functions

    def meaning(self, node: Node) -> Meaning:
        """Give what an expression stands for, or refuse it."""
        match node:
            case Number():
                return Meaning("number", DIMENSIONLESS)
            case Truth():
                return Meaning("truth")
            case Name(name):
                found = self._lookup(name)
                if found is None:
                    raise BadExpression(f"'{name}' is not a known name{nearest(name, self._known)}")
                return found
            case Negative(operand):
                return self._number(operand)
            case Arithmetic(operator, left, right):
                return self._arithmetic(operator, self._number(left), self._number(right))
            case Not(operand):
                return self._truth(operand)
            case Join(_, operands):
                for operand in operands:
                    self._truth(operand)
                return Meaning("truth")
            case Compare(operator, left, right):
                return self._compare(operator, left, right)
            case Call(function, operands):
                return self._call(function, operands)

    def _number(self, node: Node) -> Meaning:
        found = self.meaning(node)
        if found.sort != "number":
            raise BadExpression(f"a number is wanted, not {found.described()}")
        return found

    def _truth(self, node: Node) -> Meaning:
        found = self.meaning(node)
        if found.sort != "truth":
            raise BadExpression(f"a yes or no is wanted, not {found.described()}")
        return found

    def _arithmetic(self, operator: str, left: Meaning, right: Meaning) -> Meaning:
        first, second = left.unit or DIMENSIONLESS, right.unit or DIMENSIONLESS
        if operator in "*/":
            if first.point or second.point:
                raise BadExpression(
                    "a point of a scale (a date, a temperature in °C) is neither multiplied nor divided"
                )
            return Meaning("number", first.times(second) if operator == "*" else first.over(second))
        if operator == "-" and first.point and second.same_as(first):
            return Meaning("number", first.difference())
        if first.point and not second.point and second.same_as(first.difference()):
            return Meaning("number", first)
        if first.point or not first.same_as(second):
            raise BadExpression(f"{left.described()} and {right.described()} cannot be joined by '{operator}'")
        return Meaning("number", first)

    def _compare(self, operator: str, left: Node, right: Node) -> Meaning:
        first = self.meaning(left)
        if first.sort == "choice":
            return self._compare_choice(operator, first, left, right)
        second = self.meaning(right)
        if first.sort != second.sort:
            raise BadExpression(f"{first.described()} cannot be compared with {second.described()}")
        if first.sort == "number":
            if not (first.unit or DIMENSIONLESS).same_as(second.unit or DIMENSIONLESS):
                raise BadExpression(f"{first.described()} cannot be compared with {second.described()}")
        elif operator not in ("==", "!="):
            raise BadExpression(f"only == and != compare {first.described()}")
        return Meaning("truth")

    def _compare_choice(self, operator: str, first: Meaning, left: Node, right: Node) -> Meaning:
        if operator not in ("==", "!="):
            raise BadExpression("only == and != compare choices")
        if not isinstance(right, Name):
            raise BadExpression("a choice is compared with one of its words")
        if right.name in first.choices:
            return Meaning("truth")
        other = self._lookup(right.name)
        if other is None or other.sort != "choice":
            about = left.name if isinstance(left, Name) else "the choice"
            raise BadExpression(f"'{right.name}' is not a word of {about}{nearest(right.name, first.choices)}")
        return Meaning("truth")

    def _call(self, name: str, operands: tuple[Node, ...]) -> Meaning:
        function = self._functions.get(name)
        if function is None:
            raise BadExpression(f"'{name}' is not a known function{nearest(name, self._functions)}")
        wanted = self._wanted(function, operands)
        same: Meaning | None = None
        for operand, place in zip(operands, wanted, strict=True):
            found = self.meaning(operand)
            if place.sort == "same":
                if same is not None and not _alike(same, found):
                    raise BadExpression(f"{name} takes like with like, not {same.described()} with {found.described()}")
                same = same or found
            elif found.sort != place.sort:
                raise BadExpression(f"{name}: {place.name} is {found.described()}, a {place.sort} is wanted")
            elif place.sort == "number" and not (found.unit or DIMENSIONLESS).same_as(place.unit or DIMENSIONLESS):
                wanted_unit = Meaning("number", place.unit).described()
                raise BadExpression(f"{name}: {place.name} is in {found.described()}, {wanted_unit} is wanted")
        if function.returns.sort == "same":
            assert same is not None
            return same
        return Meaning(function.returns.sort, function.returns.unit)

    @staticmethod
    def _wanted(function: Function, operands: tuple[Node, ...]) -> tuple[Operand, ...]:
        if function.repeated:
            return (function.operands[0],) * len(operands)
        least = sum(operand.required for operand in function.operands)
        if not least <= len(operands) <= len(function.operands):
            names = ", ".join(operand.name for operand in function.operands)
            raise BadExpression(f"{function.name} takes {names}, not {len(operands)} operands")
        return function.operands[: len(operands)]


def _alike(first: Meaning, second: Meaning) -> bool:
    if first.sort != second.sort:
        return False
    return first.sort != "number" or (first.unit or DIMENSIONLESS).same_as(second.unit or DIMENSIONLESS)

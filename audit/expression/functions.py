"""What expressions know of a function: its units, how it treats missing operands, and how to call it."""

from __future__ import annotations

import inspect
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any, Literal

from audit.vocabulary.units import DIMENSIONLESS, Unit, unit_of_ending

Sort = Literal["number", "truth", "choice", "text", "same"]


@dataclass(frozen=True, slots=True)
class Operand:
    """What a function wants in one place: a number in a unit, a truth, a choice, a text, or the unit of its like."""

    name: str
    sort: Sort
    unit: Unit | None = None
    required: bool = True


@dataclass(frozen=True, slots=True)
class Function:
    """A function that expressions may name.

    `tolerant` functions see missing operands and decide themselves; for all others a missing operand gives a missing
    result. `of_rows` functions look at the rows of a child table and also tell which row decided.
    """

    name: str
    call: Callable[..., Any]
    operands: tuple[Operand, ...]
    returns: Operand
    repeated: bool = False
    tolerant: bool = False
    of_rows: bool = False
    reads: str = ""
    """How the function reads in a calculation sheet."""

    def in_words(self) -> str:
        """Give the function's name as a calculation sheet shows it."""
        return self.reads or self.name.replace("_", " ")


def function_from_signature(
    call: Callable[..., Any], *, choices: tuple[str, ...] = (), reads: str = "", returns: Unit | None = None
) -> Function:
    """Describe an engineering function by the endings of its name and of its parameters' names.

    >>> def resistor_current_a(voltage_v, resistance_ohm): ...
    >>> described = function_from_signature(resistor_current_a)
    >>> [operand.unit.symbol for operand in described.operands], described.returns.unit.symbol
    (['V', 'ohm'], 'A')
    """
    operands = tuple(
        Operand(
            name,
            "choice" if name in choices else "number",
            None if name in choices else unit_of_ending(name) or DIMENSIONLESS,
            parameter.default is inspect.Parameter.empty,
        )
        for name, parameter in inspect.signature(call).parameters.items()
    )
    unit = returns or unit_of_ending(call.__name__) or DIMENSIONLESS
    return Function(call.__name__, call, operands, Operand("result", "number", unit), reads=reads)


Functions = Mapping[str, Function]

"""The page of functions that rules may name: rules/FUNCTIONS.md."""

from __future__ import annotations

import inspect
import re
from collections.abc import Iterator

from audit.derivation.functions import FUNCTIONS
from audit.derivation.registered import OF_MODULE
from audit.expression.functions import Function, Operand


def functions_page(made: str) -> str:
    """Give the functions as a page, those of every expression first, the formulas by their subject after them."""
    return "\n".join(_lines(made)) + "\n"


def _lines(made: str) -> Iterator[str]:
    yield made
    yield "# Functions"
    yield ""
    yield (
        "What checks and recipes may name, a site's own among them. The unit of an operand is the ending of its name "
        "and is checked at load; operands in brackets may be left out. A missing operand gives a missing result unless "
        "the function says otherwise. Formula, validity and an example of each formula stand in the module of "
        "`audit/engineering` that heads its table."
    )
    formulas = {name for _, names in OF_MODULE for name in names.split()}
    general = [function for name, function in FUNCTIONS.items() if name not in formulas]
    yield from _table("Of every expression", [function for function in general if not function.of_rows])
    yield from _table(
        "Over child rows: starts of a motor, motors of a bus or of a group",
        [function for function in general if function.of_rows],
    )
    for module, names in OF_MODULE:
        subject = module.__name__.rpartition(".")[2]
        yield from _table(f"`{subject}`", [FUNCTIONS[name] for name in names.split()])


def _table(heading: str, functions: list[Function]) -> Iterator[str]:
    yield ""
    yield f"## {heading}"
    yield ""
    yield "| function | operands | gives | what it is | source |"
    yield "| --- | --- | --- | --- | --- |"
    for function in functions:
        operands = ", ".join(_operand(operand) for operand in function.operands) + (", …" if function.repeated else "")
        says, source = _documented(function)
        yield f"| {function.name} | {operands} | {_kind(function.returns)} | {says} | {source} |"


def _operand(operand: Operand) -> str:
    text = operand.name if operand.sort == "number" else f"{operand.name} ({_kind(operand)})"
    return text if operand.required else f"[{text}]"


def _kind(operand: Operand) -> str:
    if operand.sort == "number" and operand.unit is not None:
        return operand.unit.symbol or "number"
    return {"same": "any", "truth": "yes/no"}.get(operand.sort, operand.sort)


def _documented(function: Function) -> tuple[str, str]:
    """Give the first sentence of a function's description, and its references."""
    description = inspect.getdoc(function.call) or ""
    references = re.search(r"^References\n-+\n(.+)\Z", description, re.DOTALL | re.MULTILINE)
    source = " ".join(references[1].split()) if references else ""
    return description.partition("\n")[0].replace("|", "/"), source.replace("|", "/")

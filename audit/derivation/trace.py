"""Walk a value back to the cells that it rests on: which data, which recipes, which assumptions."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import UTC, datetime

from audit.derivation.recipes import AUDIT_DATE
from audit.derivation.workings import CHILD_OF, Workings
from audit.expression.nodes import Name, Node, names_over_rows, walk
from audit.expression.text import plain_number, render
from audit.fleet.column import ASSUMED, BASIS_NAMES, NO_CELL, Column
from audit.limits.limits import limit_in_words
from audit.vocabulary.quantities import Quantity


@dataclass(frozen=True, slots=True)
class Step:
    """A quantity on the way: its value in words, how it came to be, and its cell or formula."""

    name: str
    label: str
    subject: str
    row: int
    shown: str
    basis: str
    cell: int
    formula: str = ""
    with_numbers: str = ""
    source: str = ""
    note: str = ""


def shown_value(column: Column, row: int, quantity: Quantity) -> str:
    """Write one value of a column as a person would."""
    value = column.values[row]
    if _one_missing(column, row):
        return "not known"
    if column.kind == "truth":
        return "yes" if value == 2 else "no"
    if column.kind == "choice":
        return column.choices[int(value)].replace("_", " ")
    if column.kind == "text":
        return str(value)
    if column.kind == "date":
        return day_text(float(value))
    return shown_number(float(value), quantity)


def _one_missing(column: Column, row: int) -> bool:
    value = column.values[row]
    if column.kind in ("number", "date"):
        return bool(value != value)
    if column.kind == "truth":
        return bool(value == 1)
    if column.kind == "choice":
        return bool(value < 0)
    return value is None


def day_text(days: float) -> str:
    """Write a day as a date."""
    return datetime.fromtimestamp(days * 86400, UTC).strftime("%Y-%m-%d")


def shown_number(value: float, quantity: Quantity) -> str:
    """Write a number with its unit."""
    symbol = quantity.unit.symbol if quantity.unit else ""
    text = plain_number(value)
    if not symbol or text in ("no end", "unknown"):
        return text
    return f"{text} {symbol}"


class Trace:
    """Walks values of one fleet back to cells."""

    def __init__(self, workings: Workings) -> None:
        self.workings = workings

    def row_at_home(self, subject: str, row: int, name: str) -> int:
        """Give the row of a quantity's home table that a row of a subject sees, or -1."""
        home = self.workings.quantities[name].subject
        rows = self.workings.fleet.parent_rows(subject, home)
        return -1 if rows is None or not len(rows) else int(rows[row])

    def text_of(self, subject: str, row: int, name: str) -> str:
        """Give a name's value in a row, in words."""
        limit = self.workings.limits.get(name)
        if limit is not None:
            return limit_in_words(limit)
        if name == AUDIT_DATE:
            return self.workings.audited_on.isoformat()
        quantity = self.workings.quantities.get(name)
        if quantity is None:
            return name.replace("_", " ")
        return shown_value(self.workings.column(subject, name), row, quantity)

    def numbers_in(self, node: Node, subject: str, row: int) -> str:
        """Write an expression with the numbers of a row put in."""
        of_child_rows = names_over_rows(node, self.of_rows)

        def name_of(name: str) -> str:
            if name in of_child_rows and name in self.workings.quantities:
                return self.workings.quantities[name].label
            return self.text_of(subject, row, name)

        return render(node, name_of, self.reads)

    def steps(self, node: Node, subject: str, row: int, seen: set[tuple[str, int]] | None = None) -> Iterator[Step]:
        """Give every quantity beneath an expression in one row, deepest first, each once."""
        seen = set() if seen is None else seen
        over_rows = names_over_rows(node, self.of_rows)
        for part in walk(node):
            if isinstance(part, Name) and part.name in self.workings.quantities and part.name not in over_rows:
                yield from self._of_name(part.name, subject, row, seen)

    def _of_name(self, name: str, subject: str, row: int, seen: set[tuple[str, int]]) -> Iterator[Step]:
        quantity = self.workings.quantities[name]
        at = self.row_at_home(subject, row, name)
        if at < 0 or (name, at) in seen:
            return
        seen.add((name, at))
        column = self.workings.home_column(name)
        shown = shown_value(column, at, quantity)
        basis = BASIS_NAMES[int(column.basis[at])]
        recipe = self.workings.recipes.get(name)
        if recipe is None:
            yield Step(name, quantity.label, quantity.subject, at, shown, basis, int(column.cell[at]))
            return
        place = int(column.recipe[at]) if column.recipe is not None else -1
        if place < 0:
            yield Step(name, quantity.label, quantity.subject, at, shown, "", NO_CELL)
            return
        way = recipe.ways[place]
        child = CHILD_OF.get(quantity.subject)
        if column.deciding is not None and column.deciding[at] >= 0 and child is not None:
            for used in names_over_rows(way.node, self.of_rows):
                if used in self.workings.quantities:
                    yield from self._of_name(used, child, int(column.deciding[at]), seen)
        yield from self.steps(way.node, quantity.subject, at, seen)
        yield Step(
            name,
            quantity.label,
            quantity.subject,
            at,
            shown,
            basis,
            NO_CELL,
            formula=render(way.node, self.label_of, self.reads),
            with_numbers=self.numbers_in(way.node, quantity.subject, at),
            source=recipe.source,
            note=recipe.note if way.basis == ASSUMED else "",
        )

    def of_rows(self, function: str) -> bool:
        """Tell whether a function looks at child rows."""
        return self.workings.functions[function].of_rows

    def reads(self, function: str) -> str:
        """Give the name of a function in words."""
        return self.workings.functions[function].in_words()

    def label_of(self, name: str) -> str:
        """Give the label of a quantity or limit."""
        if name in self.workings.quantities:
            return self.workings.quantities[name].label
        return "day of the audit" if name == AUDIT_DATE else name.replace("_", " ")

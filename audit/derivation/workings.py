"""Evaluate derived quantities on demand over a fleet, and give expressions their view of it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import date

import numpy as np

from audit.derivation.recipes import AUDIT_DATE, Recipe
from audit.expression.functions import Function, Functions
from audit.expression.lacking import lacking
from audit.expression.nodes import Node
from audit.expression.values import UNKNOWN, YES, Value, evaluate
from audit.fleet.column import NO_CELL, NO_ROW, STATED, Column, Integers, missing_of
from audit.fleet.fleet import Fleet
from audit.limits.limits import Limit
from audit.vocabulary.quantities import Quantity

Mask = np.ndarray[tuple[int, ...], np.dtype[np.bool_]]
EPOCH = date(1970, 1, 1)
CHILD_OF = {"motor": "start", "bus": "motor", "sisters": "motor", "peers": "motor", "relay": "motor"}


def _as_value(column: Column) -> Value:
    sort = "number" if column.kind == "date" else column.kind
    return Value(sort, column.values, column.basis, column.choices)


@dataclass
class Workings:
    """A fleet with its derived quantities, worked out when first asked for."""

    fleet: Fleet
    quantities: Mapping[str, Quantity]
    recipes: Mapping[str, Recipe]
    limits: Mapping[str, Limit]
    functions: Functions
    audited_on: date = field(default_factory=date.today)
    _columns: dict[str, Column] = field(default_factory=dict)
    _views: dict[tuple[str, str], Column] = field(default_factory=dict)
    _lacks: dict[str, dict[str, Mask]] = field(default_factory=dict)

    def scope(self, subject: str) -> SubjectScope:
        """Give the view that expressions of a subject have."""
        return SubjectScope(self, subject)

    def preset(self, name: str, column: Column) -> None:
        """Put a column in place of what a recipe would give, as worked cases and suppositions do."""
        self._columns[name] = column

    def home_column(self, name: str) -> Column:
        """Give a quantity in its home table, derived if need be."""
        if name not in self._columns:
            quantity = self.quantities[name]
            if name in self.recipes:
                self._columns[name] = self._derive(self.recipes[name])
            else:
                table = self.fleet.tables.get(quantity.subject)
                size = len(table) if table else 0
                stored = table.columns.get(name) if table else None
                self._columns[name] = stored or Column.empty(quantity.kind, size, quantity.choices)
        return self._columns[name]

    def column(self, subject: str, name: str) -> Column:
        """Give a quantity for each row of a subject, along the links."""
        home = self.quantities[name].subject
        if home == subject:
            return self.home_column(name)
        key = (subject, name)
        if key not in self._views:
            rows = self.fleet.parent_rows(subject, home)
            if rows is None:
                quantity = self.quantities[name]
                self._views[key] = Column.empty(quantity.kind, self.fleet.rows(subject), quantity.choices)
            else:
                self._views[key] = self.home_column(name).gathered(rows)
        return self._views[key]

    def _derive(self, recipe: Recipe) -> Column:
        size = self.fleet.rows(recipe.subject)
        values = missing_of(recipe.kind, size)
        basis = np.full(size, STATED, dtype=np.int8)
        way_used = np.full(size, -1, dtype=np.int8)
        deciding = np.full(size, NO_ROW, dtype=np.int64)
        for number, way in enumerate(recipe.ways):
            scope = self.scope(recipe.subject)
            found = evaluate(way.node, scope)
            usable = np.broadcast_to(~found.missing(), size) & (way_used < 0)
            values[usable] = np.broadcast_to(found.values, size)[usable]
            basis[usable] = np.maximum(np.broadcast_to(found.basis, size)[usable], way.basis)
            way_used[usable] = number
            if scope.deciding is not None:
                deciding[usable] = scope.deciding[usable]
            if (way_used >= 0).all():
                break
        if recipe.kind == "number":
            values[~np.isfinite(values) & ~np.isposinf(values)] = np.nan
        return Column(
            recipe.kind, values, basis, np.full(size, NO_CELL, dtype=np.int64), recipe=way_used, deciding=deciding
        )

    def data_lacking(self, subject: str, name: str) -> dict[str, Mask]:
        """Give for each datum that a site can supply the rows in which its lack leaves this quantity missing."""
        home = self.quantities[name].subject
        at_home = self._lacking_at_home(name)
        if home == subject:
            return at_home
        rows = self.fleet.parent_rows(subject, home)
        size = self.fleet.rows(subject)
        if rows is None:
            return {home: np.ones(size, dtype=bool)}
        result = {datum: np.where(rows >= 0, np.append(mask, False)[rows], False) for datum, mask in at_home.items()}
        unlinked = rows < 0
        if unlinked.any():
            result[home] = unlinked
        return result

    def _lacking_at_home(self, name: str) -> dict[str, Mask]:
        if name in self._lacks:
            return self._lacks[name]
        column = self.home_column(name)
        missing = column.missing()
        recipe = self.recipes.get(name)
        if recipe is None:
            result = {name: missing}
        elif recipe.ask:
            result = {}
            for asked in recipe.ask:
                for datum, mask in self.data_lacking(recipe.subject, asked).items():
                    result[datum] = result.get(datum, np.zeros_like(missing)) | (mask & missing)
        else:
            scope = self.scope(recipe.subject)
            result = expand_lacks(self, recipe.subject, lacking(recipe.ways[0].node, scope, missing))
        self._lacks[name] = {datum: mask for datum, mask in result.items() if mask.any()}
        return self._lacks[name]


def expand_lacks(workings: Workings, subject: str, lacks: Mapping[str, Mask]) -> dict[str, Mask]:
    """Turn names that are lacking into data that a site can supply."""
    result: dict[str, Mask] = {}
    for name, rows in lacks.items():
        if name not in workings.quantities:
            continue
        quantity = workings.quantities[name]
        child = CHILD_OF.get(subject)
        if quantity.subject == child and workings.fleet.parent_rows(subject, quantity.subject) is None:
            found = _lacks_of_children(workings, subject, name)
        else:
            found = workings.data_lacking(subject, name)
        for datum, mask in found.items():
            result[datum] = result.get(datum, np.zeros_like(rows)) | (mask & rows)
    return {datum: mask for datum, mask in result.items() if mask.any()}


def _lacks_of_children(workings: Workings, subject: str, name: str) -> dict[str, Mask]:
    """Give the data that child rows lack, for the rows that these belong to; without a child, the name itself."""
    child = workings.quantities[name].subject
    size = workings.fleet.rows(subject)
    parent = workings.fleet.parent_rows(child, subject)
    if parent is None:
        return {name: np.ones(size, dtype=bool)}
    result: dict[str, Mask] = {name: ~np.isin(np.arange(size), parent)}
    for datum, lacking_rows in workings.data_lacking(child, name).items():
        of_rows = parent[lacking_rows]
        wanted = result.setdefault(datum, np.zeros(size, dtype=bool))
        wanted[of_rows[of_rows >= 0]] = True
    return result


class SubjectScope:
    """What an expression about one subject sees."""

    def __init__(self, workings: Workings, subject: str) -> None:
        self.workings = workings
        self.subject = subject
        self.functions = workings.functions
        self.deciding: Integers | None = None

    def rows(self) -> int:
        """Count the rows of the subject."""
        return self.workings.fleet.rows(self.subject)

    def value(self, name: str) -> Value:
        """Give a limit or a quantity."""
        limit = self.workings.limits.get(name)
        if limit is not None:
            return Value("number", np.array([limit.value]), np.zeros(1, dtype=np.int8))
        if name == AUDIT_DATE:
            today = float((self.workings.audited_on - EPOCH).days)
            return Value("number", np.array([today]), np.zeros(1, dtype=np.int8))
        return _as_value(self.workings.column(self.subject, name))

    def over_rows(self, function: Function, operands: tuple[Node, ...]) -> Value:
        """Evaluate a function over the child rows of each row of the subject."""
        fleet = self.workings.fleet
        child = CHILD_OF[self.subject]
        parent = fleet.parent_rows(child, self.subject)
        if parent is None:
            parent = np.full(fleet.rows(child), NO_ROW, dtype=np.int64)
        values = [evaluate(operand, self.workings.scope(child)) for operand in operands]
        numbers = [np.broadcast_to(_as_numbers(value), len(parent)) for value in values]
        size = self.rows()
        result, deciding = function.call(numbers, parent, size)
        self.deciding = deciding
        basis = np.full(size, 0, dtype=np.int8)
        linked = parent >= 0
        for value, number in zip(values, numbers, strict=True):
            used = linked & ~np.isnan(number)
            np.maximum.at(basis, parent[used], np.broadcast_to(value.basis, len(parent))[used])
        if function.returns.sort == "truth":
            truth = np.where(np.isnan(result), UNKNOWN, np.where(result > 0, YES, 0)).astype(np.int8)
            return Value("truth", truth, basis)
        return Value("number", result, basis)


def _as_numbers(value: Value) -> np.ndarray[tuple[int, ...], np.dtype[np.float64]]:
    if value.sort == "truth":
        return np.where(value.values == UNKNOWN, np.nan, value.values / YES)
    if value.sort in ("choice", "text"):
        return np.where(value.missing(), np.nan, 1.0)
    return np.asarray(value.values, dtype=float)

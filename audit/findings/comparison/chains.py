"""Walk a value that moved back through its recipes to what was changed."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

import numpy as np
from numpy.typing import NDArray

from audit.derivation.recipes import AUDIT_DATE
from audit.derivation.trace import shown_value
from audit.derivation.workings import CHILD_OF, Workings
from audit.expression.nodes import Call, Name, Node, names_over_rows, parts_of
from audit.expression.values import NO, UNKNOWN, evaluate
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.changes import Changes
from audit.findings.comparison.members import Deciding, Members
from audit.findings.comparison.starts import StartsChange
from audit.findings.comparison.steps import Chain, Step, best
from audit.fleet.column import NO_ROW, Integers
from audit.fleet.folding import exact
from audit.vocabulary.quantities import Quantity


class Chains:
    """The ways back from quantities that moved to what was changed, each worked out once."""

    def __init__(self, pair: Pair, changes: Changes) -> None:
        self.pair = pair
        self.changes = changes
        self._of: dict[tuple[str, int], tuple[Chain, ...]] = {}
        self._values: dict[tuple[int, str, Node], NDArray[np.generic]] = {}
        self._deciders: dict[tuple[int, str, Node], Integers] = {}

    def of_nodes(self, nodes: Iterable[Node | None], subject: str, row: int) -> tuple[Chain, ...]:
        """Give the chains that end in the quantities of these expressions which moved in a row, one a root."""
        return best(chain for node in nodes if node is not None for chain in self._of_node(node, subject, row))

    def _of_node(self, node: Node, subject: str, row: int) -> Iterator[Chain]:
        if isinstance(node, Name):
            yield from self._seen_from(node.name, subject, row)
        elif isinstance(node, Call) and self._of_rows(node.function):
            yield from self._of_children(node, subject, row)
        else:
            for part in self._telling_parts(node, subject, row):
                yield from self._of_node(part, subject, row)

    def _of_rows(self, function: str) -> bool:
        return self.pair.after.workings.functions[function].of_rows

    def _telling_parts(self, node: Node, subject: str, row: int) -> tuple[Node, ...]:
        """Give the operands that decided: of a choice the branch taken, of a greater or lesser the one that was it."""
        parts = parts_of(node)
        if not isinstance(node, Call):
            return parts
        if node.function == "choose":
            condition, wanted, otherwise = parts
            taken = {
                otherwise if truth == NO else wanted
                for truth in self._both(condition, subject, row)
                if truth is not None and truth != UNKNOWN
            }
            return (condition, *taken) if taken else parts
        if node.function in ("greater", "lesser"):
            wholes = self._both(node, subject, row)
            return tuple(
                part
                for part in parts
                if any(
                    one is not None and whole is not None and (one == whole or one != one)
                    for one, whole in zip(self._both(part, subject, row), wholes, strict=True)
                )
            )
        return parts

    def _both(self, node: Node, subject: str, row: int) -> tuple[float | None, float | None]:
        """Give the value of an expression in a row before and after."""
        old = int(self.pair.row_before(subject)[row])
        before = self._number(0, self.pair.before.workings, node, subject, old) if old >= 0 else None
        return before, self._number(1, self.pair.after.workings, node, subject, row)

    def _number(self, side: int, workings: Workings, node: Node, subject: str, row: int) -> float:
        key = (side, subject, node)
        if key not in self._values:
            found = evaluate(node, workings.scope(subject)).values
            self._values[key] = np.broadcast_to(found, workings.fleet.rows(subject))
        return float(self._values[key][row])

    def _seen_from(self, name: str, subject: str, row: int) -> Iterator[Chain]:
        """Give the chains of a quantity as a row of a subject sees it, along the links."""
        if name == AUDIT_DATE:
            yield from self._of_day()
            return
        quantity = self.pair.after.workings.quantities.get(name)
        if quantity is None:
            return
        if quantity.subject == subject:
            yield from self.of_quantity(name, row)
            return
        was, now = self.pair.parents(subject, quantity.subject, row)
        if now >= 0 and was == now:
            yield from self.of_quantity(name, now)
        elif was != now:
            yield from self._of_link(subject, quantity.subject, row, was, now)

    def of_quantity(self, name: str, row: int) -> tuple[Chain, ...]:
        """Give the chains that end in a quantity of a row of its own table, none where it did not move."""
        key = (name, row)
        if key in self._of:
            return self._of[key]
        self._of[key] = ()
        quantity = self.pair.after.workings.quantities[name]
        if self.pair.row_before(quantity.subject)[row] < 0:
            found: Iterable[Chain] = [(self._row_step(quantity.subject, row, "added"),)]
        elif not self.pair.differs(name)[row]:
            found = ()
        elif name in self.pair.after.workings.recipes:
            found = self._of_recipe(quantity, row)
        else:
            found = self._of_given(quantity, row)
        self._of[key] = best(found)
        return self._of[key]

    def _of_given(self, quantity: Quantity, row: int) -> Iterator[Chain]:
        """A given value was changed itself, or it follows the base that it is written on."""
        step = self.step(quantity, row)
        bases = self.changes.cause(quantity.name, row)
        if not bases:
            yield (step,)
        for base in bases:
            home = self.pair.after.workings.quantities[base].subject
            rows = self.pair.after.fleet.parent_rows(quantity.subject, home)
            if rows is not None and rows[row] >= 0:
                for chain in self.of_quantity(base, int(rows[row])):
                    yield (*chain, step)

    def _of_recipe(self, quantity: Quantity, row: int) -> Iterator[Chain]:
        recipe = self.pair.after.workings.recipes[quantity.name]
        before, at = self.pair.value_before(quantity.name, row)
        after = self.pair.after.workings.home_column(quantity.name)
        used = {int(c.recipe[r]) for c, r in ((before, at), (after, row)) if c.recipe is not None}
        nodes = [recipe.ways[way].node for way in sorted(used) if way >= 0]
        step = self.step(quantity, row)
        for node in nodes:
            for chain in self._of_node(node, quantity.subject, row):
                yield (*chain, step)

    def _of_children(self, node: Call, subject: str, row: int) -> Iterator[Chain]:
        """Chains through the rows of a child table: those that decide where only they tell, else all that moved."""
        child = CHILD_OF[subject]
        if child == "start":
            change = self.changes.starts.get(exact(self.pair.keys(subject)[row]))
            if change is not None:
                yield (self._starts_step(change),)
            return
        names = sorted(set(names_over_rows(node, self._of_rows)))
        members = self._members(child, subject, row)
        deciding = self._deciding(node, child, subject, row)
        through = list(self._through(names, child, subject, deciding.among(members)))
        yield from through or self._through(names, child, subject, members)

    def _through(self, names: list[str], child: str, subject: str, members: Members) -> Iterator[Chain]:
        for name in names:
            for member in members.both:
                yield from self._seen_from(name, child, member)
        for member in members.came:
            new = self._is_new(child, member)
            yield (self._row_step(child, member, "added") if new else self._link_step(child, subject, member),)
        for member in members.went:
            yield self._gone(child, subject, member)

    def _deciding(self, node: Call, child: str, subject: str, row: int) -> Deciding:
        """Give the child rows that decided: before (as a row before) and after."""
        old = int(self.pair.row_before(subject)[row])
        return Deciding(
            self._decider(0, self.pair.before.workings, node, subject, old),
            self._decider(1, self.pair.after.workings, node, subject, row),
            self.pair.as_after(child, self._decider(0, self.pair.before.workings, node, subject, old)),
        )

    def _decider(self, side: int, workings: Workings, node: Call, subject: str, row: int) -> int:
        key = (side, subject, node)
        if key not in self._deciders:
            scope = workings.scope(subject)
            evaluate(node, scope)
            size = workings.fleet.rows(subject)
            self._deciders[key] = np.full(size, NO_ROW) if scope.deciding is None else scope.deciding
        return int(self._deciders[key][row]) if row >= 0 else NO_ROW

    def _is_new(self, subject: str, row: int) -> bool:
        return bool(self.pair.row_before(subject)[row] < 0)

    def _gone(self, child: str, subject: str, member_before: int) -> Chain:
        now = self.pair.as_after(child, member_before)
        if now >= 0:
            return (self._link_step(child, subject, now),)
        return (self._row_step(child, member_before, "removed"),)

    def _members(self, child: str, subject: str, row: int) -> Members:
        """Give the child rows of a row: there on both sides, come, and gone (these as rows before)."""
        at_after = self.pair.after.fleet.parent_rows(child, subject)
        at_before = self.pair.before.fleet.parent_rows(child, subject)
        old = int(self.pair.row_before(subject)[row])
        now = np.flatnonzero(at_after == row) if at_after is not None else np.empty(0, dtype=np.int64)
        was = np.flatnonzero(at_before == old) if at_before is not None and old >= 0 else np.empty(0, dtype=np.int64)
        earlier = {self.pair.as_after(child, int(member)): int(member) for member in was}
        both = [member for member in now.tolist() if member in earlier]
        came = [member for member in now.tolist() if member not in earlier]
        went = [member for at, member in earlier.items() if at < 0 or at not in set(both)]
        return Members(both, came, went)

    def _of_link(self, subject: str, home: str, row: int, was: int, now: int) -> Iterator[Chain]:
        """A row points elsewhere: because it says so, or because what it points to came or went."""
        if subject in ("motor", "relay") and self._is_new(subject, row):
            yield (self._row_step(subject, row, "added"),)
            return
        named = {"bus": "bus", "relay": "relay"}.get(home, "")
        if subject == "motor" and named and self.pair.differs(named)[row]:
            yield (self.step(self.pair.after.workings.quantities[named], row),)
        elif now >= 0 and was == NO_ROW and self._is_new(home, now):
            yield (self._row_step(home, now, "added"),)
        else:
            yield (self._link_step(subject, home, row),)

    def _of_day(self) -> Iterator[Chain]:
        before, after = self.pair.before.audited_on, self.pair.after.audited_on
        if before != after:
            yield (Step("", "", AUDIT_DATE, "day of the audit", before.isoformat(), after.isoformat()),)

    def step(self, quantity: Quantity, row: int) -> Step:
        """Give the step of a quantity in a row of its own table."""
        before, at = self.pair.value_before(quantity.name, row)
        after = self.pair.after.workings.home_column(quantity.name)
        share = None
        if quantity.kind == "number" and not before.missing()[at] and not after.missing()[row]:
            old, new = float(before.values[at]), float(after.values[row])
            if old and np.isfinite(old) and np.isfinite(new):
                share = (new - old) / abs(old) * 100
        texts = shown_value(before, at, quantity), shown_value(after, row, quantity)
        key = self.pair.keys(quantity.subject)[row]
        return Step(quantity.subject, key, quantity.name, quantity.label, *texts, share)

    def _row_step(self, subject: str, row: int, what: str) -> Step:
        keys = self.pair.keys(subject, before=what == "removed")
        return Step(subject, keys[row], "", subject, "", what)

    def _link_step(self, subject: str, home: str, row: int) -> Step:
        was, now = self.pair.parents(subject, home, row)
        keys = self.pair.keys(home)
        names = ["none" if at < 0 else keys[at] for at in (was, now)]
        return Step(subject, self.pair.keys(subject)[row], home, home, names[0], names[1])

    @staticmethod
    def _starts_step(change: StartsChange) -> Step:
        return Step("motor", change.motor, "starts", "recorded starts", "", change.words())

"""Take data out of a fleet that was read, and tell what another source replaced."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from audit.checks.catalogue import Catalogue
from audit.checks.entry import Check
from audit.checks.verdicts import BREACH, MEETS, NOT_APPLICABLE, UNPROVEN, Outcome, evaluate_check
from audit.derivation.groups import with_groups
from audit.derivation.recipes import Recipe
from audit.derivation.register_facts import with_register_facts
from audit.derivation.workings import Workings
from audit.expression.nodes import Call, walk
from audit.fleet.column import NO_CELL, YES, Column
from audit.fleet.fleet import Fleet
from tests.proofs.fleets import AUDITED_ON

Mask = NDArray[np.bool_]

GREATER_OF_SEVERAL = {
    "full_voltage_start_current_a": "list and recorded starts",
    "soft_start_current_a": "current limit and recorded starts",
    "star_delta_current_a": "list and recorded starts",
    "autotransformer_current_a": "list and recorded starts",
    "lower_start_current_a": "list and recorded starts",
    "upper_start_time_s": "recorded starts, data sheet at full and at the lowest voltage",
    "start_to_stall_ratio": "recorded starts, data sheet at full and at the lowest voltage",
    "start_time_to_outlast_s": "recorded starts, data sheet at full and at the lowest voltage",
    "start_time_at_full_current_s": "recorded starts, data sheet at full and at the lowest voltage",
}
"""Quantities of which several sources speak and the safest of those known counts: one of them is not the only one."""


@dataclass
class Judged:
    """A fleet and the verdicts of its checks, before other findings replace any."""

    catalogue: Catalogue
    fleet: Fleet
    workings: Workings

    @staticmethod
    def of(catalogue: Catalogue, fleet: Fleet) -> Judged:
        """Give the workings of a fleet as it was read."""
        whole = with_register_facts(with_groups(fleet))
        workings = Workings(
            whole, catalogue.quantities, catalogue.recipes, catalogue.limits, catalogue.functions, AUDITED_ON
        )
        return Judged(catalogue, fleet, workings)

    def outcome(self, check: Check) -> Outcome:
        """Give the verdicts of a check."""
        return evaluate_check(check, self.workings)

    def without(self, name: str, rows: Mask) -> Judged:
        """Give the same fleet without a datum in these rows."""
        quantity = self.catalogue.quantities[name]
        old = self.fleet.tables[quantity.subject].columns[name]
        gone = Column.empty(quantity.kind, len(old), quantity.choices)
        column = Column(
            old.kind,
            np.where(rows, gone.values, old.values),
            np.where(rows, gone.basis, old.basis).astype(np.int8),
            np.where(rows, NO_CELL, old.cell),
            choices=old.choices,
        )
        return Judged.of(self.catalogue, self.fleet.with_columns(quantity.subject, {name: column}))


def data_beneath(catalogue: Catalogue, checks: Iterable[Check], fleet: Fleet) -> Iterator[str]:
    """Give the data of a fleet that any of these checks rests on; those whose absence means no say something."""
    names = set().union(*(catalogue.names_beneath(check) for check in checks))
    for name in sorted(names & catalogue.quantities.keys()):
        quantity = catalogue.quantities[name]
        table = fleet.tables.get(quantity.subject)
        given = quantity.role != "derived" and not quantity.absent_means_no and table is not None
        if given and name in table.columns and not table.columns[name].missing().all():
            yield name


def newly_decided(before: Outcome, after: Outcome) -> Mask:
    """Tell in which rows a verdict has become 'meets' or 'breach' that was another one."""
    return np.isin(after.verdict, (MEETS, BREACH)) & (after.verdict != before.verdict)


def held_either_way(before: Outcome, after: Outcome) -> Mask:
    """Tell where no bound applied and now it is open whether one does, which is met by values that are known."""
    return np.asarray((before.applies == YES) & (before.verdict == NOT_APPLICABLE) & (after.verdict == MEETS))


def breach_out_of_unproven(before: Outcome, after: Outcome) -> Mask:
    """Tell in which rows a breach has come out of an unproven verdict."""
    return np.asarray((after.verdict == BREACH) & (before.verdict == UNPROVEN))


def another_source(check: Check, before: Judged, after: Judged) -> Mask:
    """Tell in which rows of a check something else now says what a datum said before."""
    catalogue, fleet = before.catalogue, after.workings.fleet
    beneath = [catalogue.recipes[name] for name in catalogue.names_beneath(check) if name in catalogue.recipes]
    neighbours = any(recipe.subject == "bus" for recipe in beneath)
    found = np.zeros(fleet.rows(check.subject), dtype=bool)
    for recipe in beneath:
        changed = _replaced(recipe, before.workings, after.workings)
        if changed.any():
            found |= _along_links(fleet, recipe.subject, check.subject, changed)
            if neighbours:
                found |= _on_the_same_bus(fleet, recipe.subject, check.subject, changed)
    return found


def read_otherwise(check: Check, before: Judged, after: Judged) -> Mask:
    """Tell in which rows the reader took something beneath a check from elsewhere, as the ratio of a CT or a state."""
    rows = before.workings.fleet.rows(check.subject)
    found = np.zeros(rows, dtype=bool)
    for name in before.catalogue.names_beneath(check) & before.catalogue.quantities.keys():
        quantity = before.catalogue.quantities[name]
        if quantity.role == "derived" or name in before.catalogue.recipes or quantity.subject == "start":
            continue
        old, new = (judged.workings.column(check.subject, name) for judged in (before, after))
        found |= (old.values != new.values) & ~old.missing() & ~new.missing()
    return found


def _replaced(recipe: Recipe, before: Workings, after: Workings) -> Mask:
    """Tell where a recipe takes another way, or the safest of several sources another of them."""
    old, new = before.home_column(recipe.name), after.home_column(recipe.name)
    assert old.recipe is not None
    assert new.recipe is not None
    changed = (old.recipe != new.recipe) & (new.recipe >= 0)
    if recipe.name in GREATER_OF_SEVERAL or (recipe.subject == "motor" and _over_starts(recipe, after)):
        changed |= (old.values != new.values) & ~new.missing()
    return np.asarray(changed)


def _over_starts(recipe: Recipe, workings: Workings) -> bool:
    nodes = (node for way in recipe.ways for node in walk(way.node))
    return any(isinstance(node, Call) and workings.functions[node.function].of_rows for node in nodes)


def _along_links(fleet: Fleet, home: str, subject: str, rows: Mask) -> Mask:
    """Carry rows of one table to the rows of another that point to them or that they point to."""
    to_parent = fleet.parent_rows(subject, home)
    if to_parent is not None:
        return np.asarray(np.append(rows, False)[to_parent])
    reached = np.zeros(fleet.rows(subject), dtype=bool)
    to_child = fleet.parent_rows(home, subject)
    if to_child is not None:
        reached[to_child[rows & (to_child >= 0)]] = True
    return reached


def _on_the_same_bus(fleet: Fleet, home: str, subject: str, rows: Mask) -> Mask:
    """Tell which rows belong to a bus to which a row of another table belongs."""
    bus, own = fleet.parent_rows(subject, "bus"), fleet.parent_rows(home, "bus")
    if bus is None or own is None:
        return np.zeros(fleet.rows(subject), dtype=bool)
    return np.isin(bus, np.unique(own[rows & (own >= 0)]))

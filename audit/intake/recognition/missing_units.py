"""Columns without any unit: taken in the usual one and said, or asked where the sheet speaks of others."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace

from audit.intake.cells import CellValue
from audit.intake.celltext import read_number_column
from audit.intake.recognition.plans import ASKED, MAPPED, Plan
from audit.intake.recognition.source import Source
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import dimension_of

RIVALS = {"active_power": ("kW", "hp"), "length": ("m", "ft"), "inertia": ("kg m2", "lb ft2")}
"""Dimensions in which sites of two systems of units write numbers that look alike."""
_US = frozenset({"hp", "ft", "awg", "kcmil", "f", "lbft2", "lbft"})


def ask_about_units(
    plans: Sequence[Plan], sample: Callable[[int], list[CellValue]], address: Callable[[int], int], source: Source
) -> list[Plan]:
    """Withhold a column without unit whose sheet writes others in US units; else say what was taken."""
    known = vocabulary().quantities
    bare: list[Plan] = []
    us = False
    for plan in plans:
        if not plan.read or plan.quantity not in known or known[plan.quantity].kind != "number":
            us = us or (plan.unit is not None and plan.unit.unit in _US)
            continue
        units = {plan.unit.unit} if plan.unit else set()
        if not units and dimension_of(known[plan.quantity]) in RIVALS and plan.how != MAPPED:
            cells = sample(plan.column)
            written = {r.unit_text.casefold() for r in read_number_column(cells).odd.values() if r.unit_text}
            units |= written
            if cells and not written:
                bare.append(plan)
        us = us or bool(units & _US)
    result = list(plans)
    for plan in bare:
        quantity = known[plan.quantity]
        first, second = RIVALS[dimension_of(quantity) or ""]
        if us:
            source.ask(
                address(plan.column),
                f"'{plan.header}' has no unit, and other columns are in US units",
                f"Is the {quantity.label} in {first} or in {second}? Write the unit into the header or fleet.toml; "
                "the column is not read until then.",
                (first, second),
            )
            result[result.index(plan)] = replace(plan, quantity="", how=ASKED)
        else:
            source.remark(
                address(plan.column),
                f"'{plan.header}' has no unit",
                f"{first} or {second}",
                f"The numbers are taken in {first}.",
                plan.quantity,
            )
    return result

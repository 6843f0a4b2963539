"""The other setting groups that can be selected: judged as if each were the active one."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace

import numpy as np

from audit.checks.catalogue import Catalogue
from audit.checks.verdicts import Outcome
from audit.findings.finding import FindingCode
from audit.findings.gather import breaches
from audit.fleet.column import NO_ROW, YES, Integers
from audit.fleet.fleet import Fleet


def as_if_active(fleet: Fleet, rows: Integers) -> Fleet:
    """Give the fleet with another setting group in force; a motor without that group is left without a relay."""
    active = fleet.tables["relay"].columns["group_active"]
    values = active.values.copy()
    values[rows[rows != NO_ROW]] = YES
    links = {**fleet.links, ("motor", "relay"): rows}
    return replace(fleet, links=links).with_columns("relay", {"group_active": replace(active, values=values)})


def breaches_of_group(
    name: str, rows: Integers, outcomes: list[Outcome], active: Iterable[FindingCode], catalogue: Catalogue
) -> list[FindingCode]:
    """Give what breaks in another group and does not break in the same way in the active one.

    Only checks of motors that rest on settings are looked at: nothing else changes with the group.
    """
    on_settings = {
        number
        for number, outcome in enumerate(outcomes)
        if outcome.check.subject == "motor"
        and any(
            catalogue.quantities[used].role == "setting"
            for used in catalogue.names_beneath(outcome.check)
            if used in catalogue.quantities
        )
    }
    known = {_figures(code) for code in active}
    found = [code for code in breaches(outcomes, name) if code.outcome in on_settings and rows[code.row] != NO_ROW]
    return [code for code in found if _figures(code) not in known]


def _figures(code: FindingCode) -> tuple[int, int, int, str]:
    figures = np.array([code.present, code.low, code.high])
    return code.outcome, code.row, code.requirement, figures.tobytes().hex()

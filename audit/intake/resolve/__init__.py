"""From readings to a fleet: rows, joins, units, bases, what is on and off, and what cannot be used."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
import pandas as pd

from audit.fleet.column import NO_ROW, UNKNOWN, YES, Integers
from audit.fleet.fleet import Fleet, Table
from audit.intake.gathered import Gathered
from audit.intake.resolve.groups import group_key
from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.relays import RelayRows
from audit.intake.resolve.rows import Laid, lay
from audit.intake.resolve.tables import Tables
from audit.vocabulary.quantities import vocabulary

REPEATED = ("table", "quantity", "group", "state", "unit", "base", "header")


def resolve(gathered: Gathered) -> Fleet:
    """Resolve the readings of a site to primary values of its motors, relays, buses and starts."""
    ledger = Ledger(gathered.book)
    # these columns hold few different words: as categories they are compared as integers
    readings = gathered.readings.astype(dict.fromkeys(REPEATED, "category"))
    laid = lay(readings[readings["quantity"].isin(list(vocabulary().quantities))], ledger)
    tables = Tables(laid, gathered.book, ledger).resolve()
    _say_unjudged_groups(laid.relays, tables["relay"], ledger)
    return Fleet(
        site=gathered.site,
        tables=tables,
        links=laid.links(),
        book=gathered.book,
        inputs=gathered.inputs,
        complaints=(*gathered.complaints, *dict.fromkeys(ledger.complaints)),
        questions=(*gathered.questions, *dict.fromkeys(ledger.questions)),
        facts=gathered.facts,
        readings=_kept(laid, tables),
        other_groups=_other_groups(laid.relays, tables["relay"], laid.links()["motor", "relay"]),
    )


def _say_unjudged_groups(relays: RelayRows, table: Table, ledger: Ledger) -> None:
    """Say which setting groups are judged by nobody, since nothing tells whether they can be selected."""
    selectable = table.columns["group_selectable"].values
    unsaid = [
        row
        for row, (group, judged) in enumerate(zip(relays.groups, relays.judged, strict=True))
        if group and not judged and selectable[row] == UNKNOWN
    ]
    if unsaid:
        cells = table.columns["relay_tag"].cell[unsaid]
        ledger.complain(
            int(cells[0]),
            f"{len(unsaid)} setting groups besides the active ones, first '{table.keys[unsaid[0]]}'",
            "for each, whether an input, communication or logic can select it",
            "They are not judged until a column 'Group Selectable' says that they can be selected.",
            quantity="group_selectable",
            subject="relay",
            weight="remark",
        )


def _other_groups(relays: RelayRows, table: Table, motor_relay: Integers) -> tuple[tuple[str, Integers], ...]:
    """Give the other setting groups that can be selected: their name and each motor's relay row of that group."""
    selectable = table.columns["group_selectable"].values
    rows: dict[str, dict[int, int]] = {}
    for row, (group, judged) in enumerate(zip(relays.groups, relays.judged, strict=True)):
        if group and not judged and selectable[row] == YES:
            rows.setdefault(group_key(group), {})[relays.relay_of_row[row]] = row
    others = []
    for group, of_relay in rows.items():
        of_motor = [
            of_relay.get(relays.relay_of_row[row], NO_ROW) if row >= 0 else NO_ROW for row in motor_relay.tolist()
        ]
        others.append((group, np.array(of_motor, dtype=np.int64)))
    return tuple(others)


def _kept(laid: Laid, tables: Mapping[str, Table]) -> pd.DataFrame:
    """Give the readings with the key of their row and the value made of them, compact."""
    readings = laid.readings
    keys = np.empty(len(readings), dtype=object)
    values = np.full(len(readings), np.nan)
    subject, row = readings["subject"].to_numpy(dtype=object), readings["row"].to_numpy()
    for home, table in tables.items():
        here = subject == home
        if here.any():
            keys[here] = np.array(table.keys, dtype=object)[row[here]]
    cell = readings["cell"].to_numpy()
    for name, positions in readings.groupby("quantity", sort=False).indices.items():
        column = tables[vocabulary().quantities[str(name)].subject].columns[str(name)]
        if column.kind in ("number", "date"):
            at = row[positions]
            same = column.cell[at] == cell[positions]
            values[positions] = np.where(same, column.values[at], np.nan)
    kept = readings[
        ["table", "quantity", "group", "state", "number", "text", "unit", "base", "written", "cell", "header"]
    ]
    kept = kept.assign(subject=subject, key=keys, row=row, value=values)
    return kept.astype({"subject": "category"}).reset_index(drop=True)

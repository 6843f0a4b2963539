"""What a complaint about the inputs costs: which checks of which motors stay unproven because its value is withheld."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Mapping

import numpy as np

from audit.findings.audit import Audit
from audit.fleet.addresses import unpack
from audit.fleet.fleet import Complaint

Unproven = Mapping[tuple[str, str], Mapping[str, set[str]]]
"""For each datum and subject the checks that lack it, each with the names of its rows."""
Places = Mapping[tuple[str, str, int], tuple[str, str]]
"""For each file, sheet and line the subject and key of what was read there."""


def costs_of_complaints(audit: Audit) -> list[tuple[str, ...]]:
    """Give for each complaint the checks that its withheld value leaves unproven.

    A value withheld from a relay or a bus leaves checks of its motors unproven; those are named too.
    """
    if not audit.fleet.complaints:
        return []
    unproven, places = _unproven(audit), _places(audit)
    return [_cost(audit, complaint, places, unproven) for complaint in audit.fleet.complaints]


def _unproven(audit: Audit) -> Unproven:
    subject_of = {outcome.check.key: outcome.check.subject for outcome in audit.outcomes}
    found: dict[tuple[str, str], dict[str, set[str]]] = defaultdict(dict)
    for group in audit.unproven:
        subject = subject_of[group.check]
        keys = audit.fleet.tables[subject].keys
        for datum in group.lacking:
            found[(datum, subject)].setdefault(group.check, set()).update(keys[row] for row in group.rows.tolist())
    return found


def _places(audit: Audit) -> Places:
    readings = audit.fleet.readings
    if not {"subject", "key", "cell"} <= set(readings.columns):
        return {}
    sheet, line, _ = unpack(readings["cell"].to_numpy(dtype=np.int64))
    rows = readings[["subject", "key"]].assign(sheet=sheet, line=line).drop_duplicates(["sheet", "line"])
    rows = rows[rows["sheet"] >= 0]
    names = audit.fleet.book.sheets
    return {
        (*names[at], int(number)): (str(subject), str(key))
        for at, number, subject, key in zip(rows["sheet"], rows["line"], rows["subject"], rows["key"], strict=True)
    }


def _cost(audit: Audit, complaint: Complaint, places: Places, unproven: Unproven) -> tuple[str, ...]:
    if complaint.weight != "withheld" or not complaint.quantity:
        return ()
    subject, key = complaint.subject, complaint.key
    if not key:
        line = complaint.cell.lstrip("ABCDEFGHIJKLMNOPQRSTUVWXYZ")
        place = (complaint.file, complaint.sheet, int(line) if line.isdigit() else 0)
        subject, key = places.get(place, ("", ""))
    found: dict[str, None] = {}
    for seen_by, names in _rows_that_see(audit, subject or "motor", key).items():
        for check, lacking in unproven.get((complaint.quantity, seen_by), {}).items():
            if names & lacking:
                found[check.split("/")[0]] = None
    return tuple(found)


def _rows_that_see(audit: Audit, own: str, key: str) -> dict[str, set[str]]:
    """Give the name of the row complained of, and those of the motors that look at it, by subject."""
    names = {own: {key}}
    table = audit.fleet.tables.get(own)
    if own == "motor" or table is None or key not in table.keys:
        return names
    rows = audit.fleet.parent_rows("motor", own)
    if rows is not None:
        motors = audit.fleet.tables["motor"].keys
        names["motor"] = {motors[row] for row in np.flatnonzero(rows == table.keys.index(key)).tolist()}
    return names

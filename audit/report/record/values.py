"""The values of an audited fleet, one column a line: enough to judge the fleet again without its workbooks."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import IO, Any

import numpy as np
from numpy.typing import NDArray

from audit.checks.verdicts import BREACH, MEETS, NOT_APPLICABLE, UNPROVEN, Outcome
from audit.findings.audit import Audit
from audit.fleet.column import NO_CELL, STATED, Column, Integers
from audit.fleet.fleet import Fleet

VALUES_FILE = "values.jsonl.gz"
LETTERS = {NOT_APPLICABLE: "n", UNPROVEN: "u", MEETS: "m", BREACH: "b"}
"""A capital letter stands for a provisional verdict, e for 'no evidence given'."""
NO_EVIDENCE = "e"

Line = dict[str, Any]


def write_values(audit: Audit, stream: IO[str]) -> None:
    """Write tables, links and verdicts, each on a line of its own."""
    for line in (*_tables(audit.fleet), *_verdicts(audit)):
        stream.write(json.dumps(line, ensure_ascii=False, allow_nan=False, separators=(",", ":")))
        stream.write("\n")


def _tables(fleet: Fleet) -> Iterator[Line]:
    yield {"site": fleet.site, "facts": dict(fleet.facts), "sheets": [list(sheet) for sheet in fleet.book.sheets]}
    for subject, table in fleet.tables.items():
        yield {"table": subject, "keys": list(table.keys)}
        for name, column in table.columns.items():
            if (column.cell != NO_CELL).any() or not column.missing().all():
                yield {"table": subject, "quantity": name, **column_line(column)}
    for (child, parent), rows in fleet.links.items():
        yield {"link": [child, parent], "rows": stepped_runs(rows)}
    for name, rows in fleet.other_groups:
        yield {"group": name, "rows": stepped_runs(rows)}


def _verdicts(audit: Audit) -> Iterator[Line]:
    for outcome in audit.outcomes:
        if outcome.check.stage == "rows":
            yield {"check": outcome.check.key, "subject": outcome.check.subject, "verdicts": verdict_letters(outcome)}


def verdict_letters(outcome: Outcome) -> str:
    """Write the verdicts of a check, one letter a row."""
    letters = np.array([LETTERS[code] for code in range(len(LETTERS))])[outcome.verdict]
    letters = np.where(outcome.provisional, np.char.upper(letters), letters)
    return "".join(np.where(outcome.no_evidence, NO_EVIDENCE, letters).tolist())


def column_line(column: Column) -> Line:
    """Give a column as plain data: values, and basis and cells as runs."""
    line: Line = {"kind": column.kind}
    if column.kind == "truth":
        line["values"] = "".join(np.array(["0", "1", "2"])[column.values].tolist())
    elif column.kind in ("number", "date"):
        line["values"] = _numbers(column.values)
    else:
        line["values"] = column.values.tolist()
    if column.kind == "choice":
        line["choices"] = list(column.choices)
    if not (column.basis == STATED).all():
        line["basis"] = runs(column.basis)
    if (column.cell != NO_CELL).any():
        line["cells"] = stepped_runs(column.cell)
    return line


def _numbers(values: NDArray[np.float64]) -> list[float | str | None]:
    """Give numbers that JSON can hold; no end is a word."""
    plain: list[float | str | None] = values.tolist()
    for row in np.flatnonzero(~np.isfinite(values)).tolist():
        plain[row] = None if np.isnan(values[row]) else "inf" if values[row] > 0 else "-inf"
    return plain


def runs(codes: NDArray[np.integer[Any]]) -> list[list[int]]:
    """Write codes as runs of one code each.

    >>> runs(np.array([1, 1, 1, 3]))
    [[1, 3], [3, 1]]
    """
    if not len(codes):
        return []
    starts = np.concatenate(([0], np.flatnonzero(np.diff(codes)) + 1))
    lengths = np.diff(np.append(starts, len(codes)))
    return [list(pair) for pair in zip(codes[starts].tolist(), lengths.tolist(), strict=True)]


def from_runs(pairs: list[list[int]]) -> Integers:
    """Give codes back from their runs."""
    if not pairs:
        return np.empty(0, dtype=np.int64)
    table = np.array(pairs, dtype=np.int64)
    return np.repeat(table[:, 0], table[:, 1])


def stepped_runs(numbers: Integers) -> list[list[int]]:
    """Write numbers as runs of a first number, a step and a count: cells of a column lie a row apart.

    >>> stepped_runs(np.array([10, 12, 14, -1, -1]))
    [[10, 2, 3], [-1, 0, 2]]
    """
    found: list[list[int]] = []
    steps = np.diff(numbers).tolist()
    values = numbers.tolist()
    place = 0
    while place < len(values):
        end = place + 1
        step = 0
        if end < len(values):
            step = steps[place]
            while end < len(values) and steps[end - 1] == step:
                end += 1
            # a run of two says no more than two numbers do, and would take the first of the run that follows
            if end - place == 2 and end < len(values) and step != 0:
                end, step = place + 1, 0
        found.append([values[place], step, end - place])
        place = end
    return found


def from_stepped_runs(triples: list[list[int]]) -> Integers:
    """Give numbers back from their runs."""
    parts = [first + step * np.arange(count, dtype=np.int64) for first, step, count in triples]
    return np.concatenate(parts) if parts else np.empty(0, dtype=np.int64)

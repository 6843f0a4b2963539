"""One row a record: motor lists, settings with a row a relay, starts, buses."""

from __future__ import annotations

from collections.abc import Mapping
from datetime import datetime, timedelta

import numpy as np

from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text
from audit.intake.recognition.blocks import VALUE, Integers, Readings, objects
from audit.intake.recognition.header_rows import Heading
from audit.intake.recognition.matching import HeaderMatch
from audit.intake.recognition.missing_units import ask_about_units
from audit.intake.recognition.plans import Plan, Planner
from audit.intake.recognition.quantity_columns import read_named
from audit.intake.recognition.row_kinds import RowKinds, kinds_of_rows, rows_in_words
from audit.intake.recognition.sheets import Sheet, said
from audit.intake.recognition.tags import tags_in

KEYS = {"motor": ("motor",), "relay": ("relay_tag", "motor"), "bus": ("bus_name",), "start": ("start_motor",)}
_KEY_NAMES = frozenset({"motor", "relay_tag", "bus_name", "start_motor", "relay"})


def read_wide(
    sheet: Sheet,
    heading: Heading,
    table: str,
    matches: Mapping[int, HeaderMatch],
    last_row: int,
    mapped: Mapping[int, Plan] | None = None,
    group: str = "",
) -> bool:
    """Read a table with one row a record; False where no column names the records."""
    first_rows = range(heading.first_data_row, last_row + 1)
    planner = Planner(sheet, heading, table, list(first_rows))
    plans = planner.plans(matches, mapped)
    plans = ask_about_units(
        plans, planner.sample, lambda c: sheet.address(heading.first_row + heading.depth - 1, c), sheet.source
    )
    key = _key(plans, table)
    if key is None:
        return False
    used = frozenset(plan.column for plan in plans if plan.read)
    kinds = kinds_of_rows(sheet.grid, heading, key.column, last_row, fill_down=table == "start", used=used)
    _say_rows(sheet, kinds, key)
    if kinds.key_rows != kinds.records or len(kinds.records) != len(first_rows):
        planner = Planner(sheet, heading, table, kinds.records)
    record = sheet.records.take(len(kinds.records))
    made = [block for plan in plans if plan.read for block in _column(sheet, kinds, record, plan, key)]
    if table == "motor":
        made += _areas(sheet, kinds, record, plans)
        made = _several_tags(sheet, made)
    if table == "start":
        made = _with_clock(made)
    for block in _by_group(sheet, made, table):
        if group and table == "relay" and isinstance(block.group, str):
            block.group = block.group or group
        sheet.keep(block, block.table or table)
    _note_columns(sheet, heading, table, plans, kinds)
    return True


def _key(plans: list[Plan], table: str) -> Plan | None:
    for name in KEYS[table]:
        for plan in plans:
            if plan.quantity == name:
                return plan
    return None


def _column(sheet: Sheet, kinds: RowKinds, record: Integers, plan: Plan, key: Plan) -> list[Readings]:
    rows = kinds.key_rows if plan.column == key.column else kinds.records
    cells = sheet.cells(plan.column, rows, record, plan.unit, plan.header)
    cells.group = plan.group
    return read_named(plan.name, cells, sheet.source)


def _say_rows(sheet: Sheet, kinds: RowKinds, key: Plan) -> None:
    """Tell which rows were not read as records."""
    for rows, what, advice in (
        (kinds.totals, "totals", "They are left out."),
        (kinds.notes, "notes", "They are left out."),
        (kinds.repeated, "headers that are repeated", "They are left out."),
    ):
        if rows:
            sheet.source.remark(
                sheet.address(rows[0], 1), f"{rows_in_words(rows)} read as {what}", "rows of the table", advice
            )
    if kinds.keyless:
        sheet.source.complain(
            sheet.address(kinds.keyless[0], key.column),
            f"{rows_in_words(kinds.keyless)} without an entry below '{key.header}'",
            "a name in each row",
            "These rows are left out; fill in the name, or clear them.",
            key.quantity,
        )


def _areas(sheet: Sheet, kinds: RowKinds, record: Integers, plans: list[Plan]) -> list[Readings]:
    """Give the area that a sub-heading names to the rows below it, unless a column names it."""
    if any(plan.quantity == "area" for plan in plans):
        return []
    places = [(index, area) for index, area in enumerate(kinds.areas) if area is not None]
    if not places:
        return []
    texts = [sheet.text(*area) for _, area in places]
    cells = np.array([sheet.address(*area) for _, area in places], dtype=np.int64)
    index = np.array([index for index, _ in places], dtype=np.int64)
    return [said("area", record[index], texts, cells, "sub-heading")]


def _several_tags(sheet: Sheet, made: list[Readings]) -> list[Readings]:
    """Give the readings of a row that names several motors to each of them."""
    tags = next((block for block in made if block.quantity == "motor"), None)
    if tags is None:
        return made
    copies: dict[int, Integers] = {}
    for place, text in enumerate(tags.text.tolist()):
        if not isinstance(text, str):
            continue
        names = tags_in(text)
        if len(names) < 2:
            continue
        further = sheet.records.take(len(names) - 1)
        copies[int(tags.record[place])] = further
        tags.text[place] = names[0]
        extra = tags.part(np.full(len(names) - 1, place))
        extra.record = further
        extra.text = objects(names[1:])
        made.append(extra)
        sheet.source.remark(
            int(tags.cell[place]), f"'{text}' read as {len(names)} motors: {', '.join(names)}", "a tag in each row"
        )
    if not copies:
        return made
    result = list(made)
    for block in made:
        if block.quantity == "motor":
            continue
        for place in np.flatnonzero(np.isin(block.record, list(copies))).tolist():
            further = copies[int(block.record[place])]
            extra = block.part(np.full(len(further), place))
            extra.record = further
            result.append(extra)
    return result


def _with_clock(made: list[Readings]) -> list[Readings]:
    """Join a time of day from a column of its own to the day of the start."""
    days = next((block for block in made if block.quantity == "start_moment"), None)
    clock = next((block for block in made if block.quantity == "start_clock"), None)
    if days is None or clock is None:
        return made
    times = {
        int(record): fraction
        for record, text in zip(clock.record.tolist(), clock.text.tolist(), strict=True)
        if isinstance(text, str) and (fraction := day_fraction(text)) is not None
    }
    added = np.array([times.get(int(record), 0.0) for record in days.record])
    whole = days.number == np.floor(days.number)
    days.number = np.where((days.state == VALUE) & whole, days.number + added, days.number)
    return made


def day_fraction(text: str) -> float | None:
    """Give a time of day as a fraction of a day, or None.

    >>> day_fraction("12:00"), day_fraction("6:00 pm"), day_fraction("0.25"), day_fraction("noon") is None
    (0.5, 0.75, 0.25, True)
    """
    for pattern in ("%H:%M:%S", "%H:%M", "%H:%M:%S.%f", "%I:%M %p", "%I:%M:%S %p", "%H.%M"):
        try:
            moment = datetime.strptime(text.strip(), pattern)
        except ValueError:
            continue
        if pattern == "%H.%M" and text.strip().startswith("0."):
            break
        return (moment - datetime(1900, 1, 1)) / timedelta(days=1)
    try:
        number = float(text)
    except ValueError:
        return None
    return number if 0 <= number < 1 else None


def _by_group(sheet: Sheet, made: list[Readings], table: str) -> list[Readings]:
    """Give columns that name a setting group in their header to a record of that group."""
    groups = sorted({block.group for block in made if isinstance(block.group, str) and block.group})
    named = next((block for block in made if block.quantity == "setting_group"), None)
    if named is not None and not groups:
        of_record = dict(zip(named.record.tolist(), named.text.tolist(), strict=True))
        for block in made:
            if isinstance(block.group, str) and not block.group:
                block.group = objects([of_record.get(int(r), "") or "" for r in block.record])
        return made
    if not groups:
        return made
    result: list[Readings] = [block for block in made if not block.group]
    keys = [block for block in result if block.quantity in _KEY_NAMES]
    everyone = np.unique(np.concatenate([block.record for block in made]))
    for group in groups:
        numbers = dict(zip(everyone.tolist(), sheet.records.take(len(everyone)).tolist(), strict=True))
        of_group = [block for block in made if block.group == group]
        present = set(np.concatenate([block.record for block in of_group]).tolist())
        for block in [*of_group, *keys]:
            places = np.array([i for i, r in enumerate(block.record.tolist()) if r in present], dtype=np.int64)
            copy = block.part(places)
            copy.record = np.array([numbers[r] for r in block.record[places].tolist()], dtype=np.int64)
            copy.group = group
            copy.table = "relay" if table == "motor" else table
            result.append(copy)
    return result


def _note_columns(sheet: Sheet, heading: Heading, table: str, plans: list[Plan], kinds: RowKinds) -> None:
    row = heading.first_row + heading.depth - 1
    for plan in plans:
        names = plan.quantity or plan.combined
        sheet.understood(
            plan.header,
            sheet.address(row, plan.column),
            table,
            names,
            plan.unit,
            _sample(sheet, kinds.records, plan.column),
            plan.how,
        )


def _sample(sheet: Sheet, rows: list[int], column: int) -> str:
    for row in rows:
        value: CellValue = sheet.grid.rows[row - 1][column - 1]
        if value is not None and cell_text(value):
            return cell_text(value)[:40]
    return ""

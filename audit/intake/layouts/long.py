"""One row a setting: relay, function, setting, value and unit in any order, further columns ignored."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from audit.intake.celltext import cell_text
from audit.intake.layouts.anchors import Anchor
from audit.intake.layouts.setting_names import NamedSettings, match_setting
from audit.intake.opening import SheetGrid
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_rows import SEARCHED_ROWS
from audit.intake.recognition.matching import match_header
from audit.intake.recognition.sheets import Sheet, said

_FUNCTION = (
    "function, protection function, prot function, element, protection element, device no, device number, ansi, "
    "ansi no, ansi code, function code, device function, function no, protection, category, section, function group"
)
_NAME = (
    "setting, setting name, parameter, parameter name, name, description, setting description, "
    "parameter description, item, quantity, variable, designation, setting item, text, label"
)
_VALUES = (
    # best first: what stands in the relay, then what is to be set
    "value, setting value, set value, parameter value, as left, al, actual, actual value, actual setting, present, "
    "present value, present setting, existing, existing setting, applied, applied setting, in service, as set, "
    "final, setting, set, set point, settings"
)
_AS_FOUND = "as found, af, found"
_OUTPUT = "trips, output, assigned to, opens, trip output, output contact, trips device"
_UNIT = "unit, units, uom, eng unit, engineering unit, dimension"
_GROUP = "group, setting group, sg, grp, active group no"
_BASE = "base, basis, reference, ref, multiple of, per unit of"
FEWEST_ROWS = 2


def _folded(words: str) -> dict[str, int]:
    order: dict[str, int] = {}
    for word in words.split(","):
        order.setdefault(fold_header(word), len(order))
    return order


_ROLES = {
    "function": _folded(_FUNCTION),
    "name": _folded(_NAME),
    "value": _folded(_VALUES),
    "found": _folded(_AS_FOUND),
    "unit": _folded(_UNIT),
    "group": _folded(_GROUP),
    "base": _folded(_BASE),
    "output": _folded(_OUTPUT),
}


@dataclass(frozen=True)
class LongHeading:
    """Header row of a list of settings and the column of each role."""

    row: int
    roles: Mapping[str, int]
    further_values: tuple[int, ...] = ()
    every_name: str = ""
    """What every row states where no column names settings: 'Output' in a table of what each element trips."""

    @property
    def names_owner(self) -> bool:
        """Tell whether a column names the relay or the motor."""
        return "relay" in self.roles or "motor" in self.roles


def find_long_heading(grid: SheetGrid) -> LongHeading | None:
    """Find the header row of a list of settings, or None."""
    for row in range(1, min(grid.height, SEARCHED_ROWS) + 1):
        found = _roles_of(grid, row)
        if found is not None and _names_settings(grid, found):
            return found
    return None


def long_heading_at(grid: SheetGrid, row: int) -> LongHeading | None:
    """Give the roles of the columns of a known header row."""
    return _roles_of(grid, row)


def _roles_of(grid: SheetGrid, row: int) -> LongHeading | None:
    texts = {
        column: fold_header(cell_text(value))
        for column, value in enumerate(grid.rows[row - 1], 1)
        if isinstance(value, str)
    }
    texts = {column: text for column, text in texts.items() if text}
    roles: dict[str, int] = {}
    for column, text in texts.items():
        for table in ("relay", "motor"):
            found = match_header(text, table)
            name = {"relay_tag": "relay", "motor": "motor"}.get(found.quantity)
            if name and name not in roles:
                roles[name] = column
    free = {column: text for column, text in texts.items() if column not in roles.values()}
    for role in ("unit", "group", "base", "function"):
        for column, text in free.items():
            if text in _ROLES[role] and column not in roles.values() and role not in roles:
                roles[role] = column
    free = {column: text for column, text in free.items() if column not in roles.values()}
    values = sorted((_ROLES["value"][text], column) for column, text in free.items() if text in _ROLES["value"])
    names = [column for column, text in free.items() if text in _ROLES["name"]]
    if not values:
        values = sorted((0, column) for column, text in free.items() if text in _ROLES["found"])
    outputs = [column for column, text in free.items() if text in _ROLES["output"]]
    if not values and not names and outputs and "function" in roles:
        return LongHeading(row, {**roles, "value": outputs[0]}, every_name="Output")
    if not values:
        return None
    chosen = values[0][1]
    # 'Setting | Value' names and states; 'Parameter | Setting' too
    names = [column for column in names if column != chosen]
    if names:
        by_word = {text: column for column, text in free.items() if column in names}
        order = sorted(by_word, key=lambda text: ("description" in text, _ROLES["name"][text]))
        roles["name"] = by_word[order[0]]
    if "name" not in roles and "function" not in roles:
        return None
    roles["value"] = chosen
    further = tuple(c for _, c in values[1:] if c not in roles.values())
    further += tuple(c for c, text in free.items() if text in _ROLES["found"] and c != chosen)
    return LongHeading(row, roles, further)


def _names_settings(grid: SheetGrid, heading: LongHeading) -> bool:
    """Tell whether the rows below name settings that are known."""
    seen: set[str] = set()
    function = ""
    for row in range(heading.row + 1, min(grid.height, heading.row + 400) + 1):
        function = _text(grid, row, heading.roles.get("function")) or function
        found = match_setting(function, heading.every_name or _text(grid, row, heading.roles.get("name")))
        if found.known or found.open_part:
            seen.add(found.name or found.element + found.open_part)
            if len(seen) >= FEWEST_ROWS:
                return True
    return False


def _text(grid: SheetGrid, row: int, column: int | None) -> str:
    return cell_text(grid.rows[row - 1][column - 1]) if column else ""


def read_long(
    sheet: Sheet, heading: LongHeading, group: str = "", relay: str = "", owner: Anchor | None = None
) -> bool:
    """Read a list with one row a setting; False where neither columns nor the sheet tell whose settings they are."""
    grid, roles = sheet.grid, heading.roles
    if not heading.names_owner and not relay and owner is None:
        return False
    if heading.further_values:
        others = ", ".join(f"'{_text(grid, heading.row, column)}'" for column in heading.further_values)
        sheet.source.remark(
            sheet.address(heading.row, roles["value"]),
            f"of several columns of values '{_text(grid, heading.row, roles['value'])}' is read, not {others}",
            "one column of values",
            "Name the column in fleet.toml if another one counts.",
        )
    settings = NamedSettings(sheet)
    records: dict[tuple[str, str, str], int] = {}
    places: dict[int, tuple[int, int]] = {}
    spelled: dict[int, tuple[str, str]] = {}
    last = {"relay": "", "motor": "", "function": "", "group": ""}
    last_rows = {"relay": 0, "motor": 0}
    if owner is not None:
        last[owner.kind] = owner.text
    columns = {role: list(map(cell_text, grid.column(column, heading.row + 1))) for role, column in roles.items()}
    head_name = _text(grid, heading.row, roles.get("name"))
    for place, row in enumerate(range(heading.row + 1, grid.height + 1)):
        texts = {role: column[place] for role, column in columns.items()}
        if texts.get("relay") and texts["relay"] != last["relay"]:
            last.update(function="", motor="", group="")
        if texts.get("motor") and "relay" not in roles and texts["motor"] != last["motor"]:
            last.update(function="", group="")
        for role in last:
            if texts.get(role):
                last[role] = texts[role]
                if role in last_rows:
                    last_rows[role] = row
        if not texts["value"] or texts.get("name") == head_name:
            continue
        whose = last["relay"] or relay
        in_group = last["group"] or group
        key = (whose.casefold(), last["motor"].casefold() if not whose else "", in_group)
        if not (whose or last["motor"]):
            continue
        if key not in records:
            records[key] = int(sheet.records.take(1)[0])
            places[records[key]] = (last_rows["relay"], last_rows["motor"])
            spelled[records[key]] = (whose, last["motor"])
        unit = texts.get("unit", "")
        if texts.get("base"):
            unit = f"{unit or 'x'} {texts['base']}".strip()
        settings.add(
            last["function"],
            heading.every_name or texts.get("name", ""),
            sheet.address(row, roles.get("name") or roles["function"]),
            (row, roles["value"]),
            records[key],
            "" if unit in ("-", "--") else unit,
            in_group,
        )
    settings.read()
    groups = {number: key[2] for key, number in records.items()}
    for role, quantity in (("relay", "relay_tag"), ("motor", "motor")):
        place = 0 if role == "relay" else 1
        of = [number for number in spelled if spelled[number][place]]
        if not of:
            continue
        column = roles.get(role)
        beside = sheet.address(*owner.cell) if owner and owner.kind == role and owner.cell[0] else -1
        cells = [sheet.address(places[n][place], column) if column and places[n][place] else beside for n in of]
        made = said(
            quantity,
            np.array(of, dtype=np.int64),
            [spelled[n][place] for n in of],
            np.array(cells, dtype=np.int64),
            _text(grid, heading.row, column) if column else "sheet",
        )
        made.group = np.array([groups[n] for n in of], dtype=object)
        sheet.keep(made, "relay")
    return bool(sheet.readings)

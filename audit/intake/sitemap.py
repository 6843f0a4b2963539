"""The site's own word on its workbooks: `fleet.toml` beside them, which rules over whatever was found.

```toml
site = "Example works"
code = "IEC"                    # or "NFPA 70"
audit_interval_days = 365
packs = ["low-voltage"]
must_run = ["P-101", "FP-1"]
stand_ins_for_off = [999, 9999]
zero_means_off = true
day_first = true

[[sheet]]
file = "motors.xlsx"
sheet = "Motors"
table = "motor"                 # motor, relay, bus, start, or "none" to leave it unread
layout = "wide"                 # wide, long, block, points, log
header_row = 4
header_rows = 2
group = "1"                     # setting group of the whole sheet
relay = "R-101"                 # relay of the whole sheet

  [[sheet.column]]
  header = "In"                 # or column = "F"
  quantity = "full_load_a"      # "" to leave it unread
  unit = "A"
  base = "full_load"
```
"""

from __future__ import annotations

import difflib
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from audit.fleet.addresses import column_number
from audit.fleet.fleet import Complaint
from audit.intake.gathered import TABLES, CannotRead
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.folding import fold_header
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, dimensions_for, read_unit, spellings

NAME = "fleet.toml"
CODES = ("NFPA 70", "IEC")
LAYOUTS = ("wide", "long", "block", "points", "log")
BASES = (
    "",
    "full_load",
    "ct",
    "earth_ct",
    "secondary",
    "primary",
    "motor_voltage",
    "system_voltage",
    "vt",
    "device",
)
_FACTS = {
    "site": str,
    "code": str,
    "audit_interval_days": int,
    "packs": list,
    "must_run": list,
    "stand_ins_for_off": list,
    "zero_means_off": bool,
    "day_first": bool,
    "sheet": list,
}
_OF_SHEET = {
    "file": str,
    "sheet": str,
    "table": str,
    "layout": str,
    "header_row": int,
    "header_rows": int,
    "group": str,
    "relay": str,
    "column": list,
}
_OF_COLUMN = {"header": str, "column": str, "quantity": str, "unit": str, "base": str}


@dataclass(frozen=True)
class MappedColumn:
    """What the site says about one column."""

    header: str
    column: int
    quantity: str
    unit: UnitReading | None


@dataclass(frozen=True)
class MappedSheet:
    """What the site says about one sheet."""

    file: str
    sheet: str = ""
    table: str = ""
    layout: str = ""
    header_row: int = 0
    header_rows: int = 1
    group: str = ""
    relay: str = ""
    columns: tuple[MappedColumn, ...] = ()

    def setting_named(self, header: str) -> MappedColumn | None:
        """Give what is said about a setting that is named beside its value."""
        return next((entry for entry in self.columns if same_header(entry.header, header)), None)


def same_header(one: str, other: str) -> bool:
    """Tell whether two headers are the same but for case, spaces, dots and line breaks.

    >>> same_header("Full Load\\nAmps", "full load amps")
    True
    """
    return bool(one) and fold_header(one) == fold_header(other)


@dataclass(frozen=True)
class SiteMap:
    """Everything that `fleet.toml` says."""

    site: str = ""
    facts: Mapping[str, str] = field(default_factory=dict)
    must_run: tuple[str, ...] = ()
    stand_ins: frozenset[float] = frozenset()
    zero_means_off: bool | None = None
    day_first: bool | None = None
    sheets: tuple[MappedSheet, ...] = ()

    def sheet(self, file: str, sheet: str) -> MappedSheet | None:
        """Give what is said about a sheet; an entry without a sheet's name speaks of all sheets of its file."""
        named = [entry for entry in self.sheets if entry.file.casefold() == file.casefold()]
        for entry in named:
            if entry.sheet.casefold() == sheet.casefold():
                return entry
        return next((entry for entry in named if not entry.sheet), None)


def load_site_map(folder: Path) -> SiteMap:
    """Read `fleet.toml` of a folder; an empty map where there is none, `CannotRead` where it is wrong."""
    path = folder / NAME
    if not path.is_file():
        return SiteMap()
    try:
        text = path.read_text("utf-8-sig")
        entries = tomllib.loads(text)
    except (tomllib.TOMLDecodeError, UnicodeDecodeError, OSError, RecursionError) as error:
        raise _wrong(f"it cannot be read: {error}", "a TOML file in UTF-8") from error
    return site_map(entries)


def site_map(entries: Mapping[str, Any]) -> SiteMap:
    """Check and take over the entries of a `fleet.toml`."""
    _check(entries, _FACTS, "")
    if "code" in entries and entries["code"] not in CODES:
        raise _wrong(f"code = {entries['code']!r}", " or ".join(repr(code) for code in CODES))
    facts = {
        name: ", ".join(map(str, value)) if isinstance(value, list) else str(value)
        for name in ("site", "code", "audit_interval_days", "packs")
        if (value := entries.get(name)) is not None
    }
    stand_ins = entries.get("stand_ins_for_off", [])
    if not all(isinstance(number, int | float) for number in stand_ins):
        raise _wrong(f"stand_ins_for_off = {stand_ins!r}", "a list of numbers")
    return SiteMap(
        entries.get("site", ""),
        facts,
        tuple(str(tag) for tag in entries.get("must_run", [])),
        frozenset(float(number) for number in stand_ins),
        entries.get("zero_means_off"),
        entries.get("day_first"),
        tuple(_sheet(entry) for entry in entries.get("sheet", [])),
    )


def _sheet(entry: Mapping[str, Any]) -> MappedSheet:
    where = f"[[sheet]] {entry.get('file', '')} {entry.get('sheet', '')}".strip()
    _check(entry, _OF_SHEET, where)
    if "file" not in entry:
        raise _wrong(f"{where} names no file", "file = the name of a workbook")
    if entry.get("table", "none") not in (*TABLES, "none", ""):
        raise _wrong(f"{where}: table = {entry['table']!r}", f"one of {', '.join(TABLES)}, none")
    if entry.get("layout", "wide") not in (*LAYOUTS, ""):
        raise _wrong(f"{where}: layout = {entry['layout']!r}", f"one of {', '.join(LAYOUTS)}")
    columns = tuple(_column(column, where) for column in entry.get("column", []))
    facts = {name: value for name, value in entry.items() if name != "column"}
    return MappedSheet(**facts, columns=columns)


def _column(entry: Mapping[str, Any], where: str) -> MappedColumn:
    _check(entry, _OF_COLUMN, where)
    name = entry.get("quantity", "")
    known = vocabulary().quantities
    if name and name not in known and name not in combined_readings():
        raise _wrong(f"{where}: quantity = {name!r}", "a quantity of the vocabulary", _nearest(name))
    if not entry.get("header") and not entry.get("column"):
        raise _wrong(f"{where}: a column without header and letter", "header = its text, or column = its letter")
    unit_text, base = entry.get("unit", ""), entry.get("base", "")
    if base not in BASES:
        raise _wrong(f"{where}: base = {base!r}", f"one of {', '.join(BASES[1:])}")
    unit = None
    if name and (unit_text or base):
        quantity = known[combined_readings()[name].quantities[0] if name in combined_readings() else name]
        unit = _unit(unit_text, quantity) if unit_text else UnitReading("x")
        if unit is None:
            raise _wrong(f"{where}: unit = {unit_text!r}", f"a unit of {quantity.label}")
        unit = UnitReading(unit.unit, base or unit.base)
    try:
        column = column_number(entry["column"]) if entry.get("column") else 0
    except ValueError as error:
        raise _wrong(f"{where}: column = {entry['column']!r}", "the letter of a column") from error
    return MappedColumn(entry.get("header", ""), column, name, unit)


def _unit(text: str, quantity: Quantity) -> UnitReading | None:
    """Read a unit as sites spell it, or by the name that a saved map gives it."""
    known = spellings().dimensions
    if any(text in known[dimension].units for dimension in dimensions_for(quantity)):
        return UnitReading(text)
    return read_unit(text, quantity)


def _nearest(name: str) -> str:
    near = difflib.get_close_matches(name, vocabulary().quantities, n=1)
    return f"Did you mean '{near[0]}'?" if near else ""


def _check(entries: Mapping[str, Any], known: Mapping[str, type], where: str) -> None:
    for name, value in entries.items():
        if name not in known:
            raise _wrong(f"{where + ': ' if where else ''}'{name}' is no entry of it", f"one of {', '.join(known)}")
        if not isinstance(value, known[name]) or (known[name] is int and isinstance(value, bool)):
            raise _wrong(f"{where + ': ' if where else ''}{name} = {value!r}", f"{name} as {_IN_WORDS[known[name]]}")


_IN_WORDS = {str: "a text", int: "a whole number", list: "a list", bool: "true or false"}


def _wrong(found: str, expected: str, advice: str = "") -> CannotRead:
    return CannotRead(
        Complaint(NAME, "", "", found, expected, advice or "Correct the file, or take it away.", weight="stop")
    )

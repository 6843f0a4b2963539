"""Settings that are named beside their values, in lists and in blocks: names to quantities, values to readings."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from functools import lru_cache

import numpy as np

from audit.fleet.addresses import pack
from audit.intake.cells import CellValue
from audit.intake.celltext import cell_text, find_decimal_comma
from audit.intake.celltext.characters import plain
from audit.intake.recognition.blocks import objects
from audit.intake.recognition.cells_to_readings import unit_named
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_units import split_units
from audit.intake.recognition.matching import (
    NOTHING,
    HeaderMatch,
    heading_element,
    match_header,
    near_miss,
)
from audit.intake.recognition.plans import ASKED, MAPPED, SYNONYM, UNREAD
from audit.intake.recognition.quantity_columns import read_named
from audit.intake.recognition.second_signs import is_level, part_by_cells
from audit.intake.recognition.settings_grammar import read_part, setting_named
from audit.intake.recognition.sheets import Sheet
from audit.intake.recognition.source import ADVICE, Cells
from audit.intake.sitemap import MappedColumn
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, read_unit


@lru_cache(maxsize=65536)
def match_setting(function: str, name: str) -> HeaderMatch:
    """Give what a setting's name means beneath or beside the name of its function.

    >>> match_setting("50 Short circuit", "Pickup").quantity
    'short_circuit_trip_pickup_a'
    >>> match_setting("", "CT primary (A)").quantity
    'relay_ct_primary_a'
    """
    element = heading_element(function) if function else ""
    if element:
        joined = match_header(f"{function} {name}", "relay")
        if joined.known or joined.open_part:
            return joined
        within = _within(element, name)
        if within.known or within.open_part:
            return within
    alone = match_header(name, "relay") if name else NOTHING
    if element and alone.element != element and (alone.known or alone.open_part or alone.candidates):
        return NOTHING
    return alone


def heading_for(heading: str, name: str) -> str:
    """Give the heading under which a name stands, '' where the heading is none or the name names its own element.

    >>> heading_for("50 Short circuit", "Pickup"), heading_for("50 Short circuit", "46 Pickup")
    ('50 Short circuit', '')
    """
    element = heading_element(heading) if heading else ""
    own = match_setting("", name)
    return heading if element and own.element in ("", element) else ""


def _within(element: str, name: str) -> HeaderMatch:
    """Match a name that stands beneath an element's heading and need not repeat it."""
    known = vocabulary().quantities
    label = vocabulary().elements[element].words[0] if vocabulary().elements[element].words else ""
    if label:
        named = match_header(f"{label} {name}", "relay")
        if named.known or named.open_part:
            return named
    for words, unit_text in split_units(name):
        part = read_part(fold_header(words))
        quantity = setting_named(element, part) if part else None
        if quantity is None:
            continue
        unit = read_unit(unit_text, known[quantity]) if unit_text else None
        if unit_text and unit is None:
            continue
        return HeaderMatch(quantity, unit=unit, unit_text=unit_text, element=element)
    return NOTHING


@dataclass
class _Values:
    """Values of one name, wherever they stand."""

    values: list[CellValue] = field(default_factory=list)
    rows: list[int] = field(default_factory=list)
    columns: list[int] = field(default_factory=list)
    records: list[int] = field(default_factory=list)
    units: list[str] = field(default_factory=list)
    groups: list[str] = field(default_factory=list)
    name_cell: int = -1


@dataclass
class NamedSettings:
    """Gathers values by the names beside them, then reads each quantity at once."""

    sheet: Sheet
    found: dict[tuple[str, str], _Values] = field(default_factory=dict)

    def add(
        self,
        function: str,
        name: str,
        name_cell: int,
        place: tuple[int, int],
        record: int,
        unit: str,
        group: str,
    ) -> None:
        """Take the value at a row and column for a function's setting."""
        values = self.found.setdefault((function, name), _Values(name_cell=name_cell))
        values.values.append(self.sheet.value(*place))
        values.rows.append(place[0])
        values.columns.append(place[1])
        values.records.append(record)
        values.units.append(unit)
        values.groups.append(group)

    def read(self) -> int:
        """Read everything; give how many quantities were recognised."""
        self._find_decimal_mark()
        count = 0
        for (function, name), values in self.found.items():
            match = match_setting(function, name)
            label = " / ".join(text for text in (function, name) if text)
            count += self._read_one(label, match, values)
        return count

    def _find_decimal_mark(self) -> None:
        """Let all values of the sheet tell the decimal mark: each name has few values of its own."""
        if self.sheet.source.decimal_comma is None:
            texts = (v for values in self.found.values() for v in values.values if isinstance(v, str))
            self.sheet.source.decimal_comma = find_decimal_comma(map(plain, texts))

    def _read_one(self, label: str, match: HeaderMatch, values: _Values) -> bool:
        mapped = self.sheet.mapped.setting_named(label) if self.sheet.mapped else None
        if mapped is not None:
            return self._as_mapped(label, mapped, values)
        quantity_name, how = match.quantity, SYNONYM
        units = {unit for unit in values.units if unit}
        if match.open_part:
            settled = part_by_cells(
                match.element,
                match.open_part,
                [value for value in values.values if cell_text(value)],
                units.pop() if len(units) == 1 else "",
                is_level(label),
            )
            quantity_name, how = settled or "", SYNONYM if settled else ASKED if settled is None else UNREAD
        elif match.candidates and not match.known:
            # a name beside a value that could be a tag or a service is no setting
            settings = tuple(name for name in match.candidates if vocabulary().quantities[name].subject == "relay")
            match = replace(match, candidates=settings)
            quantity_name, how = self._by_unit(match, units) if settings else ("", UNREAD)
        if how == ASKED:
            self._ask(label, match, values)
        if not match.combined and not quantity_name:
            near = near_miss([label.rpartition(" / ")[2]], "relay") if how == UNREAD and not match.known else ""
            self._note(label, values, "", None, f"proposed: {near}" if near else how if how == ASKED else UNREAD)
            return False
        self._emit(label, match, quantity_name, values)
        return True

    def _as_mapped(self, label: str, mapped: MappedColumn, values: _Values) -> bool:
        """Read a setting as the site map has it."""
        if not mapped.quantity:
            self._note(label, values, "", None, UNREAD)
            return False
        combined = mapped.quantity if mapped.quantity in combined_readings() else ""
        match = HeaderMatch("" if combined else mapped.quantity, combined, unit=mapped.unit)
        self._emit(label, match, match.quantity, values, MAPPED)
        return True

    def _by_unit(self, match: HeaderMatch, units: set[str]) -> tuple[str, str]:
        known = vocabulary().quantities
        if len(units) == 1 and len(match.candidates) > 1:
            unit = next(iter(units))
            fitting = [name for name in match.candidates if read_unit(unit, known[name]) is not None]
            if len(fitting) == 1:
                return fitting[0], SYNONYM
        return "", ASKED

    def _ask(self, label: str, match: HeaderMatch, values: _Values) -> None:
        known = vocabulary().quantities
        answers = match.candidates or tuple(
            name
            for part in ("on", "pickup", "delay")
            if (name := setting_named(match.element, f"{match.open_part}_{part}"))
        )
        labels = " or ".join(known[name].label for name in answers)
        self.sheet.source.ask(
            values.name_cell,
            f"'{label}' has more than one meaning",
            f"Does it state {labels}? Name the quantity in fleet.toml; it is not read until then.",
            answers,
        )

    def _emit(self, label: str, match: HeaderMatch, quantity_name: str, values: _Values, how: str = SYNONYM) -> None:
        known = vocabulary().quantities
        name = match.combined or quantity_name
        quantity = known[combined_readings()[name].quantities[0]] if match.combined else known[name]
        units = [self._unit(text, match.unit, quantity, values, place) for place, text in enumerate(values.units)]
        kept = [place for place, unit in enumerate(units) if not isinstance(unit, str)]
        cells = self._cells(label, match, values, kept, [u for u in units if not isinstance(u, str)])
        made = read_named(name, cells, self.sheet.source)
        for block in made:
            self.sheet.keep(block, "relay", label)
        unit = next((u for u in units if isinstance(u, UnitReading)), None)
        self._note(label, values, name, unit, how)

    def _unit(
        self, text: str, stated: UnitReading | None, quantity: Quantity, values: _Values, place: int
    ) -> UnitReading | str | None:
        """Give the unit beside a value; a text where it does not fit the quantity."""
        if not text or quantity.kind != "number":
            return stated
        unit = unit_named(text, quantity.name)
        if unit is None:
            self.sheet.source.complain(
                self.sheet.address(values.rows[place], values.columns[place]),
                f"the unit '{text}' beside {cell_text(values.values[place])!r} does not fit",
                f"a unit of {quantity.label}",
                ADVICE,
                quantity.name,
            )
            return text
        if stated is not None and stated.base and not unit.base:
            return UnitReading(unit.unit, stated.base)
        return unit

    def _cells(
        self,
        label: str,
        match: HeaderMatch,
        values: _Values,
        kept: Sequence[int],
        units: list[UnitReading | None],
    ) -> Cells:
        rows = np.array([values.rows[place] for place in kept], dtype=np.int64)
        columns = np.array([values.columns[place] for place in kept], dtype=np.int64)
        grid = self.sheet.grid
        marks = pack(0, rows, columns)
        return Cells(
            [values.values[place] for place in kept],
            pack(self.sheet.index, rows, columns),
            np.array([values.records[place] for place in kept], dtype=np.int64),
            units,
            np.isin(marks, grid.percent_cells) if grid.percent_cells.size else None,
            np.isin(marks, grid.struck_cells) if grid.struck_cells.size else None,
            label,
            objects([values.groups[place] or match.group for place in kept]),
        )

    def _note(self, label: str, values: _Values, quantity: str, unit: UnitReading | None, how: str) -> None:
        sample = next((text for value in values.values if (text := cell_text(value))), "")
        self.sheet.understood(label, values.name_cell, "relay", quantity, unit, sample[:40], how)

"""Small sites written as rows of cells, laid down as readings by the shortest way."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence

import pytest

from audit.fleet.addresses import SheetBook, pack
from audit.fleet.fleet import Fleet
from audit.intake.celltext.quantities import read_number_text
from audit.intake.celltext.reading import CellKind
from audit.intake.celltext.words import kind_of_word
from audit.intake.gathered import Gathered, readings_frame
from audit.intake.resolve import resolve
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import read_unit

Row = Mapping[str, object]
STATE_OF_KIND = {
    CellKind.OFF: "off",
    CellKind.NOT_USED: "not_used",
    CellKind.TO_BE_CONFIRMED: "pending",
    CellKind.BAD: "bad",
    CellKind.ERROR: "bad",
}


class Site:
    """Readings under construction: `add` lays one sheet of rows down."""

    def __init__(self) -> None:
        self.book = SheetBook()
        self.columns: dict[str, list[object]] = {name: [] for name in readings_frame().columns}
        self.records = 0

    def add(
        self,
        table: str,
        rows: Sequence[Row],
        sheet: str = "",
        file: str = "site.xlsx",
        units: Mapping[str, str] | None = None,
        groups: Sequence[str] = (),
    ) -> Site:
        """Lay rows down; headers are the quantities' names, `units` what their headers say of the unit."""
        index = self.book.index(file, sheet or table)
        places: dict[str, int] = {}
        for line, row in enumerate(rows, 2):
            for quantity, cell in row.items():
                if cell is None:
                    continue
                column = places.setdefault(quantity, len(places) + 1)
                self._cell(table, quantity, cell, int(pack(index, line, column)), (units or {}).get(quantity, ""))
                self.columns["group"].append(groups[line - 2] if groups else "")
            self.records += 1
        return self

    def _cell(self, table: str, quantity: str, cell: object, address: int, header_unit: str) -> None:
        known = vocabulary().quantities[quantity]
        written = str(cell)
        state, number, text, unit = "value", float("nan"), None, header_unit
        if known.kind in ("number", "date"):
            if isinstance(cell, (int, float)):
                number = float(cell)
            else:
                read = read_number_text(written, decimal_comma=False)
                state, number = STATE_OF_KIND.get(read.kind, "value"), read.number
                unit = read.unit_text or header_unit
        else:
            text = written
            kind = kind_of_word(written)
            if known.name not in ("motor", "relay_tag") and kind is not None:
                state = STATE_OF_KIND.get(kind, "value")
        meant = read_unit(unit, known) if unit else None
        if unit and meant is None:
            meant_unit, base = unit, ""
        else:
            meant_unit, base = (meant.unit, meant.base) if meant else ("", "")
        values = {
            "table": table, "record": self.records, "quantity": quantity, "state": state, "number": number,
            "text": text, "unit": meant_unit, "base": base, "written": written, "cell": address, "header": quantity,
        }  # fmt: skip
        for name, value in values.items():
            self.columns[name].append(value)

    def gathered(self) -> Gathered:
        """Give what reading such workbooks would hand on."""
        return Gathered("Mill", {}, self.book, (), readings_frame(self.columns))

    def fleet(self) -> Fleet:
        """Resolve the site."""
        return resolve(self.gathered())


@pytest.fixture(scope="session")
def site() -> Callable[[], Site]:
    """A site without any sheet."""
    return Site

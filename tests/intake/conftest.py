"""Sheets as lists of rows, written to a workbook and gathered."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from pathlib import Path

import openpyxl
import pytest

from audit.intake import Gathered, gather

Sheets = Mapping[str, Sequence[Sequence[object]]]


@pytest.fixture
def gathered(tmp_path: Path) -> Callable[..., Gathered]:
    """Give a function that writes sheets to a workbook and gathers it, with a site map where given."""

    def of(sheets: Sheets, site_map: str = "") -> Gathered:
        book = openpyxl.Workbook()
        book.remove(book.active)
        for title, rows in sheets.items():
            sheet = book.create_sheet(title)
            for row in rows:
                sheet.append(list(row))
        book.save(tmp_path / "site.xlsx")
        if site_map:
            (tmp_path / "fleet.toml").write_text(site_map, "utf-8")
        return gather(tmp_path)

    return of


def values(read: Gathered, quantity: str) -> dict[str, object]:
    """Give the number, text or state of a quantity by the tag of its motor, relay or bus."""
    names = read.readings[read.readings["quantity"].isin(("motor", "relay_tag", "bus_name", "start_motor"))]
    tags = names.drop_duplicates("record").set_index("record")["text"]
    rows = read.readings[read.readings["quantity"] == quantity]
    told = {}
    for row in rows.itertuples():
        value = row.text if row.text is not None else row.number
        told[tags[row.record]] = value if row.state == "value" else row.state
    return told


def units(read: Gathered, quantity: str) -> set[tuple[str, str]]:
    """Give the units and bases that a quantity was read in."""
    rows = read.readings[read.readings["quantity"] == quantity]
    return set(zip(rows["unit"], rows["base"], strict=True))

"""The columns of the hand-over sheet: what stands in each, who fills it in, and the hidden ones that formulas need."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from openpyxl.utils import get_column_letter

Owner = Literal["tool", "engineer", "contractor", "hidden"]
MARK = "work:"
"""Begins the hidden name above each column, by which a returned sheet is read whatever moved or was renamed."""


@dataclass(frozen=True, slots=True)
class WorkColumn:
    """A column of the sheet."""

    name: str
    heading: str
    width: float
    owner: Owner
    page: int = 0
    """Page of print, side by side; 0 on every page."""


COLUMNS = (
    WorkColumn("key", "key", 6, "hidden"),
    WorkColumn("severity", "", 3, "tool"),
    WorkColumn("bus", "bus", 8, "tool"),
    WorkColumn("cubicle", "panel", 7, "tool"),
    WorkColumn("motor", "motor", 9, "tool"),
    WorkColumn("relay", "relay", 9, "tool"),
    WorkColumn("header", "setting, in the words of the export", 16, "tool"),
    WorkColumn("function", "function", 11, "tool", 1),
    WorkColumn("label", "our name for it", 14, "tool", 1),
    WorkColumn("written", "present, as written", 8, "tool", 1),
    WorkColumn("written_unit", "unit and base", 7, "tool", 1),
    WorkColumn("present", "present", 8, "tool", 1),
    WorkColumn("low", "low", 8, "tool", 1),
    WorkColumn("high", "high", 8, "tool", 1),
    WorkColumn("symbol", "unit", 5, "tool", 1),
    WorkColumn("wrong", "what is wrong", 40, "tool", 1),
    WorkColumn("why", "why", 31, "tool", 2),
    WorkColumn("set_by", "what sets each end", 20, "tool", 2),
    WorkColumn("source", "source", 14, "tool", 2),
    WorkColumn("cell", "cell", 14, "tool", 2),
    WorkColumn("proposed", "proposed", 8, "tool", 2),
    WorkColumn("how", "how it was chosen", 22, "tool", 2),
    WorkColumn("issued", "ISSUED VALUE", 10, "engineer", 3),
    WorkColumn("issued_unit", "unit and base", 7, "tool", 3),
    WorkColumn("issued_primary", "primary value", 9, "tool", 3),
    WorkColumn("primary_unit", "unit", 5, "tool", 3),
    WorkColumn("judged", "judged", 24, "tool", 3),
    WorkColumn("issued_by", "issued by", 10, "engineer", 3),
    WorkColumn("revision", "revision", 8, "engineer", 3),
    WorkColumn("issued_date", "date", 10, "engineer", 3),
    WorkColumn("plant_state", "plant state at the time", 11, "contractor", 3),
    WorkColumn("trip_links", "trip links at the time", 9, "contractor", 3),
    WorkColumn("as_found", "AS-FOUND on the relay", 9, "contractor", 4),
    WorkColumn("as_left", "AS-LEFT", 9, "contractor", 4),
    WorkColumn("unit", "unit", 7, "contractor", 4),
    WorkColumn("notice", "notice", 16, "tool", 4),
    WorkColumn("injected", "injected current, A", 8, "contractor", 4),
    WorkColumn("measured", "measured time, s", 9, "contractor", 4),
    WorkColumn("trip_proved", "trip proved to the device", 7, "contractor", 4),
    WorkColumn("export_file", "export file taken after the work", 11, "contractor", 4),
    WorkColumn("done_by", "done by", 7, "contractor", 4),
    WorkColumn("witnessed_by", "witnessed by", 9, "contractor", 4),
    WorkColumn("date", "date", 9, "contractor", 4),
    WorkColumn("remark", "remark", 11, "contractor", 4),
    WorkColumn("setting_key", "setting key", 6, "hidden"),
    WorkColumn("issued_key", "issued key", 6, "hidden"),
    WorkColumn("step", "step", 6, "hidden"),
    WorkColumn("factor", "factor", 6, "hidden"),
    WorkColumn("offset", "offset", 6, "hidden"),
    WorkColumn("held", "held", 6, "hidden"),
    WorkColumn("again", "again", 6, "hidden"),
    WorkColumn("wanted", "wanted", 6, "hidden"),
    WorkColumn("low_other", "low moves with", 6, "hidden"),
    WorkColumn("low_now", "its value", 6, "hidden"),
    WorkColumn("high_other", "high moves with", 6, "hidden"),
    WorkColumn("high_now", "its value", 6, "hidden"),
    WorkColumn("present_number", "present number", 6, "hidden"),
    WorkColumn("judged_from", "judged from", 6, "hidden"),
    WorkColumn("stamp", "stamp", 6, "hidden"),
)
NUMBER = {column.name: place for place, column in enumerate(COLUMNS, start=1)}
LETTER = {column.name: get_column_letter(place) for place, column in enumerate(COLUMNS, start=1)}
LAST_PRINTED = "remark"
REPEATED = ("severity", "header")
"""First and last of the columns that stand on every page."""

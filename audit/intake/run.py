"""What reading the workbooks of a site has gathered so far, and what later sheets ask of it."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property

from audit.fleet.addresses import SheetBook
from audit.fleet.fleet import Complaint, InputFile, Question
from audit.fleet.folding import exact
from audit.intake.gathered import ColumnReading, SheetReading
from audit.intake.layouts.anchors import known_tags
from audit.intake.recognition.blocks import Readings
from audit.intake.recognition.sheets import Records
from audit.intake.sitemap import SiteMap


@dataclass
class Run:
    """What a run has gathered so far."""

    map: SiteMap
    book: SheetBook = field(default_factory=SheetBook)
    records: Records = field(default_factory=Records)
    inputs: list[InputFile] = field(default_factory=list)
    complaints: list[Complaint] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)
    readings: list[Readings] = field(default_factory=list)
    columns: list[ColumnReading] = field(default_factory=list)
    sheets: list[SheetReading] = field(default_factory=list)

    @cached_property
    def tags(self) -> dict[str, tuple[str, str]]:
        """Give the tags of motors and relays that lists name; asked for once all lists are read."""
        kinds = {"motor": "motor", "relay": "relay", "relay_tag": "relay"}
        return known_tags(
            (kinds[block.quantity], text)
            for block in self.readings
            if block.quantity in kinds
            for text in block.text.tolist()
            if isinstance(text, str)
        )

    def records_named(self, quantity: str) -> dict[str, list[int]]:
        """Give the records of the lists by the text of a quantity: a tag, a fuse, a bus."""
        named: dict[str, list[int]] = {}
        for block in self.readings:
            if block.quantity == quantity and block.table in ("motor", "bus"):
                for record, text in zip(block.record.tolist(), block.text.tolist(), strict=True):
                    if isinstance(text, str):
                        named.setdefault(exact(text), []).append(record)
        return named

    def full_load_a(self) -> dict[int, float]:
        """Give the full-load current of the motor records that state it in amperes."""
        return {
            record: number
            for block in self.readings
            if block.quantity == "full_load_a" and block.table == "motor"
            for record, number, unit in zip(block.record.tolist(), block.number.tolist(), block.unit, strict=True)
            if number == number and unit in ("", "a")
        }

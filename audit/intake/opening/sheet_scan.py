"""One pass over the XML of a sheet for its extent and for what the reader does not tell."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from pathlib import Path

from audit.intake.opening.facts import SheetFacts
from audit.intake.opening.kinds import damaged
from audit.intake.opening.package import CellFormats
from audit.intake.opening.sheet_elements import scan_elements
from audit.intake.opening.sheet_pieces import UnusualSheet, scan_pieces


def scan_sheet(
    path: Path, sheet: str, part: str, chunks: Callable[[], Iterator[bytes]], formats: CellFormats
) -> SheetFacts:
    """Facts of a sheet; `chunks` gives its XML anew at each call.

    Sheets as programs save them are taken in large pieces with array operations and few patterns.
    Anything unusual (prefixed names, comments, CDATA, other quotes, cells without an address)
    goes through an XML parser, which is several times slower and makes no assumption.
    """
    if next(chunks(), b"").startswith((b"\xff\xfe", b"\xfe\xff", b"<\0", b"\0<")):
        # the reader of the values would take such a sheet for an empty one
        raise damaged(path, f"sheet '{sheet}' is written in UTF-16, which spreadsheet programs never do")
    try:
        return scan_pieces(path, sheet, chunks(), formats)
    except UnusualSheet:
        return scan_elements(path, sheet, part, chunks(), formats)

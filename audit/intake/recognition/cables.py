"""Conductor sizes with cores and parallel runs: '3C x 70', '2x(3x240)', '#2/0 AWG'."""

from __future__ import annotations

from audit.intake.celltext import CellKind, cell_text, read_number_column
from audit.intake.recognition.blocks import BAD, PENDING, Readings
from audit.intake.recognition.source import ADVICE, Cells, Source
from audit.intake.recognition.splits import Split, idle_readings
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import UnitReading
from audit.vocabulary.wire_sizes import WireSize, wire_size


def read_cables(cells: Cells, source: Source) -> list[Readings]:
    """Read conductor sizes with cores and parallel runs: '3C x 70', '2x(3x240)', '#2/0 AWG'."""
    known = vocabulary().quantities
    size, runs = Split(), Split()
    idle: dict[int, str] = {}
    gauge = cells.stated(0) if len(cells.values) else None
    suffix = {"awg": " AWG", "kcmil": " kcmil"}.get(gauge.unit if gauge else "", "")
    met: dict[str, WireSize | str] = {}
    for place, value in enumerate(cells.values):
        text = cell_text(value)
        if not text:
            continue
        if text not in met:
            met[text] = _conductor(text, suffix, source.decimal_comma)
        found = met[text]
        if isinstance(found, WireSize):
            size.add(place, found.mm2, UnitReading("mm2"))
            if found.runs is not None:
                runs.add(place, float(found.runs), UnitReading("x"))
        elif found:
            idle[place] = found
            if found == BAD:
                source.complain(
                    int(cells.address[place]),
                    f"'{text}' is not a conductor size",
                    "a size such as '3C x 70 mm2' or '2/0 AWG'",
                    ADVICE,
                    "cable_size_mm2",
                )
    made = [size.readings("cable_size_mm2", cells), runs.readings("cable_runs", cells)]
    return [*made, *idle_readings(idle, [known["cable_size_mm2"]], cells)]


def _conductor(text: str, suffix: str, decimal_comma: bool | None) -> WireSize | str:
    """Give the size that a text states, or the state of a cell that states none."""
    kind = read_number_column([text], decimal_comma=decimal_comma).reading(0).kind
    if kind in (CellKind.MISSING, CellKind.NOT_USED, CellKind.OFF):
        return ""
    if kind is CellKind.TO_BE_CONFIRMED:
        return PENDING
    bare = bool(suffix) and not any(word in text.casefold() for word in ("awg", "mcm", "mm", "cmil"))
    return wire_size(text + suffix if bare else text) or BAD

"""Second signs for doubtful headers: units, choices, magnitudes, and what the cells hold."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np

from audit.intake.cells import CellValue
from audit.intake.celltext import KIND_CODES, CellKind, cell_text, read_number_column, read_truth_cells
from audit.intake.recognition.settings_grammar import setting_named
from audit.vocabulary.quantities import Quantity, fold_choice, vocabulary
from audit.vocabulary.spellings import UnitReading, conversion, read_unit

FULL_LOAD_TO_RATING = (0.95, 2.3)
"""Full-load current over P / (sqrt(3) V): one over efficiency and power factor, 0.95 for rounding."""
LOCKED_ROTOR_TO_RATING = (3.5, 12.0)
BANDS = {"full_load_a": FULL_LOAD_TO_RATING, "locked_rotor_a": LOCKED_ROTOR_TO_RATING}


def factor_of(unit: UnitReading | None, quantity: Quantity) -> float:
    if unit is None or not unit.unit:
        return 1.0
    found = conversion(unit.unit, quantity)
    return found[0] if found is not None and not unit.base else float("nan")


def by_choices(candidates: Sequence[Quantity], sample: Sequence[CellValue]) -> str:
    """Settle a header by its cells: 'F' and 'G' below 'Code' are code letters, 'A' and 'B' may be designs as well."""
    if len(candidates) < 2:
        return ""
    fitting = []
    for quantity in candidates:
        if quantity.kind == "choice":
            spelled = quantity.spellings or {}
            if all(fold_choice(cell_text(value)) in spelled for value in sample):
                fitting.append(quantity.name)
        elif quantity.kind != "number" or _could_be_numbers(sample):
            fitting.append(quantity.name)
    return fitting[0] if len(fitting) == 1 else ""


def _could_be_numbers(sample: Sequence[CellValue]) -> bool:
    read = read_number_column(sample)
    return bool(np.any(read.kinds == KIND_CODES[CellKind.NUMBER]))


def only_one(fitting: Sequence[str], unit_text: str, sample: Sequence[CellValue], known: Mapping[str, Quantity]) -> str:
    return fitting[0] if len(fitting) == 1 and unit_is_known(unit_text, sample, known[fitting[0]]) else ""


def units_fit(quantity: Quantity, unit_text: str, sample: Sequence[CellValue]) -> bool:
    """Tell whether header unit and cell units, where there are any, fit a quantity."""
    if quantity.kind != "number":
        return not unit_text
    if unit_text:
        return read_unit(unit_text, quantity) is not None
    odd = read_number_column(sample).odd
    units = {reading.unit_text for reading in odd.values() if reading.unit_text}
    return all(read_unit(unit, quantity) is not None for unit in units)


def unit_is_known(unit_text: str, sample: Sequence[CellValue], quantity: Quantity) -> bool:
    if quantity.kind != "number":
        return False
    if unit_text:
        return True
    return any(reading.unit_text for reading in read_number_column(sample).odd.values())


def rivals_are_unlike(rivals: Sequence[str]) -> bool:
    """Tell whether other meanings of a current header could not have the size of the motor's own currents."""
    return not set(rivals) & {"overload_dial_a", "contactor_rated_current_a", "relay_full_load_a", "running_current_a"}


def looks_like_tags(sample: Sequence[CellValue]) -> bool:
    """Tell whether cells could be tags: all different, and not simply counting up.

    >>> looks_like_tags(["P-101", "P-102"]), looks_like_tags([1.0, 2.0, 3.0])
    (True, False)
    """
    texts = [cell_text(value) for value in sample]
    if len(set(texts)) < 0.9 * len(texts) or not texts:
        return False
    if all(text.replace(".", "").isdigit() for text in texts):
        return False
    return sum(any(c.isdigit() for c in text) and any(c.isalpha() for c in text) for text in texts) > 0.7 * len(texts)


def is_level(header: str) -> bool:
    """Tell whether a header is written as a level: 'I>>', 'U<'."""
    return header.rstrip().endswith((">", "<")) and not header.strip().casefold().startswith("t")


def part_by_cells(
    element: str, stage: str, sample: Sequence[CellValue], unit_text: str = "", level_sign: bool = False
) -> str | None:
    """Tell by its cells which part of an element a column holds; '' where it holds nothing, None where it is open.

    >>> part_by_cells("jam", "trip", ["Yes", "No", "OFF"])
    'jam_trip_on'
    >>> part_by_cells("jam", "trip", ["2.5 x FLA", "OFF"]), part_by_cells("jam", "trip", ["2 s"])
    ('jam_trip_pickup_a', 'jam_trip_delay_s')
    """
    if not sample:
        return ""
    known = vocabulary().quantities
    kinds = [reading.kind for reading in read_truth_cells(sample)]
    idle = (CellKind.NOT_USED, CellKind.MISSING, CellKind.TO_BE_CONFIRMED, CellKind.ERROR)
    judged = [kind for kind in kinds if kind not in idle]
    level = setting_named(element, f"{stage}_pickup")
    delay = setting_named(element, f"{stage}_delay")
    switch = setting_named(element, f"{stage}_on")
    if not unit_text and sum(kind is CellKind.TRUTH for kind in judged) >= 0.9 * len(judged):
        return switch or ""
    read = read_number_column(sample)
    numbers = np.count_nonzero(read.kinds == KIND_CODES[CellKind.NUMBER])
    if numbers == 0 or numbers < 0.5 * len(judged):
        return switch if switch and not unit_text and not judged else None
    units = {unit_text} if unit_text else {r.unit_text for r in read.odd.values() if r.unit_text}
    choices = [name for name in (level, delay) if name]
    if units:
        fitting = [name for name in choices if all(read_unit(unit, known[name]) is not None for unit in units)]
        return fitting[0] if len(fitting) == 1 else None
    if level and (level_sign or (not delay and not known[level].bases)):
        return level
    return None

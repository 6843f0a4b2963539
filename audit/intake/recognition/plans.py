"""What is read from each column of a table: sure headers, second signs for doubtful ones, and what is asked."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from audit.fleet.column import Floats
from audit.intake.cells import CellValue
from audit.intake.celltext import KIND_CODES, CellKind, cell_text, read_number_column, read_truth_cells
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.header_rows import Heading, unit_below
from audit.intake.recognition.matching import HeaderMatch, near_miss
from audit.intake.recognition.settings_grammar import setting_named
from audit.intake.recognition.sheets import Sheet
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, conversion, read_unit

SAMPLED = 400
SYNONYM, ASKED, UNREAD, MAPPED = "synonym", "asked", "unread", "site map"
FULL_LOAD_TO_RATING = (0.95, 2.3)
"""Full-load current over P / (sqrt(3) V): one over efficiency and power factor, 0.95 for rounding."""
LOCKED_ROTOR_TO_RATING = (3.5, 12.0)


@dataclass(frozen=True)
class Plan:
    """What is read from one column."""

    column: int
    header: str
    quantity: str = ""
    combined: str = ""
    unit: UnitReading | None = None
    group: str = ""
    how: str = UNREAD

    @property
    def read(self) -> bool:
        """Tell whether the column is read."""
        return bool(self.quantity or self.combined)

    @property
    def name(self) -> str:
        """Give the quantity or combined reading."""
        return self.quantity or self.combined


@dataclass
class Planner:
    """Makes the plans of one table of one sheet."""

    sheet: Sheet
    heading: Heading
    table: str
    rows: Sequence[int]
    """Rows that hold records, as far as known before reading."""

    def sample(self, column: int) -> list[CellValue]:
        """Give the first cells of a column that hold something."""
        found: list[CellValue] = []
        for row in self.rows:
            value = self.sheet.grid.rows[row - 1][column - 1]
            if value is not None and not (isinstance(value, str) and not value.strip()):
                found.append(value)
                if len(found) == SAMPLED:
                    break
        return found

    def plans(self, matches: Mapping[int, HeaderMatch], mapped: Mapping[int, Plan] | None = None) -> list[Plan]:
        """Give a plan for each column of the heading; the site map rules."""
        mapped = mapped or {}
        plans: dict[int, Plan] = dict(mapped)
        taken = {(plan.name, plan.group) for plan in mapped.values() if plan.read}
        for column, found in matches.items():
            if column not in mapped and found.known and not found.open_part:
                plans[column] = self._sure(column, found)
                taken.add((plans[column].name, found.group))
        for column, found in matches.items():
            if column in mapped or (found.known and not found.open_part):
                continue
            if found.open_part:
                plans[column] = self._open(column, found)
            elif found.candidates:
                plans[column] = self._doubtful(column, found, plans, {name for name, _ in taken})
            else:
                plans[column] = self._unknown(column)
            if plans[column].read:
                taken.add((plans[column].name, plans[column].group))
        ordered = [plans[column] for column in sorted(plans)]
        return self._without_twins(ordered, frozenset(mapped))

    def _sure(self, column: int, found: HeaderMatch) -> Plan:
        unit_text = self.heading.units.get(column, "")
        unit = unit_below(found, unit_text)
        if found.combined and unit_text:
            first = vocabulary().quantities[combined_readings()[found.combined].quantities[0]]
            unit = read_unit(unit_text, first) or unit
        return Plan(column, self.heading.label(column), found.quantity, found.combined, unit, found.group, SYNONYM)

    def _unknown(self, column: int) -> Plan:
        near = near_miss(self.heading.texts[column], self.table)
        return Plan(column, self.heading.label(column), how=f"proposed: {near}" if near else UNREAD)

    def _open(self, column: int, found: HeaderMatch) -> Plan:
        """Let the cells tell whether a column headed by an element alone holds yes and no, a level or a time."""
        header = self.heading.label(column)
        unit_text = self.heading.units.get(column, "")
        name = part_by_cells(found.element, found.open_part, self.sample(column), unit_text, is_level(header))
        if name is None:
            choices = tuple(
                name
                for part in ("on", "pickup", "delay")
                if (name := setting_named(found.element, f"{found.open_part}_{part}"))
            )
            self._ask(column, choices)
            return Plan(column, header, how=ASKED)
        if not name:
            return Plan(column, header)
        quantity = vocabulary().quantities[name]
        unit = read_unit(unit_text, quantity) if unit_text and quantity.kind == "number" else None
        return Plan(column, header, name, unit=unit, group=found.group, how=SYNONYM)

    def _doubtful(self, column: int, found: HeaderMatch, plans: Mapping[int, Plan], taken: set[str]) -> Plan:
        header = self.heading.label(column)
        candidates = [name for name in found.candidates if name not in taken]
        if len(candidates) < len(found.candidates) and not found.by_unit:
            # another column says it plainly
            return Plan(column, header)
        known = vocabulary().quantities
        unit_text = found.unit_text or self.heading.units.get(column, "")
        sample = self.sample(column)
        if not sample:
            return Plan(column, header)
        settled = ""
        if len(found.candidates) > 1:
            fitting = [name for name in candidates if _units_fit(known[name], unit_text, sample)]
            settled = fitting[0] if len(fitting) == 1 and _unit_is_known(unit_text, sample, known[fitting[0]]) else ""
        if not settled and (unit_text or len(found.by_unit) == 1):
            settled = _only(
                [n for n in found.by_unit if n in candidates and _units_fit(known[n], unit_text, sample)],
                unit_text,
                sample,
                known,
            )
        settled = settled or self._by_magnitude(column, candidates, unit_text, plans)
        if not settled and "motor" in candidates and looks_like_tags(sample):
            settled = "motor"
        if settled:
            unit = read_unit(unit_text, known[settled]) if unit_text else found.unit
            return Plan(column, header, settled, unit=unit, group=found.group, how=SYNONYM)
        if candidates == ["motor"]:
            return Plan(column, header)
        self._ask(column, tuple(candidates))
        return Plan(column, header, how=ASKED)

    def _by_magnitude(self, column: int, candidates: Sequence[str], unit_text: str, plans: Mapping[int, Plan]) -> str:
        """Settle a current against rated power and voltage of the same rows, where exactly one meaning fits."""
        wanted = [name for name in ("full_load_a", "locked_rotor_a") if name in candidates]
        rating = self._rating_a(plans)
        if not wanted or rating is None:
            return ""
        cells = [self.sheet.grid.rows[row - 1][column - 1] for row in self.rows]
        read = read_number_column(cells, decimal_comma=self.sheet.source.decimal_comma)
        units = {reading.unit_text for reading in read.odd.values()} | ({unit_text} if unit_text else set())
        known = vocabulary().quantities
        if any(unit and read_unit(unit, known[wanted[0]]) != UnitReading("a") for unit in units):
            return ""
        ratio = read.values / rating
        ratio = ratio[np.isfinite(ratio)]
        if ratio.size < 3:
            return ""
        bands = {"full_load_a": FULL_LOAD_TO_RATING, "locked_rotor_a": LOCKED_ROTOR_TO_RATING}
        fits = [name for name in wanted if np.mean((ratio >= bands[name][0]) & (ratio <= bands[name][1])) >= 0.9]
        rivals = [name for name in candidates if name not in wanted]
        if rivals and not _rivals_are_unlike(rivals):
            return ""
        return fits[0] if len(fits) == 1 else ""

    def _rating_a(self, plans: Mapping[int, Plan]) -> Floats | None:
        """Give P / (sqrt(3) V) of each row, or None where power or voltage is not read."""
        parts: dict[str, Floats] = {}
        for plan in plans.values():
            if plan.quantity in ("rated_power_kw", "rated_voltage_v") and plan.quantity not in parts:
                quantity = vocabulary().quantities[plan.quantity]
                parts[plan.quantity] = self._values(plan, quantity)
        if len(parts) < 2:
            return None
        with np.errstate(divide="ignore", invalid="ignore"):
            return np.asarray(parts["rated_power_kw"] * 1000 / (np.sqrt(3) * parts["rated_voltage_v"]))

    def _values(self, plan: Plan, quantity: Quantity) -> Floats:
        """Give the numbers of a column in its quantity's unit, missing where they cannot be had at once."""
        cells = [self.sheet.grid.rows[row - 1][plan.column - 1] for row in self.rows]
        read = read_number_column(cells, decimal_comma=self.sheet.source.decimal_comma)
        factor = _factor(plan.unit, quantity)
        values = read.values * factor
        for index, reading in read.odd.items():
            if reading.unit_text and reading.kind is CellKind.NUMBER:
                own = read_unit(reading.unit_text, quantity)
                values[index] = reading.number * _factor(own, quantity) if own else np.nan
        return values

    def _ask(self, column: int, answers: tuple[str, ...]) -> None:
        known = vocabulary().quantities
        labels = " or ".join(known[name].label for name in answers)
        row = self.heading.first_row + self.heading.depth - 1
        self.sheet.source.ask(
            self.sheet.address(row, column),
            f"the header '{self.heading.label(column)}' has more than one meaning",
            f"Does the column hold {labels}? Name the quantity in fleet.toml; it is not read until then.",
            answers,
        )

    def _without_twins(self, plans: list[Plan], mapped: frozenset[int]) -> list[Plan]:
        """Settle columns that claim one quantity: the site map first, equal ones read once, others asked."""
        kept: list[Plan] = []
        by_name: dict[tuple[str, str], list[Plan]] = {}
        for plan in plans:
            if plan.read:
                by_name.setdefault((plan.name, plan.group), []).append(plan)
        dropped: dict[int, Plan] = {}
        for (name, _), twins in by_name.items():
            sure = [plan for plan in twins if plan.column in mapped] or twins
            for plan in twins:
                if plan not in sure:
                    dropped[plan.column] = replace(plan, quantity="", combined="", how=UNREAD)
            if len(sure) < 2:
                continue
            first = sure[0]
            if all(self._agree(first, other) for other in sure[1:]):
                for other in sure[1:]:
                    dropped[other.column] = replace(other, quantity="", combined="", how=UNREAD)
                    self.sheet.source.remark(
                        self._header_cell(other.column),
                        f"'{other.header}' says the same as '{first.header}'",
                        "one column for a quantity",
                        f"'{first.header}' is read.",
                        name,
                    )
                continue
            for plan in sure:
                dropped[plan.column] = replace(plan, quantity="", combined="", how=ASKED)
            known = vocabulary().quantities
            label = known[name].label if name in known else name.replace("_", " ")
            headers = " and ".join(f"'{plan.header}'" for plan in sure)
            self.sheet.source.ask(
                self._header_cell(first.column),
                f"{headers} both claim to be the {label}",
                "Which of them counts? Name it in fleet.toml; neither is read until then.",
                tuple(plan.header for plan in sure),
            )
        for plan in plans:
            kept.append(dropped.get(plan.column, plan))
        return kept

    def _header_cell(self, column: int) -> int:
        return self.sheet.address(self.heading.first_row + self.heading.depth - 1, column)

    def _agree(self, first: Plan, other: Plan) -> bool:
        """Tell whether two columns say the same in every row: texts alike, numbers within 3 per cent (kW and HP)."""
        if first.combined or other.combined or first.quantity not in vocabulary().quantities:
            return False
        quantity = vocabulary().quantities[first.quantity]
        if quantity.kind != "number":
            pairs = [
                (cell_text(a).casefold(), cell_text(b).casefold())
                for a, b in zip(self._cells(first), self._cells(other), strict=True)
            ]
            both = [(a, b) for a, b in pairs if a and b]
            return bool(both) and all(a == b for a, b in both) and all(a or not b for a, b in pairs)
        a, b = self._values(first, quantity), self._values(other, quantity)
        both_known = np.isfinite(a) & np.isfinite(b)
        if not both_known.any() or (np.isfinite(b) & ~np.isfinite(a)).any():
            return False
        slack = 0.03 if first.unit and other.unit and first.unit != other.unit else 1e-9
        return bool(np.all(np.abs(a[both_known] - b[both_known]) <= slack * np.abs(a[both_known])))

    def _cells(self, plan: Plan) -> list[CellValue]:
        return [self.sheet.grid.rows[row - 1][plan.column - 1] for row in self.rows]


def _factor(unit: UnitReading | None, quantity: Quantity) -> float:
    if unit is None or not unit.unit:
        return 1.0
    found = conversion(unit.unit, quantity)
    return found[0] if found is not None and not unit.base else float("nan")


def _only(fitting: Sequence[str], unit_text: str, sample: Sequence[CellValue], known: Mapping[str, Quantity]) -> str:
    return fitting[0] if len(fitting) == 1 and _unit_is_known(unit_text, sample, known[fitting[0]]) else ""


def _units_fit(quantity: Quantity, unit_text: str, sample: Sequence[CellValue]) -> bool:
    """Tell whether header unit and cell units, where there are any, fit a quantity."""
    if quantity.kind != "number":
        return not unit_text
    if unit_text:
        return read_unit(unit_text, quantity) is not None
    odd = read_number_column(sample).odd
    units = {reading.unit_text for reading in odd.values() if reading.unit_text}
    return all(read_unit(unit, quantity) is not None for unit in units)


def _unit_is_known(unit_text: str, sample: Sequence[CellValue], quantity: Quantity) -> bool:
    if quantity.kind != "number":
        return False
    if unit_text:
        return True
    return any(reading.unit_text for reading in read_number_column(sample).odd.values())


def _rivals_are_unlike(rivals: Sequence[str]) -> bool:
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
        return switch if switch and not unit_text else None
    units = {unit_text} if unit_text else {r.unit_text for r in read.odd.values() if r.unit_text}
    choices = [name for name in (level, delay) if name]
    if units:
        fitting = [name for name in choices if all(read_unit(unit, known[name]) is not None for unit in units)]
        return fitting[0] if len(fitting) == 1 else None
    if level and (level_sign or (not delay and not known[level].bases)):
        return level
    return None

"""What is read from each column of a table: sure headers, second signs for doubtful ones, and what is asked."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

import numpy as np

from audit.fleet.column import Floats
from audit.intake.cells import CellValue
from audit.intake.celltext import CellKind, cell_text, read_number_column
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.header_rows import Heading, unit_below
from audit.intake.recognition.matching import HeaderMatch, near_miss
from audit.intake.recognition.second_signs import (
    BANDS,
    by_choices,
    factor_of,
    is_level,
    looks_like_tags,
    only_one,
    part_by_cells,
    rivals_are_unlike,
    unit_is_known,
    units_fit,
)
from audit.intake.recognition.settings_grammar import setting_named
from audit.intake.recognition.sheets import Sheet
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, read_unit

SAMPLED = 400
SYNONYM, ASKED, UNREAD, MAPPED = "synonym", "asked", "unread", "site map"


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
            fitting = [name for name in candidates if units_fit(known[name], unit_text, sample)]
            settled = fitting[0] if len(fitting) == 1 and unit_is_known(unit_text, sample, known[fitting[0]]) else ""
        if not settled and (unit_text or len(found.by_unit) == 1):
            settled = only_one(
                [n for n in found.by_unit if n in candidates and units_fit(known[n], unit_text, sample)],
                unit_text,
                sample,
                known,
            )
        settled = settled or by_choices([known[name] for name in found.candidates], sample)
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
        fits = [name for name in wanted if np.mean((ratio >= BANDS[name][0]) & (ratio <= BANDS[name][1])) >= 0.9]
        rivals = [name for name in candidates if name not in wanted]
        if rivals and not rivals_are_unlike(rivals):
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
        factor = factor_of(plan.unit, quantity)
        values = read.values * factor
        for index, reading in read.odd.items():
            if reading.unit_text and reading.kind is CellKind.NUMBER:
                own = read_unit(reading.unit_text, quantity)
                values[index] = reading.number * factor_of(own, quantity) if own else np.nan
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

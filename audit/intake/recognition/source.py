"""The sheet that cells come from, and the cells of one quantity on their way to readings."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from audit.fleet.addresses import a1, unpack
from audit.fleet.fleet import Complaint, Question
from audit.intake.cells import CellValue
from audit.intake.recognition.blocks import Integers, Objects
from audit.vocabulary.spellings import UnitReading

ADVICE = "Correct the cell, or leave it empty: what needs it then counts as unproven."


@dataclass
class Source:
    """The sheet that cells come from, and where complaints and questions about them go."""

    file: str
    sheet: str
    decimal_comma: bool | None = None
    stand_ins: frozenset[float] = frozenset()
    zero_means_off: bool | None = None
    day_first: bool | None = None
    complaints: list[Complaint] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)

    def complain(
        self,
        cell: int,
        found: str,
        expected: str,
        advice: str = ADVICE,
        quantity: str = "",
        weight: str = "withheld",
    ) -> None:
        """Keep a complaint about a packed cell."""
        self.complaints.append(
            Complaint(
                self.file,
                self.sheet,
                name_of_cell(cell),
                found,
                expected,
                advice,
                quantity,
                weight="remark" if weight == "remark" else "withheld",
            )
        )

    def remark(self, cell: int, found: str, expected: str, advice: str = "", quantity: str = "") -> None:
        """Keep a remark: something the reader should know, though nothing is withheld."""
        self.complain(cell, found, expected, advice, quantity, weight="remark")

    def ask(self, cell: int, about: str, ask: str, answers: tuple[str, ...] = ()) -> None:
        """Keep a question about a packed cell."""
        self.questions.append(Question(self.file, self.sheet, name_of_cell(cell), about, ask, answers))


def name_of_cell(cell: int) -> str:
    """Give the name of a packed cell, '' for none."""
    _, row, column = unpack(cell)
    return a1(int(row), int(column)) if int(row) else ""


@dataclass
class Cells:
    """Cells of one quantity: their values, addresses, records, and what header, unit row or unit column say."""

    values: Sequence[CellValue]
    address: Integers
    record: Integers
    unit: UnitReading | Sequence[UnitReading | None] | None = None
    percent: NDArray[np.bool_] | None = None
    struck: NDArray[np.bool_] | None = None
    header: str = ""
    group: Objects | str = ""

    def stated(self, place: int) -> UnitReading | None:
        """Give the unit that header, unit row or unit column state for a cell."""
        if self.unit is None or isinstance(self.unit, UnitReading):
            return self.unit
        return self.unit[place]

    def part(self, places: Integers) -> Cells:
        """Give some of the cells."""
        chosen = places.tolist()
        unit = self.unit
        return Cells(
            [self.values[place] for place in chosen],
            self.address[places],
            self.record[places],
            unit if unit is None or isinstance(unit, UnitReading) else [unit[place] for place in chosen],
            None if self.percent is None else self.percent[places],
            None if self.struck is None else self.struck[places],
            self.header,
            self.group if isinstance(self.group, str) else self.group[places],
        )

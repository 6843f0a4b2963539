"""Complaints and questions of the resolution, with the cells they speak of, gathered per column."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import Literal

import numpy as np
import pandas as pd

from audit.fleet.addresses import Place, SheetBook, unpack
from audit.fleet.column import NO_CELL
from audit.fleet.fleet import Complaint, Question

Weight = Literal["stop", "withheld", "remark"]


@dataclass
class Ledger:
    """What the resolution has to say, in the order in which it met it."""

    book: SheetBook
    complaints: list[Complaint] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)

    def place(self, cell: int) -> Place:
        """Give where a cell lies, empty words for no cell."""
        return self.book.place(cell) or Place("", "", "")

    def complain(
        self,
        cell: int,
        found: str,
        expected: str,
        advice: str,
        *,
        quantity: str = "",
        subject: str = "",
        key: str = "",
        weight: Weight = "withheld",
    ) -> None:
        """Note something that could not be used, or a remark about something that could."""
        place = self.place(cell)
        self.complaints.append(
            Complaint(*place, found, expected, advice, quantity=quantity, subject=subject, key=key, weight=weight)
        )

    def complain_by_column(
        self,
        readings: pd.DataFrame,
        found: str,
        expected: str,
        advice: str,
        *,
        quantity: str,
        weight: Weight = "withheld",
    ) -> None:
        """Note one thing once a column of a file; `found` may name the first cell's text as {written}."""
        for first, more in self._columns(readings):
            self.complain(
                int(first["cell"]),
                found.format(written=first["written"], header=first["header"]) + more,
                expected,
                advice,
                quantity=quantity,
                weight=weight,
            )

    def ask_by_column(self, readings: pd.DataFrame, about: str, ask: str, answers: tuple[str, ...] = ()) -> None:
        """Ask one thing once a column of a file; `about` may name the first cell's text as {written}."""
        for first, more in self._columns(readings):
            place = self.place(int(first["cell"]))
            words = about.format(written=first["written"], header=first["header"]) + more
            self.questions.append(Question(*place, words, ask, answers))

    def ask(self, cell: int, about: str, ask: str, answers: tuple[str, ...] = ()) -> None:
        """Ask one thing about one cell."""
        self.questions.append(Question(*self.place(cell), about, ask, answers))

    def _columns(self, readings: pd.DataFrame) -> Iterator[tuple[pd.Series, str]]:
        """Give the first reading of each column (file and header) and words for how many more there are."""
        if readings.empty:
            return
        ordered = readings.sort_values("cell", kind="stable")
        sheet_index = unpack(ordered["cell"].to_numpy())[0]
        files = np.array([self.book.sheets[index][0] if index >= 0 else "" for index in sheet_index], dtype=object)
        for _, group in ordered.groupby([files, ordered["header"].astype(str)], sort=False):
            cells = group["cell"].nunique() if (group["cell"] != NO_CELL).any() else len(group)
            yield group.iloc[0], f" (and {cells - 1} more of this column)" if cells > 1 else ""

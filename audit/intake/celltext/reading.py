"""What came of reading one cell."""

from __future__ import annotations

import math
from dataclasses import dataclass
from datetime import datetime
from enum import StrEnum


class CellKind(StrEnum):
    """What a cell turned out to hold."""

    NUMBER = "number"
    RANGE = "range"
    SEVERAL = "several"
    AMBIGUOUS = "ambiguous"
    INSTANTANEOUS = "instantaneous"
    TEXT = "text"
    TRUTH = "truth"
    DATE = "date"
    OFF = "off"
    NOT_USED = "not_used"
    MISSING = "missing"
    TO_BE_CONFIRMED = "to_be_confirmed"
    ERROR = "error"
    BAD = "bad"


KIND_CODES = {kind: code for code, kind in enumerate(CellKind)}
KINDS = tuple(CellKind)


@dataclass(frozen=True, slots=True)
class CellReading:
    """One cell, read.

    `number` is the value of a NUMBER, and 1 or 0 of a TRUTH; missing (NaN) for everything else.
    `numbers` are the ends of a RANGE, the values of SEVERAL, the candidates of an AMBIGUOUS cell.
    `parts` are the readings of SEVERAL, each with its own unit and qualifier.
    `unit_text` is what follows the number, with multiples written 'x FLA' and '% FLA'.
    `relation` is '<=', '>=', '<', '>' or '~' where the cell gives a bound or an approximate value.
    `qualifier` is what stands beside number and unit: a tolerance, '@ 80 % V', 'hot', '(150 hp)', '*'.
    `moment` is the day, and time of day where given, of a DATE; the candidates of an ambiguous date
    are `moments`.
    `text` is the cell as written; `remark` says in plain words what is odd, empty where nothing is.
    """

    kind: CellKind
    number: float = math.nan
    unit_text: str = ""
    text: str = ""
    remark: str = ""
    numbers: tuple[float, ...] = ()
    parts: tuple[CellReading, ...] = ()
    relation: str = ""
    qualifier: str = ""
    moment: datetime | None = None
    moments: tuple[datetime, ...] = ()


MISSING = CellReading(CellKind.MISSING)

"""The decimal mark of a sheet, told by all its texts that are numbers."""

from __future__ import annotations

import re

from audit.intake.celltext import find_decimal_comma
from audit.intake.celltext.characters import plain
from audit.intake.opening import SheetGrid

_NUMBER_AND_UNIT = re.compile(r"[-+<>~=]{0,2}\s*\d[\d.,' ]*\s*(?:[^\W\d]|[%°/²³ ]){0,12}")


def decimal_mark(grid: SheetGrid) -> bool | None:
    """Tell whether a sheet writes its numbers with a decimal comma; None where they do not tell or disagree."""
    texts = {
        value
        for row in grid.rows
        for value in row
        if isinstance(value, str) and ("," in value or "." in value) and len(value) <= 24
    }
    return find_decimal_comma(
        text for text in map(plain, texts) if _NUMBER_AND_UNIT.fullmatch(text) and text[-1:] not in ".,"
    )

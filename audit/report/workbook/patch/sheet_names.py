"""Names of sheets: which are free in a workbook, and references that follow a renamed sheet."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping

LONGEST_NAME = 31
RESERVED = "history"
_FORBIDDEN = re.compile(r"[\[\]:*?/\\]")
_REFERENCE = re.compile(
    r"(?P<text>\"(?:[^\"]|\"\")*\")|(?P<quoted>'(?:[^']|'')+')!|(?<![\w.\]'])(?P<plain>[^\W\d][\w.]*)!"
)


def free_names(wanted: Iterable[str], taken: Iterable[str]) -> dict[str, str]:
    """Name for each wanted one that neither the workbook nor an earlier one has.

    >>> free_names(["Cover", "Motors", "History"], ["motors"])
    {'Cover': 'Cover', 'Motors': 'Motors (audit)', 'History': 'History (audit)'}
    """
    used = {name.casefold() for name in taken} | {RESERVED}
    names = {}
    for name in wanted:
        free = _allowed(name)
        number = 1
        while free.casefold() in used:
            suffix = " (audit)" if number == 1 else f" (audit {number})"
            free = _shortened(_allowed(name), LONGEST_NAME - len(suffix)) + suffix
            number += 1
        used.add(free.casefold())
        names[name] = free
    return names


def quoted(name: str) -> str:
    """Name of a sheet as a reference writes it, always in quotes.

    >>> quoted("Owner's list")
    "'Owner''s list'"
    """
    return "'" + name.replace("'", "''") + "'"


def renamed(reference: str, names: Mapping[str, str]) -> str:
    """Formula or reference in which sheets go by their new names; text in double quotes is left alone.

    >>> renamed("SUM(Motors!A1,'Other list'!B2)&\\"Motors!\\"", {"Motors": "Motors (audit)"})
    'SUM(\\'Motors (audit)\\'!A1,\\'Other list\\'!B2)&"Motors!"'
    """

    def replace(found: re.Match[str]) -> str:
        if found["text"] is not None:
            return found[0]
        old = found["plain"] or found["quoted"][1:-1].replace("''", "'")
        new = names.get(old, old)
        return found[0] if new == old else quoted(new) + "!"

    return _REFERENCE.sub(replace, reference)


def _allowed(name: str) -> str:
    return _shortened(_FORBIDDEN.sub("_", name).strip("'").strip() or "Sheet", LONGEST_NAME)


def _shortened(name: str, length: int) -> str:
    """Cut to a number of UTF-16 units, which is how spreadsheet programs count."""
    while len(name.encode("utf-16-le")) > 2 * length:
        name = name[:-1]
    return name

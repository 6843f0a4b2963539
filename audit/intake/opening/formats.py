"""Number formats: whether a number is shown as a percentage."""

from __future__ import annotations

import re

BUILT_IN_PERCENT = frozenset({9, 10})
"""Numbers of the formats 0% and 0.00%, ECMA-376 part 1, section 18.8.30."""

_LITERAL = re.compile(r'"[^"]*"|\\.|_.|\*.|\[[^\]]*\]')


def shows_percent(format_code: str) -> bool:
    """Tell whether a format multiplies by a hundred: a percent sign outside of literal text.

    >>> shows_percent("0.0%"), shows_percent('0.0" %"'), shows_percent(r"0\\%")
    (True, False, False)
    """
    first_section = _LITERAL.sub("", format_code).split(";")[0]
    return "%" in first_section

"""Tags that stand for several motors: 'P-101 A/B' is P-101 A and P-101 B."""

from __future__ import annotations

import re

_LETTERS = re.compile(r"(?P<stem>.*?\d[ -]*)(?P<letters>[A-Z](?:\s*[/&,+]\s*[A-Z])+)", re.IGNORECASE)
_WHOLE = re.compile(r"\s*(?:/|&|\+|,|;|\n)\s*")
_TAG = re.compile(r"[A-Z0-9]+(?:[-. ][A-Z0-9]+)*", re.IGNORECASE)


def tags_in(text: str) -> list[str]:
    """Give the tags that one cell names.

    >>> tags_in("P-101 A/B"), tags_in("P-101A/B/C"), tags_in("P-101A / P-101B"), tags_in("P-101")
    (['P-101 A', 'P-101 B'], ['P-101A', 'P-101B', 'P-101C'], ['P-101A', 'P-101B'], ['P-101'])
    """
    match = _LETTERS.fullmatch(text)
    if match:
        letters = re.split(r"\s*[/&,+]\s*", match["letters"])
        return [match["stem"] + letter for letter in letters]
    pieces = _WHOLE.split(text)
    if len(pieces) > 1 and all(_TAG.fullmatch(piece) and len(piece) >= 4 for piece in pieces):
        shapes = {re.sub(r"\d+", "9", re.sub(r"[A-Z]+", "A", piece.upper())) for piece in pieces}
        if len(shapes) == 1 and any(c.isdigit() for c in pieces[0]):
            return pieces
    return [text]

"""Rows that share one tag: the reader numbers them as they stand, so they are paired by what they say."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping, Sequence

from audit.fleet.folding import exact

_NUMBERED = re.compile(r"^(?P<tag>.*) \((?P<number>\d+)\)$")
Cost = Callable[[int, int], int]
"""How many data differ between a row before and a row after."""


def namesakes(keys: Sequence[str]) -> dict[str, list[int]]:
    """Give the rows of each tag that stands more than once, by the folded tag.

    >>> namesakes(["P-1", "P-2", "P-1 (2)", "P-3 (2)"])
    {'p-1': [0, 2]}
    """
    plain = {exact(key): row for row, key in enumerate(keys)}
    found: dict[str, list[int]] = {}
    for row, key in enumerate(keys):
        match = _NUMBERED.match(key)
        tag = exact(match["tag"]) if match else ""
        if tag in plain and plain[tag] != row:
            found.setdefault(tag, [plain[tag]]).append(row)
    return found


def paired(before: Mapping[str, list[int]], after: Mapping[str, list[int]], cost: Cost) -> dict[int, int]:
    """Give for rows after that share a tag the row before that is most alike, each used once."""
    pairs: dict[int, int] = {}
    for tag, rows in after.items():
        left = list(before.get(tag, ()))
        ranked = sorted((cost(old, new), old, new) for new in rows for old in left)
        for _, old, new in ranked:
            if new not in pairs and old in left:
                pairs[new] = old
                left.remove(old)
    return pairs

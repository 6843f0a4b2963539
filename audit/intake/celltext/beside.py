"""What stands beside a number: its unit or base in one spelling, and tolerances, conditions and marks."""

from __future__ import annotations

import re
from functools import lru_cache

BASES = "fla|flc|in|i_n|ib|ir|ie|iref|ct|ict|un|vn|ul|pn"
LONGEST_UNIT = 24
_TOLERANCE = re.compile(
    r"(?P<unit>.*?)\s*(?P<tolerance>(?:\+\s?/\s?-|-\s?/\s?\+|±)\s*\d+(?:[.,]\d+)?\s*%?|[-+]\s*\d+(?:[.,]\d+)?\s*%)"
)
_BRACKETS = re.compile(r"(?P<unit>.*?)\s*(?P<brackets>[\[({].*[\])}])", re.DOTALL)
_MARKS = re.compile(r"(?P<unit>.*?)\s*(?P<marks>[*†‡]+|\bapprox\.?|\best\.?|\bcalc\.?|\bmeas\.?)")
_STATE = re.compile(
    r"(?P<unit>|s|sec|secs|seconds?|min|ms)\s*[-,]?\s*(?P<state>hot|cold|warm|(?<=[a-z] )[hc])", re.IGNORECASE
)
_MULTIPLE = re.compile(r"(?:x|\*|times)\s*(?:of\s+)?(?P<base>.*)", re.IGNORECASE)
_PER_CENT = re.compile(r"(?:%|pct|percent|per cent)\s*(?:of\s+|x\s+)?(?P<base>.*)", re.IGNORECASE)
_BARE_BASE = re.compile(BASES, re.IGNORECASE)
_UNIT = re.compile(r"(?:(?:1/)?[^\W\d_][\w%°/^.·*²³√\"' -]*|[°%√ΔΩ\"'].*)?")


@lru_cache(maxsize=4096)
def unit_and_qualifier(rest: str) -> tuple[str | None, str]:
    """Unit in one spelling and what stands beside it; None where the rest is no unit."""
    qualifiers: list[str] = []
    unit, at, condition = rest.partition("@")
    if at:
        qualifiers.append(f"@ {condition.strip()}")
    unit = unit.strip()
    for pattern, group in (
        (_BRACKETS, "brackets"),
        (_MARKS, "marks"),
        (_TOLERANCE, "tolerance"),
        (_STATE, "state"),
    ):
        match = pattern.fullmatch(unit)
        if match:
            qualifiers.insert(0, match[group])
            unit = match["unit"].strip()
    qualifier = " ".join(qualifiers)
    unit = unit.rstrip(" .,:;=").lstrip(" ,")
    match = _MULTIPLE.fullmatch(unit)
    if match:
        unit = f"x {match['base']}".strip()
    elif _PER_CENT.fullmatch(unit):
        unit = _PER_CENT.sub(r"% \g<base>", unit).strip()
    elif _BARE_BASE.fullmatch(unit):
        unit = f"x {unit}"
    is_unit = (
        len(unit) <= LONGEST_UNIT and _UNIT.fullmatch(unit) and not re.search(r"(?:^x ?|[ (])[\d.,]*\d(?!/)", unit)
    )
    return (unit if is_unit else None), qualifier

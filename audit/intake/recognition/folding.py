"""One spelling for headers: case, line breaks, dots, dashes, underscores and common abbreviations do not count."""

from __future__ import annotations

import re
from functools import lru_cache

from audit.intake.celltext.characters import plain

_SAME_WORD = {
    "number": "no",
    "nr": "no",
    "nos": "no",
    "num": "no",
    "nbr": "no",
    "temperature": "temp",
    "acceleration": "accel",
    "accelerating": "accel",
    "amperes": "amps",
    "amp": "amps",
    "amperage": "amps",
    "volt": "volts",
    "hour": "hr",
    "hours": "hr",
    "hrs": "hr",
    "h": "hr",
    "curr": "current",
    "mtr": "motor",
    "mot": "motor",
    "equip": "equipment",
    "eqpt": "equipment",
    "desc": "description",
    "descr": "description",
    "insul": "insulation",
    "ins": "insulation",
    "serv": "service",
    "prim": "primary",
    "brg": "bearing",
    "bearings": "bearing",
    "freq": "frequency",
    "eff": "efficiency",
    "gnd": "ground",
    "grd": "ground",
    "grounding": "earthing",
    "neg": "negative",
    "seq": "sequence",
    "starting": "start",
    "maximum": "max",
    "minimum": "min",
    "lockedrotor": "locked rotor",
    "molded": "moulded",
    "wdg": "winding",
    "setpoint": "setting",
    "settings": "setting",
    "alm": "alarm",
    "alm/trip": "alarm/trip",
    "trip/alm": "trip/alarm",
}
_SIGNS = str.maketrans({"²": "2", "³": "3", "_": " ", "\n": " ", "\r": " ", ":": " ", ";": " ", "*": " ", "|": " "})
_ABBREVIATION = re.compile(r"\b(\w)\.(?=\w\b)")
_LAST_DOT = re.compile(r"\b(\w)\.(?!\w)")
_STAGE_SIGN = re.compile(r"(?<=[\wθδφ]) (?=[<>])|(?<=[<>]) (?=[<>])")
_CLOSE_UP = re.compile(r"\s*(/)\s*|(?<=@)\s+()")
_PER_CENT = re.compile(r"(\d)\s+%")
_SPACES = re.compile(r"\s+")
_NUMBER_SIGN = re.compile(r"#(?!\d)")
_NOTE = re.compile(r"(?:\s*(?:\(\s*(?:see )?note s?\d*\s*\)|\(\d\)|\[\d\]|[*†‡¹])+)\s*$", re.IGNORECASE)


@lru_cache(maxsize=65536)
def fold_header(text: str) -> str:
    """Fold a header for look-up; brackets become spaces.

    >>> fold_header("Full-Load\\nCurrent"), fold_header("S.F."), fold_header("Tag #"), fold_header("I >>")
    ('full load current', 'sf', 'tag no', 'i>>')
    """
    folded = without_note(plain(text)).translate(_SIGNS).casefold()
    folded = _ABBREVIATION.sub(r"\1", folded)
    folded = _LAST_DOT.sub(r"\1", folded)
    folded = _NUMBER_SIGN.sub(" no ", folded)
    for sign in ".-()[]{},":
        folded = folded.replace(sign, " ")
    folded = _CLOSE_UP.sub(lambda match: match[1] or "", folded)
    folded = _PER_CENT.sub(r"\1%", folded)
    folded = _SPACES.sub(" ", folded).strip()
    folded = _STAGE_SIGN.sub("", folded).strip(" /")
    return " ".join(_SAME_WORD.get(word, word) for word in folded.split(" ")) if folded else ""


def without_note(text: str) -> str:
    """Give a header without the sign of a footnote at its end.

    >>> without_note("FLA (1)"), without_note("LRA*")
    ('FLA', 'LRA')
    """
    return _NOTE.sub("", text) or text


def compact(folded: str) -> str:
    """Give a folded header without spaces and slashes, for names out of databases ('FullLoadCurrent')."""
    return folded.replace(" ", "").replace("/", "")

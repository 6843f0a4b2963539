"""Cross-sections of conductors as sites write them: mm², AWG, kcmil, with cores and parallel runs."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

MM2_PER_KCMIL = math.pi / 4 * 25.4**2 / 1000
"""A thousand circular mils: circles of 0.001 inch diameter."""

_PLAIN = str.maketrans("×²\u00a0", "x2 ")
_METRIC = re.compile(r"(?P<size>\d+(?:[.,]\d+)?)\s*(?:mm\s?[²2]|mm\^2|sq\.?\s?mm\.?|mm)?", re.I)
_KCMIL = re.compile(r"(?P<size>\d+(?:\.\d+)?)\s*(?:kcmil|mcm|kcm)", re.I)
_AUGHT = re.compile(r"#?\s*(?P<aught>[1-4])/0(?:\s*(?:awg|ga))?", re.I)
_GAUGE = re.compile(
    r"#\s*(?P<number>\d{1,2})(?:\s*(?:awg|ga))?|(?P<plain>\d{1,2})\s*(?:awg|ga)|awg\s*#?(?P<after>\d{1,2})", re.I
)
_RUNS = re.compile(r"(?P<runs>\d{1,2})\s*(?:x|off|/ph(?:ase)?\b[ -]*|per phase\b[ -]*)\s*(?=[(\d#])", re.I)
_CORES = re.compile(r"(?P<cores>[1-7])\s*/?\s*c(?:ore)?s?(?![a-z])\s*(?:[x*-]\s*)?(?=[#\d])", re.I)
_EARTH_CORE = re.compile(r"\+\s*(?:pe|e|g|gnd|n|earth|ground)(?![a-z])", re.I)
_TAIL = re.compile(r"\s*(?:\+.*|\b(?:cu|al|copper|alumini?um|xlpe|pvc|epr|swa|per phase|/ph)\b.*)", re.I)


@dataclass(frozen=True, slots=True)
class WireSize:
    """The cross-section of a phase conductor, and the conductors in parallel where the cell says."""

    mm2: float
    runs: int | None = None


def awg_mm2(gauge: float) -> float:
    """Cross-section of an American wire gauge; 1/0 is 0, 2/0 is -1, 3/0 is -2, 4/0 is -3.

    The diameter is 0.005 inch times 92 to the power of (36 - gauge) / 39 (ASTM B258).

    >>> round(awg_mm2(12), 2), round(awg_mm2(-1), 1)
    (3.31, 67.4)
    """
    diameter_mm = 0.127 * math.pow(92.0, (36.0 - gauge) / 39.0)
    return math.pi / 4 * diameter_mm * diameter_mm


def wire_size(text: str) -> WireSize | None:
    """Read the text of a conductor size; None where it is none.

    >>> wire_size("3C x 70 mm²"), wire_size("2x(3x240)"), wire_size("250 MCM").mm2.__round__(1)
    (WireSize(mm2=70.0, runs=None), WireSize(mm2=240.0, runs=2), 126.7)
    >>> wire_size("see schedule") is None
    True
    """
    written = text.translate(_PLAIN).strip()
    written = _TAIL.sub("", _EARTH_CORE.sub("", written)).strip()
    runs = None
    if "(" in written and written.endswith(")"):
        match = _RUNS.match(written)
        if match is None:
            return None
        runs = int(match["runs"])
        written = written[match.end() :].strip("() ")
    match = _CORES.match(written)
    if match:
        written = written[match.end() :].strip()
    else:
        match = _RUNS.match(written)
        if match:
            inner = written[match.end() :].strip()
            cores = _CORES.match(inner)
            if cores:
                runs, written = int(match["runs"]), inner[cores.end() :].strip()
            elif int(match["runs"]) in (1, 3, 4, 5) or runs:
                written = inner
            else:
                runs, written = int(match["runs"]), inner
    size = _size(written)
    return WireSize(size, runs) if size is not None else None


def _size(written: str) -> float | None:
    match = _KCMIL.fullmatch(written)
    if match:
        return float(match["size"]) * MM2_PER_KCMIL
    match = _AUGHT.fullmatch(written)
    if match:
        return awg_mm2(1 - int(match["aught"]))
    match = _GAUGE.fullmatch(written)
    if match:
        return awg_mm2(int(match["number"] or match["plain"] or match["after"]))
    match = _METRIC.fullmatch(written)
    if match:
        return float(match["size"].replace(",", "."))
    return None

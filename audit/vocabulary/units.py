"""Units as scale, exponents and the mark of a point on a scale; the ending of a name tells its unit."""

from __future__ import annotations

from dataclasses import dataclass
from math import pi

Exponents = tuple[int, int, int, int, int, int]
"""Exponents of ampere, volt, second, kelvin, metre, kilogram."""


@dataclass(frozen=True, slots=True)
class Unit:
    """A unit: how many coherent units it holds, its exponents, and whether it names a point (a date, a temperature)."""

    symbol: str
    scale: float
    exponents: Exponents
    point: bool = False

    def same_as(self, other: Unit) -> bool:
        """Tell whether two quantities in these units may be added and compared."""
        return (
            self.exponents == other.exponents
            and self.point == other.point
            and abs(self.scale - other.scale) <= 1e-9 * abs(self.scale)
        )

    def times(self, other: Unit) -> Unit:
        """Give the unit of a product."""
        exponents = tuple(a + b for a, b in zip(self.exponents, other.exponents, strict=True))
        return _composed(self.scale * other.scale, exponents)

    def over(self, other: Unit) -> Unit:
        """Give the unit of a quotient."""
        exponents = tuple(a - b for a, b in zip(self.exponents, other.exponents, strict=True))
        return _composed(self.scale / other.scale, exponents)

    def difference(self) -> Unit:
        """Give the unit of the difference of two points of this scale."""
        if not self.point:
            return self
        return next(
            u for u in UNITS.values() if u.exponents == self.exponents and not u.point and u.scale == self.scale
        )


def _composed(scale: float, exponents: tuple[int, ...]) -> Unit:
    settled: Exponents = (exponents[0], exponents[1], exponents[2], exponents[3], exponents[4], exponents[5])
    for unit in UNITS.values():
        if unit.exponents == settled and not unit.point and abs(unit.scale - scale) <= 1e-9 * abs(scale):
            return unit
    return Unit("combined", scale, settled)


def _unit(symbol: str, scale: float, **exponents: int) -> Unit:
    order = ("a", "v", "s", "k", "m", "kg")
    values = [exponents.get(name, 0) for name in order]
    return Unit(symbol, scale, (values[0], values[1], values[2], values[3], values[4], values[5]))


UNITS: dict[str, Unit] = {
    "1": _unit("", 1.0),
    "pct": _unit("%", 0.01),
    "deg": _unit("deg", pi / 180),
    "a": _unit("A", 1.0, a=1),
    "ka": _unit("kA", 1e3, a=1),
    "v": _unit("V", 1.0, v=1),
    "kv": _unit("kV", 1e3, v=1),
    "va": _unit("VA", 1.0, a=1, v=1),
    "kva": _unit("kVA", 1e3, a=1, v=1),
    "mva": _unit("MVA", 1e6, a=1, v=1),
    "kw": _unit("kW", 1e3, a=1, v=1),
    "ohm": _unit("ohm", 1.0, a=-1, v=1),
    "s": _unit("s", 1.0, s=1),
    "min": _unit("min", 60.0, s=1),
    "days": _unit("days", 86400.0, s=1),
    "date": Unit("", 86400.0, (0, 0, 1, 0, 0, 0), point=True),
    "hz": _unit("Hz", 1.0, s=-1),
    "rpm": _unit("r/min", 1 / 60, s=-1),
    "per_hour": _unit("an hour", 1 / 3600, s=-1),
    "k": _unit("K", 1.0, k=1),
    "c": Unit("°C", 1.0, (0, 0, 0, 1, 0, 0), point=True),
    "ohm_per_km": _unit("ohm/km", 1e-3, a=-1, v=1, m=-1),
    "m": _unit("m", 1.0, m=1),
    "mm2": _unit("mm²", 1e-6, m=2),
    "kgm2": _unit("kg m²", 1.0, kg=1, m=2),
    "nm": _unit("N m", 1.0, a=1, v=1, s=1),
    "uf": _unit("µF", 1e-6, a=1, v=-1, s=1),
    "uf_per_km": _unit("µF/km", 1e-9, a=1, v=-1, s=1, m=-1),
    "a2s": _unit("A²s", 1.0, a=2, s=1),
}
DIMENSIONLESS = UNITS["1"]
_PLAIN_ENDINGS = ("_ratio", "_multiple", "_pu", "_factor")
_ENDINGS = sorted((name for name in UNITS if name != "1"), key=len, reverse=True)


def unit_named(name: str) -> Unit:
    """Give the unit with this short name, as vocabulary and limits write it."""
    return UNITS[name]


def unit_of_ending(quantity: str) -> Unit | None:
    """Give the unit that the ending of a quantity's name states, or none.

    >>> unit_of_ending("full_load_a").symbol
    'A'
    >>> unit_of_ending("switching_device") is None
    True
    """
    if quantity.endswith(_PLAIN_ENDINGS):
        return DIMENSIONLESS
    for ending in _ENDINGS:
        if quantity.endswith("_" + ending):
            return UNITS[ending]
    return None

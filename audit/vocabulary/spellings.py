"""Units and bases as sites write them: a spelling to the unit meant, and from there to the vocabulary's unit."""

from __future__ import annotations

import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files

from audit.vocabulary.quantities import Quantity
from audit.vocabulary.units import UNITS, Unit

_SMALL = str.maketrans({"²": "2", "³": "3", "×": "x", "✕": "x", "−": "-", "–": "-", "⁻": "-", "¹": "1"})
_DROPPED = re.compile(r"[\s.·_^()\[\]{}-]+")
_MULTIPLE = re.compile(r"(?P<sign>x|\*|times|multiples?|p\.?u\.?|per unit)\b[\s.]*(?:of\s+|on\s+)?(?P<base>.*)", re.I)
_GLUED_MULTIPLE = re.compile(r"x(?P<base>[A-Z].*)", re.I)
_PER_CENT = re.compile(r"(?:%|pct\b|per\s?cent\b|prozent\b)\s*(?:of\s+|x\s+)?(?P<base>.*)", re.I)
_AFTER = re.compile(r"(?P<base>.+?)\s*(?:%|\bpu|\bp\.u\.|\bper unit|\bpercent)\s*", re.I)
_SIDE = re.compile(r"[\s.,(\[/-]*\b(?P<side>sec|secondary|pri|prim|primary)\b\.?[\s)\].,-]*", re.I)


@dataclass(frozen=True, slots=True)
class UnitReading:
    """What a written unit means: a unit of the spelling table, and the base or side it names ("" for none)."""

    unit: str
    base: str = ""


@dataclass(frozen=True, slots=True)
class SpelledUnit:
    """A unit that sites write: (number + offset) * factor gives the first target unit of its dimension."""

    factor: float
    offset: float = 0.0
    periods: bool = False
    gauge: bool = False


@dataclass(frozen=True, slots=True)
class Dimension:
    """Units that convert to each other, and the units of the vocabulary among them."""

    targets: tuple[str, ...]
    units: Mapping[str, SpelledUnit]
    spellings: Mapping[str, str]


@dataclass(frozen=True, slots=True)
class Spellings:
    """The whole table."""

    dimensions: Mapping[str, Dimension]
    bases: Mapping[str, tuple[str, ...]]
    open_bases: frozenset[str]
    also: Mapping[str, str]


def fold_unit(text: str) -> str:
    """Fold a unit for look-up: case, spaces, dots, dashes and superscripts do not count.

    >>> fold_unit("kg m²"), fold_unit("lb-ft^2"), fold_unit("% F.L.A.")
    ('kgm2', 'lbft2', '%fla')
    """
    return _DROPPED.sub("", text.translate(_SMALL).casefold())


@cache
def spellings() -> Spellings:
    """Read the table once."""
    table = tomllib.loads(files("audit.vocabulary").joinpath("unit_spellings.toml").read_text("utf-8"))
    bases: dict[str, tuple[str, ...]] = {}
    for base, listed in table.pop("bases").items():
        for word in dict.fromkeys(fold_unit(word) for word in listed):
            bases[word] = (*bases.get(word, ()), base)
    open_bases = frozenset(fold_unit(word) for words in table.pop("open_bases").values() for word in words)
    also = table.pop("also")
    dimensions = {}
    for name, entry in table.items():
        units: dict[str, SpelledUnit] = {}
        words: dict[str, str] = {}
        for unit, facts in entry["units"].items():
            units[unit] = SpelledUnit(**{key: value for key, value in facts.items() if key != "spellings"})
            for word in facts["spellings"]:
                if words.setdefault(fold_unit(word), unit) != unit:
                    raise ValueError(f"{word!r} names two units of {name}")
        dimensions[name] = Dimension(tuple(entry["targets"]), units, words)
    return Spellings(dimensions, bases, open_bases, also)


def name_of(unit: Unit) -> str:
    """Give the short name of a unit of the vocabulary.

    >>> name_of(UNITS["kw"])
    'kw'
    """
    return next(name for name, known in UNITS.items() if known == unit)


def dimension_of(quantity: Quantity) -> str | None:
    """Give the dimension in which a quantity is written, or none (dates, words).

    >>> from audit.vocabulary.quantities import vocabulary
    >>> dimension_of(vocabulary().quantities["temperature_rise_k"])
    'temperature_difference'
    """
    if quantity.unit is None or quantity.kind != "number":
        return None
    target = name_of(quantity.unit)
    return next(name for name, dimension in spellings().dimensions.items() if target in dimension.targets)


def dimensions_for(quantity: Quantity) -> tuple[str, ...]:
    """Give the dimensions in which a quantity may be written, its own first, ratios where it has bases."""
    own = dimension_of(quantity)
    if own is None:
        return ()
    also = spellings().also.get(quantity.name)
    further = (also,) if also else ()
    return (own, *further, *(("ratio",) if quantity.bases and own != "ratio" else ()))


def read_units(text: str) -> tuple[tuple[str, UnitReading], ...]:
    """Give every meaning of a written unit as (dimension, reading); empty where it is no unit at all.

    >>> [dimension for dimension, _ in read_units("m")]
    ['time', 'length']
    >>> read_units("x CT")[0][1]
    UnitReading(unit='x', base='ct')
    >>> read_units("Description")
    ()
    """
    table = spellings()
    folded = fold_unit(text)
    found = [
        (name, UnitReading(dimension.spellings[folded]))
        for name, dimension in table.dimensions.items()
        if folded in dimension.spellings
    ]
    if found and folded not in ("sec",):
        return tuple(found)
    sided = _sided(text)
    if found or sided:
        return (*found, *sided)
    return tuple(("ratio", multiple) for multiple in _multiples(text))


def read_unit(text: str, quantity: Quantity) -> UnitReading | None:
    """Give what a written unit means for a quantity, or None where it does not fit that quantity.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> known = vocabulary().quantities
    >>> read_unit("A sec", known["jam_trip_pickup_a"])
    UnitReading(unit='a', base='secondary')
    >>> read_unit("sec", known["jam_trip_delay_s"]), read_unit("m", known["cable_length_m"])
    (UnitReading(unit='s', base=''), UnitReading(unit='m', base=''))
    >>> read_unit("kV", known["jam_trip_delay_s"]) is None
    True
    """
    readings = read_units(text)
    for dimension in dimensions_for(quantity):
        found = [reading for name, reading in readings if name == dimension]
        if found:
            return next((reading for reading in found if reading.base in quantity.bases), found[0])
    return None


def conversion(unit: str, quantity: Quantity) -> tuple[float, float] | None:
    """Give (factor, offset) such that (number + offset) * factor is in the quantity's own unit.

    None where the unit is not of the quantity's dimension, or converts by no constant (wire gauges). Cycles
    give their factor for one cycle a second: divide by the frequency.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> conversion("ms", vocabulary().quantities["jam_trip_delay_s"])
    (0.001, 0.0)
    """
    own = dimension_of(quantity)
    if own is None or quantity.unit is None:
        return None
    dimension = spellings().dimensions[own]
    spelled = dimension.units.get(unit)
    if spelled is None or spelled.gauge:
        return None
    target = UNITS[name_of(quantity.unit)]
    first = UNITS[dimension.targets[0]]
    return spelled.factor * first.scale / target.scale, spelled.offset


def _sided(text: str) -> tuple[tuple[str, UnitReading], ...]:
    """Readings of 'A sec', 'pri. V', 'secondary amps' and of a bare side, which current and voltage both know."""
    match = _SIDE.search(text)
    if match is None:
        return ()
    side = "secondary" if match["side"].casefold().startswith("s") else "primary"
    unit = fold_unit(text[: match.start()] + text[match.end() :])
    dimensions = spellings().dimensions
    if not unit:
        return (("current", UnitReading("a", side)), ("voltage", UnitReading("v", side)))
    return tuple(
        (name, UnitReading(dimensions[name].spellings[unit], side))
        for name in ("current", "voltage")
        if unit in dimensions[name].spellings
    )


def _multiples(text: str) -> tuple[UnitReading, ...]:
    """Read 'x FLA', '% of CT', 'pu', 'FLA %' and a bare base such as 'FLA'."""
    written = " ".join(text.translate(_SMALL).strip(" ()[]").split())
    for pattern, unit in ((_MULTIPLE, "x"), (_GLUED_MULTIPLE, "x"), (_PER_CENT, "pct")):
        match = pattern.fullmatch(written)
        if match:
            return tuple(UnitReading(unit, base) for base in _bases(match["base"]))
    match = _AFTER.fullmatch(written)
    if match:
        unit = "pct" if "%" in written or "ercent" in written else "x"
        return tuple(UnitReading(unit, base) for base in _bases(match["base"]))
    if fold_unit(written) == "motor":
        return ()
    return tuple(UnitReading("x", base) for base in _bases(written) if base)


def _bases(text: str) -> tuple[str, ...]:
    """Give the bases that words may name: "" for none or an open one, empty where they are no base at all."""
    folded = fold_unit(text)
    if not folded or folded in spellings().open_bases:
        return ("",)
    return tuple(base for base in spellings().bases.get(folded, ()) if base not in ("primary", "secondary"))

"""What a header means in a table: a quantity with unit and base, a doubt, a near miss, or nothing."""

from __future__ import annotations

import difflib
import re
from collections.abc import Sequence
from dataclasses import dataclass
from functools import lru_cache

from audit.intake.celltext.characters import plain
from audit.intake.recognition.dictionary import Entry, combined_readings, dictionary
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_units import split_units, unit_in_words
from audit.intake.recognition.settings_grammar import (
    doubtful_elements,
    read_element,
    read_setting_words,
    setting_named,
)
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.spellings import UnitReading, dimension_of, read_unit, read_units

LONGEST_HEADER = 90
NEAR = 0.84
_GROUP = re.compile(
    r"\b(?:setting group|set group|setting grp|group|grp|sg|gr)\s*(?P<group>\d|[a-h])\b"
    r"|^g(?P<short>[1-8])\b|\bg(?P<last>[1-8])$"
)
_MEASURED = {
    "unbalance": "",
    "phase_sequence": "",
    "stator_temperature": "highest_running_temperature_c",
    "bearing_temperature": "",
}
"""Elements whose plain words also head what was measured on the motors of a list, and its quantity."""
_LITTLE = frozenset(
    [
        "data",
        "details",
        "detail",
        "information",
        "info",
        "parameters",
        "parameter",
        "list",
        "section",
        "particulars",
        "values",
    ]
)
_LEADS = {
    "motor": frozenset({"motor", "nameplate", "name", "plate", "rated"}),
    "relay": frozenset({"relay", "setting", "protection"}),
    "bus": frozenset({"bus", "board", "switchgear", "system"}),
    "start": frozenset({"recorded", "record", "measured", "event"}),
}
_LAST = {
    "motor": frozenset({"np", "nameplate"}),
    "relay": frozenset[str](),
    "bus": frozenset[str](),
    "start": frozenset({"recorded", "measured"}),
}
_NEUTRAL_WORDS = """
    motor nameplate name plate rated general identification electrical mechanical protection setting relay data details
    info information equipment load basic main characteristics and & technical machine supply
"""
_NEUTRAL = frozenset(_NEUTRAL_WORDS.split())


@dataclass(frozen=True, slots=True)
class HeaderMatch:
    """A header as it was understood in one table."""

    quantity: str = ""
    combined: str = ""
    candidates: tuple[str, ...] = ()
    by_unit: tuple[str, ...] = ()
    """Those candidates that a fitting unit settles."""
    unit: UnitReading | None = None
    unit_text: str = ""
    group: str = ""
    open_part: str = ""
    """'trip' or 'alarm' where only the cells tell whether they hold yes and no, a level or a time."""
    element: str = ""

    @property
    def known(self) -> bool:
        """Tell whether the header means one thing."""
        return bool(self.quantity or self.combined)

    @property
    def name(self) -> str:
        """Give what the header means, for comparison."""
        return self.quantity or self.combined


NOTHING = HeaderMatch()


@lru_cache(maxsize=65536)
def match_header(header: str, table: str) -> HeaderMatch:
    """Give what one header text means in a table.

    >>> match_header("Rated Power (kW)", "motor").quantity
    'rated_power_kw'
    >>> found = match_header("50 PU x FLA", "relay")
    >>> found.quantity, found.unit
    ('short_circuit_trip_pickup_a', UnitReading(unit='x', base='full_load'))
    >>> match_header("In", "motor").candidates != ()
    True
    """
    text = plain(header)
    if not text or len(text) > LONGEST_HEADER:
        return NOTHING
    doubt = NOTHING
    # words of the vocabulary first, then settings put together from the words of elements and parts
    for meaning in (_listed, _composed) if table in ("motor", "relay") else (_listed,):
        for words, unit_text in split_units(text):
            folded = fold_header(words)
            group = ""
            if table in ("motor", "relay"):
                folded, group = _without_group(folded)
            for variant in _variants(folded, table):
                found = meaning(variant, words, unit_text, group, table)
                if found.known or found.open_part:
                    return found
                if found.candidates and not doubt.candidates:
                    doubt = found
        if doubt.candidates:
            return doubt
    return doubt


def _without_group(folded: str) -> tuple[str, str]:
    match = _GROUP.search(folded)
    if match is None:
        return folded, ""
    rest = (folded[: match.start()] + " " + folded[match.end() :]).split()
    if not rest:
        return folded, ""
    return " ".join(rest), (match["group"] or match["short"] or match["last"]).upper()


def _variants(folded: str, table: str) -> list[str]:
    """Give a folded header, and what is left of it without words that say little."""
    variants = [folded]
    words = folded.split()
    without = [word for word in words if word not in _LITTLE]
    if without and len(without) < len(words):
        variants.append(" ".join(without))
    while len(without) > 1 and without[0] in _LEADS[table]:
        without = without[1:]
        variants.append(" ".join(without))
    if len(without) > 1 and without[-1] in _LAST[table]:
        variants.append(" ".join(without[:-1]))
    return variants


def _listed(folded: str, words: str, unit_text: str, group: str, table: str) -> HeaderMatch:
    entries = dictionary(table).find(folded)
    return _of_entries(entries, words, unit_text, group) if entries else NOTHING


def _composed(folded: str, words: str, unit_text: str, group: str, table: str) -> HeaderMatch:
    read = read_setting_words(folded)
    if read is not None and read.quantity:
        quantity = vocabulary().quantities[read.quantity]
        if unit_text and read_unit(unit_text, quantity) is None:
            return NOTHING
        return _sure(quantity, words, unit_text, group)
    if read is not None and table == "motor" and not read.part and _may_be_measured(read.element, folded):
        may_be = (setting_named(read.element, "trip_pickup"), _MEASURED[read.element])
        return HeaderMatch(candidates=tuple(name for name in may_be if name), unit_text=unit_text, group=group)
    if read is not None:
        return _of_setting(read.element, read.part, folded, words, unit_text, group)
    names, part = doubtful_elements(folded)
    candidates = tuple(name for element in names if (name := setting_named(element, part or "trip_pickup")) is not None)
    return HeaderMatch(candidates=candidates, unit_text=unit_text, group=group) if candidates else NOTHING


def _may_be_measured(element: str, folded: str) -> bool:
    """Tell whether a header without device number may state what was measured: 'Winding Temp (°C)'."""
    return element in _MEASURED and not any(c.isdigit() for c in folded)


def _of_entries(entries: tuple[Entry, ...], words: str, unit_text: str, group: str) -> HeaderMatch:
    if not unit_text:
        if entries[0].sure:
            return _one(entries[0], words, "", group)
        implied = [e for e in entries if e.by_unit and unit_in_words(words, _target(e)) is not None]
        if len(implied) == 1:
            return _one(implied[0], words, "", group)
        return _doubt(entries, "", group)
    fitting = [entry for entry in entries if read_unit(unit_text, _target(entry)) is not None]
    if not fitting:
        return NOTHING
    written_in = {dimension for dimension, _ in read_units(unit_text)}
    # 'LRA (x FLA)' is the ratio, though a current may be given as a multiple as well
    own = [entry for entry in fitting if dimension_of(_target(entry)) in written_in] or fitting
    sure = [entry for entry in own if entry.sure] or [entry for entry in own if entry.by_unit]
    if len(sure) == 1 and (sure[0].sure or len(own) == 1 or all(e.by_unit for e in own)):
        return _one(sure[0], words, unit_text, group)
    if len(own) == 1 and len(entries) > 1 and own[0].by_unit:
        return _one(own[0], words, unit_text, group)
    return _doubt(tuple(fitting), unit_text, group)


def _target(entry: Entry) -> Quantity:
    """Give the quantity by which the unit of a meaning is judged."""
    known = vocabulary().quantities
    return known[combined_readings()[entry.name].quantities[0] if entry.combined else entry.name]


def _one(entry: Entry, words: str, unit_text: str, group: str) -> HeaderMatch:
    if entry.combined:
        unit = _unit(unit_text, words, _target(entry))
        return HeaderMatch(combined=entry.name, unit=unit, unit_text=unit_text, group=group)
    return _sure(_target(entry), words, unit_text, group)


def _doubt(entries: tuple[Entry, ...], unit_text: str, group: str) -> HeaderMatch:
    units = {read_unit(unit_text, _target(e)) for e in entries} if unit_text else {None}
    names = [name for e in entries for name in (combined_readings()[e.name].quantities if e.combined else (e.name,))]
    return HeaderMatch(
        candidates=tuple(dict.fromkeys(names)),
        by_unit=tuple(e.name for e in entries if e.by_unit and not e.combined),
        unit=units.pop() if len(units) == 1 else None,
        unit_text=unit_text,
        group=group,
    )


def _sure(quantity: Quantity, words: str, unit_text: str, group: str) -> HeaderMatch:
    return HeaderMatch(
        quantity.name,
        unit=_unit(unit_text, words, quantity),
        unit_text=unit_text,
        group=group,
        element=quantity.element or "",
    )


def _unit(unit_text: str, words: str, quantity: Quantity) -> UnitReading | None:
    unit = read_unit(unit_text, quantity) if unit_text else unit_in_words(words, quantity)
    if "gd2" in fold_header(words).split() and (unit is None or unit.unit == "kgm2"):
        # GD2 is four times the moment of inertia, however its unit is spelled
        return UnitReading("gd2")
    return unit


def _of_setting(element: str, part: str, folded: str, words: str, unit_text: str, group: str) -> HeaderMatch:
    known = vocabulary().quantities
    stage = {"": "trip", "trip_on": "trip", "alarm_on": "alarm"}.get(part, "")
    open_part = stage if not part or folded.split()[-1] in ("trip", "alarm") else ""
    if open_part and unit_text:
        for candidate in (f"{stage}_pickup", f"{stage}_delay"):
            name = setting_named(element, candidate)
            if name is not None and read_unit(unit_text, known[name]) is not None:
                return _sure(known[name], words, unit_text, group)
        return NOTHING
    if open_part:
        return HeaderMatch(open_part=open_part, element=element, group=group)
    name = setting_named(element, part)
    if name is None or (unit_text and read_unit(unit_text, known[name]) is None):
        return NOTHING
    unit = read_unit(unit_text, known[name]) if unit_text else None
    return HeaderMatch(name, unit=unit, unit_text=unit_text, group=group, element=element)


@lru_cache(maxsize=65536)
def match_texts(texts: tuple[str, ...], table: str) -> HeaderMatch:
    """Give what a heading of several rows means, read downwards.

    >>> match_texts(("Motor", "Rated", "Current (A)"), "motor").quantity
    'full_load_a'
    """
    if len(texts) == 1:
        return match_header(texts[0], table)
    joined = match_header(" ".join(texts), table)
    if joined.known:
        return joined
    doubt = joined
    for first in range(1, len(texts)):
        # what is left away above must say nothing about the column
        if not all(_neutral(text, table) for text in texts[:first]):
            continue
        found = match_header(" ".join(texts[first:]), table)
        if found.known:
            return found
        doubt = doubt if doubt.candidates else found
    return doubt


def _neutral(text: str, table: str) -> bool:
    words = set(fold_header(text).split())
    return words <= (_NEUTRAL - {"relay", "setting", "protection"} if table == "motor" else _NEUTRAL)


def near_miss(texts: Sequence[str], table: str) -> str:
    """Give the quantity whose header is spelled almost like this one, or nothing.

    >>> near_miss(["Rated Powr"], "motor")
    'rated_power_kw'
    """
    entries = dictionary(table).entries
    for text in (" ".join(texts), texts[-1]):
        for words, _ in split_units(plain(text)):
            folded = fold_header(words)
            if len(folded) < 4:
                continue
            close = difflib.get_close_matches(folded, entries, n=1, cutoff=NEAR)
            if close:
                entry = entries[close[0]][0]
                return combined_readings()[entry.name].quantities[0] if entry.combined else entry.name
    return ""


def heading_element(text: str) -> str:
    """Give the element that a heading above rows of settings names, or nothing."""
    return read_element(fold_header(text)) or ""

"""Headers of settings, put together from the words of an element and the words of a part: 'Jam Trip PU'."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from functools import cache

from audit.intake.recognition.folding import fold_header
from audit.vocabulary.quantities import vocabulary

LONGEST_WORD = 5
_LITTLE_WORDS = """
    protection element function phase phases motor value current relay stage device fault prot amps volts for the of to
    from ansi iec ieee c37.2 range select
"""
_SAYS_LITTLE = frozenset(_LITTLE_WORDS.split())
_SAYS_NOTHING = frozenset({"at", "the", "of", "for", "value"})


@dataclass(frozen=True, slots=True)
class SettingWords:
    """What the words of a setting's header mean: the element and the part ('' where only the element is named).

    `quantity` is filled where the words beside the element name a setting that only this element has.
    """

    element: str
    part: str
    quantity: str = ""


@dataclass(frozen=True)
class Grammar:
    """Words of elements and parts, folded, ready for look-up."""

    elements: Mapping[tuple[str, ...], str]
    open_elements: Mapping[tuple[str, ...], tuple[str, ...]]
    parts: Mapping[tuple[str, ...], str]
    quantities: Mapping[tuple[str, str], str]
    own: Mapping[tuple[str, tuple[str, ...]], str]


def _words(text: str) -> tuple[str, ...]:
    return tuple(fold_header(text).split())


def _unordered(words: Iterable[str]) -> tuple[str, ...]:
    return tuple(sorted(words))


@cache
def grammar() -> Grammar:
    """Prepare the words once."""
    known = vocabulary()
    elements: dict[tuple[str, ...], str] = {}
    doubtful: dict[tuple[str, ...], list[str]] = {}
    for name, element in known.elements.items():
        for word in element.words:
            if elements.setdefault(_words(word), name) != name:
                raise ValueError(f"the word {word!r} names two elements")
        for word in element.ambiguous_words:
            doubtful.setdefault(_words(word), []).append(name)
    parts: dict[tuple[str, ...], str] = {}
    for name, part in known.parts.items():
        for word in part.words:
            if word and parts.setdefault(_unordered(_words(word)), name) != name:
                raise ValueError(f"the word {word!r} names two parts")
    quantities = {
        (q.element, q.part): q.name for q in known.quantities.values() if q.element and q.part and q.part != "own"
    }
    own: dict[tuple[str, tuple[str, ...]], str] = {}
    for quantity in known.quantities.values():
        if quantity.element is None:
            continue
        for header in quantity.headers:
            tokens = list(_words(header))
            found = _element_at(tokens, elements)
            if found is not None and found[0] == quantity.element and found[2] < len(tokens):
                rest = tokens[: found[1]] + tokens[found[1] + found[2] :]
                own.setdefault((quantity.element, _unordered(rest)), quantity.name)
    open_elements = {words: tuple(names) for words, names in doubtful.items()}
    return Grammar(elements, open_elements, parts, quantities, own)


def _element_at(tokens: list[str], known: Mapping[tuple[str, ...], str]) -> tuple[str, int, int] | None:
    """Find the longest word of an element: its name, where it starts and how many tokens it takes."""
    for length in range(min(LONGEST_WORD, len(tokens)), 0, -1):
        for start in range(len(tokens) - length + 1):
            name = known.get(tuple(tokens[start : start + length]))
            if name is not None:
                return name, start, length
    return None


def read_setting_words(folded: str) -> SettingWords | None:
    """Read a folded header as element and part, or give None where it is no such header.

    >>> found = read_setting_words("short circuit trip pickup")
    >>> found.element, found.part
    ('short_circuit', 'trip_pickup')
    >>> read_setting_words("i>> delay").part, read_setting_words("rated power") is None
    ('trip_delay', True)
    """
    tokens = folded.split()
    known = grammar()
    found = _element_at(tokens, known.elements)
    if found is None:
        return None
    element = found[0]
    rest = tokens
    while found is not None:
        name, start, length = found
        if name != element:
            part = _part(rest)
            return SettingWords(element, part) if part else None
        rest = rest[:start] + rest[start + length :]
        own = known.own.get((element, _unordered(rest)))
        if own is not None:
            return SettingWords(element, "own", own)
        found = _element_at(rest, known.elements)
    if not rest:
        return SettingWords(element, "")
    part = _part(rest)
    if part is None:
        rest = [word for word in rest if word not in _SAYS_LITTLE]
        own = known.own.get((element, _unordered(rest)))
        if own is not None:
            return SettingWords(element, "own", own)
        part = _part(rest) if rest else ""
    return None if part is None else SettingWords(element, part)


def _part(tokens: list[str]) -> str | None:
    words = [word for word in tokens if word not in _SAYS_NOTHING]
    return grammar().parts.get(_unordered(words))


def read_part(folded: str) -> str | None:
    """Read a folded header that names a part alone, as rows beneath a heading do: 'Pickup', 'Alarm Delay'.

    >>> read_part("time delay"), read_part("colour") is None
    ('trip_delay', True)
    """
    part = _part(folded.split())
    return part or None


def read_element(folded: str) -> str | None:
    """Read a folded text that names an element and nothing else: '50', 'Thermal Overload (49)'."""
    read = read_setting_words(folded)
    return read.element if read is not None and not read.part else None


def doubtful_elements(folded: str) -> tuple[tuple[str, ...], str]:
    """Give the elements that a doubtful word such as '50/51' may mean, and the part named beside it."""
    tokens = folded.split()
    known = grammar().open_elements
    for length in range(min(LONGEST_WORD, len(tokens)), 0, -1):
        for start in range(len(tokens) - length + 1):
            names = known.get(tuple(tokens[start : start + length]))
            if names:
                rest = tokens[:start] + tokens[start + length :]
                return names, (_part(rest) or "") if rest else ""
    return (), ""


def setting_named(element: str, part: str) -> str | None:
    """Give the quantity of an element's part, or None where the vocabulary has none."""
    return grammar().quantities.get((element, part))

"""Read the vocabulary: every quantity with its label, unit, subject, kind, plausible range, choices and headers."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files
from typing import Any, Literal

from audit.vocabulary.units import Unit, unit_named, unit_of_ending

Kind = Literal["number", "truth", "choice", "text", "date"]
Role = Literal["datum", "setting", "derived"]
SUBJECT_OF_FILE = {"motor": "motor", "bus": "bus", "start": "start", "relay": "relay", "settings": "relay"}


@dataclass(frozen=True, slots=True)
class Quantity:
    """A named datum, setting or derived value of one subject."""

    name: str
    label: str
    subject: str
    kind: Kind
    role: Role
    unit: Unit | None = None
    plausible: tuple[float, float] | None = None
    choices: tuple[str, ...] = ()
    spellings: Mapping[str, str] | None = None
    """Folded cell spelling to choice."""
    headers: tuple[str, ...] = ()
    ambiguous_headers: tuple[str, ...] = ()
    headers_with_unit: tuple[str, ...] = ()
    """Headers that mean this quantity only where a unit of it is written: 'Rating (kW)'."""
    bases: tuple[str, ...] = ()
    element: str | None = None
    part: str | None = None
    function: str | None = None
    ask: str | None = None
    absent_means_no: bool = False


@dataclass(frozen=True, slots=True)
class Element:
    """A protective element: its device number and the words that sites write for it."""

    name: str
    function: str
    label: str
    words: tuple[str, ...]
    ambiguous_words: tuple[str, ...] = ()
    """Words that some sites write for this element and others for another one."""


@dataclass(frozen=True, slots=True)
class Part:
    """A part of an element's settings: pickup, delay, on or off, ..."""

    name: str
    kind: Kind
    label: str
    words: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Vocabulary:
    """All quantities, elements and parts."""

    quantities: Mapping[str, Quantity]
    elements: Mapping[str, Element]
    parts: Mapping[str, Part]

    def of_subject(self, subject: str) -> dict[str, Quantity]:
        """Give the quantities of one subject, in the order of the files."""
        return {name: q for name, q in self.quantities.items() if q.subject == subject}

    def settings(self) -> dict[str, Quantity]:
        """Give the settings of relays."""
        return {name: q for name, q in self.quantities.items() if q.role == "setting"}


def fold_choice(text: str) -> str:
    """Fold the spelling of a choice for look-up: case, spaces, dashes and underscores do not count.

    >>> fold_choice(" Core-Balance ")
    'core balance'
    """
    return " ".join(text.casefold().replace("-", " ").replace("_", " ").split()) or text.strip()


def _quantity(
    name: str, entry: Mapping[str, Any], file: str, elements: Mapping[str, Element], parts: Mapping[str, Part]
) -> Quantity:
    element = elements.get(entry.get("element", ""))
    part = parts.get(entry.get("part", ""))
    kind: Kind = entry.get("kind") or (part.kind if part else "number")
    label = entry.get("label") or (part.label.format(element=element.label) if part and element else name)
    unit = unit_named(entry["unit"]) if "unit" in entry else unit_of_ending(name)
    if kind == "date":
        unit = unit_named("date")
    elif kind != "number":
        unit = None
    choices: Mapping[str, list[str]] = entry.get("choices", {})
    spellings = {fold_choice(word): choice for choice, words in choices.items() for word in [choice, *words]}
    plausible = entry.get("plausible")
    return Quantity(
        name=name,
        label=label,
        subject=SUBJECT_OF_FILE[file],
        kind=kind,
        role=entry.get("role") or ("setting" if file == "settings" else "datum"),
        unit=unit,
        plausible=(float(plausible[0]), float(plausible[1])) if plausible else None,
        choices=tuple(choices),
        spellings=spellings or None,
        headers=tuple(entry.get("headers", ())),
        ambiguous_headers=tuple(entry.get("ambiguous_headers", ())),
        headers_with_unit=tuple(entry.get("headers_with_unit", ())),
        bases=tuple(entry.get("bases", ())),
        element=element.name if element else None,
        part=entry.get("part"),
        function=element.function if element else None,
        ask=entry.get("ask"),
        absent_means_no=bool(entry.get("absent_means_no", False)),
    )


@cache
def vocabulary() -> Vocabulary:
    """Read the vocabulary once."""
    here = files("audit.vocabulary")
    words = tomllib.loads(here.joinpath("elements.toml").read_text("utf-8"))
    elements = {
        name: Element(
            name,
            entry["function"],
            entry["label"],
            tuple(entry["words"]),
            tuple(entry.get("ambiguous_words", ())),
        )
        for name, entry in words["elements"].items()
    }
    parts = {
        name: Part(name, entry["kind"], entry["label"], tuple(entry["words"])) for name, entry in words["parts"].items()
    }
    quantities: dict[str, Quantity] = {}
    for file in SUBJECT_OF_FILE:
        text = here.joinpath("quantities", f"{file}.toml").read_text("utf-8")
        for name, entry in tomllib.loads(text).items():
            if name in quantities:
                raise ValueError(f"the vocabulary names {name} twice")
            quantities[name] = _quantity(name, entry, file, elements, parts)
    return Vocabulary(quantities, elements, parts)

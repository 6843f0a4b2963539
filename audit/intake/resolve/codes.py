"""Words to codes: choices and yes/no as sites spell them."""

from __future__ import annotations

import re
from collections.abc import Mapping

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.column import NO, UNKNOWN, YES
from audit.intake.celltext.reading import CellKind
from audit.intake.celltext.truths import read_truth_cells
from audit.intake.resolve.names import exact
from audit.vocabulary.quantities import Quantity, fold_choice

UNREAD = -2
"""A word that is none of the choices."""

_TRIPS = frozenset({"trip", "trips", "tripping", "trip only", "latched", "latching", "latched trip", "trip latched"})
_BOTH = frozenset(
    words
    for between in (" and ", " + ", "+", " & ", "&", "/", " / ", " ", ", ")
    for words in (f"trip{between}alarm", f"alarm{between}trip")
)
_ALARMS = frozenset({"alarm", "alarms", "alarm only", "alarming", "signal", "warning", "annunciate"})
_PUNCTUATION = re.compile(r"[^a-z0-9]+")
FREE_TEXT_CHOICES = frozenset({"driven_machine"})
"""Choices that sites write in words of their own: one known word in the text tells it, and is shown."""


def truth_of(text: str, part: str | None = None) -> int:
    """Code of a yes or no; the words trip and alarm answer for a trip and for an alarm.

    >>> truth_of("Enabled"), truth_of("alarm only", "trip_on"), truth_of("alarm only", "alarm_on"), truth_of("maybe")
    (2, 0, 2, 1)
    """
    word = exact(text)
    if part in ("trip_on", "alarm_on"):
        for words, codes in ((_BOTH, (YES, YES)), (_TRIPS, (YES, NO)), (_ALARMS, (NO, YES))):
            if word in words:
                return codes[0] if part == "trip_on" else codes[1]
    reading = read_truth_cells([text])[0]
    if reading.kind is CellKind.TRUTH:
        return YES if reading.number else NO
    return UNKNOWN


def choice_of(quantity: Quantity, text: str) -> tuple[int, bool]:
    """Code of a choice and whether only a word within the text told it; UNREAD for a word that is none.

    >>> from audit.vocabulary.quantities import vocabulary
    >>> machine = vocabulary().quantities["driven_machine"]
    >>> choice_of(machine, "Belt-Conveyor")[0] == machine.choices.index("conveyor")
    True
    >>> choice_of(machine, "ID fan, boiler 2") == (machine.choices.index("fan"), True)
    True
    """
    spellings = quantity.spellings or {}
    choice = spellings.get(fold_choice(text)) or _without_signs(quantity).get(_PUNCTUATION.sub("", text.casefold()))
    if choice is not None:
        return quantity.choices.index(choice), False
    if quantity.name in FREE_TEXT_CHOICES:
        choice = _word_within(spellings, text)
        if choice is not None:
            return quantity.choices.index(choice), True
    return UNREAD, False


def _without_signs(quantity: Quantity) -> dict[str, str]:
    """Spellings without punctuation, where that leaves something and stays unique."""
    found: dict[str, set[str]] = {}
    for spelling, choice in (quantity.spellings or {}).items():
        found.setdefault(_PUNCTUATION.sub("", spelling), set()).add(choice)
    return {bare: min(choices) for bare, choices in found.items() if bare and len(choices) == 1}


def _word_within(known: Mapping[str, str], text: str) -> str | None:
    """Give the choice of the longest known words in a text, unless words of different choices are equally long."""
    words = fold_choice(_PUNCTUATION.sub(" ", text.casefold()))
    padded = f" {words} "
    found = {spelled for spelled in known if f" {spelled} " in padded or f" {spelled}s " in padded}
    outer = {spelled for spelled in found if not any(spelled != other and spelled in other for other in found)}
    choices = {known[spelled] for spelled in outer}
    return choices.pop() if len(choices) == 1 else None


def code_words(quantity: Quantity, texts: pd.Series) -> tuple[NDArray[np.int16], NDArray[np.bool_]]:
    """Codes of a column of words and which were told by a word within; each spelling is looked up once."""
    codes, words = pd.factorize(texts.astype(object).fillna(""))
    if quantity.kind == "truth":
        found = [(truth_of(word, quantity.part), False) for word in words]
    else:
        found = [choice_of(quantity, word) if word else (UNREAD, False) for word in words]
    table = np.array([code for code, _ in found], dtype=np.int16)
    within = np.array([inside for _, inside in found], dtype=bool)
    return (table[codes], within[codes]) if len(words) else (np.empty(0, np.int16), np.empty(0, bool))

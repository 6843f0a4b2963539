"""The functions that rules may name: the engineering functions, described by the endings of their parameters' names."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import replace
from functools import wraps
from types import ModuleType
from typing import Any

import numpy as np
from numpy.typing import NDArray

from audit.derivation.bus_members import BUS_FUNCTIONS
from audit.derivation.curve_text import CURVE_FUNCTIONS
from audit.derivation.registered import OF_MODULE
from audit.derivation.start_records import START_FUNCTIONS
from audit.engineering import code_letter
from audit.expression.builtin import BUILTIN
from audit.expression.functions import Function, function_from_signature
from audit.vocabulary.units import UNITS

_RETURNS = {
    "usual_starts_per_hour": UNITS["per_hour"],
}
_WORDS = ("material", "insulation", "insulation_class", "earthing")
_CODES: Mapping[str, Mapping[str, int]] = {
    "curve_code": {
        "definite_time": 0,
        "iec_standard_inverse": 1,
        "iec_very_inverse": 2,
        "iec_extremely_inverse": 3,
        "ieee_moderately_inverse": 4,
        "ieee_very_inverse": 5,
        "ieee_extremely_inverse": 6,
        "long_time_inverse": 7,
    },
    "standard": {"iec": 0, "nema": 1},
    "letter_code": {letter: code for code, letter in enumerate(code_letter.LETTERS)},
}


def _with_codes(call: Callable[..., Any], places: Mapping[int, Mapping[str, int]]) -> Callable[..., Any]:
    """Let a function that takes codes be called with words; a word without a code is missing."""

    @wraps(call)
    def called(*operands: NDArray[Any]) -> Any:
        given = list(operands)
        for place, codes in places.items():
            if place < len(given):
                words, which = np.unique(given[place], return_inverse=True)
                given[place] = np.array([codes.get(str(word), np.nan) for word in words], dtype=float)[which]
        return call(*given)

    return called


def _described(module: ModuleType, name: str) -> Function:
    call = getattr(module, name)
    function = function_from_signature(call, choices=(*_WORDS, *_CODES), returns=_RETURNS.get(name))
    places = {at: _CODES[operand.name] for at, operand in enumerate(function.operands) if operand.name in _CODES}
    reads = name.rsplit("_", 1)[0].replace("_", " ")
    return replace(function, call=_with_codes(call, places) if places else call, reads=reads)


FUNCTIONS: dict[str, Function] = {
    **BUILTIN,
    **START_FUNCTIONS,
    **BUS_FUNCTIONS,
    **CURVE_FUNCTIONS,
    **{name: _described(module, name) for module, names in OF_MODULE for name in names.split()},
}

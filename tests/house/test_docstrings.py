"""Every formula documents exactly its parameters, each with the unit that its name ends in."""

from __future__ import annotations

import importlib
import inspect
import pkgutil
import re
from collections.abc import Callable, Iterator
from types import ModuleType
from typing import Any

import pytest

import audit.engineering

# name ending -> what may stand in brackets; the longest ending counts
UNIT_OF_ENDING = {
    "_a": {"A"},
    "_ka": {"kA"},
    "_ma": {"mA"},
    "_v": {"V"},
    "_kv": {"kV"},
    "_va": {"VA"},
    "_kva": {"kVA"},
    "_mva": {"MVA"},
    "_kw": {"kW"},
    "_hp": {"hp"},
    "_s": {"s"},
    "_min": {"min"},
    "_d": {"d"},
    "_pct": {"%"},
    "_c": {"C"},
    "_f": {"F"},
    "_k": {"K"},
    "_ohm": {"ohm"},
    "_ohm_per_km": {"ohm/km"},
    "_mm2": {"mm2"},
    "_m": {"m"},
    "_km": {"km"},
    "_rpm": {"r/min"},
    "_hz": {"Hz"},
    "_deg": {"deg"},
    "_nm": {"N m"},
    "_kgm2": {"kg m2"},
    "_kgm2_per_hour": {"kg m2/h"},
    "_per_hour": {"1/h"},
    "_kva_per_hp": {"kVA/hp"},
    "_a2s": {"A2 s"},
    "_uf": {"uF"},
    "_uf_per_km": {"uF/km"},
    "_pu": {"1"},
    "_ratio": {"1"},
    "_multiple": {"1"},
    "_factor": {"1"},
}
# names without a unit ending: a plain number, a choice, a word, or the unit of what is handed in
PLAIN = {"1", "code", "text", "yes/no", "any", "any/d", "A sqrt(s)/mm2"}
# helpers that turn arguments into arrays: no formula, no unit
NO_FORMULAS = {"audit.engineering.arrays"}
SECTIONS = ("Parameters", "Returns", "Notes", "Examples", "References")


def formulas_of(module: ModuleType) -> Iterator[Callable[..., Any]]:
    """Give the public functions that a module defines itself."""
    for name, member in vars(module).items():
        if inspect.isfunction(member) and member.__module__ == module.__name__ and not name.startswith("_"):
            yield member


def all_formulas() -> list[Callable[..., Any]]:
    names = [f"audit.engineering.{found.name}" for found in pkgutil.iter_modules(audit.engineering.__path__)]
    modules = [importlib.import_module(name) for name in names if name not in NO_FORMULAS]
    return [formula for module in modules for formula in formulas_of(module)]


def sections_of(docstring: str) -> dict[str, str]:
    """Split a docstring at its underlined headings."""
    parts = re.split(r"^(\w+)\n-{3,}\n", inspect.cleandoc(docstring) + "\n", flags=re.MULTILINE)
    return dict(zip(parts[1::2], parts[2::2], strict=True))


def documented(section: str) -> dict[str, str]:
    """Give each entry of a section with its text joined into one line."""
    entries = re.findall(r"^(\w[^\n]*)\n((?:[ ]+[^\n]*\n?|\n)*)", section, flags=re.MULTILINE)
    return {head.split(" : ")[0].strip(): " ".join(text.split()) for head, text in entries}


def units_for(name: str) -> set[str]:
    """Give the units that a name allows."""
    endings = [ending for ending in UNIT_OF_ENDING if f"_{name}".endswith(ending)]
    return UNIT_OF_ENDING[max(endings, key=len)] if endings else PLAIN


def unit_fault(name: str, text: str) -> str | None:
    found = re.search(r"\[([^\[\]]+)\]$", text)
    if found is None:
        return f"{name}: no [unit] at the end"
    if found[1] not in units_for(name):
        return f"{name}: [{found[1]}], its name says {' or '.join(sorted(units_for(name)))}"
    return None


def faults_of(formula: Callable[..., Any]) -> list[str]:
    """Say what a formula's docstring lacks or gets wrong."""
    sections = sections_of(formula.__doc__ or "")
    faults = [f"no section {section}" for section in SECTIONS if section not in sections]
    parameters = documented(sections.get("Parameters", ""))
    expected = list(inspect.signature(formula).parameters)
    if list(parameters) != expected:
        faults.append(f"documents {list(parameters)}, takes {expected}")
    returned = documented(sections.get("Returns", ""))
    if len(returned) != 1:
        faults.append(f"documents {len(returned)} results")
    entries = [*parameters.items(), *((formula.__name__, text) for text in returned.values())]
    faults += [fault for name, text in entries if (fault := unit_fault(name, text)) is not None]
    if ">>>" not in sections.get("Examples", ""):
        faults.append("no example that runs")
    if not sections.get("References", "").strip():
        faults.append("no source named")
    return faults


@pytest.mark.parametrize("formula", all_formulas(), ids=lambda f: f"{f.__module__.rsplit('.', 1)[1]}.{f.__name__}")
def test_a_formula_documents_its_parameters_units_example_and_source(formula):
    assert faults_of(formula) == []


def test_there_are_formulas_to_look_at():
    assert len(all_formulas()) > 50


def planted_trip_time_s(current_a, pickup_a, multiplier):
    """Planted with one fault of each kind.

    Parameters
    ----------
    current_a : array_like
        Current, unit of another name. [kA]
    pickup : array_like
        Parameter of another name than the signature's. [A]
    multiplier : array_like
        No unit at all.

    Returns
    -------
    ndarray
        Time in the wrong unit. [min]

    Notes
    -----
    Planted.

    Examples
    --------
    None that runs.

    References
    ----------
    """


def test_a_planted_bad_formula_is_found_out():
    assert faults_of(planted_trip_time_s) == [
        "documents ['current_a', 'pickup', 'multiplier'], takes ['current_a', 'pickup_a', 'multiplier']",
        "current_a: [kA], its name says A",
        "pickup: [A], its name says " + " or ".join(sorted(PLAIN)),
        "multiplier: no [unit] at the end",
        "planted_trip_time_s: [min], its name says s",
        "no example that runs",
        "no source named",
    ]


def test_a_formula_without_docstring_lacks_every_section():
    def bare_a(current_a):
        return current_a

    assert [f"no section {section}" for section in SECTIONS] == faults_of(bare_a)[: len(SECTIONS)]


def test_a_sound_formula_has_no_fault():
    def doubled_a(current_a):
        """Twice the current.

        Parameters
        ----------
        current_a : array_like
            Current, described
            over two lines. [A]

        Returns
        -------
        ndarray
            Twice of it. [A]

        Notes
        -----
        Always.

        Examples
        --------
        By hand: 2 * 3 = 6.

        >>> 2 * 3
        6

        References
        ----------
        Arithmetic.
        """
        return 2 * current_a

    assert faults_of(doubled_a) == []

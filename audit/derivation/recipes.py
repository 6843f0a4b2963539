"""Read recipes: how a derived quantity is got, best first, each way with the basis that it can claim."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any, Literal

from audit.expression.functions import Functions
from audit.expression.nodes import Node, names_in
from audit.expression.parse import BadExpression, parse
from audit.expression.units import Meaning, UnitCheck, nearest
from audit.fleet.column import ASSUMED, CALCULATED, RECORDED, STATED
from audit.limits.limits import BadRule, Limit, read_rule_file
from audit.vocabulary.quantities import Quantity
from audit.vocabulary.units import UNITS, unit_named, unit_of_ending

AUDIT_DATE = "audited_on_date"
"""The day of the audit, for the ages of exports, studies and tests."""
BASES = {"recorded": RECORDED, "stated": STATED, "calculated": CALCULATED, "assumed": ASSUMED}
SUBJECTS = ("motor", "relay", "bus", "start", "sisters", "peers")
_KEYS = {"subject", "label", "unit", "kind", "source", "ask", "note", "choices", *BASES}


@dataclass(frozen=True, slots=True)
class Way:
    """One way to get a derived quantity."""

    basis: int
    text: str
    node: Node


@dataclass(frozen=True, slots=True)
class Recipe:
    """A derived quantity: its ways, best first, and what to ask for when none works."""

    name: str
    subject: str
    label: str
    kind: Literal["number", "truth"]
    ways: tuple[Way, ...]
    ask: tuple[str, ...]
    source: str
    note: str
    file: str


def _entry(path: Path, name: str, entry: Mapping[str, Any]) -> tuple[Recipe, Quantity]:
    unknown = sorted(set(entry) - _KEYS)
    if unknown:
        raise BadRule(path.name, name, f"'{unknown[0]}' is not a key of a recipe{nearest(unknown[0], _KEYS)}")
    subject = entry.get("subject", "motor")
    if subject not in SUBJECTS:
        raise BadRule(path.name, name, f"'{subject}' is not a subject{nearest(str(subject), SUBJECTS)}")
    kind = entry.get("kind", "number")
    if kind not in ("number", "truth"):
        raise BadRule(path.name, name, f"kind is 'number' or 'truth', not '{kind}'")
    if not str(entry.get("label", "")).strip():
        raise BadRule(path.name, name, "'label' is lacking", "Say in words what the quantity is.")
    stated = entry.get("unit")
    if stated is not None and stated not in UNITS:
        raise BadRule(path.name, name, f"'{stated}' is not a known unit{nearest(str(stated), UNITS)}")
    unit = (unit_named(stated) if stated is not None else unit_of_ending(name)) if kind == "number" else None
    if kind == "number" and unit is None:
        raise BadRule(path.name, name, "the quantity has no unit", 'End its name in a unit, or write unit = "1".')
    ways = []
    for word, basis in BASES.items():
        texts = entry.get(word, [])
        for text in [texts] if isinstance(texts, str) else texts:
            try:
                ways.append(Way(basis, str(text), parse(text)))
            except BadExpression as error:
                raise BadRule(path.name, name, str(error)) from error
    if not ways:
        raise BadRule(path.name, name, "the recipe has no way", f'Write one of {", ".join(BASES)} = "…".')
    asked = entry.get("ask", [])
    ask = (asked,) if isinstance(asked, str) else tuple(asked)
    label = str(entry["label"])
    recipe = Recipe(
        name,
        subject,
        label,
        kind,
        tuple(ways),
        ask,
        str(entry.get("source", "")),
        str(entry.get("note", "")),
        path.name,
    )
    return recipe, Quantity(name=name, label=label, subject=subject, kind=kind, role="derived", unit=unit)


def read_recipes(folders: list[Path]) -> tuple[dict[str, Recipe], dict[str, Quantity]]:
    """Read all recipes of these folders; a name is defined once."""
    recipes: dict[str, Recipe] = {}
    quantities: dict[str, Quantity] = {}
    for path in [file for folder in folders for file in sorted(folder.glob("*.toml"))]:
        for name, entry in read_rule_file(path).items():
            if not isinstance(entry, dict):
                raise BadRule(path.name, name, "a recipe is a table", f"Write [{name}] and its keys below it.")
            if name in recipes:
                raise BadRule(path.name, name, f"the quantity is already derived in {recipes[name].file}")
            recipes[name], quantities[name] = _entry(path, name, entry)
    return recipes, quantities


def lookup_for(quantities: Mapping[str, Quantity], limits: Mapping[str, Limit]) -> Mapping[str, Meaning]:
    """Give what each name that an expression may use stands for."""
    meanings = {name: Meaning("number", limit.unit) for name, limit in limits.items()}
    meanings[AUDIT_DATE] = Meaning("number", unit_named("date"))
    for name, quantity in quantities.items():
        sort = "number" if quantity.kind in ("number", "date") else quantity.kind
        meanings[name] = Meaning(sort, quantity.unit, quantity.choices)
    return meanings


def check_recipes(recipes: Mapping[str, Recipe], meanings: Mapping[str, Meaning], functions: Functions) -> None:
    """Refuse recipes with unknown names, wrong units or a circle."""
    checker = UnitCheck(meanings.get, meanings, functions)
    for recipe in recipes.values():
        own = meanings[recipe.name]
        for way in recipe.ways:
            try:
                found = checker.meaning(way.node)
            except BadExpression as error:
                raise BadRule(recipe.file, recipe.name, f"'{way.text}': {error}") from error
            alike = found.sort == own.sort and (own.unit is None or found.unit is None or own.unit.same_as(found.unit))
            if not alike:
                problem = f"'{way.text}' gives {found.described()}, the name says {own.described()}"
                raise BadRule(recipe.file, recipe.name, problem)
        for asked in recipe.ask:
            if asked not in meanings:
                raise BadRule(recipe.file, recipe.name, f"'{asked}' is not a known name{nearest(asked, meanings)}")
    _refuse_circles(recipes)


def _refuse_circles(recipes: Mapping[str, Recipe]) -> None:
    done: set[str] = set()

    def visit(name: str, trail: tuple[str, ...]) -> None:
        if name in done or name not in recipes:
            return
        if name in trail:
            circle = " -> ".join((*trail[trail.index(name) :], name))
            raise BadRule(recipes[name].file, name, f"the recipe needs itself: {circle}")
        for way in recipes[name].ways:
            for used in names_in(way.node):
                visit(used, (*trail, name))
        done.add(name)

    for name in recipes:
        visit(name, ())

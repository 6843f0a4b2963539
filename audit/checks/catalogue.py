"""The catalogue: every rule file read, checked for names and units, and joined with a site's own rules."""

from __future__ import annotations

from collections.abc import Callable, Collection, Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from audit.checks.entry import Check, Requirement, read_entry
from audit.derivation.functions import FUNCTIONS
from audit.derivation.hand_over_facts import HAND_OVER_FACTS
from audit.derivation.recipes import Recipe, check_recipes, lookup_for, read_recipes
from audit.derivation.register_facts import REGISTER_FACTS
from audit.expression.functions import Functions
from audit.expression.nodes import Name, Node, names_in
from audit.expression.parse import BadExpression
from audit.expression.units import Meaning, UnitCheck, nearest
from audit.limits.limits import BadRule, Limit, limit_in_words, override_limits, read_limits, read_rule_file
from audit.rule_folder import rules_folder
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.units import DIMENSIONLESS, UNITS

CORE = "core"
NOT_CHECKS = ("limits.toml", "change_impact.toml")
"""Rule files of other things than checks."""


@dataclass(frozen=True, slots=True)
class SiteChange:
    """A change that a site made to the rules: what, and why."""

    kind: str
    name: str
    was: str
    now: str
    reason: str


@dataclass(frozen=True)
class Catalogue:
    """Checks, recipes, limits and quantities that belong together."""

    checks: tuple[Check, ...]
    recipes: Mapping[str, Recipe]
    limits: Mapping[str, Limit]
    quantities: Mapping[str, Quantity]
    functions: Functions
    changes: tuple[SiteChange, ...] = ()
    pack_evidence: Mapping[str, tuple[str, ...]] = field(default_factory=dict)
    """For each pack the quantities whose presence in a fleet brings it into scope."""

    def packs(self) -> tuple[str, ...]:
        """Give the names of the packs, core first."""
        return tuple(dict.fromkeys((CORE, *(check.pack for check in self.checks))))

    def label_of(self, name: str) -> str:
        """Give what a name reads as: a limit's value, a quantity's label, or the word of a choice."""
        if name in self.limits:
            return limit_in_words(self.limits[name])
        quantity = self.quantities.get(name)
        return quantity.label if quantity else name.replace("_", " ")

    def reads(self, function: str) -> str:
        """Give how a function reads."""
        return self.functions[function].in_words()

    def names_beneath(self, check: Check) -> set[str]:
        """Give every quantity and limit that a check rests on, through all recipes."""
        nodes: list[Node] = [check.when]
        for requirement in check.requirements:
            parts = (requirement.when, requirement.judged, requirement.bound, requirement.within)
            nodes += [node for node in parts if node is not None]
        nodes += [Name(name) for names in check.slips.values() for name in names]
        nodes += [Name(name) for name in (*check.signs, check.beyond) if name is not None]
        found: set[str] = set()
        while nodes:
            for name in set(names_in(nodes.pop())) - found:
                found.add(name)
                if name in self.recipes:
                    nodes += [way.node for way in self.recipes[name].ways]
        return found

    def named(self, name: str) -> list[Check]:
        """Give the checks of this name: one, or one for each setting."""
        return [check for check in self.checks if check.name == name]


def load_catalogue(site_rules: Path | None = None, rules: Path | None = None) -> Catalogue:
    """Read the rules that come with the tool and, if given, the rules of a site."""
    folder = rules or rules_folder()
    limits = read_limits(folder / "limits.toml")
    recipes, derived = read_recipes([folder / "derived"])
    checks: list[Check] = []
    for path in sorted(folder.glob("*.toml")):
        if path.name not in NOT_CHECKS:
            checks += _read_checks(path, CORE, read_rule_file(path))
    evidence: dict[str, tuple[str, ...]] = {}
    for path in sorted((folder / "packs").glob("*.toml")):
        pack = path.stem.replace("-", " ")
        entries = read_rule_file(path)
        evidence[pack] = tuple(entries.pop("in_scope_with", ()))
        checks += _read_checks(path, pack, entries)
    changes: list[SiteChange] = []
    known = {check.name for check in checks}
    if site_rules is not None:
        limits, checks, changes = _site(site_rules, limits, checks)
        more, more_derived = read_recipes([site_rules / "derived"])
        for name in more:
            if name in recipes:
                raise BadRule(more[name].file, name, "the quantity is already derived by the tool's own rules")
        recipes, derived = {**recipes, **more}, {**derived, **more_derived}
    quantities = {**vocabulary().quantities, **REGISTER_FACTS, **HAND_OVER_FACTS, **derived}
    _refuse_clashes(limits, recipes, checks)
    meanings = lookup_for(quantities, limits)
    check_recipes(recipes, meanings, FUNCTIONS)
    known |= {check.name for check in checks}
    for check in checks:
        _check_names_and_units(check, meanings, quantities, limits, known)
    for pack, names in evidence.items():
        for name in names:
            if name not in quantities:
                raise BadRule(pack, "in_scope_with", f"'{name}' is not a known name{nearest(name, quantities)}")
    return Catalogue(tuple(checks), recipes, limits, quantities, FUNCTIONS, tuple(changes), evidence)


def _read_checks(path: Path, pack: str, entries: Mapping[str, Any]) -> list[Check]:
    found: list[Check] = []
    for name, entry in entries.items():
        found += read_entry(path, name, entry, pack)
    return found


def _site(
    folder: Path, limits: Mapping[str, Limit], checks: list[Check]
) -> tuple[dict[str, Limit], list[Check], list[SiteChange]]:
    if not folder.is_dir():
        raise BadRule(str(folder.name), "", "there is no such folder of site rules", "Give a folder of .toml files.")
    changes: list[SiteChange] = []
    result, kept = dict(limits), list(checks)
    for path in sorted(folder.glob("*.toml")):
        entries = read_rule_file(path)
        overrides = _table(path, entries, "limits")
        result = override_limits(result, path, overrides)
        for name, entry in overrides.items():
            was, now = f"{limits[name].value:g}", f"{result[name].value:g}"
            changes.append(SiteChange("limit", name, was, now, str(entry["reason"])))
        for name, reason in _table(path, entries, "switched_off").items():
            if not any(check.name == name for check in kept):
                known = sorted({check.name for check in kept})
                raise BadRule(path.name, "switched_off", f"'{name}' is not a known check{nearest(name, known)}")
            if not isinstance(reason, str) or not reason.strip():
                raise BadRule(path.name, "switched_off", f"'{name}' is switched off without a reason")
            kept = [check for check in kept if check.name != name]
            changes.append(SiteChange("check switched off", name, "on", "off", reason))
        for name, entry in entries.items():
            if any(check.name == name for check in kept):
                raise BadRule(
                    path.name, name, "the tool has a check of this name", "Give the site's check another name."
                )
            added = read_entry(path, name, entry, CORE)
            kept += added
            changes.append(SiteChange("check added", name, "", added[0].severity, added[0].why))
    return result, kept, changes


def _table(path: Path, entries: dict[str, Any], name: str) -> dict[str, Any]:
    table = entries.pop(name, {})
    if not isinstance(table, dict):
        raise BadRule(path.name, name, "this is a table of names", f"Write [{name}] and a line for each below it.")
    return table


def _refuse_clashes(limits: Mapping[str, Limit], recipes: Mapping[str, Recipe], checks: list[Check]) -> None:
    known = {**vocabulary().quantities, **REGISTER_FACTS, **HAND_OVER_FACTS}
    for name in limits:
        if name in known or name in recipes:
            raise BadRule("limits.toml", name, "a limit has the name of a quantity")
    for name, recipe in recipes.items():
        if name in known:
            raise BadRule(recipe.file, name, "a derived quantity has the name of a quantity that the reader gives")
    seen: dict[str, str] = {}
    for check in checks:
        if check.key in seen:
            raise BadRule(check.file, check.name, f"the check is already declared in {seen[check.key]}")
        seen[check.key] = check.file


def _check_names_and_units(
    check: Check,
    meanings: Mapping[str, Meaning],
    quantities: Mapping[str, Quantity],
    limits: Mapping[str, Limit],
    known: Collection[str],
) -> None:
    checker = UnitCheck(meanings.get, meanings, FUNCTIONS)

    def meaning(node: Node, wanted: str) -> Meaning:
        try:
            found = checker.meaning(node)
        except BadExpression as error:
            raise BadRule(check.file, check.name, str(error)) from error
        if wanted and found.sort != wanted:
            raise BadRule(check.file, check.name, f"a {wanted} is wanted, not {found.described()}")
        return found

    meaning(check.when, "truth")
    for requirement in check.requirements:
        if requirement.when is not None:
            meaning(requirement.when, "truth")
        _check_requirement(check, requirement, meaning)
    for name in check.evidence:
        if name not in quantities:
            raise BadRule(check.file, check.name, f"evidence '{name}' is not a known name{nearest(name, quantities)}")
    _check_slips(check, meaning, limits)
    # a check that the site switched off is still known: it is never found
    if check.unless_found is not None and check.unless_found not in known:
        raise BadRule(
            check.file, check.name, f"'{check.unless_found}' is not a check{nearest(check.unless_found, known)}"
        )


def _check_slips(check: Check, meaning: Callable[[Node, str], Meaning], limits: Mapping[str, Limit]) -> None:
    for unit, names in check.slips.items():
        if unit not in UNITS:
            raise BadRule(check.file, check.name, f"'{unit}' of 'slips' is not a known unit{nearest(unit, UNITS)}")
        for name in names:
            factor = meaning(Name(name), "number").unit
            if factor is not None and not factor.same_as(DIMENSIONLESS):
                raise BadRule(check.file, check.name, f"'{name}' of 'slips' is no plain factor")
    for name in (*check.signs, *((check.beyond,) if check.beyond else ())):
        if name not in limits:
            raise BadRule(check.file, check.name, f"'{name}' is not a known limit{nearest(name, limits)}")


def _check_requirement(check: Check, requirement: Requirement, meaning: Any) -> None:
    if requirement.kind == "requires":
        meaning(requirement.bound, "truth")
        return
    judged = meaning(requirement.judged, "truth" if requirement.kind == "must_be" else "")
    if requirement.bound is None:
        return
    bound = meaning(requirement.bound, "")
    if requirement.kind == "equals" and judged.sort != "number":
        alike = bound.sort == judged.sort
    else:
        alike = judged.sort == bound.sort == "number" and judged.unit.same_as(bound.unit)
    if not alike:
        problem = f"{judged.described()} is judged against {bound.described()} ('{requirement.text}')"
        raise BadRule(check.file, check.name, problem)
    if requirement.within is not None and meaning(requirement.within, "number").unit.same_as(judged.unit) is False:
        raise BadRule(check.file, check.name, "'within' is in another unit than the quantity judged")

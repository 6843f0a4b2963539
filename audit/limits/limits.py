"""Read the named limits of the rules and the overrides of a site."""

from __future__ import annotations

import math
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, replace
from pathlib import Path
from typing import Any

from audit.expression.text import plain_number
from audit.expression.units import nearest
from audit.refusal import Refusal
from audit.vocabulary.units import UNITS, Unit, unit_named, unit_of_ending


class BadRule(Refusal):
    """A rule file that is refused: which file, which entry, what is wrong and what to do."""

    def __init__(self, file: str, entry: str, problem: str, advice: str = "") -> None:
        self.file, self.entry, self.problem, self.advice = file, entry, problem, advice
        place = f"{file}, entry [{entry}]" if entry else file
        super().__init__(f"{place}: {problem}.{' ' + advice if advice else ''}")


@dataclass(frozen=True, slots=True)
class Limit:
    """A named constant of the checks."""

    name: str
    value: float
    unit: Unit
    says: str
    source: str
    overridden_from: float | None = None
    override_reason: str = ""


_KEYS = {"value", "unit", "says", "source"}


def limit_in_words(limit: Limit) -> str:
    """Write a limit's value with its unit."""
    text = plain_number(limit.value)
    return f"{text} {limit.unit.symbol}" if limit.unit.symbol else text


def read_rule_file(path: Path) -> dict[str, Any]:
    """Read a TOML file of rules, or refuse it with its name and the place of the fault."""
    if path.stat().st_size > 2_000_000:
        raise BadRule(path.name, "", "the file is larger than a rule file can be", "Give a TOML file below 2 MB.")
    try:
        return tomllib.loads(path.read_text("utf-8"))
    except (tomllib.TOMLDecodeError, UnicodeDecodeError) as error:
        raise BadRule(path.name, "", f"the file is not valid TOML: {error}", "Correct it at that place.") from error
    except RecursionError as error:
        raise BadRule(path.name, "", "brackets are nested too deep", "Write the file in plain tables.") from error


def _number(path: Path, name: str, value: object) -> float:
    if isinstance(value, bool) or not isinstance(value, int | float) or not math.isfinite(value):
        raise BadRule(path.name, name, f"{value!r} is not a finite number", "Write a number.")
    return float(value)


def read_limits(path: Path) -> dict[str, Limit]:
    """Read the limits that come with the rules."""
    limits: dict[str, Limit] = {}
    for name, entry in read_rule_file(path).items():
        if not isinstance(entry, dict):
            raise BadRule(path.name, name, "a limit is a table", f"Write [{name}] with value, says and source.")
        unknown = sorted(set(entry) - _KEYS)
        if unknown:
            raise BadRule(path.name, name, f"'{unknown[0]}' is not a key of a limit{nearest(unknown[0], _KEYS)}")
        lacking = sorted({"value", "says", "source"} - set(entry))
        if lacking:
            raise BadRule(path.name, name, f"'{lacking[0]}' is lacking")
        stated = entry.get("unit")
        if stated is not None and stated not in UNITS:
            raise BadRule(path.name, name, f"'{stated}' is not a known unit{nearest(stated, UNITS)}")
        unit = unit_named(stated) if stated is not None else unit_of_ending(name)
        if unit is None:
            raise BadRule(path.name, name, "the limit has no unit", 'End its name in a unit, or write unit = "1".')
        limits[name] = Limit(name, _number(path, name, entry["value"]), unit, str(entry["says"]), str(entry["source"]))
    return limits


def override_limits(limits: Mapping[str, Limit], path: Path, overrides: Mapping[str, Any]) -> dict[str, Limit]:
    """Put a site's values in place of limits, each written `name = {value = …, reason = "…"}`."""
    result = dict(limits)
    for name, entry in overrides.items():
        if name not in limits:
            raise BadRule(path.name, name, f"'{name}' is not a known limit{nearest(name, limits)}")
        if not isinstance(entry, dict) or set(entry) != {"value", "reason"} or not str(entry["reason"]).strip():
            raise BadRule(path.name, name, "an override has a value and a reason", 'Write {value = …, reason = "…"}.')
        value = _number(path, name, entry["value"])
        result[name] = replace(
            result[name], value=value, overridden_from=limits[name].value, override_reason=str(entry["reason"])
        )
    return result

"""Read the records of several sites, and put side by side what they say."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np

from audit.checks.entry import SEVERITIES
from audit.fleet.fleet import Fleet
from audit.fleet.folding import exact
from audit.report.record.read import Record, read_record
from audit.vocabulary.quantities import Quantity, vocabulary

SAME_TYPE = ("motor_make", "motor_type")
ALIKE = ("rated_power_kw", "rated_voltage_v", "starting_method")
"""Motors of one type are compared where these agree as well."""
APART = 0.05
"""Settings of like motors differ where they lie more than this share apart, currents as multiples of full load."""


@dataclass(frozen=True, slots=True)
class SiteResult:
    """How the audit of one site ended."""

    folder: Path
    """The fleet."""
    out: Path
    site: str
    problem: str
    """Why it could not be audited; '' where it could."""
    record: Record | None


@dataclass(frozen=True, slots=True)
class CommonCheck:
    """A check that finds something at two sites or more."""

    check: str
    function: str
    severity: str
    says: str
    by_site: Mapping[str, int]
    everywhere: bool


@dataclass(frozen=True, slots=True)
class TypeDifference:
    """A setting that sites choose otherwise for the same type of motor."""

    motor_type: str
    quantity: str
    label: str
    unit: str
    """The setting's unit, or '× full load'."""
    by_site: Mapping[str, float]
    """The median of the motors of this type at each site."""
    motors: Mapping[str, int]


@dataclass(frozen=True)
class SitesSummary:
    """Several sites side by side."""

    results: tuple[SiteResult, ...]
    by_severity: Mapping[str, Mapping[str, int]]
    by_function: Mapping[str, Mapping[str, int]]
    """For each function the findings of each site."""
    common: tuple[CommonCheck, ...]
    types: tuple[TypeDifference, ...]

    def sites(self) -> list[str]:
        """Give the sites that were audited."""
        return [result.site for result in self.results if result.record is not None]


def read_result(folder: Path, out: Path, name: str, problem: str) -> SiteResult:
    """Read what the audit of one site left; the name tells sites of one name apart."""
    record = None if problem else read_record(out)
    return SiteResult(folder, out, name, problem, record)


def summarise(results: Sequence[SiteResult]) -> SitesSummary:
    """Put the records of several sites side by side."""
    audited = [(result.site, result.record) for result in results if result.record is not None]
    findings = {site: record.findings() for site, record in audited}
    functions = sorted({finding["function"] for found in findings.values() for finding in found})
    return SitesSummary(
        results=tuple(results),
        by_severity={site: record.content["counts"]["by_severity"] for site, record in audited},
        by_function={
            function: {site: sum(f["function"] == function for f in found) for site, found in findings.items()}
            for function in functions
        },
        common=tuple(_common(findings)),
        types=tuple(_types({site: record.fleet for site, record in audited if record.fleet is not None})),
    )


def _common(findings: Mapping[str, Sequence[Mapping[str, Any]]]) -> Iterator[CommonCheck]:
    if len(findings) < 2:
        return
    counts = {site: Counter(finding["check"] for finding in found) for site, found in findings.items()}
    first = {finding["check"]: finding for found in reversed(list(findings.values())) for finding in found}
    rank = {severity: place for place, severity in enumerate(SEVERITIES)}
    shared = [check for check in first if sum(check in counted for counted in counts.values()) >= 2]
    for check in sorted(
        shared, key=lambda check: (-sum(check in c for c in counts.values()), rank[first[check]["severity"]], check)
    ):
        finding = first[check]
        by_site = {site: counted[check] for site, counted in counts.items() if check in counted}
        everywhere = len(by_site) == len(counts)
        yield CommonCheck(check, finding["function"], finding["severity"], finding["says"], by_site, everywhere)


def _types(fleets: Mapping[str, Fleet]) -> Iterator[TypeDifference]:
    """Compare the settings of motors of the same make and type between sites."""
    members: dict[str, dict[str, list[int]]] = {}
    names: dict[str, str] = {}
    for site, fleet in fleets.items():
        for row, (key, name) in enumerate(_type_keys(fleet)):
            if key:
                members.setdefault(key, {}).setdefault(site, []).append(row)
                names.setdefault(key, name)
    for key, of_site in sorted(members.items()):
        if len(of_site) < 2:
            continue
        for quantity in vocabulary().settings().values():
            if quantity.kind == "number":
                yield from _difference(
                    names[key], quantity, {site: (fleets[site], rows) for site, rows in of_site.items()}
                )


def _type_keys(fleet: Fleet) -> Iterator[tuple[str, str]]:
    columns = fleet.tables["motor"].columns
    size = fleet.rows("motor")
    type_ = columns.get("motor_type")
    for row in range(size):
        if type_ is None or type_.values[row] is None:
            yield "", ""
            continue
        told = [str(columns[name].values[row] or "") for name in SAME_TYPE if name in columns]
        alike = [str(columns[name].values[row]) for name in ALIKE if name in columns]
        yield "|".join([*map(exact, told), *alike]), " ".join(part for part in told if part)


def _difference(
    name: str, quantity: Quantity, of_site: Mapping[str, tuple[Fleet, list[int]]]
) -> Iterator[TypeDifference]:
    current = quantity.unit is not None and quantity.unit.symbol == "A"
    medians: dict[str, float] = {}
    motors: dict[str, int] = {}
    for site, (fleet, rows) in of_site.items():
        values = _settings(fleet, quantity.name, rows, per_full_load=current)
        if len(values):
            medians[site] = float(np.median(values))
            motors[site] = len(values)
    if len(medians) < 2:
        return
    least, greatest = min(medians.values()), max(medians.values())
    if greatest - least > APART * max(abs(greatest), abs(least)):
        unit = "× full load" if current else quantity.unit.symbol if quantity.unit else ""
        yield TypeDifference(name, quantity.name, quantity.label, unit, medians, motors)


def _settings(
    fleet: Fleet, name: str, rows: list[int], *, per_full_load: bool
) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    column = fleet.tables["relay"].columns.get(name) if "relay" in fleet.tables else None
    relays = fleet.parent_rows("motor", "relay")
    if column is None or relays is None:
        return np.empty(0)
    values = np.append(column.values, np.nan)[relays[rows]]
    if per_full_load:
        full_load = fleet.tables["motor"].columns.get("full_load_a")
        values = values / full_load.values[rows] if full_load is not None else np.full(len(rows), np.nan)
    return np.asarray(values[np.isfinite(values)], dtype=np.float64)

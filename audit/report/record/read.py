"""Read the record of an audit back: what was found, and the fleet as it was judged."""

from __future__ import annotations

import gzip
import json
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from datetime import date
from pathlib import Path
from typing import Any

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from audit.fleet.addresses import SheetBook
from audit.fleet.column import NO_CELL, STATED, Column, Integers, Kind
from audit.fleet.fleet import Fleet, InputFile, Table
from audit.refusal import Refusal
from audit.report.record.parts import RECORD_VERSION
from audit.report.record.values import VALUES_FILE, from_runs, from_stepped_runs
from audit.vocabulary.quantities import vocabulary

RECORD_FILE = "findings.json"
READINGS_FILE = "readings.csv.gz"
FIRST_WITH_VALUES = 2
_NUMBER_COLUMNS = {"number": "float64", "value": "float64", "cell": "int64", "row": "int64"}


@dataclass(frozen=True)
class Record:
    """A record that was read."""

    path: Path
    version: int
    audited_on: date
    content: Mapping[str, Any]
    """Everything that findings.json holds."""
    fleet: Fleet | None
    """The fleet as it was judged; None where the record holds no values."""
    verdicts: Mapping[str, str] = field(default_factory=dict)
    """For each check one letter a row."""

    @property
    def site(self) -> str:
        """Give the name of the site."""
        return str(self.content["fleet"])

    def findings(self) -> list[Mapping[str, Any]]:
        """Give the findings as they were recorded."""
        return list(self.content["findings"])


def record_file(path: Path) -> Path | None:
    """Give the findings.json that a path means, or None where it means no record."""
    if path.is_dir():
        inside = path / RECORD_FILE
        return inside if inside.is_file() else None
    return path if path.suffix.casefold() == ".json" and path.is_file() else None


def read_record(path: Path) -> Record:
    """Read the record that stands in a folder or in a findings.json.

    Raises
    ------
    Refusal
        If the file is no record of an audit, or the record of a newer tool.
    """
    file = record_file(path)
    if file is None:
        raise Refusal(f"{path}: there is no {RECORD_FILE} here. Give the folder that an audit wrote into.")
    content = _content(file)
    version = content["record_version"]
    values = file.parent / VALUES_FILE
    fleet: Fleet | None = None
    verdicts: dict[str, str] = {}
    if version >= FIRST_WITH_VALUES and values.is_file():
        fleet, verdicts = _read_values(values, content, file.parent / READINGS_FILE)
    return Record(file, version, date.fromisoformat(content["audited_on"]), content, fleet, verdicts)


def _content(file: Path) -> dict[str, Any]:
    try:
        content = json.loads(file.read_text("utf-8"))
    except (json.JSONDecodeError, UnicodeDecodeError) as error:
        raise Refusal(f"{file}: this is no record of an audit: {error}. Give the findings.json of an audit.") from error
    version = content.get("record_version") if isinstance(content, dict) else None
    if not isinstance(version, int) or isinstance(version, bool):
        raise Refusal(f"{file}: this is no record of an audit: it names no record_version. Give the findings.json.")
    if version > RECORD_VERSION:
        raise Refusal(
            f"{file}: the record is of version {version}; this tool reads versions 1 to {RECORD_VERSION}. "
            "Read it with the newer tool that wrote it, or audit that fleet again."
        )
    lacking = sorted({"audited_on", "fleet", "findings"} - set(content))
    if lacking:
        raise Refusal(f"{file}: the record is not whole: '{lacking[0]}' is lacking. Audit that fleet again.")
    return dict(content)


def _lines(file: Path) -> Iterator[dict[str, Any]]:
    try:
        with gzip.open(file, "rt", encoding="utf-8") as stream:
            for line in stream:
                yield json.loads(line)
    except (OSError, EOFError, json.JSONDecodeError) as error:
        raise Refusal(f"{file}: the values cannot be read: {error}. Audit that fleet again.") from error


def _read_values(file: Path, content: Mapping[str, Any], readings: Path) -> tuple[Fleet, dict[str, str]]:
    keys: dict[str, tuple[str, ...]] = {}
    columns: dict[str, dict[str, Column]] = {}
    links: dict[tuple[str, str], Integers] = {}
    groups: list[tuple[str, Integers]] = []
    verdicts: dict[str, str] = {}
    first: dict[str, Any] = {"sheets": [], "facts": {}}
    for line in _lines(file):
        if "keys" in line:
            keys[line["table"]] = tuple(line["keys"])
            columns[line["table"]] = {}
        elif "quantity" in line:
            columns[line["table"]][line["quantity"]] = _column(line, len(keys[line["table"]]))
        elif "link" in line:
            links[line["link"][0], line["link"][1]] = from_stepped_runs(line["rows"])
        elif "group" in line:
            groups.append((line["group"], from_stepped_runs(line["rows"])))
        elif "check" in line:
            verdicts[line["check"]] = line["verdicts"]
        else:
            first = line
    fleet = Fleet(
        site=str(content["fleet"]),
        tables={subject: Table(subject, keys[subject], columns[subject]) for subject in keys},
        links=links,
        book=SheetBook([(sheet[0], sheet[1]) for sheet in first["sheets"]]),
        inputs=tuple(InputFile(item["file"], item["sha256"], "") for item in content.get("inputs", [])),
        facts=dict(first["facts"]),
        readings=_readings(readings) if readings.is_file() else pd.DataFrame(),
        other_groups=tuple(groups),
    )
    return fleet, verdicts


def _readings(file: Path) -> pd.DataFrame:
    """Read the readings; words like 'NA' stay words."""
    try:
        header = pd.read_csv(file, nrows=0).columns
        kinds = {name: _NUMBER_COLUMNS.get(name, "object") for name in header}
        blanks = {name: [""] for name in header if name in _NUMBER_COLUMNS}
        return pd.read_csv(file, dtype=kinds, keep_default_na=False, na_values=blanks)
    except pd.errors.EmptyDataError:
        return pd.DataFrame()
    except (OSError, EOFError, ValueError) as error:
        raise Refusal(f"{file}: the readings cannot be read: {error}. Audit that fleet again.") from error


def _column(line: Mapping[str, Any], size: int) -> Column:
    kind: Kind = line["kind"]
    quantity = vocabulary().quantities.get(line["quantity"])
    choices = tuple(line.get("choices", ()))
    known = quantity.choices if quantity is not None and quantity.kind == kind else choices
    basis = from_runs(line["basis"]) if "basis" in line else np.full(size, STATED)
    cell = from_stepped_runs(line["cells"]) if "cells" in line else np.full(size, NO_CELL, dtype=np.int64)
    values = _values(kind, line["values"], choices, known)
    return Column(kind, values, basis.astype(np.int8), cell, choices=known)


def _values(kind: Kind, written: Any, choices: tuple[str, ...], known: tuple[str, ...]) -> NDArray[Any]:
    if kind == "truth":
        return np.frombuffer(written.encode("ascii"), dtype=np.uint8).astype(np.int8) - np.int8(ord("0"))
    if kind in ("number", "date"):
        return np.array(_floats(written), dtype=np.float64)
    if kind == "choice":
        # the choices of the tool may have grown since: a word keeps its meaning, its code may not
        places = [known.index(word) if word in known else -1 for word in choices]
        return np.array([*places, -1], dtype=np.int16)[np.array(written, dtype=np.int64)]
    texts = np.empty(len(written), dtype=object)
    texts[:] = written
    return texts


def _floats(written: Iterable[float | str | None]) -> list[float]:
    return [float("nan") if value is None else float(value) for value in written]

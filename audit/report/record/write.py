"""Write the record as a stream: findings, readings and values; the same inputs give the same bytes."""

from __future__ import annotations

import csv
import gzip
import io
import json
from collections.abc import Iterable, Iterator, Mapping
from contextlib import contextmanager
from pathlib import Path
from typing import IO, Any

from audit.findings.audit import Audit
from audit.report.atomic import whole_file
from audit.report.record import parts
from audit.report.record.calculations import CALCULATIONS_FILE, write_calculations
from audit.report.record.values import VALUES_FILE, write_values

CSV_COLUMNS = (
    "severity", "status", "since", "audits", "motor", "service", "bus", "cubicle", "relay", "subject", "name",
    "function", "check", "says", "label", "present", "unit", "low", "high", "range_state", "margin_pct", "because",
    "remedy", "source", "assumptions", "provisional", "setting_group", "file", "sheet", "cell", "key",
)  # fmt: skip
DANGEROUS_FIRST = ("=", "+", "-", "@", "\t", "\r")


def write_record(audit: Audit, folder: Path) -> list[Path]:
    """Write the findings, the readings, the values and the calculations into a folder."""
    folder.mkdir(parents=True, exist_ok=True)
    record = folder / "findings.json"
    with whole_file(record) as stream:
        write_json(audit, stream)
    table = folder / "findings.csv"
    with whole_file(table) as stream:
        _write_csv(parts.findings(audit), stream)
    readings = folder / "readings.csv.gz"
    with whole_file(readings, _gzip) as stream:
        audit.fleet.readings.to_csv(stream, index=False)
    values = folder / VALUES_FILE
    with whole_file(values, _gzip) as stream:
        write_values(audit, stream)
    calculations = folder / CALCULATIONS_FILE
    with whole_file(calculations, _gzip) as stream:
        write_calculations(audit, stream)
    return [record, table, readings, values, calculations]


@contextmanager
def _gzip(path: Path) -> Iterator[IO[str]]:
    # no file name and no time in the header, so that the same readings give the same bytes
    with (
        path.open("wb") as file,
        gzip.GzipFile(filename="", fileobj=file, mode="wb", mtime=0, compresslevel=6) as packed,
        io.TextIOWrapper(packed, encoding="utf-8", newline="") as stream,
    ):
        yield stream


def write_json(audit: Audit, stream: IO[str]) -> None:
    """Write the record part by part, one finding a line."""
    lists: Mapping[str, Iterable[dict[str, Any]]] = {
        "findings": parts.findings(audit),
        "cleared": parts.cleared(audit),
        "setting_changes": parts.setting_changes(audit),
        "trends": parts.trends(audit),
        "unproven": parts.unproven(audit),
        "ranges": parts.ranges(audit),
        "data_to_collect": parts.data_to_collect(audit),
        "complaints": parts.complaints(audit),
        "questions": parts.questions(audit),
    }
    stream.write("{")
    for name, value in parts.head(audit).items():
        stream.write(f"{json.dumps(name)}: {_text(value)},\n")
    for name, items in lists.items():
        stream.write(f"{json.dumps(name)}: [")
        for piece in _separated(items):
            stream.write(piece)
        stream.write("],\n")
    stream.write(f'"per_check": {_text(parts.per_check(audit))}}}\n')


def _text(value: object) -> str:
    return json.dumps(value, ensure_ascii=False, allow_nan=False)


def _separated(items: Iterable[dict[str, Any]]) -> Iterator[str]:
    for number, item in enumerate(items):
        yield f"{',' if number else ''}\n{_text(item)}"


def _write_csv(findings: Iterable[dict[str, Any]], stream: IO[str]) -> None:
    writer = csv.DictWriter(stream, CSV_COLUMNS, extrasaction="ignore", lineterminator="\n")
    writer.writeheader()
    for finding in findings:
        first = finding["cells"][0] if finding["cells"] else {"file": "", "sheet": "", "cell": ""}
        row = {**finding, **first, "assumptions": "; ".join(finding["assumptions"])}
        writer.writerow({name: harmless(row[name]) for name in CSV_COLUMNS})


def harmless(value: object) -> object:
    """Keep text taken from inputs from becoming a formula where the table is opened in a spreadsheet program.

    >>> harmless("=HYPERLINK(1)"), harmless(-3.5)
    ("'=HYPERLINK(1)", -3.5)
    """
    if isinstance(value, str) and value.startswith(DANGEROUS_FIRST):
        return f"'{value}"
    return "" if value is None else value

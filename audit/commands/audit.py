"""The main job as a command."""

from __future__ import annotations

import re
import sys
from collections.abc import Sequence
from datetime import date
from pathlib import Path

from audit.checks.entry import SEVERITIES
from audit.commands.consoles import progress_console, table_console
from audit.findings.audit import Audit
from audit.pipeline import audit_path, since_record
from audit.refusal import Refusal
from audit.report.record.read import read_record
from audit.report.record.write import write_json, write_record
from audit.report.terminal.show import show_audit
from audit.report.workbook.write import write_workbooks


def run_audit(
    fleet: Path,
    *,
    out: Path | None,
    rules: Path | None,
    packs: Sequence[str],
    fail_on: str | None,
    as_json: bool,
    everything: bool,
    audited_on: date | None,
    previous: Path | None = None,
) -> int:
    """Audit one fleet, print and write; give the exit status."""
    if fail_on is not None and fail_on not in SEVERITIES:
        raise Refusal(f"--fail-on '{fail_on}' is not a severity. Accepted: {', '.join(SEVERITIES)}.")
    progress = progress_console()
    earlier = read_record(previous) if previous is not None else None
    with progress.status("reading", spinner="line") as status:
        result = audit_path(
            fleet,
            site_rules=rules,
            packs=packs,
            audited_on=audited_on,
            progress=lambda text: status.update(text) if progress.is_terminal else None,
        )
        if earlier is not None:
            result = since_record(result, earlier)
        if as_json:
            write_json(result, sys.stdout)
            return _status(result, fail_on)
        status.update("writing")
        written = write_outputs(result, fleet, out or Path(f"audit-{file_name(result.fleet.site)}"))
    show_audit(result, table_console(), written, everything=everything)
    return _status(result, fail_on)


def write_outputs(result: Audit, fleet: Path, out: Path) -> list[Path]:
    """Write the record and the annotated workbooks."""
    if out.resolve() == (fleet if fleet.is_dir() else fleet.parent).resolve():
        raise Refusal(
            f"--out {out}: that is the folder of the inputs, which are never written to. Give another folder."
        )
    written = write_record(result, out)
    for workbook in write_workbooks(result, out):
        if workbook.remark:
            progress_console().print(workbook.remark)
        if workbook.path.exists():
            written.append(workbook.path)
    return written


def file_name(site: str) -> str:
    """Make a site's name fit for a folder.

    >>> file_name("Lime works / North")
    'lime-works-north'
    """
    return re.sub(r"[^a-z0-9]+", "-", site.casefold()).strip("-") or "site"


def _status(result: Audit, fail_on: str | None) -> int:
    if fail_on is None:
        return 0
    counts = result.by_severity()
    names: list[str] = [*SEVERITIES]
    return 1 if any(counts[severity] for severity in names[: names.index(fail_on) + 1]) else 0

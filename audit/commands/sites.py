"""Several sites in one go: each audited in a process of its own, so that a bad one never stops the others."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from collections.abc import Sequence
from concurrent.futures import ThreadPoolExecutor
from datetime import date
from pathlib import Path

from audit.commands.audit import file_name
from audit.commands.consoles import progress_console, table_console
from audit.report.record.read import RECORD_FILE, record_file
from audit.report.sites.summary import SiteResult, read_result, summarise
from audit.report.sites.write import sites_part, write_sites
from audit.report.terminal.sites import show_sites

OWN_PREFIX = "motor-audit: "


def run_sites(
    fleets: Sequence[Path],
    *,
    out: Path | None,
    rules: Path | None,
    packs: Sequence[str],
    fail_on: str | None,
    as_json: bool,
    everything: bool,
    audited_on: date | None,
    previous: Path | None,
) -> int:
    """Audit several sites; give 2 where one could not be audited, 1 where one has findings at or above a severity."""
    folder = out or Path("audit-sites")
    names = site_names(fleets)
    options = [*(["--rules", str(rules)] if rules else []), *(word for pack in packs for word in ("--pack", pack))]
    options += [*(["--fail-on", fail_on] if fail_on else []), *(["--on", audited_on.isoformat()] if audited_on else [])]
    jobs = [
        _Job(fleet, name, folder / name, [*options, *_previous(previous, name)])
        for fleet, name in zip(fleets, names, strict=True)
    ]
    progress = progress_console()
    with progress.status(f"auditing {len(jobs)} sites", spinner="line"), ThreadPoolExecutor(os.cpu_count()) as pool:
        ended = list(pool.map(_audited, jobs))
    summary = summarise([result for result, _ in ended])
    written = write_sites(summary, folder)
    if as_json:
        json.dump(sites_part(summary), sys.stdout, ensure_ascii=False, allow_nan=False, indent=1)
        sys.stdout.write("\n")
    else:
        show_sites(summary, table_console(), written, everything=everything)
    return max(status for _, status in ended)


class _Job:
    """One site to be audited."""

    def __init__(self, fleet: Path, name: str, out: Path, options: Sequence[str]) -> None:
        self.fleet, self.name, self.out = fleet, name, out
        self.options = options


def site_names(fleets: Sequence[Path]) -> list[str]:
    """Give each site a name of its own, fit for a folder.

    >>> site_names([Path("north/works"), Path("south/works"), Path("quarry.xlsx")])
    ['works', 'works-2', 'quarry']
    """
    names: list[str] = []
    for fleet in fleets:
        base = file_name(fleet.resolve().stem if fleet.suffix else fleet.resolve().name)
        name, number = base, 2
        while name in names:
            name = f"{base}-{number}"
            number += 1
        names.append(name)
    return names


def _previous(previous: Path | None, name: str) -> list[str]:
    """Find the record of a site below the folder of an earlier run over several sites."""
    if previous is None or record_file(previous / name) is None:
        return []
    return ["--previous", str(previous / name)]


def _audited(job: _Job) -> tuple[SiteResult, int]:
    """Audit one site in a process of its own, and read what it left."""
    (job.out / RECORD_FILE).unlink(missing_ok=True)
    command = [sys.executable, "-c", "from audit.cli import main; main()", "audit", str(job.fleet)]
    environment = {**os.environ, "PYTHONPATH": os.pathsep.join(path for path in sys.path if path)}
    ended = subprocess.run(
        [*command, "--out", str(job.out), *job.options], env=environment, capture_output=True, text=True, check=False
    )
    if ended.returncode in (0, 1) and (job.out / RECORD_FILE).is_file():
        return read_result(job.fleet, job.out, job.name, ""), ended.returncode
    said = [line for line in ended.stderr.splitlines() if line.strip()]
    reason = said[-1].removeprefix(OWN_PREFIX) if said else f"the audit ended with status {ended.returncode}"
    return read_result(job.fleet, job.out, job.name, reason), 2

"""The close-out as a command: read what came back, judge it, sort it, write the record and the workbook to sign."""

from __future__ import annotations

import shutil
import tempfile
from collections.abc import Callable
from datetime import UTC, date, datetime, timedelta
from pathlib import Path

import numpy as np

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.commands.audit import file_name
from audit.commands.consoles import progress_console, table_console
from audit.findings.accepted import read_deviations
from audit.findings.accepting import with_accepted
from audit.findings.audit import Audit
from audit.findings.closeout.matching import match
from audit.findings.closeout.returned import read_returned
from audit.findings.closeout.sort import CloseOut, close_out
from audit.findings.closeout.states import Export
from audit.findings.closeout.substitute import with_as_left
from audit.findings.handover.rows import work_rows
from audit.findings.render import FindingRenderer
from audit.fleet.addresses import unpack
from audit.fleet.fleet import Fleet
from audit.intake import Gathered, gather, resolve
from audit.intake.later_export import LaterExport, gather_with_export
from audit.intake.opening import find_workbooks
from audit.intake.sitemap import NAME as SITE_MAP
from audit.pipeline import audit_fleet
from audit.refusal import Refusal
from audit.report.closeout.record import write_closeout_record
from audit.report.closeout.terminal import show_closeout
from audit.report.closeout.workbook import write_closeout_workbook
from audit.report.workbook.sheets.work import judged_from, stamp

Tell = Callable[[str], None]


def run_closeout(
    returned: Path, fleet: Path, *, settings: Path | None, out: Path | None, rules: Path | None, on: date | None
) -> int:
    """Close out one hand-over, print and write; give the exit status: 1 where something is not closed."""
    progress = progress_console()
    with progress.status("reading", spinner="line") as status:

        def tell(text: str) -> None:
            status.update(text)

        result = close_out_of(returned, fleet, settings=settings, rules=rules, on=on or date.today(), tell=tell)
        folder = out or Path(f"closeout-{file_name(result.before.fleet.site)}")
        if folder.resolve() == (fleet if fleet.is_dir() else fleet.parent).resolve():
            raise Refusal(f"--out {folder}: that is the folder of the inputs, which are never written to.")
        tell("writing")
        written = [write_closeout_record(result, folder), write_closeout_workbook(result, folder)]
    show_closeout(result, table_console(), written)
    return 0 if result.is_closed() else 1


def close_out_of(
    returned: Path, fleet: Path, *, settings: Path | None, rules: Path | None, on: date, tell: Tell
) -> CloseOut:
    """Read, judge and sort."""
    tell(f"reading {returned.name}")
    sheet = read_returned(returned)
    catalogue = load_catalogue(rules)
    gathered = _gathered(fleet, returned, settings, tell)
    before_fleet = resolve(gathered)
    tell("judging the fleet as it was")
    before = with_accepted(_audit(before_fleet, catalogue, on), read_deviations(fleet))
    work = work_rows(before, FindingRenderer(before).all())
    matches = match(work, sheet, stamp(before, work), {row.key: judged_from(row) for row in work})
    later = None
    if settings is not None:
        later = gather_with_export(fleet, settings, [returned], tell)
    tell("judging the fleet as it was left")
    base = later.gathered if later is not None else gathered
    base_fleet = resolve(base) if later is not None else before_fleet
    read_files = later.files if later is not None else ()
    after_fleet = resolve(with_as_left(base, base_fleet, matches.rows, read_files))
    after = _audit(after_fleet, catalogue, on)
    export = _export(later, after.fleet) if later is not None else None
    return close_out(before, after, matches, (sheet.file, sheet.sha256), export)


def _audit(fleet: Fleet, catalogue: Catalogue, on: date) -> Audit:
    return audit_fleet(fleet, catalogue, audited_on=on)


def _gathered(fleet: Path, returned: Path, settings: Path | None, tell: Tell) -> Gathered:
    """Read the site without what came back, should that lie in its folder."""
    own = find_workbooks(fleet) if fleet.is_dir() else []
    foreign = [file for file in own if any(_is(file, other) for other in (returned, settings))]
    if not foreign:
        return gather(fleet, tell)
    with tempfile.TemporaryDirectory() as scratch:
        folder = Path(scratch) / fleet.name
        folder.mkdir()
        for file in [*(file for file in own if file not in foreign), fleet / SITE_MAP]:
            if file.is_file():
                shutil.copyfile(file, folder / file.name)
        return gather(folder, tell)


def _is(file: Path, other: Path | None) -> bool:
    return other is not None and other.is_file() and file.samefile(other)


def _export(later: LaterExport, fleet: Fleet) -> Export:
    """Give the day of each relay that the later export holds: its own, else that of its file."""
    table = fleet.tables["relay"]
    own = table.columns.get("settings_export_date")
    by_file = dict(zip(later.files, later.days, strict=True))
    readings = fleet.readings[(fleet.readings["subject"] == "relay").to_numpy()]
    sheets, rows = unpack(readings["cell"].to_numpy())[0], readings["row"].to_numpy()
    days: dict[str, date] = {}
    for number, (file, _) in enumerate(fleet.book.sheets):
        if file not in by_file:
            continue
        for row in np.unique(rows[sheets == number]).tolist():
            key = table.keys[row]
            days[key] = max(by_file[file], days.get(key, by_file[file]))
            if own is not None and own.values[row] == own.values[row]:
                days[key] = (datetime(1970, 1, 1, tzinfo=UTC) + timedelta(days=float(own.values[row]))).date()
    return Export(later.files, days, later.day_from)

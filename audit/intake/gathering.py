"""All workbooks of a site to readings: open, find the tables, read them, ask what is open."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from audit.fleet.fleet import Complaint, InputFile
from audit.intake.candidates import Candidate, candidates_of
from audit.intake.gathered import CannotRead, Gathered, SheetReading
from audit.intake.layouts.across import find_across, read_across
from audit.intake.layouts.anchors import owner_of_sheet
from audit.intake.layouts.block import read_block
from audit.intake.layouts.change_log import read_change_log
from audit.intake.layouts.long import read_long
from audit.intake.layouts.points import read_points
from audit.intake.layouts.wide import read_wide
from audit.intake.opening import UnreadableWorkbook, find_workbooks, open_workbook
from audit.intake.recognition.blocks import frame
from audit.intake.recognition.decimal_mark import decimal_mark
from audit.intake.recognition.dual_voltage import choose_by_bus
from audit.intake.recognition.row_kinds import rows_in_words
from audit.intake.recognition.sheets import Sheet
from audit.intake.recognition.source import Source
from audit.intake.recognition.tables import table_of
from audit.intake.run import Run
from audit.intake.site_answers import mark_must_run, plans_of_map
from audit.intake.sitemap import load_site_map

Progress = Callable[[str], None]


def gather(path: Path, progress: Progress | None = None) -> Gathered:
    """Read all workbooks of a folder, or one workbook, to readings.

    Raises
    ------
    CannotRead
        If nothing can be judged: no workbook could be read, none holds a motor list, `fleet.toml` is wrong.
    """
    tell = progress or (lambda text: None)
    if not path.exists():
        raise CannotRead(_nothing(path, "there is no such file or folder", "a folder of workbooks, or a workbook"))
    folder = path if path.is_dir() else path.parent
    run = Run(load_site_map(folder))
    files = find_workbooks(path)
    if not files:
        raise CannotRead(
            _nothing(path, "the folder holds no workbook", "workbooks: .xlsx .xlsm .xls .xlsb .ods .csv .tsv")
        )
    candidates: list[Candidate] = []
    for file in files:
        tell(f"reading {file.name}")
        candidates += _candidates(file, run)
    if not run.inputs:
        raise CannotRead(run.complaints[0])
    _ensure_motor_list(candidates, path, run)
    tell("recognising tables")
    for candidate in sorted(candidates, key=Candidate.order):
        _read(candidate, run)
    choose_by_bus(run.readings, run.complaints, run.book)
    mark_must_run(run)
    site = run.map.site or (path.name if path.is_dir() else path.stem)
    facts = {**run.map.facts, "site": site}
    return Gathered(
        site,
        facts,
        run.book,
        tuple(run.inputs),
        frame(run.readings),
        run.complaints,
        run.questions,
        run.columns,
        run.sheets,
    )


def _nothing(path: Path, found: str, expected: str, advice: str = "Check the path.") -> Complaint:
    return Complaint(path.name, "", "", found, expected, advice, weight="stop")


def _candidates(file: Path, run: Run) -> list[Candidate]:
    """Open a workbook and look at each of its sheets."""
    try:
        workbook = open_workbook(file)
    except UnreadableWorkbook as error:
        run.complaints.append(Complaint(file.name, "", "", error.found, error.expected, error.advice, weight="stop"))
        return []
    run.inputs.append(InputFile(file.name, workbook.sha256, str(file)))
    found: list[Candidate] = []
    for grid in workbook.sheets:
        # sheets are numbered as they stand in their files, whatever the order of reading
        run.book.index(file.name, grid.name)
        found += candidates_of(file.name, grid, run.map.sheet(file.name, grid.name))
    return found


def _ensure_motor_list(candidates: list[Candidate], path: Path, run: Run) -> None:
    """Let the best sheet with tags be the motor list where no sheet is one; refuse where none can be."""
    if any(candidate.table == "motor" for candidate in candidates):
        return
    offers = [
        (verdict.score, index, verdict)
        for index, candidate in enumerate(candidates)
        if candidate.heading and (verdict := table_of(candidate.heading, settings_make_list=True)) is not None
        if verdict.table == "motor"
    ]
    if offers:
        _, index, verdict = max(offers, key=lambda offer: (offer[0], -offer[1]))
        candidates[index].verdict = verdict
        candidates[index].layout = "wide"
        return
    found, wanted = "no sheet holds a list of motors", "a sheet with a tag and rated data for each motor"
    advice = "Name the sheet, its header row and its columns in fleet.toml."
    raise CannotRead(_nothing(path, found, wanted, advice))


def _read(candidate: Candidate, run: Run) -> None:
    """Read one sheet by its layout."""
    grid = candidate.grid
    source = Source(
        candidate.file,
        grid.name,
        grid.decimal_comma if grid.decimal_comma is not None else decimal_mark(grid),
        run.map.stand_ins,
        run.map.zero_means_off,
        run.map.day_first,
        run.complaints,
        run.questions,
    )
    sheet = Sheet(grid, run.book.index(candidate.file, grid.name), source, run.records, mapped=candidate.mapped)
    if not _by_layout(candidate, sheet, run):
        source.remark(-1, "no table was recognised on this sheet", "a table with headers", "It is left unread.")
        return
    _say_hidden(sheet)
    run.readings += sheet.readings
    run.columns += sheet.columns
    row, depth = candidate.header_rows
    table = candidate.table or "motor"
    run.sheets.append(SheetReading(candidate.file, grid.name, table, candidate.layout, row, depth))


def _by_layout(candidate: Candidate, sheet: Sheet, run: Run) -> bool:
    mapped = candidate.mapped
    relay, group = (mapped.relay, mapped.group) if mapped else ("", "")
    if candidate.layout == "long" and candidate.listed:
        owner = None if relay or candidate.listed.names_owner else owner_of_sheet(sheet, run.tags)
        return read_long(sheet, candidate.listed, group, relay, owner)
    if candidate.layout == "block":
        across = find_across(sheet.grid, run.tags)
        if across is not None and not relay:
            return read_across(sheet, across, group)
        return read_block(sheet, run.tags, relay, group)
    if candidate.layout == "points" and candidate.points:
        motors, fuses = run.records_named("motor"), run.records_named("fuse")
        return read_points(sheet, candidate.points, motors, fuses, run.full_load_a())
    if candidate.layout == "log" and candidate.log:
        return read_change_log(sheet, candidate.log, run.records_named("motor"), run.records_named("bus_name"))
    if candidate.layout == "wide" and candidate.heading and candidate.verdict:
        verdict = candidate.verdict
        columns = plans_of_map(candidate.heading, verdict, mapped, sheet.source)
        return read_wide(sheet, candidate.heading, verdict.table, verdict.matches, candidate.last_row, columns, group)
    return False


def _say_hidden(sheet: Sheet) -> None:
    """Tell of hidden rows, columns and sheets, which are read like others."""
    grid, source = sheet.grid, sheet.source
    if grid.hidden:
        source.remark(-1, "the sheet is hidden", "sheets that are shown", "It is read like the others.")
    if grid.hidden_rows:
        source.remark(-1, f"{rows_in_words(sorted(grid.hidden_rows))} hidden", "rows that are shown", "They are read.")
    if grid.hidden_columns:
        source.remark(-1, f"{len(grid.hidden_columns)} columns are hidden", "columns that are shown", "They are read.")
    for note in grid.notes:
        source.remark(-1, note, "a workbook whose cells can be told fully")

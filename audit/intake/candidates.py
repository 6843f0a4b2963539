"""Which layout a sheet has, which table it holds, and where one table ends and the next begins."""

from __future__ import annotations

from dataclasses import dataclass, replace

from audit.intake.layouts.block import is_block
from audit.intake.layouts.change_log import LogHeading, find_change_log
from audit.intake.layouts.long import LongHeading, find_long_heading, long_heading_at
from audit.intake.layouts.points import PointsHeading, find_points
from audit.intake.opening import SheetGrid
from audit.intake.recognition.header_rows import Heading, find_heading, heading_at, same_heading
from audit.intake.recognition.tables import Verdict, table_of
from audit.intake.sitemap import MappedSheet

ORDER = ("wide", "long", "points", "log", "block", "")
"""Lists come first: points, logs and blocks are understood by the tags that lists name."""
WIDE_ENOUGH = 4.0
"""A list of settings has a relay, a group, perhaps a tag in common with wide tables; those have more."""
FEWEST_HEADERS = 3
MOST_LOOKS = 200


@dataclass
class Candidate:
    """A sheet, or a part of one, with the layout found on it and the table its headers fit."""

    file: str
    grid: SheetGrid
    mapped: MappedSheet | None
    last_row: int
    layout: str = ""
    heading: Heading | None = None
    verdict: Verdict | None = None
    listed: LongHeading | None = None
    points: PointsHeading | None = None
    log: LogHeading | None = None

    @property
    def table(self) -> str:
        """Give the table that the sheet holds, '' for none and for what is added to rows of other tables."""
        if self.layout == "wide":
            return self.verdict.table if self.verdict else ""
        return "relay" if self.layout in ("long", "block") else ""

    def order(self) -> float:
        """Give the place in the order of reading; a list that names no relay waits for those that do."""
        waits = self.layout == "long" and self.listed is not None and not self.listed.names_owner
        return ORDER.index("log") + 0.5 if waits else float(ORDER.index(self.layout))

    @property
    def header_rows(self) -> tuple[int, int]:
        """Give the first header row and the number of header rows, zeros where there are none."""
        if self.layout == "wide" and self.heading:
            return self.heading.first_row, self.heading.depth
        found = {"long": self.listed, "points": self.points, "log": self.log}.get(self.layout)
        return (found.row, 1) if found else (0, 0)


def candidates_of(file: str, grid: SheetGrid, mapped: MappedSheet | None) -> list[Candidate]:
    """Find the tables of a sheet; the site map rules."""
    if not grid.height or (mapped and mapped.table == "none"):
        return []
    candidate = Candidate(file, grid, mapped, grid.height)
    wanted = mapped.layout if mapped else ""
    if wanted in ("", "wide"):
        if mapped and mapped.header_row:
            candidate.heading = heading_at(grid, mapped.header_row, mapped.header_rows)
        else:
            candidate.heading = find_heading(grid)
        candidate.verdict = _verdict(candidate.heading, mapped)
    sure = candidate.verdict is not None and candidate.verdict.score >= WIDE_ENOUGH
    if not sure and wanted != "wide":
        _look_for_lists(candidate, wanted)
    if not candidate.layout and candidate.verdict is not None:
        candidate.layout = "wide"
        return _parts(candidate)
    if not candidate.layout and (wanted == "block" or (not wanted and is_block(grid))):
        candidate.layout = "block"
    return [candidate]


def _verdict(heading: Heading | None, mapped: MappedSheet | None) -> Verdict | None:
    if heading is None:
        return None
    verdict = table_of(heading)
    if mapped and mapped.table and (verdict is None or verdict.table != mapped.table):
        return Verdict(mapped.table, WIDE_ENOUGH, heading.matches(mapped.table))
    return verdict


def _look_for_lists(candidate: Candidate, wanted: str) -> None:
    grid, mapped = candidate.grid, candidate.mapped
    if wanted in ("", "long") and not (mapped and mapped.table not in ("", "relay")):
        row = mapped.header_row if mapped and wanted else 0
        candidate.listed = long_heading_at(grid, row) if row else find_long_heading(grid)
    if wanted in ("", "points") and not candidate.listed:
        candidate.points = find_points(grid)
    if wanted in ("", "log") and not candidate.listed and not candidate.points:
        candidate.log = find_change_log(grid)
    for layout, found in (("long", candidate.listed), ("points", candidate.points), ("log", candidate.log)):
        if found:
            candidate.layout = layout


def _parts(candidate: Candidate) -> list[Candidate]:
    """Part a sheet on which one table stands below another."""
    parts = [candidate]
    if candidate.mapped and candidate.mapped.header_row:
        return parts
    grid = candidate.grid
    heading = candidate.heading
    assert heading is not None
    looks = 0
    row = heading.first_data_row + 1
    while row <= grid.height and looks < MOST_LOOKS:
        if _could_be_headers(grid, row) and not _filled(grid, row - 1) and not same_heading(grid, row, heading):
            looks += 1
            following = find_heading(grid, row, row + 1)
            verdict = table_of(following) if following else None
            if following and verdict and len(following.texts) >= FEWEST_HEADERS:
                parts[-1].last_row = following.first_row - 1
                parts.append(replace(candidate, heading=following, verdict=verdict, last_row=grid.height))
                heading = following
                row = following.first_data_row
        row += 1
    return parts


def _filled(grid: SheetGrid, row: int) -> bool:
    """Tell whether a row holds more than a title."""
    return sum(value is not None for value in grid.rows[row - 1]) > 1


def _could_be_headers(grid: SheetGrid, row: int) -> bool:
    values = [value for value in grid.rows[row - 1] if value is not None]
    return len(values) >= FEWEST_HEADERS and all(isinstance(value, str) for value in values)

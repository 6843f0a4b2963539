"""Several sites as plain data, and as a workbook."""

from __future__ import annotations

import json
from dataclasses import asdict
from pathlib import Path
from typing import Any

from openpyxl import Workbook

from audit.cautions import CAUTIONS
from audit.checks.entry import SEVERITIES
from audit.report.atomic import whole_file
from audit.report.record.parts import tool_version
from audit.report.sites.summary import SitesSummary
from audit.report.workbook.sheets.layout import new_sheet, page, table, title

SITES_VERSION = 1
HEADING = "Several sites"


def sites_part(summary: SitesSummary) -> dict[str, Any]:
    """Give the whole summary as plain data."""
    return {
        "sites_version": SITES_VERSION,
        "tool_version": tool_version(),
        "cautions": list(CAUTIONS),
        "sites": [
            {
                "site": result.site,
                "fleet": str(result.folder),
                "record": str(result.out) if result.record is not None else None,
                "problem": result.problem,
                "audited_on": result.record.audited_on.isoformat() if result.record is not None else None,
                "counts": result.record.content["counts"] if result.record is not None else None,
            }
            for result in summary.results
        ],
        "by_function": summary.by_function,
        "common_checks": [asdict(one) for one in summary.common],
        "same_type_other_settings": [asdict(one) for one in summary.types],
    }


def write_sites(summary: SitesSummary, folder: Path) -> list[Path]:
    """Write sites.json and sites.xlsx."""
    record, workbook = folder / "sites.json", folder / "sites.xlsx"
    with whole_file(record) as stream:
        json.dump(sites_part(summary), stream, ensure_ascii=False, allow_nan=False, indent=1)
        stream.write("\n")
    _book(summary).save(workbook)
    return [record, workbook]


def _book(summary: SitesSummary) -> Workbook:
    book = Workbook()
    book.remove(book.worksheets[0])
    sites = summary.sites()

    def sheet(name: str, below: str, headings: list[str], widths: list[float], rows: list[list[object]]) -> None:
        created = new_sheet(book, name)
        table(created, title(created, name, below), headings, widths, rows)
        page(created, HEADING)

    sheet(
        "Sites",
        "findings by severity; a site that could not be audited says why",
        ["site", "motors", *SEVERITIES, "unproven", "could not be audited"],
        [30, 10, 10, 10, 12, 12, 10, 70],
        [_site_row(summary, place) for place in range(len(summary.results))],
    )
    sheet(
        "Functions",
        "findings by function and site",
        ["function", *sites],
        [12, *[16] * len(sites)],
        [[function, *(of[site] or "" for site in sites)] for function, of in summary.by_function.items()],
    )
    sheet(
        "Common",
        "checks that find something at two sites or more",
        ["check", "function", "severity", "everywhere", "says", *sites],
        [40, 10, 12, 11, 60, *[14] * len(sites)],
        [
            [one.check, one.function, one.severity, "yes" if one.everywhere else "", one.says,
             *(one.by_site.get(site, "") for site in sites)]
            for one in summary.common
        ],
    )  # fmt: skip
    sheet(
        "Same type, other settings",
        "medians of the motors of one make and type at each site; currents as multiples of full load",
        ["motor type", "setting", "unit", *sites],
        [34, 44, 12, *[14] * len(sites)],
        [
            [one.motor_type, one.label, one.unit, *(_rounded(one.by_site.get(site)) for site in sites)]
            for one in summary.types
        ],
    )
    return book


def _site_row(summary: SitesSummary, place: int) -> list[object]:
    result = summary.results[place]
    if result.record is None:
        return [result.site, "", *[""] * len(SEVERITIES), "", result.problem]
    counts = result.record.content["counts"]
    return [result.site, counts["motors"], *(counts["by_severity"][s] for s in SEVERITIES), counts["unproven"], ""]


def _rounded(value: float | None) -> object:
    return "" if value is None else float(f"{value:.4g}")

"""The cover of a comparison: what was compared, what was supposed, counts, cautions, sign-off."""

from __future__ import annotations

from openpyxl.worksheet.worksheet import Worksheet

from audit.cautions import CAUTIONS
from audit.findings.comparison import Comparison
from audit.report.record.parts import tool_version
from audit.report.workbook.sheets.cover import pairs, sign_off
from audit.report.workbook.sheets.layout import page, title

ROLES = ("prepared", "checked", "approved", "cleared for energising")


def write_cover(comparison: Comparison, sheet: Worksheet) -> None:
    """Write the cover sheet."""
    site = comparison.after.fleet.site
    heading = "Change as supposed" if comparison.supposed else "Change of the plant"
    row = title(sheet, f"{heading}: motor protection · {site}", "to be attached to the management-of-change form")
    for column, width in zip("ABCD", (26, 22, 52, 40), strict=True):
        sheet.column_dimensions[column].width = width
    row = pairs(sheet, row, "Compared", _compared(comparison))
    if comparison.supposed:
        told = [
            (f"{one.subject} {one.name}", f"{one.label}: {one.supposed} (read: {one.was})")
            for one in comparison.supposed
        ]
        row = pairs(sheet, row, "Supposed, not read", told)
    row = pairs(sheet, row, "In short", _counts(comparison))
    if comparison.notices:
        row = pairs(sheet, row, "Notes", [("", notice) for notice in comparison.notices])
    row = pairs(sheet, row, "Cautions", [("", caution) for caution in CAUTIONS])
    for word, audit in (("before", comparison.before), ("after", comparison.after)):
        hashes = [(item.file, f"sha256 {item.sha256}") for item in audit.fleet.inputs]
        row = pairs(sheet, row, f"Input files {word}", hashes)
    sign_off(sheet, row, ROLES)
    page(sheet, site, pages_high=1)


def _compared(comparison: Comparison) -> list[tuple[str, str]]:
    told = []
    for word, audit, source in zip(
        ("before", "after"), (comparison.before, comparison.after), comparison.sources, strict=True
    ):
        motors = audit.fleet.rows("motor")
        told.append((word, f"{source}; {motors:,} motors; judged as of {audit.audited_on.isoformat()}"))
    packs = ", ".join(comparison.after.packs_in_scope)
    return [*told, ("packs in scope", packs), ("rules", tool_version())]


def _counts(comparison: Comparison) -> list[tuple[str, str]]:
    by_hand = sum(not one.names for one in comparison.looked_at)
    looked = sum(len(one.names) for one in comparison.looked_at)
    touched = {(one.subject, one.name) for one in comparison.touched}
    return [
        ("changed", f"{len(comparison.changed):,} data and settings, {len(comparison.rows):,} added or removed"),
        ("findings", ", ".join(f"{number:,} {word}" for word, number in comparison.standing_counts().items())),
        ("touched", f"{len(touched):,} without a change of their own (sheet 'Touched')"),
        ("no longer provable", f"{len(comparison.no_longer_provable):,} verdicts"),
        ("looked at", f"{looked:,} verdicts, {by_hand:,} things to be looked at by hand (sheet 'Looked at')"),
    ]

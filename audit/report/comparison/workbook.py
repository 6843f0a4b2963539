"""The comparison as a workbook to be attached to a management-of-change form."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from pathlib import Path

from openpyxl import Workbook
from openpyxl.cell import Cell
from openpyxl.worksheet.worksheet import Worksheet

from audit.findings.comparison import Comparison
from audit.findings.comparison.changes import Change
from audit.findings.comparison.looked_at import LookedAt
from audit.findings.comparison.standing import FindingChange
from audit.findings.comparison.steps import chain_words
from audit.fleet.addresses import Place
from audit.report.comparison.cover import write_cover
from audit.report.workbook.sheets.layout import FILLS, LETTERS, fill, new_sheet, page, table, title

COVER, CHANGED, FINDINGS = "Change", "Changed", "Findings"
TOUCHED, PROOFS, LOOKED_AT = "Touched", "No longer provable", "Looked at"
MOST_NAMES = 40
ARROW = "\n-> "


def write_workbook(comparison: Comparison, target: Path) -> None:
    """Write the workbook."""
    book = Workbook()
    book.remove(book.worksheets[0])
    site = comparison.after.fleet.site

    def sheet(name: str) -> Worksheet:
        return new_sheet(book, name)

    write_cover(comparison, sheet(COVER))
    _changed(comparison, sheet(CHANGED))
    _findings(comparison, sheet(FINDINGS))
    _touched(comparison, sheet(TOUCHED))
    _proofs(comparison, sheet(PROOFS))
    _looked_at(comparison, sheet(LOOKED_AT))
    for written in book.worksheets:
        if written.title != COVER:
            page(written, site)
    book.save(target)


def _cell(place: Place | None) -> str:
    return f"{place.file}\n{place.sheet}!{place.cell}" if place else ""


def _changed(comparison: Comparison, sheet: Worksheet) -> None:
    row = title(sheet, "Changed", "every datum and setting that says something else, with both values and cells")
    rows: list[Sequence[object]] = [
        (one.subject, one.name, one.motor if one.subject != "motor" else "", one.kind, "", "", one.bus, "", "")
        for one in comparison.rows
    ]
    rows += [_change_row(change) for change in comparison.changed]
    rows += [
        ("motor", starts.motor, "", "recorded starts", "", starts.words(), "", "", "") for starts in comparison.starts
    ]
    headings = ("of", "name", "motor", "what", "before", "after", "note", "cell before", "cell after")
    table(sheet, row, headings, (8, 18, 14, 40, 16, 16, 30, 28, 28), rows)


def _change_row(change: Change) -> Sequence[object]:
    note: str = "" if change.kind == "changed" else change.kind
    if change.follows:
        note = f"its cell says what it said; follows {', '.join(change.follows).replace('_', ' ')}"
    return (
        change.subject,
        change.name,
        change.motor if change.subject != "motor" else "",
        change.label,
        change.before_text,
        change.after_text,
        note,
        _cell(change.before_cell),
        _cell(change.after_cell),
    )


def _findings(comparison: Comparison, sheet: Worksheet) -> None:
    row = title(sheet, "Findings", "new, worse, no longer provable, still there, better, gone; a gone one says why")
    headings = ("standing", "", "of", "motor", "function", "what is wrong", "before", "after", "margin before, %",
                "margin after, %", "why gone", "check")  # fmt: skip
    found = list(comparison.findings)
    table(sheet, row, headings, (14, 4, 16, 12, 8, 40, 44, 44, 10, 10, 20, 34), (_finding_row(one) for one in found))
    for offset, finding in enumerate(found, start=1):
        cell = sheet.cell(row=row + offset, column=2)
        assert isinstance(cell, Cell)
        fill(cell, FILLS[finding.severity])


def _finding_row(finding: FindingChange) -> Sequence[object]:
    return (
        finding.standing,
        LETTERS[finding.severity],
        finding.name,
        finding.motor if finding.motor != finding.name else "",
        finding.function,
        finding.says,
        finding.before_text,
        finding.after_text,
        _tenth(finding.margin_before_pct),
        _tenth(finding.margin_after_pct),
        finding.why_gone,
        finding.check,
    )


def _tenth(value: float | None) -> object:
    return "" if value is None else round(value, 1)


def _touched(comparison: Comparison, sheet: Worksheet) -> None:
    below = f"nothing of their own on the chain changed; figures count from a move of {comparison.share_pct:g} % on"
    row = title(sheet, "Touched by changes of others", below)
    rows = (
        (
            one.name,
            one.motor if one.motor != one.name else "",
            one.move.function,
            one.what,
            one.before_text,
            one.after_text,
            ARROW.join(chain_words(one.chain)),
            one.further or "",
        )
        for one in comparison.touched
    )
    headings = ("of", "motor", "function", "what moved", "before", "after", "because", "further changes")
    table(sheet, row, headings, (16, 12, 8, 40, 16, 16, 80, 10), rows)


def _proofs(comparison: Comparison, sheet: Worksheet) -> None:
    row = title(sheet, "No longer provable, and provable now", "verdicts lost for want of a datum, and verdicts won")
    rows = [
        (one.name, LETTERS[one.severity], one.check, one.says, one.before, one.after, "; ".join(one.lacking),
         ARROW.join(chain_words(one.chain)))
        for one in (*comparison.no_longer_provable, *comparison.provable_now)
    ]  # fmt: skip
    headings = ("of", "", "check", "says", "before", "after", "lacking", "because")
    table(sheet, row, headings, (16, 4, 34, 44, 14, 14, 40, 60), rows)


def _looked_at(comparison: Comparison, sheet: Worksheet) -> None:
    below = "what a change of this kind asks to look at again, with the verdict it has now; sign before energising"
    row = title(sheet, "Looked at", below)
    headings = ("change", "of", "shown by", "at", "check", "verdict", "which", "what to do", "why", "initials", "date")
    widths = (26, 14, 26, 14, 34, 14, 44, 24, 44, 10, 11)
    table(sheet, row, headings, widths, _looked_rows(comparison.looked_at))


def _looked_rows(entries: Iterable[LookedAt]) -> Iterator[Sequence[object]]:
    for one in entries:
        parts = [one.names[at : at + MOST_NAMES] for at in range(0, len(one.names), MOST_NAMES)] or [()]
        for names in parts:
            yield (
                one.change_says, one.name, ", ".join(one.shown_by), one.at, one.check, one.verdict,
                ", ".join(names), one.action, one.why, "", "",
            )  # fmt: skip

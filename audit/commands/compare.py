"""The comparison as a command."""

from __future__ import annotations

import json
import sys
from collections.abc import Sequence
from datetime import date
from pathlib import Path

from audit.checks.catalogue import Catalogue, load_catalogue
from audit.commands.audit import file_name
from audit.commands.consoles import progress_console, table_console
from audit.commands.sides import Side, judge_sides, read_side, read_supposed
from audit.findings.comparison import Comparison, compare
from audit.findings.comparison.suppose import read_supposition
from audit.pipeline import Progress
from audit.refusal import Refusal
from audit.report.comparison.parts import comparison_part
from audit.report.comparison.write import write_comparison
from audit.report.terminal.comparison import show_comparison


def run_compare(
    before: Path,
    after: Path | None,
    *,
    suppose: Sequence[str],
    out: Path | None,
    rules: Path | None,
    packs: Sequence[str],
    share_pct: float,
    as_json: bool,
    everything: bool,
    audited_on: date | None,
) -> int:
    """Compare two states of a fleet, print and write; give the exit status."""
    if share_pct < 0:
        raise Refusal(f"--share {share_pct:g} is below nought. Give per cent, for example 1.")
    catalogue = load_catalogue(rules)
    progress = progress_console()
    with progress.status("reading", spinner="line") as status:
        tell = status.update if progress.is_terminal else None
        sides = _sides(before, after, suppose, catalogue, audited_on or date.today(), tell)
        result = _compared(sides, catalogue, packs, share_pct)
    if as_json:
        json.dump(comparison_part(result), sys.stdout, ensure_ascii=False, allow_nan=False, indent=1)
        sys.stdout.write("\n")
        return 0
    folder = out or Path(f"compare-{file_name(result.after.fleet.site)}")
    if any(
        folder.resolve() == (path if path.is_dir() else path.parent).resolve() for path in (before, after or before)
    ):
        raise Refusal(f"--out {folder}: inputs stand there, which are never written to. Give another folder.")
    show_comparison(result, table_console(), write_comparison(result, folder), everything=everything)
    return 0


def _sides(
    before: Path,
    after: Path | None,
    suppose: Sequence[str],
    catalogue: Catalogue,
    today: date,
    tell: Progress | None,
) -> tuple[Side, Side]:
    suppositions = [read_supposition(text) for text in suppose]
    if after is None:
        if not suppositions:
            raise Refusal("compare wants BEFORE and AFTER, or one FLEET and at least one --set.")
        return read_supposed(before, suppositions, catalogue, today, tell)
    if suppositions:
        raise Refusal("--set goes with one FLEET: what is supposed is compared with what is.")
    return read_side(before, today, tell), read_side(after, today, tell)


def _compared(sides: tuple[Side, Side], catalogue: Catalogue, packs: Sequence[str], share_pct: float) -> Comparison:
    audits, notices = judge_sides(sides, catalogue, packs)
    if audits[0].audited_on > audits[1].audited_on:
        notices.append("the side given first is the later one: read 'new' as 'no longer' and the other way round")
    return compare(
        audits[0],
        audits[1],
        share_pct=share_pct,
        supposed=sides[1].supposed,
        notices=notices,
        sources=(f"{sides[0].path} ({sides[0].kind()})", f"{sides[1].path} ({sides[1].kind()})"),
    )

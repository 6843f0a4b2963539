"""The site map as text: what was understood of the workbooks, written down so that the site can correct it."""

from __future__ import annotations

import json
import tomllib
from collections.abc import Iterable, Mapping
from pathlib import Path
from typing import Any

from audit.fleet.fleet import Question
from audit.intake.gathered import ColumnReading, Gathered, SheetReading

EMPTY_MAP = """\
# Facts of the site, and how its workbooks are to be read. Everything here rules over what is found.

# site = "Name of the site"
# code = "IEC"                      # or "NFPA 70"
# audit_interval_days = 365
# packs = []                        # packs of checks to run besides those that the data call for
# must_run = []                     # tags of fire pumps and other motors that must run to destruction
# stand_ins_for_off = []            # numbers that stand for off in settings, such as 999
# zero_means_off = true             # a pickup of 0 means that the function is off
# day_first = true                  # 03/04/25 is 3 April
"""
_FACTS = (
    "site",
    "code",
    "audit_interval_days",
    "packs",
    "must_run",
    "stand_ins_for_off",
    "zero_means_off",
    "day_first",
)
_HINTS = {
    "code": '# code = "IEC"                      # or "NFPA 70"',
    "audit_interval_days": "# audit_interval_days = 365",
    "packs": "# packs = []",
    "must_run": "# must_run = []                     # tags of motors that must run to destruction, fire pumps say",
    "stand_ins_for_off": "# stand_ins_for_off = []            # numbers that stand for off in settings, such as 999",
    "zero_means_off": "# zero_means_off = true             # a pickup of 0 means that the function is off",
    "day_first": "# day_first = true                  # 03/04/25 is 3 April",
}


def save_map(gathered: Gathered, path: Path) -> None:
    """Write `fleet.toml` from a reading; facts that an earlier one states are kept, its map of sheets is replaced."""
    earlier: dict[str, Any] = {}
    if path.is_file():
        earlier = tomllib.loads(path.read_text("utf-8-sig"))
    written = path.with_name(path.name + ".part")
    written.write_text(map_text(gathered, earlier), "utf-8")
    written.replace(path)


def map_text(gathered: Gathered, facts: Mapping[str, Any] | None = None) -> str:
    """Give the text of a `fleet.toml` for a reading."""
    stated = {"site": gathered.site, **(facts or {})}
    lines = [
        "# How the workbooks of this site were understood. Correct what is wrong: this file rules from now on.",
        "# Lines that begin with # are not in force: questions, columns left unread, facts not stated.",
        "",
    ]
    for name in _FACTS:
        lines.append(f"{name} = {_toml(stated[name])}" if name in stated else _HINTS[name])
    for sheet in gathered.sheets:
        lines += ["", *_sheet(gathered, sheet)]
    recognised = {(sheet.file, sheet.sheet) for sheet in gathered.sheets}
    for file, name in gathered.book.sheets:
        if (file, name) not in recognised:
            lines += ["", "# No table was recognised here:", "# [[sheet]]"]
            lines += [f"# file = {_toml(file)}", f"# sheet = {_toml(name)}"]
            lines += ['# table = "none"                   # or motor, relay, bus, start, with header_row']
    return "\n".join(lines) + "\n"


def _sheet(gathered: Gathered, sheet: SheetReading) -> list[str]:
    lines = ["[[sheet]]", f"file = {_toml(sheet.file)}", f"sheet = {_toml(sheet.sheet)}"]
    lines += [f"table = {_toml(sheet.table)}", f"layout = {_toml(sheet.layout)}"]
    if sheet.header_row:
        lines += [f"header_row = {sheet.header_row}", f"header_rows = {sheet.header_rows}"]
    questions = [q for q in gathered.questions if (q.file, q.sheet) == (sheet.file, sheet.sheet)]
    columns = [c for c in gathered.columns if (c.file, c.sheet) == (sheet.file, sheet.sheet)]
    heads = {column.cell for column in columns}
    for question in questions:
        if question.cell not in heads:
            lines += _question(question)
    for column in columns:
        about = [question for question in questions if question.cell == column.cell]
        lines += _column(column, sheet.layout, about)
    return lines


def _question(question: Question) -> list[str]:
    return _comment(f"Question, cell {question.cell}: {question.about}. {question.ask}", "")


def _column(column: ColumnReading, layout: str, questions: Iterable[Question]) -> list[str]:
    """Give the entry of a column; of one that is not read the entry stands as a comment."""
    letters = column.cell.rstrip("0123456789")
    place = [f"column = {_toml(letters)}"] if layout == "wide" and letters else []
    entry = [*place, f"header = {_toml(' '.join(column.header.split()))}"]
    sample = f"# such as: {column.sample}" if column.sample else ""
    lines = [""]
    asked = list(questions)
    if column.quantity:
        entry.append(f"quantity = {_toml(column.quantity)}")
        entry += [f"unit = {_toml(column.unit)}"] if column.unit else []
        entry += [f"base = {_toml(column.base)}"] if column.base else []
        if sample:
            lines += _comment(sample[2:], "  ")
        return [*lines, "  [[sheet.column]]", *("  " + line for line in entry)]
    for question in asked:
        lines += _comment(f"Question: {question.about}. {question.ask}", "  ")
    answers = [answer for question in asked for answer in question.answers]
    proposed = column.how.partition("proposed: ")[2]
    guess = proposed or (answers[0] if answers else "")
    others = f"   # or {', '.join(answers[1:])}" if len(answers) > 1 else ""
    lines += _comment("Not read" + (f"; much like {proposed}" if proposed else ""), "  ")
    if sample:
        lines += _comment(sample[2:], "  ")
    return [
        *lines,
        "  # [[sheet.column]]",
        *("  # " + line for line in entry),
        f"  # quantity = {_toml(guess)}{others}",
    ]


def _comment(text: str, indent: str) -> list[str]:
    plain = " ".join("".join(c if c.isprintable() else " " for c in text).split())
    return [f"{indent}# {plain}"]


def _toml(value: object) -> str:
    """Spell a value in TOML; a JSON string is a TOML string but for the delete character.

    >>> _toml('a "b"'), _toml(True), _toml([1.5, "x"])
    ('"a \\\\"b\\\\""', 'true', '[1.5, "x"]')
    """
    if isinstance(value, list):
        return "[" + ", ".join(_toml(item) for item in value) + "]"
    return json.dumps(value, ensure_ascii=False).replace("\x7f", "\\u007F")

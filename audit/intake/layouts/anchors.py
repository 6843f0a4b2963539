"""Cells that say whose settings stand below or beside them: the relay, its motor, the setting group."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass

from audit.fleet.folding import exact
from audit.intake.celltext import cell_text
from audit.intake.layouts.setting_names import match_setting
from audit.intake.opening import SheetGrid
from audit.intake.recognition.folding import fold_header
from audit.intake.recognition.header_rows import SEARCHED_ROWS
from audit.intake.recognition.matching import match_header
from audit.intake.recognition.sheets import Sheet

FARTHEST_TAG = 4
LONGEST_NAME = 70
_LABEL = re.compile(
    r"(?P<what>relay(?: tag| id| no\.?| name)?|ied|protection relay|motor(?: tag| id| no\.?)?|tag(?: no\.?)?|"
    r"equipment tag|feeder|setting group|group)\s*[:=]\s*(?P<text>\S.*)",
    re.IGNORECASE | re.DOTALL,
)
_GENERAL_NAME = re.compile(
    r"(?:sheet|tabelle|table|feuil|hoja|blad)\s*\d*|settings?(?: list| data| sheet)?|relay settings?|relays?|data|"
    r"parameters?|protection(?: settings?)?|page \d+",
    re.IGNORECASE,
)
_PIECE_ENDS = " ,:;()[]{}'\"/–—-"


@dataclass(frozen=True)
class Anchor:
    """A cell that says whose settings follow: kind is 'relay', 'motor' or 'group'."""

    row: int
    column: int
    kind: str
    text: str
    cell: tuple[int, int]


def find_anchors(
    grid: SheetGrid, tags: Mapping[str, tuple[str, str]], is_value: Callable[[int, int], bool]
) -> list[Anchor]:
    """Find the cells that say whose settings follow."""
    found: list[Anchor] = []
    for row in range(1, grid.height + 1):
        for column in range(1, grid.width + 1):
            value = grid.rows[row - 1][column - 1]
            if not isinstance(value, str) or (is_value(row, column)):
                continue
            text = cell_text(value)
            if not text or len(text) > LONGEST_NAME:
                continue
            found += _anchors_in(grid, row, column, text, tags)
    return found


def _anchors_in(grid: SheetGrid, row: int, column: int, text: str, tags: Mapping[str, tuple[str, str]]) -> list[Anchor]:
    match = _LABEL.fullmatch(text)
    if match:
        kind = _kind(match["what"])
        return [Anchor(row, column, kind, _known_or_whole(match["text"], tags, kind), (row, column))]
    kind = _kind(text.strip(" :=")) if _is_label(text) else ""
    if kind:
        for place in range(column + 1, min(column + FARTHEST_TAG, grid.width) + 1):
            beside = cell_text(grid.rows[row - 1][place - 1])
            if beside:
                return [Anchor(row, column, kind, _known_or_whole(beside, tags, kind), (row, place))]
        return []
    if match_setting("", text).known:
        return []
    return [Anchor(row, column, kind, spelled, (row, column)) for kind, spelled in tags_within(text, tags)]


def _is_label(text: str) -> bool:
    folded = text.strip(" :=")
    if fold_header(folded) in ("setting group", "group", "active group"):
        return True
    return match_header(folded, "relay").quantity in ("relay_tag", "motor") or fold_header(folded) in (
        "tag",
        "feeder",
    )


def _kind(label: str) -> str:
    folded = fold_header(label)
    if "group" in folded.split():
        return "group"
    if folded.split()[0] in ("motor", "tag", "equipment", "feeder"):
        return "motor"
    return "relay" if match_header(label, "relay").quantity != "motor" else "motor"


def _known_or_whole(text: str, tags: Mapping[str, tuple[str, str]], kind: str) -> str:
    """Give the known tag within a text, else its first line."""
    for known, spelled in tags_within(text, tags):
        if known == kind:
            return spelled
    return text.split("\n")[0].strip()


def tags_within(text: str, tags: Mapping[str, tuple[str, str]]) -> list[tuple[str, str]]:
    """Give the known tags that a text names as whole words, longest first.

    >>> tags_within("Settings of R-101 (P-101 A)", {"r-101": ("relay", "R-101"), "p-101 a": ("motor", "P-101 A")})
    [('motor', 'P-101 A'), ('relay', 'R-101')]
    """
    words = text.replace("\n", " ").split(" ")
    found: list[tuple[str, str]] = []
    for length in range(min(4, len(words)), 0, -1):
        for start in range(len(words) - length + 1):
            piece = exact(" ".join(words[start : start + length]).strip(_PIECE_ENDS))
            if piece in tags and tags[piece] not in found:
                found.append(tags[piece])
    return found


def sheet_tag(sheet: Sheet, tags: Mapping[str, tuple[str, str]]) -> str:
    """Give the relay that the name of a sheet, or else of its file, stands for."""
    name = sheet.grid.name
    within = tags_within(name, tags)
    if within:
        return within[0][1]
    stem = sheet.source.file.rpartition(".")[0]
    if _GENERAL_NAME.fullmatch(name.strip()):
        within = tags_within(stem, tags)
        return within[0][1] if within else stem
    return name.strip()


def known_tags(texts: Iterable[tuple[str, str]]) -> dict[str, tuple[str, str]]:
    """Give the tags by which headings are understood; a tag of both kinds counts as the relay's."""
    tags: dict[str, tuple[str, str]] = {}
    for kind, text in texts:
        if text and (exact(text) not in tags or kind == "relay"):
            tags[exact(text)] = (kind, text)
    return tags


def owner_of_sheet(sheet: Sheet, tags: Mapping[str, tuple[str, str]]) -> Anchor | None:
    """Give whose settings a whole sheet holds: named above them, else by the name of the sheet or file."""
    anchors = [
        anchor
        for anchor in find_anchors(sheet.grid, tags, lambda row, _: row > SEARCHED_ROWS)
        if anchor.kind != "group"
    ]
    if anchors:
        return min(anchors, key=lambda anchor: (anchor.kind != "relay", anchor.row, anchor.column))
    name = sheet_tag(sheet, tags)
    kind = tags.get(exact(name), ("relay", name))[0]
    return Anchor(0, 0, kind, name, (0, 0)) if name else None

"""Tags of rows and cells found in the bytes of a sheet, with their numbers where the sheet leaves them out."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from functools import lru_cache
from typing import NamedTuple

from audit.fleet.addresses import a1, column_number
from audit.report.workbook.patch.refusal import CannotPatch

INSIDE_TAG = rb"[^>\"']*(?:(?:\"[^\"]*\"|'[^']*')[^>\"']*)*"
_ANY_TAG = re.compile(rb"<(/?)([^\s/>]+)(" + INSIDE_TAG + rb")>")
_ATTRIBUTE = re.compile(rb"([^\s=]+)(\s*=\s*)(\"[^\"]*\"|'[^']*')")
_REFERENCE = re.compile(rb"([A-Za-z]{1,3})([0-9]+)")


class Tag(NamedTuple):
    """An opening tag `data[start:after]`; its element ends at `end`; `empty` ones end with the tag itself."""

    number: int
    start: int
    after: int
    end: int
    attributes: bytes
    empty: bool


class Source(NamedTuple):
    """Where to look: the bytes of a sheet, the prefix of its elements, and whether elements may nest."""

    data: bytes
    prefix: bytes
    nested: bool


def attribute(attributes: bytes, name: bytes) -> bytes | None:
    """Value of an attribute without a prefix.

    >>> attribute(b' r="A1" s="3"', b"s")
    b'3'
    """
    for found, _, quoted in _ATTRIBUTE.findall(attributes):
        if found == name:
            return bytes(quoted[1:-1])
    return None


def with_attribute(attributes: bytes, name: bytes, value: bytes | None) -> bytes:
    """Attributes with one of them set, or taken out where the value is None; all else as it stands.

    >>> with_attribute(b' r="A1" t="s"', b"s", b"7"), with_attribute(b" s='1'", b"s", None)
    (b' r="A1" t="s" s="7"', b'')
    """
    for found in _ATTRIBUTE.finditer(attributes):
        if found[1] == name:
            if value is None:
                return attributes[: found.start()].rstrip() + attributes[found.end() :]
            return attributes[: found.start(3)] + b'"' + value + b'"' + attributes[found.end(3) :]
    if value is None:
        return attributes
    return attributes.rstrip() + b" " + name + b'="' + value + b'"'


def rows(source: Source, start: int, end: int) -> Iterator[Tag]:
    """Rows of a sheet in their order; a row without a number follows the one before."""
    number = 0
    for tag in _elements(source, b"row", start, end):
        stated = attribute(tag.attributes, b"r") or _row_of_first_cell(source, tag)
        number = int(stated) if stated and stated.isdigit() else number + 1
        yield tag._replace(number=number)


def cells(source: Source, row: Tag) -> Iterator[Tag]:
    """Cells of a row in their order; a cell without an address stands right of the one before."""
    if row.empty:
        return
    number = 0
    for tag in _elements(source, b"c", row.after, content_end(source, row)):
        stated = attribute(tag.attributes, b"r")
        reference = _REFERENCE.fullmatch(stated.strip()) if stated else None
        number = _column(reference[1]) if reference else number + 1
        yield tag._replace(number=number)


def cells_by_address(source: Source, row: Tag, columns: Sequence[int]) -> list[Tag] | None:
    """Cells of some columns found by their address, as it is usually written; None where one is not found so."""
    if source.nested:
        return None
    data = source.data
    opening, _ = _patterns(source.prefix + b"c")
    found = []
    for column in columns:
        start = data.find(b'<%bc r="%b"' % (source.prefix, a1(row.number, column).encode()), row.after, row.end)
        tag = opening.match(data, start, row.end) if start >= 0 else None
        if tag is None:
            return None
        empty = tag[1].endswith(b"/")
        attributes = tag[1][:-1] if empty else tag[1]
        found.append(Tag(column, start, tag.end(), tag.end(), attributes, empty))
    return found


def content_end(source: Source, row: Tag) -> int:
    """Where the closing tag of a row begins."""
    return row.end if row.empty else source.data.rindex(b"</", row.after, row.end)


def _row_of_first_cell(source: Source, row: Tag) -> bytes | None:
    if row.empty:
        return None
    for tag in _elements(source, b"c", row.after, content_end(source, row)):
        reference = _REFERENCE.fullmatch(attribute(tag.attributes, b"r") or b"")
        return bytes(reference[2]) if reference else None
    return None


@lru_cache(maxsize=20_000)
def _column(letters: bytes) -> int:
    return column_number(letters.decode("ascii"))


def _elements(source: Source, local: bytes, start: int, end: int) -> Iterator[Tag]:
    name = source.prefix + local
    if source.nested:
        yield from (tag for found, tag in _nested_elements(source.data, start, end) if found == name)
        return
    data = source.data
    opening, closing = _patterns(name)
    while found := opening.search(data, start, end):
        attributes = found[1]
        empty = attributes.endswith(b"/")
        start = found.end()
        if empty:
            attributes = attributes[:-1]
        else:
            close = closing.search(data, start, end)
            if close is None:
                raise CannotPatch("a sheet is cut short within a row")
            start = close.end()
        yield Tag(0, found.start(), found.end(), start, attributes, empty)


@lru_cache(maxsize=64)
def _patterns(name: bytes) -> tuple[re.Pattern[bytes], re.Pattern[bytes]]:
    name = re.escape(name)
    return re.compile(rb"<" + name + rb"(?=[\s/>])(" + INSIDE_TAG + rb")>"), re.compile(rb"</" + name + rb"\s*>")


def _nested_elements(data: bytes, start: int, end: int) -> Iterator[tuple[bytes, Tag]]:
    """Direct children of what lies between two positions, found by counting how deep each tag lies."""
    depth = 0
    opened: re.Match[bytes] | None = None
    for found in _ANY_TAG.finditer(data, start, end):
        if found[1]:
            depth -= 1
            if depth == 0 and opened is not None:
                yield opened[2], Tag(0, opened.start(), opened.end(), found.end(), opened[3], False)
        elif found[3].endswith(b"/"):
            if depth == 0:
                yield found[2], Tag(0, found.start(), found.end(), found.end(), found[3][:-1], True)
        else:
            if depth == 0:
                opened = found
            depth += 1
    if depth:
        raise CannotPatch("a sheet is cut short within a row")

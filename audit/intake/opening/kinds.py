"""Find out what a file is from its first bytes and its content, whatever its name says."""

from __future__ import annotations

import io
import zipfile
from enum import StrEnum
from pathlib import Path

from audit.intake.opening.compound import SIGNATURE, CompoundFile, DamagedCompoundFile
from audit.intake.opening.grids import UnreadableWorkbook

EXPECTED = "a workbook (.xlsx, .xlsm, .xls, .xlsb, .ods) or a table as text (.csv, .tsv)"
TEXT_SUFFIXES = frozenset({".csv", ".tsv", ".txt"})
WORKBOOK_SUFFIXES = frozenset({".xlsx", ".xlsm", ".xls", ".xlsb", ".ods"})
OPEN_DOCUMENT_SHEET = b"application/vnd.oasis.opendocument.spreadsheet"

KNOWN_OTHERS = (
    (b"%PDF", "a PDF document"),
    (b"\x89PNG", "a picture"),
    (b"\xff\xd8\xff", "a picture"),
    (b"GIF8", "a picture"),
    (b"Rar!", "a RAR archive"),
    (b"7z\xbc\xaf", "a 7z archive"),
    (b"\x1f\x8b", "a gzip archive"),
    (b"{\\rtf", "a rich-text document"),
    (b"SQLite format 3\0", "a database"),
)
SAVE_AS_WORKBOOK = "Save the table as .xlsx in the program it comes from, then run again."


class FileKind(StrEnum):
    """Kinds of files that can be read."""

    XLSX = "xlsx"
    XLSB = "xlsb"
    XLS = "xls"
    ODS = "ods"
    TEXT = "text"


def recognise(path: Path, data: bytes) -> FileKind:
    """Kind of a file, or a refusal that says what it is instead."""
    if not data:
        raise UnreadableWorkbook(path, "the file is empty (0 bytes)", EXPECTED, "Ask for the file again.")
    if data.startswith(b"PK"):
        return _kind_of_archive(path, data)
    if data.startswith(SIGNATURE):
        return _kind_of_compound(path, data)
    for start, name in KNOWN_OTHERS:
        if data.startswith(start):
            raise UnreadableWorkbook(path, f"this is {name}", EXPECTED, SAVE_AS_WORKBOOK)
    head = data[:4096].lstrip(b"\xef\xbb\xbf \t\r\n").lower()
    if head.startswith((b"<html", b"<!doctype", b"<table", b"<?xml", b"<workbook")):
        name = "a web page" if b"<html" in head or b"<table" in head else "an XML document"
        raise UnreadableWorkbook(path, f"this is {name}", EXPECTED, SAVE_AS_WORKBOOK)
    if not _looks_like_text(data):
        raise UnreadableWorkbook(
            path,
            "this is not a workbook, or its beginning is damaged",
            EXPECTED,
            "Open it in a spreadsheet program; if that works, save it as .xlsx, else ask for it again.",
        )
    if path.suffix.lower() not in TEXT_SUFFIXES:
        raise UnreadableWorkbook(
            path,
            f"the name says {path.suffix or 'nothing'}, but the file is plain text",
            EXPECTED,
            "If it is a table with separators, rename it to .csv; else save it as .xlsx.",
        )
    return FileKind.TEXT


def _looks_like_text(data: bytes) -> bool:
    head = data[:65536]
    if head.startswith((b"\xff\xfe", b"\xfe\xff")):
        return True
    if b"\0" in head:
        # UTF-16 without its mark: every other byte of plain western text is zero
        even, odd = head[0::2].count(0), head[1::2].count(0)
        return max(even, odd) > 0.4 * len(head) / 2 and min(even, odd) == 0
    odd_controls = sum(head.count(bytes([code])) for code in range(32) if code not in b"\t\n\v\f\r\x1a")
    return odd_controls == 0


def _kind_of_archive(path: Path, data: bytes) -> FileKind:
    try:
        with zipfile.ZipFile(io.BytesIO(data)) as archive:
            names = set(archive.namelist())
            mimetype = b""
            if "mimetype" in names and archive.getinfo("mimetype").file_size < 200:
                mimetype = archive.read("mimetype")
            manifest = b""
            if "META-INF/manifest.xml" in names and archive.getinfo("META-INF/manifest.xml").file_size < 2**20:
                manifest = archive.read("META-INF/manifest.xml")
    except (zipfile.BadZipFile, zipfile.LargeZipFile, EOFError, ValueError, RuntimeError, OSError) as error:
        raise damaged(path, str(error)) from error
    except (NotImplementedError, KeyError, IndexError, OverflowError) as error:
        raise damaged(path, str(error)) from error
    if mimetype.startswith(OPEN_DOCUMENT_SHEET):
        if b"encryption-data" in manifest:
            raise encrypted(path)
        return FileKind.ODS
    lowered = {name.lower() for name in names}
    if any(name.endswith("workbook.bin") for name in lowered):
        return FileKind.XLSB
    if "[content_types].xml" in lowered and any(name.startswith("word/") for name in lowered):
        raise UnreadableWorkbook(path, "this is a text document", EXPECTED, SAVE_AS_WORKBOOK)
    if "[content_types].xml" in lowered and any(name.startswith("ppt/") for name in lowered):
        raise UnreadableWorkbook(path, "this is a presentation", EXPECTED, SAVE_AS_WORKBOOK)
    if "[content_types].xml" in lowered:
        return FileKind.XLSX
    if not names:
        raise UnreadableWorkbook(path, "this is an empty archive", EXPECTED, "Ask for the file again.")
    raise UnreadableWorkbook(
        path,
        "this is an archive of files, not a workbook",
        EXPECTED,
        "Unpack it and give the workbook in it.",
    )


def _kind_of_compound(path: Path, data: bytes) -> FileKind:
    try:
        names = CompoundFile(data).names
    except DamagedCompoundFile as error:
        raise damaged(path, str(error)) from error
    if "EncryptedPackage" in names:
        raise encrypted(path)
    if names & {"Workbook", "Book", "WORKBOOK", "BOOK"}:
        return FileKind.XLS
    what = "a text document" if "WordDocument" in names else "a document of another program"
    raise UnreadableWorkbook(path, f"this is {what}", EXPECTED, SAVE_AS_WORKBOOK)


def damaged(path: Path, detail: str) -> UnreadableWorkbook:
    """Refusal of a file that was cut short or altered on its way."""
    return UnreadableWorkbook(
        path,
        f"the workbook is damaged or was cut short ({detail})",
        "a complete workbook",
        "Ask for the file again, or open it in a spreadsheet program, let it repair it, and save it anew.",
    )


def encrypted(path: Path) -> UnreadableWorkbook:
    """Refusal of a file that needs a password."""
    return UnreadableWorkbook(
        path,
        "the workbook is encrypted with a password",
        "a workbook that opens without one",
        "Open it with its password, save a copy without, and give the copy.",
    )

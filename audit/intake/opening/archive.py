"""Look at an archive before any reader opens it: sizes, names, and what its parts may not contain."""

from __future__ import annotations

import io
import zipfile
import zlib
from collections.abc import Iterator
from pathlib import Path

from audit.intake.opening.bounds import (
    LARGE_PART_BYTES,
    MAXIMUM_PART_BYTES,
    MAXIMUM_PARTS,
    MAXIMUM_UNPACKED_BYTES,
    MEGABYTE,
    SUSPECT_RATIO,
)
from audit.intake.opening.grids import UnreadableWorkbook
from audit.intake.opening.kinds import damaged

CHUNK_BYTES = 4 * MEGABYTE
MARKUP_SUFFIXES = (".xml", ".rels", ".vml")
FORBIDDEN = ("<!DOCTYPE", "<!ENTITY")
FORBIDDEN_BYTES = tuple(word.encode(codec) for word in FORBIDDEN for codec in ("ascii", "utf-16-le", "utf-16-be"))
OVERLAP_BYTES = max(len(word) for word in FORBIDDEN_BYTES)
TRAP_ADVICE = "Do not open it before its sender has explained it; ask for a plain copy of the workbook."


class SafeArchive:
    """An archive whose parts were found to be as large as they say and free of document types.

    Parts are inflated once here, against their stated size: a reader that trusts the packed stream
    rather than the stated size would otherwise unpack more than was looked at.
    """

    def __init__(self, path: Path, data: bytes) -> None:
        self.path = path
        try:
            self._zip = zipfile.ZipFile(io.BytesIO(data))
        except (zipfile.BadZipFile, ValueError, OSError, NotImplementedError, OverflowError) as error:
            raise damaged(path, str(error)) from error
        self._parts = {info.filename: info for info in self._zip.infolist()}
        self._lowered = {name.lower().lstrip("/"): name for name in self._parts}
        self._check_names()
        self._check_sizes()

    @property
    def names(self) -> frozenset[str]:
        """Names of all parts."""
        return frozenset(self._parts)

    def find(self, name: str) -> str | None:
        """Name of a part as the archive spells it; None if there is none."""
        return self._lowered.get(name.lower().lstrip("/"))

    def read(self, name: str) -> bytes:
        """Content of a part."""
        return b"".join(self.chunks(name))

    def chunks(self, name: str) -> Iterator[bytes]:
        """Content of a part, piece by piece, checked against its stated size and sum."""
        info = self._parts[name]
        total = 0
        try:
            with self._zip.open(info) as part:
                while piece := part.read(CHUNK_BYTES):
                    total += len(piece)
                    yield piece
        except (
            zipfile.BadZipFile,
            zlib.error,
            EOFError,
            OSError,
            RuntimeError,
            NotImplementedError,
        ) as error:
            raise damaged(self.path, f"part {name}: {error}") from error
        if total != info.file_size:
            raise damaged(self.path, f"part {name} is shorter than it says")

    def check_markup(self) -> None:
        """Refuse document types and entities in any part that a reader would parse."""
        for name in self._parts:
            if not name.lower().endswith(MARKUP_SUFFIXES):
                continue
            tail = b""
            for piece in self.chunks(name):
                window = tail + piece
                if any(word in window for word in FORBIDDEN_BYTES):
                    raise UnreadableWorkbook(
                        self.path,
                        f"part {name} declares a document type or entities",
                        "a workbook as spreadsheet programs save it, which never does",
                        TRAP_ADVICE,
                    )
                tail = piece[-OVERLAP_BYTES:]

    def _check_names(self) -> None:
        infos = self._zip.infolist()
        if len(infos) > MAXIMUM_PARTS:
            raise UnreadableWorkbook(
                self.path, f"the archive has {len(infos):,} parts", f"at most {MAXIMUM_PARTS:,}", TRAP_ADVICE
            )
        if len(self._lowered) != len(infos):
            raise UnreadableWorkbook(
                self.path, "two parts of the archive have one name", "a name for each part", TRAP_ADVICE
            )
        for info in infos:
            steps = info.filename.replace("\\", "/").split("/")
            if ".." in steps or info.filename.startswith("//") or ":" in steps[0]:
                raise UnreadableWorkbook(
                    self.path,
                    f"the name of part {info.filename!r} leads out of the archive",
                    "names inside it",
                    TRAP_ADVICE,
                )
            if info.flag_bits & 0x1:
                raise UnreadableWorkbook(
                    self.path,
                    "the archive is encrypted",
                    "a workbook that opens without a password",
                    "Unpack it with its password and give the workbook.",
                )

    def _check_sizes(self) -> None:
        total = 0
        for info in self._zip.infolist():
            total += info.file_size
            ratio = info.file_size / max(info.compress_size, 1)
            if info.file_size > MAXIMUM_PART_BYTES or total > MAXIMUM_UNPACKED_BYTES:
                found = f"unpacked, part {info.filename} brings the workbook to {total / MEGABYTE:,.0f} MB"
            elif info.file_size > LARGE_PART_BYTES and ratio > SUSPECT_RATIO:
                found = f"part {info.filename} unpacks to {ratio:,.0f} times its size"
            else:
                continue
            raise UnreadableWorkbook(
                self.path,
                found,
                f"at most {MAXIMUM_PART_BYTES // MEGABYTE} MB a part, {MAXIMUM_UNPACKED_BYTES // MEGABYTE} "
                f"MB in all, {SUSPECT_RATIO} times a large part's size",
                TRAP_ADVICE,
            )

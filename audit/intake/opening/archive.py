"""Look at an archive before any reader opens it: sizes, names, and what its parts may not contain."""

from __future__ import annotations

import io
import re
import struct
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
MARKUP_SUFFIXES = (".xml", ".rels")
BINARY_SUFFIXES = (".bin",)
DOCUMENT_TYPE = re.compile(rb"<\0?!\0?(?:D\0?O\0?C\0?T\0?Y\0?P\0?E|E\0?N\0?T\0?I\0?T\0?Y)")
OVERLAP_BYTES = 32
LOCAL_HEADER = struct.Struct("<4s22xHH")
TRAP_ADVICE = "Do not open it before its sender has explained it; ask for a plain copy of the workbook."


class SafeArchive:
    """An archive whose parts are inflated only as far as they say, and may declare no document type.

    Parts are inflated here against their stated size and sum: a reader that follows the packed stream
    rather than the stated size would else unpack more than was looked at.
    """

    def __init__(self, path: Path, data: bytes) -> None:
        self.path = path
        self._data = data
        self._checked: set[str] = set()
        try:
            with zipfile.ZipFile(io.BytesIO(data)) as archive:
                infos = archive.infolist()
        except (zipfile.BadZipFile, ValueError, OSError, NotImplementedError, OverflowError) as error:
            raise damaged(path, str(error)) from error
        self._parts = {info.filename: info for info in infos}
        self._lowered = {_spelling(name): name for name in self._parts}
        self._check_names(infos)
        self._check_sizes(infos)

    @property
    def names(self) -> frozenset[str]:
        """Names of all parts."""
        return frozenset(self._parts)

    def find(self, name: str) -> str | None:
        """Name of a part as the archive spells it; None if there is none."""
        return self._lowered.get(_spelling(name))

    def read(self, name: str) -> bytes:
        """Content of a part."""
        return b"".join(self.chunks(name))

    def chunks(self, name: str) -> Iterator[bytes]:
        """Content of a part, piece by piece, while it is checked."""
        info = self._parts[name]
        markup = _spelling(name).endswith(MARKUP_SUFFIXES)
        total = checksum = 0
        tail = b""
        for piece in self._inflated(info):
            total += len(piece)
            checksum = zlib.crc32(piece, checksum)
            suspect = b"<!" in piece or b"\0" in piece
            if markup and DOCUMENT_TYPE.search(tail + (piece if suspect else piece[:OVERLAP_BYTES])):
                raise UnreadableWorkbook(
                    self.path,
                    f"part {name} declares a document type or entities",
                    "a workbook as spreadsheet programs save it, which never does",
                    TRAP_ADVICE,
                )
            tail = piece[-OVERLAP_BYTES:]
            yield piece
        if total != info.file_size or checksum != info.CRC:
            raise damaged(self.path, f"part {name} is not what the archive says of it")
        self._checked.add(name)

    def unread(self, *suffixes: str) -> list[str]:
        """Names of the parts with such endings that nobody has read here to their end."""
        return [name for name in self._parts if name not in self._checked and _spelling(name).endswith(suffixes)]

    def check_the_rest(self) -> None:
        """Inflate and check every part that a reader may open and nobody has read here yet."""
        for name in self.unread(*MARKUP_SUFFIXES, *BINARY_SUFFIXES):
            for _ in self.chunks(name):
                pass

    def _inflated(self, info: zipfile.ZipInfo) -> Iterator[bytes]:
        packed = self._packed(info)
        if info.compress_type == zipfile.ZIP_STORED:
            if len(packed) != info.file_size:
                raise damaged(self.path, f"part {info.filename} has another size than the archive says")
            for start in range(0, len(packed), CHUNK_BYTES):
                yield bytes(packed[start : start + CHUNK_BYTES])
            return
        if info.compress_type != zipfile.ZIP_DEFLATED:
            raise damaged(self.path, f"part {info.filename} is packed in a way that workbooks do not use")
        inflater = zlib.decompressobj(-zlib.MAX_WBITS)
        left = info.file_size
        waiting: bytes | memoryview = packed
        try:
            while not inflater.eof:
                piece = inflater.decompress(waiting, CHUNK_BYTES)
                waiting = inflater.unconsumed_tail
                left -= len(piece)
                if left < 0 or (not piece and not waiting and not inflater.eof):
                    raise damaged(self.path, f"part {info.filename} has another size than the archive says")
                yield piece
        except zlib.error as error:
            raise damaged(self.path, f"part {info.filename}: {error}") from error

    def _packed(self, info: zipfile.ZipInfo) -> memoryview:
        offset = info.header_offset
        if offset < 0 or offset + 30 > len(self._data):
            raise damaged(self.path, f"part {info.filename} lies outside the file")
        signature, name_bytes, extra_bytes = LOCAL_HEADER.unpack_from(self._data, offset)
        start = offset + 30 + name_bytes + extra_bytes
        if signature != b"PK\x03\x04" or start + info.compress_size > len(self._data):
            raise damaged(self.path, f"part {info.filename} lies outside the file")
        return memoryview(self._data)[start : start + info.compress_size]

    def _check_names(self, infos: list[zipfile.ZipInfo]) -> None:
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

    def _check_sizes(self, infos: list[zipfile.ZipInfo]) -> None:
        total = 0
        for info in infos:
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


def _spelling(name: str) -> str:
    """Name by which parts are looked up: their case does not count, and some programs write backslashes."""
    return name.replace("\\", "/").lower().lstrip("/")

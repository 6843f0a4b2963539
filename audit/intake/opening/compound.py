"""Names inside an OLE compound file, which tell an old workbook from an encrypted one.

Layout: [MS-CFB], the published specification of the compound file.
"""

from __future__ import annotations

import struct

SIGNATURE = bytes.fromhex("D0CF11E0A1B11AE1")
LARGEST_SECTOR_NUMBER = 0xFFFFFFFA
ENTRY_BYTES = 128
STREAM = 2


class DamagedCompoundFile(ValueError):
    """A compound file whose own tables do not lead to its directory."""


class CompoundFile:
    """Directory and streams of a compound file held in memory."""

    def __init__(self, data: bytes) -> None:
        if len(data) < 512 or not data.startswith(SIGNATURE):
            raise DamagedCompoundFile("no compound file header")
        sector_shift, mini_shift = struct.unpack_from("<HH", data, 30)
        if sector_shift not in (9, 12) or mini_shift != 6:
            raise DamagedCompoundFile("sector size that the format does not know")
        self._data = data
        self._sector_bytes = 1 << sector_shift
        self._table = self._read_sector_table()
        directory_start, cutoff, mini_start = struct.unpack_from("<I4xII", data, 48)
        self._mini_cutoff = cutoff
        directory = self._chain(directory_start)
        self._entries: dict[str, tuple[int, int]] = {}
        self._root = (0, 0)
        for offset in range(0, len(directory) - ENTRY_BYTES + 1, ENTRY_BYTES):
            name_bytes, kind = struct.unpack_from("<HB", directory, offset + 64)
            if not 2 <= name_bytes <= 64:
                continue
            name = directory[offset : offset + name_bytes - 2].decode("utf-16-le", errors="replace")
            start, size = struct.unpack_from("<II", directory, offset + 116)
            if kind == STREAM:
                self._entries.setdefault(name, (start, size))
            elif kind == 5:
                self._root = (start, size)
            else:
                self._entries.setdefault(name, (0, 0))
        self._mini_table = self._numbers(self._chain(mini_start)) if mini_start < LARGEST_SECTOR_NUMBER else ()

    @property
    def names(self) -> frozenset[str]:
        """Names of all streams and storages."""
        return frozenset(self._entries)

    def stream(self, name: str) -> bytes:
        """Content of a stream."""
        start, size = self._entries[name]
        if size >= self._mini_cutoff:
            return self._chain(start)[:size]
        container = self._chain(self._root[0])
        pieces = []
        seen = 0
        while start < LARGEST_SECTOR_NUMBER and seen * 64 < size:
            if start >= len(self._mini_table):
                raise DamagedCompoundFile("small stream leads out of its table")
            pieces.append(container[start * 64 : start * 64 + 64])
            start = self._mini_table[start]
            seen += 1
        return b"".join(pieces)[:size]

    def _sector(self, number: int) -> bytes:
        offset = (number + 1) * self._sector_bytes
        if offset >= len(self._data):
            raise DamagedCompoundFile("cut short")
        return self._data[offset : offset + self._sector_bytes]

    @staticmethod
    def _numbers(block: bytes) -> tuple[int, ...]:
        return struct.unpack(f"<{len(block) // 4}I", block[: len(block) // 4 * 4])

    def _read_sector_table(self) -> tuple[int, ...]:
        listed = list(struct.unpack_from("<109I", self._data, 76))
        further, count = struct.unpack_from("<II", self._data, 68)
        for _ in range(min(count, len(self._data) // self._sector_bytes)):
            if further >= LARGEST_SECTOR_NUMBER:
                break
            *numbers, further = self._numbers(self._sector(further))
            listed.extend(numbers)
        table: list[int] = []
        for number in listed:
            if number < LARGEST_SECTOR_NUMBER:
                table.extend(self._numbers(self._sector(number)))
        return tuple(table)

    def _chain(self, number: int) -> bytes:
        pieces: list[bytes] = []
        limit = len(self._table)
        while number < LARGEST_SECTOR_NUMBER:
            if number >= len(self._table) or len(pieces) > limit:
                raise DamagedCompoundFile("a chain of sectors leads nowhere")
            pieces.append(self._sector(number))
            number = self._table[number]
        return b"".join(pieces)

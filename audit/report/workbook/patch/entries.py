"""The entries of a package: where each one's packed bytes lie, and its headers written anew.

Layout: the ZIP file format that ISO/IEC 29500-2 builds on (local header, central directory, its end).
"""

from __future__ import annotations

import io
import struct
import zipfile
from dataclasses import dataclass

from audit.report.workbook.patch.refusal import CannotPatch

LOCAL_HEADER = struct.Struct("<4sHHHHHIIIHH")
CENTRAL_HEADER = struct.Struct("<4sHHHHHHIIIHHHHHII")
END_OF_DIRECTORY = struct.Struct("<4sHHHHIIH")
DESCRIPTOR_FOLLOWS = 0x8
NAME_IS_UTF8 = 0x800
ZIP64_EXTRA = 1
LARGEST_OFFSET = 0xFFFFFFFE
MOST_ENTRIES = 0xFFFE
EARLIEST_DATE = (1980, 1, 1, 0, 0, 0)


@dataclass(frozen=True)
class Entry:
    """One entry of the original archive: its place in the directory and its packed bytes as they lie there."""

    info: zipfile.ZipInfo
    listed: int
    local_extra: bytes
    packed: memoryview


def read_entries(data: bytes) -> tuple[list[Entry], bytes]:
    """Entries of an archive in the order in which they lie in it, and the archive's comment."""
    archive = zipfile.ZipFile(io.BytesIO(data))
    view = memoryview(data)
    entries = []
    reached = 0
    by_offset = sorted(enumerate(archive.infolist()), key=lambda numbered: numbered[1].header_offset)
    for listed, info in by_offset:
        start = info.header_offset
        if start < reached:
            raise CannotPatch("the archive is corrupt: two of its parts share bytes")
        if len(data) < start + LOCAL_HEADER.size or bytes(view[start : start + 4]) != b"PK\x03\x04":
            raise CannotPatch(f"the archive is corrupt: the part {info.filename} is not where it should be")
        *_, name_length, extra_length = LOCAL_HEADER.unpack_from(data, start)
        name_start = start + LOCAL_HEADER.size
        extra_start = name_start + name_length
        packed_start = extra_start + extra_length
        reached = packed_start + info.compress_size
        if reached > len(data):
            raise CannotPatch(f"the archive is corrupt: the part {info.filename} is cut short")
        if bytes(view[name_start:extra_start]) != name_bytes(info):
            raise CannotPatch(f"the archive is corrupt: the part {info.filename} has two names")
        entries.append(Entry(info, listed, without_zip64(data[extra_start:packed_start]), view[packed_start:reached]))
    return entries, archive.comment


def name_bytes(info: zipfile.ZipInfo) -> bytes:
    """Name as the archive stores it."""
    return info.orig_filename.encode("utf-8" if info.flag_bits & NAME_IS_UTF8 else "cp437")


def without_zip64(extra: bytes) -> bytes:
    """Extra fields of a header without the one for sizes past 4 GB, which no entry of ours needs.

    >>> without_zip64(bytes([1, 0, 2, 0, 9, 9, 7, 0, 1, 0, 5])).hex()
    '0700010005'
    """
    kept = []
    position = 0
    while position + 4 <= len(extra):
        kind, length = struct.unpack_from("<HH", extra, position)
        end = position + 4 + length
        if kind != ZIP64_EXTRA:
            kept.append(extra[position:end])
        position = end
    return b"".join(kept) + extra[position:]


def new_info(name: str) -> zipfile.ZipInfo:
    """Header facts of a part that the original did not have; the date is always the same."""
    info = zipfile.ZipInfo(name, EARLIEST_DATE)
    info.CRC = 0
    info.compress_type = zipfile.ZIP_DEFLATED
    if not name.isascii():
        info.flag_bits = NAME_IS_UTF8
    return info


def local_header(info: zipfile.ZipInfo, extra: bytes) -> bytes:
    """Header that stands before an entry's bytes."""
    name = name_bytes(info)
    return (
        LOCAL_HEADER.pack(
            b"PK\x03\x04",
            info.extract_version,
            info.flag_bits & ~DESCRIPTOR_FOLLOWS,
            info.compress_type,
            *_dos_time(info),
            info.CRC,
            info.compress_size,
            info.file_size,
            len(name),
            len(extra),
        )
        + name
        + extra
    )


def central_header(info: zipfile.ZipInfo, offset: int) -> bytes:
    """Header of an entry in the directory at the end."""
    name = name_bytes(info)
    extra = without_zip64(info.extra)
    return (
        CENTRAL_HEADER.pack(
            b"PK\x01\x02",
            info.create_version | info.create_system << 8,
            info.extract_version,
            info.flag_bits & ~DESCRIPTOR_FOLLOWS,
            info.compress_type,
            *_dos_time(info),
            info.CRC,
            info.compress_size,
            info.file_size,
            len(name),
            len(extra),
            len(info.comment),
            0,
            info.internal_attr,
            info.external_attr,
            offset,
        )
        + name
        + extra
        + info.comment
    )


def end_of_directory(count: int, length: int, offset: int, comment: bytes) -> bytes:
    """What closes an archive."""
    return END_OF_DIRECTORY.pack(b"PK\x05\x06", 0, 0, count, count, length, offset, len(comment)) + comment


def _dos_time(info: zipfile.ZipInfo) -> tuple[int, int]:
    year, month, day, hour, minute, second = info.date_time
    return hour << 11 | minute << 5 | second // 2, (year - 1980) << 9 | month << 5 | day

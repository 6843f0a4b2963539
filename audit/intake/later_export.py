"""A site with a later settings export in place of the earlier one: which files it replaces, and when it was read."""

from __future__ import annotations

import re
import shutil
import tempfile
import zipfile
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from datetime import date, datetime
from pathlib import Path

from lxml import etree

from audit.intake.gathered import Gathered
from audit.intake.gathering import gather
from audit.intake.opening import find_workbooks
from audit.intake.resolve.names import exact
from audit.intake.sitemap import NAME as SITE_MAP
from audit.refusal import Refusal

SHARE = 0.5
"""A file of settings is replaced by a later export that holds at least this share of its relays."""
_DAY_IN_NAME = re.compile(r"(?<!\d)(20\d\d)[-_.]?(0[1-9]|1[0-2])[-_.]?([0-2]\d|3[01])(?!\d)")
_MODIFIED = "{http://purl.org/dc/terms/}modified"


@dataclass(frozen=True)
class LaterExport:
    """The readings of the site with the later export, the names of its files there, and their days."""

    gathered: Gathered
    files: tuple[str, ...]
    replaced: tuple[str, ...]
    days: tuple[date, ...]
    day_from: str


def gather_with_export(
    site: Path, export: Path, leave_out: Sequence[Path] = (), progress: Callable[[str], None] | None = None
) -> LaterExport:
    """Read a site with a later export in place of the files that it replaces.

    `leave_out` are files of the site's folder that are no data of it. Nothing is written to the site: the files
    are copied to a scratch folder, where an export that replaces one file takes its name, so that fleet.toml holds.
    """
    old = [file for file in find_workbooks(site) if not any(_same(file, other) for other in (*leave_out, export))]
    new = find_workbooks(export)
    if not new:
        raise Refusal(f"{export}: there is no workbook here. Give the settings export that was taken after the work.")
    replaced = [file for file in old if file.name in {later.name for later in new}]
    with tempfile.TemporaryDirectory() as scratch:
        if not replaced:
            replaced = _replaced(site, old, new, Path(scratch) / "both", progress)
        kept = [file for file in old if file not in replaced]
        names = {file: file.name for file in new}
        if len(new) == len(replaced) == 1 and new[0].suffix.casefold() == replaced[0].suffix.casefold():
            names[new[0]] = replaced[0].name
        folder = _copied(site, kept, names, Path(scratch) / (site.name if site.is_dir() else site.stem))
        gathered = gather(folder, progress)
    days = [_day_of(file) for file in new]
    return LaterExport(
        gathered,
        tuple(names[file] for file in new),
        tuple(file.name for file in replaced),
        tuple(day for day, _ in days),
        ", ".join(dict.fromkeys(said for _, said in days)),
    )


def _same(one: Path, other: Path) -> bool:
    return other.exists() and other.is_file() and one.samefile(other)


def _copied(site: Path, kept: Sequence[Path], names: dict[Path, str], folder: Path) -> Path:
    folder.mkdir()
    for file in kept:
        shutil.copyfile(file, folder / file.name)
    for file, name in names.items():
        shutil.copyfile(file, folder / name)
    site_map = (site if site.is_dir() else site.parent) / SITE_MAP
    if site_map.is_file():
        shutil.copyfile(site_map, folder / SITE_MAP)
    return folder


def _replaced(
    site: Path, old: Sequence[Path], new: Sequence[Path], folder: Path, progress: Callable[[str], None] | None
) -> list[Path]:
    """Find the files of settings alone whose relays the new export holds."""
    both = gather(_copied(site, old, {file: file.name for file in new}, folder), progress)
    relays: dict[str, set[str]] = {}
    tables: dict[str, set[str]] = {}
    for sheet in both.sheets:
        tables.setdefault(sheet.file, set()).add(sheet.table)
    named = both.readings[both.readings["quantity"].isin(["relay_tag", "relay"])]
    for cell, written in zip(named["cell"].tolist(), named["written"].tolist(), strict=True):
        place = both.book.place(cell)
        if place is not None:
            relays.setdefault(place.file, set()).add(exact(str(written)))
    later = set().union(*(relays.get(file.name, set()) for file in new))
    found = []
    for file in old:
        own = relays.get(file.name, set())
        if "motor" not in tables.get(file.name, {"motor"}) and own and len(own & later) >= SHARE * len(own):
            found.append(file)
    return found


def _day_of(file: Path) -> tuple[date, str]:
    """Give the day of an export: as its name says, else as its own properties say, else as the file system does."""
    named = _DAY_IN_NAME.search(file.name)
    if named is not None:
        try:
            return date(int(named[1]), int(named[2]), int(named[3])), "the name of the file"
        except ValueError:
            pass
    if zipfile.is_zipfile(file):
        with zipfile.ZipFile(file) as archive:
            if "docProps/core.xml" in archive.namelist():
                parser = etree.XMLParser(resolve_entities=False, no_network=True)
                stated = etree.fromstring(archive.read("docProps/core.xml"), parser).findtext(_MODIFIED)
                if stated:
                    return datetime.fromisoformat(stated.replace("Z", "+00:00")).date(), "the properties of the file"
    return date.fromtimestamp(file.stat().st_mtime), "the file system's time of the file"

"""Save a workbook so that the same content always gives the same bytes."""

from __future__ import annotations

import io
import re
import zipfile
from pathlib import Path

from openpyxl import Workbook

MOMENT = (2026, 11, 2, 8, 0, 0)
_STAMP = re.compile(rb"(<dcterms:(?:created|modified)[^>]*>)[^<]*")


def save(workbook: Workbook, path: Path) -> None:
    """Save a workbook with a fixed time in its properties and in its archive."""
    held = io.BytesIO()
    workbook.save(held)
    with zipfile.ZipFile(held) as archive, zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as fixed:
        for name in archive.namelist():
            content = archive.read(name)
            if name == "docProps/core.xml":
                content = _STAMP.sub(rb"\g<1>2026-11-02T08:00:00Z", content)
            entry = zipfile.ZipInfo(name, MOMENT)
            entry.compress_type = zipfile.ZIP_DEFLATED
            fixed.writestr(entry, content)

"""How much a file may hold before it is refused; far above any motor list, far below what harms."""

from __future__ import annotations

MEGABYTE = 2**20

MAXIMUM_FILE_BYTES = 100 * MEGABYTE
"""Size of a file on disk."""

MAXIMUM_PART_BYTES = 512 * MEGABYTE
"""Unpacked size of one part of an archive; 100,000 rows of 40 columns take about 200 MB."""

MAXIMUM_UNPACKED_BYTES = 1024 * MEGABYTE
"""Unpacked size of all parts together."""

SUSPECT_RATIO = 250
"""Unpacked to packed size past which a large part is taken for a trap; sheets reach 10 to 100."""

LARGE_PART_BYTES = 16 * MEGABYTE
"""The ratio is looked at only for parts above this size."""

MAXIMUM_PARTS = 20_000
"""Number of parts of an archive."""

MAXIMUM_GRID_CELLS = 16_000_000
"""Cells of the rectangles from A1 to the last used row and column, over all sheets."""

SHEET_ROWS = 1_048_576
SHEET_COLUMNS = 16_384
"""Extent of a sheet, ECMA-376."""

MAXIMUM_SHEETS = 1_000
"""Number of sheets."""

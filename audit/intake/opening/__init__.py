"""From any file to grids of cells, safely."""

from audit.intake.opening.folder import find_workbooks
from audit.intake.opening.grids import SheetGrid, UnreadableWorkbook, WorkbookGrids
from audit.intake.opening.workbook import open_workbook

__all__ = ["SheetGrid", "UnreadableWorkbook", "WorkbookGrids", "find_workbooks", "open_workbook"]

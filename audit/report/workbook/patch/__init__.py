"""A copy of the user's workbook, marked without loss: only the parts that must change are written anew."""

from audit.report.workbook.patch.annotate import (
    AnnotationOutcome,
    Mark,
    annotate_copy,
    is_our_output,
    names_for_report,
    our_sheet_names,
)
from audit.report.workbook.patch.refusal import CannotPatch
from audit.report.workbook.patch.saved_values import SavedValue, SavedValues, save_with_values
from audit.report.workbook.patch.text import storable_text, strip_our_note

__all__ = [
    "AnnotationOutcome",
    "CannotPatch",
    "Mark",
    "SavedValue",
    "SavedValues",
    "annotate_copy",
    "is_our_output",
    "names_for_report",
    "our_sheet_names",
    "save_with_values",
    "storable_text",
    "strip_our_note",
]

"""An annotated copy given as input: the sheets that the audit added are no data of the site."""

from __future__ import annotations

import openpyxl
import pytest
from openpyxl.packaging.custom import StringProperty
from openpyxl.workbook.defined_name import DefinedName

from audit.intake.opening import open_workbook
from audit.intake.opening.package import ANNOTATED_COPY_PROPERTY, OWN_SHEET_MARK
from audit.report.workbook.patch import record


def made(path, *, says_so):
    book = openpyxl.Workbook()
    book.active.title = "Cover"
    book.create_sheet("Motors")["A1"] = "Tag"
    book.create_sheet("Findings")
    for name in ("Cover", "Findings"):
        book[name].defined_names[OWN_SHEET_MARK] = DefinedName(OWN_SHEET_MARK, attr_text="TRUE", hidden=True)
    if says_so:
        book.custom_doc_props.append(StringProperty(name=ANNOTATED_COPY_PROPERTY, value="annotated copy"))
    book.save(path)
    return [sheet.name for sheet in open_workbook(path).sheets]


def test_marked_sheets_of_an_annotated_copy_are_passed_over(tmp_path):
    assert made(tmp_path / "copy.xlsx", says_so=True) == ["Motors"]


def test_a_workbook_that_does_not_say_so_is_read_as_it_is(tmp_path):
    assert made(tmp_path / "plain.xlsx", says_so=False) == ["Cover", "Motors", "Findings"]


@pytest.mark.parametrize(
    ("read", "written"), [(ANNOTATED_COPY_PROPERTY, record.PROPERTY), (OWN_SHEET_MARK, record.SHEET_MARK)]
)
def test_what_is_looked_for_is_what_the_report_writes(read, written):
    assert read == written

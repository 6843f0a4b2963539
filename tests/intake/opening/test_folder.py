"""Which files of a folder are read."""

from __future__ import annotations

from audit.intake.opening import find_workbooks


def test_workbooks_are_found_by_name_without_locks_hidden_files_and_sub_folders(tmp_path):
    for name in ("b.XLSX", "a.xlsx", "c.csv", "d.ods", "e.xls", "f.tsv", "g.xlsm", "h.xlsb"):
        (tmp_path / name).touch()
    for name in ("~$a.xlsx", ".~lock.a.xlsx#", ".hidden.xlsx", "notes.txt", "fleet.toml", "a.docx"):
        (tmp_path / name).touch()
    (tmp_path / "sub.xlsx").mkdir()
    assert [path.name for path in find_workbooks(tmp_path)] == [
        "a.xlsx", "b.XLSX", "c.csv", "d.ods", "e.xls", "f.tsv", "g.xlsm", "h.xlsb",
    ]  # fmt: skip


def test_one_workbook_stands_for_itself(tmp_path):
    path = tmp_path / "a.xlsx"
    path.touch()
    assert find_workbooks(path) == [path]

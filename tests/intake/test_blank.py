"""The intake workbook: every quantity has a column, and filled in it is read without a map."""

from __future__ import annotations

import openpyxl
import pytest

from audit.intake import gather
from audit.intake.blank import EXAMPLE, SHEETS, WORKBOOK, columns_of, write_blank
from audit.intake.gathered import CannotRead
from audit.refusal import Refusal
from audit.vocabulary.quantities import vocabulary

# what each kind of quantity is filled in with; the values lie within every plausible range below
FILLED = {"truth": "yes", "text": "abc 1", "date": "2026-03-14"}


def _value(quantity):
    if quantity.kind == "choice":
        return quantity.choices[-1].replace("_", " ")
    if quantity.kind == "number":
        low, high = quantity.plausible
        return (low + high) / 2
    return FILLED[quantity.kind]


@pytest.fixture
def filled(tmp_path):
    write_blank(tmp_path / "site")
    path = tmp_path / "site" / WORKBOOK
    book = openpyxl.load_workbook(path)
    for title, table in SHEETS:
        sheet = book[title]
        for column, (_, quantity) in enumerate(columns_of(table), 1):
            sheet.cell(4, column, "T-1" if column == 1 else _value(quantity))
    book.save(path)
    return tmp_path / "site"


def test_every_quantity_that_a_site_can_state_has_a_column():
    for table in ("motor", "bus", "start"):
        named = {quantity.name for _, quantity in columns_of(table)}
        assert named == {q.name for q in vocabulary().of_subject(table).values() if q.role != "derived"}
    relays = {quantity.name for _, quantity in columns_of("relay")}
    assert {q.name for q in vocabulary().of_subject("relay").values() if q.role != "derived"} | {"motor"} == relays


def test_headers_within_a_sheet_differ():
    for _, table in SHEETS:
        headers = [header.casefold() for header, _ in columns_of(table)]
        assert len(headers) == len(set(headers))


def test_a_filled_in_workbook_is_read_without_a_map_or_a_question(filled):
    gathered = gather(filled)
    assert gathered.questions == []
    assert [column for column in gathered.columns if column.how != "synonym"] == []
    for title, table in SHEETS:
        wanted = {quantity.name for _, quantity in columns_of(table)} - {"start_clock"}
        rows = gathered.readings[gathered.readings["table"] == table]
        assert set(rows["quantity"]) - {"start_clock"} == wanted, title
        assert rows["record"].nunique() == 1, "the example row is no record"


def test_numbers_arrive_in_the_unit_of_the_second_row(filled):
    readings = gather(filled).readings.set_index("quantity")
    power = vocabulary().quantities["rated_power_kw"]
    assert readings.at["rated_power_kw", "number"] == pytest.approx(sum(power.plausible) / 2)
    assert readings.at["rated_power_kw", "unit"] == "kw"
    assert readings.at["fault_max_ka", "unit"] == "ka"


def test_the_blank_workbook_itself_holds_no_motor(tmp_path):
    write_blank(tmp_path)
    gathered = gather(tmp_path)
    assert len(gathered.readings) == 0


def test_drop_downs_and_plausible_ranges_are_set(tmp_path):
    write_blank(tmp_path)
    book = openpyxl.load_workbook(tmp_path / WORKBOOK)
    kinds = {validation.type for validation in book["Motors"].data_validations.dataValidation}
    assert kinds == {"list", "decimal", "date"}
    assert book["Motors"].cell(3, 1).value == EXAMPLE
    assert all(book[title].cell(1, 1).comment is not None for title, _ in SHEETS)


def test_files_that_are_there_are_not_overwritten(tmp_path):
    write_blank(tmp_path)
    with pytest.raises(Refusal, match="exists already"):
        write_blank(tmp_path)


def test_an_empty_folder_is_refused_with_what_to_do(tmp_path):
    with pytest.raises(CannotRead, match="no workbook"):
        gather(tmp_path)

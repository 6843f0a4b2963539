"""Yes and no in their usual spellings; days that are never guessed."""

from __future__ import annotations

from datetime import date, datetime, timedelta

import pytest
from hypothesis import given
from hypothesis import strategies as st

from audit.intake.cells import CellError
from audit.intake.celltext import CellKind, find_day_first, read_date_cells, read_truth_cells


@pytest.mark.parametrize(
    "cell", ["Y", "yes", "1", 1, 1.0, "ON", "Enabled", "X", "x", "✓", "✔", True, "TRUE", "In service"]
)
def test_spellings_of_yes(cell):
    reading = read_truth_cells([cell])[0]
    assert (reading.kind, reading.number) == (CellKind.TRUTH, 1.0)


@pytest.mark.parametrize("cell", ["N", "no", "0", 0, 0.0, "OFF", "Disabled", "dis.", "✗", False, "Out of service"])
def test_spellings_of_no(cell):
    reading = read_truth_cells([cell])[0]
    assert (reading.kind, reading.number) == (CellKind.TRUTH, 0.0)


def test_a_blank_is_neither_yes_nor_no():
    cells = [None, "  ", "-", "N/A", "TBC", CellError("#REF!"), "maybe", 2.0]
    assert [reading.kind for reading in read_truth_cells(cells)] == [
        CellKind.MISSING, CellKind.MISSING, CellKind.NOT_USED, CellKind.NOT_USED,
        CellKind.TO_BE_CONFIRMED, CellKind.ERROR, CellKind.BAD, CellKind.BAD,
    ]  # fmt: skip


@pytest.mark.parametrize(
    "text",
    ["2025-04-03", "2025/4/3", "3 Apr 2025", "03-Apr-25", "3rd April 2025", "April 3, 2025", "03.04.2025", "3.4.25"],
)
def test_a_clear_date_is_read(text):
    assert read_date_cells([text])[0].moment == datetime(2025, 4, 3)


@pytest.mark.parametrize(
    ("text", "moment"),
    [
        ("2025-04-03 14:05:09", datetime(2025, 4, 3, 14, 5, 9)),
        ("2025-04-03T14:05", datetime(2025, 4, 3, 14, 5)),
        ("3 Apr 2025 2:05 PM", datetime(2025, 4, 3, 14, 5)),
        ("3 Apr 2025 12:05 am", datetime(2025, 4, 3, 0, 5)),
    ],
)
def test_a_time_of_day_is_kept(text, moment):
    assert read_date_cells([text])[0].moment == moment


def test_an_open_order_of_day_and_month_is_asked():
    reading = read_date_cells(["03/04/25"])[0]
    assert reading.kind is CellKind.AMBIGUOUS
    assert reading.moments == (datetime(2025, 4, 3), datetime(2025, 3, 4))
    assert "2025-04-03" in reading.remark


def test_other_dates_of_the_column_settle_the_order():
    assert read_date_cells(["03/04/25", "25/04/25"])[0].moment == datetime(2025, 4, 3)
    assert read_date_cells(["03/04/25", "04/25/25"])[0].moment == datetime(2025, 3, 4)
    assert read_date_cells(["03/04/25", "25/04/25", "04/25/25"])[0].kind is CellKind.AMBIGUOUS
    assert read_date_cells(["03/04/25"], day_first=False)[0].moment == datetime(2025, 3, 4)


def test_the_same_day_and_month_leave_nothing_to_ask():
    assert read_date_cells(["04/04/25"])[0].moment == datetime(2025, 4, 4)


@pytest.mark.parametrize("cell", ["31/02/25", "2025-13-01", "soon", "12", 12.0, True, timedelta(days=2)])
def test_what_is_no_date_is_withheld_with_advice(cell):
    reading = read_date_cells([cell])[0]
    assert reading.kind is CellKind.BAD
    assert "2025-04-03" in reading.remark


def test_a_year_or_an_unformatted_day_number_is_asked():
    year, number = read_date_cells(["2019", 45_000.0])
    assert year.kind is CellKind.AMBIGUOUS
    # published: day 45,000 of the 1900 date system is 15 March 2023
    assert (number.kind, number.moments) == (CellKind.AMBIGUOUS, (datetime(2023, 3, 15),))


@given(
    st.dates(min_value=date(1970, 1, 1), max_value=date(2068, 12, 31)),
    st.sampled_from(["%Y-%m-%d", "%d %b %Y", "%d-%B-%y", "%d.%m.%Y"]),
)
def test_any_day_is_read_back(day, pattern):
    moment = read_date_cells([day.strftime(pattern)])[0].moment
    assert moment is not None
    assert moment.date() == day


def test_words_tell_no_order():
    assert find_day_first(["soon", "13.04.25", "2025-13-01"]) is None

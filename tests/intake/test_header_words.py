"""Header recognition held against a list of headers in generic US and IEC wording, written out by hand."""

from __future__ import annotations

import tomllib
from pathlib import Path

import pytest

from audit.intake.gathered import TABLES
from audit.intake.recognition.matching import match_header
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import UnitReading

HEADERS = tomllib.loads(Path(__file__).with_name("headers.toml").read_text("utf-8"))
LEAST_SHARE = 0.97


def _meant() -> list[tuple[str, str, str]]:
    """Give (table, header, meaning): a quantity, a combined reading, or the element of a bare header."""
    rows = []
    for table in TABLES:
        for name, headers in HEADERS[table].items():
            if name in ("asked", "unread"):
                continue
            if name in ("combined", "bare"):
                rows += [(table, header, meaning) for meaning, found in headers.items() for header in found]
            else:
                rows += [(table, header, name) for header in headers]
    return rows


def _understood(table: str, header: str) -> str:
    found = match_header(header, table)
    return found.element if found.open_part else found.name


def test_the_list_names_only_quantities_of_the_vocabulary():
    known = vocabulary()
    for table in TABLES:
        for name in HEADERS[table]:
            assert name in known.quantities or name in ("combined", "bare", "asked", "unread"), name


def test_no_header_is_read_as_something_else():
    wrong = [
        (table, header, meaning, read)
        for table, header, meaning in _meant()
        if (read := _understood(table, header)) not in ("", meaning)
    ]
    assert wrong == []


def test_nearly_all_headers_are_recognised():
    rows = _meant()
    missed = [(table, header, meaning) for table, header, meaning in rows if not _understood(table, header)]
    share = 1 - len(missed) / len(rows)
    assert share >= LEAST_SHARE, f"{share:.1%} of {len(rows)}; missed: {missed}"


@pytest.mark.parametrize("table", TABLES)
def test_doubtful_headers_are_never_mapped_without_a_second_sign(table):
    mapped = {
        header: found.name
        for header in HEADERS[table]["asked"]["headers"]
        if (found := match_header(header, table)).known and not found.combined
    }
    assert mapped == {}


@pytest.mark.parametrize("table", TABLES)
def test_headers_of_other_things_stay_unread(table):
    mapped = {
        header: found.name
        for header in HEADERS[table]["unread"]["headers"]
        if (found := match_header(header, table)).known
    }
    assert mapped == {}


def test_an_ampere_in_brackets_behind_a_pickup_is_its_unit() -> None:
    # Trade usage: '50 Pickup (A)' gives the unit; the A is not the article of 'within a second'
    found = match_header("50 Pickup (A)", "relay")
    assert (found.quantity, found.unit) == ("short_circuit_trip_pickup_a", UnitReading("a"))

"""The site map: what it may say, that it rules, and that a saved one reads the workbooks as before."""

from __future__ import annotations

import openpyxl
import pandas as pd
import pytest

from audit.intake import gather
from audit.intake.gathered import CannotRead
from audit.intake.sitemap_text import map_text, save_map

MOTORS = [
    ["Motor list"],
    ["Tag", "Service", "Size", "Volts", "In", "Tap", "Relay", "50 PU", "Rated Powr"],
    ["P-101", "Feed pump", 55, 400, 97, 3, "R-1", 999, 1],
    ["P-102", "Feed pump", 75, 400, 132, 3, "R-2", "8 x FLA", 1],
]
EXPORT = [
    ["Relay", "Function", "Setting", "Value", "Unit"],
    ["R-1", "51LR", "Pickup", 2.5, "x FLA"],
    ["R-1", "51LR", "Delay", 2, "s"],
    ["R-1", "House", "Number", 12, "s"],
]


@pytest.fixture
def site(tmp_path):
    book = openpyxl.Workbook()
    book.remove(book.active)
    for title, rows in (("Motors", MOTORS), ("Export", EXPORT)):
        sheet = book.create_sheet(title)
        for row in rows:
            sheet.append(row)
    book.save(tmp_path / "site.xlsx")
    return tmp_path


def write(site, text):
    (site / "fleet.toml").write_text(text, "utf-8")
    return gather(site)


def numbers(gathered, quantity):
    rows = gathered.readings[gathered.readings["quantity"] == quantity]
    return dict(zip(rows["written"], rows["number"], strict=True))


def test_a_doubtful_column_is_read_once_the_map_names_it(site):
    assert "Size" in [column.header for column in gather(site).columns if column.how == "asked"]
    gathered = write(
        site,
        """
        [[sheet]]
        file = "site.xlsx"
        sheet = "Motors"
          [[sheet.column]]
          header = "size"
          quantity = "rated_power_kw"
          unit = "HP"
        """,
    )
    rows = gathered.readings[gathered.readings["quantity"] == "rated_power_kw"]
    assert rows["number"].tolist() == [55, 75]
    assert set(rows["unit"]) == {"hp"}
    assert {c.how for c in gathered.columns if c.header == "Size"} == {"site map"}


def test_the_map_wins_over_a_header_that_is_known(site):
    gathered = write(
        site,
        """
        [[sheet]]
        file = "site.xlsx"
        sheet = "Motors"
          [[sheet.column]]
          column = "D"
          quantity = ""
        """,
    )
    assert "rated_voltage_v" not in set(gathered.readings["quantity"])


def test_a_setting_of_a_list_is_read_once_the_map_names_it(site):
    gathered = write(
        site,
        """
        [[sheet]]
        file = "site.xlsx"
        sheet = "Export"
          [[sheet.column]]
          header = "House / Number"
          quantity = "jam_block_s"
        """,
    )
    assert numbers(gathered, "jam_block_s") == {"12": 12}


def test_a_stand_in_for_off_is_off_only_where_the_map_says_so(site):
    before = gather(site).readings.query("quantity == 'short_circuit_trip_pickup_a'")
    assert before["state"].tolist() == ["value", "value"]
    after = write(site, "stand_ins_for_off = [999]").readings.query("quantity == 'short_circuit_trip_pickup_a'")
    assert after["state"].tolist() == ["off", "value"]


def test_must_run_motors_and_facts_come_from_the_map(site):
    gathered = write(
        site, 'site = "Example works"\ncode = "IEC"\naudit_interval_days = 365\nmust_run = ["p-102", "P-9"]'
    )
    must = gathered.readings.query("quantity == 'must_run'")
    tags = gathered.readings.query("quantity == 'motor'").set_index("record")["text"]
    assert [tags[record] for record in must["record"]] == ["P-102"]
    assert must["text"].tolist() == ["yes"]
    assert gathered.site == "Example works"
    assert gathered.facts["code"] == "IEC"
    assert gathered.facts["audit_interval_days"] == "365"
    assert any("P-9" in complaint.found for complaint in gathered.complaints)


def test_a_sheet_is_left_unread_at_the_site_s_word(site):
    gathered = write(site, '[[sheet]]\nfile = "site.xlsx"\nsheet = "Export"\ntable = "none"')
    assert "jam_trip_pickup_a" not in set(gathered.readings["quantity"])


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("site = [", "cannot be read"),
        ("sight = 'x'", "'sight' is no entry"),
        ("code = 'BS'", "'NFPA 70' or 'IEC'"),
        ("[[sheet]]\nsheet = 'x'", "names no file"),
        ("[[sheet]]\nfile = 'x'\ntable = 'motors'", "motor, relay, bus, start, none"),
        ("[[sheet]]\nfile = 'x'\n[[sheet.column]]\nheader = 'a'\nquantity = 'full_load'", "Did you mean 'full_load_a'"),
        ("[[sheet]]\nfile = 'x'\n[[sheet.column]]\nquantity = 'full_load_a'", "without header and letter"),
        (
            "[[sheet]]\nfile = 'x'\n[[sheet.column]]\nheader = 'a'\nquantity = 'full_load_a'\nunit = 'kV'",
            "a unit of full-load current",
        ),
        ("must_run = 'P-1'", "as a list"),
    ],
)
def test_a_wrong_map_is_refused_with_what_to_do(site, text, message):
    with pytest.raises(CannotRead, match=r"fleet\.toml") as refusal:
        write(site, text)
    assert message in str(refusal.value)


def test_a_column_that_the_sheet_does_not_have_is_said(site):
    gathered = write(
        site,
        '[[sheet]]\nfile = "site.xlsx"\nsheet = "Motors"\n[[sheet.column]]\nheader = "Foo"\nquantity = "full_load_a"',
    )
    assert any("'Foo', which the sheet does not have" in complaint.found for complaint in gathered.complaints)


def test_a_saved_map_reads_the_workbooks_as_they_were_read_before(site):
    before = gather(site)
    save_map(before, site / "fleet.toml")
    after = gather(site)
    pd.testing.assert_frame_equal(before.readings, after.readings)
    read = [column for column in after.columns if column.quantity]
    assert read
    assert {column.how for column in read} == {"site map"}


def test_a_saved_map_keeps_the_facts_of_an_earlier_one(site):
    write(site, 'must_run = ["P-101"]\ncode = "IEC"')
    save_map(gather(site), site / "fleet.toml")
    again = gather(site)
    assert again.facts["code"] == "IEC"
    assert "must_run" in set(again.readings["quantity"])


def test_questions_and_proposals_stand_in_the_map_as_comments(site):
    text = map_text(gather(site))
    assert "# Question: the header 'Size' has more than one meaning" in text
    assert '# quantity = "rated_power_kw"' in text
    assert "much like rated_power_kw" in text

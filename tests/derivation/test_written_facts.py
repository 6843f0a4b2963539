"""How a setting is written: relative or not, with its base or without, with its unit or without, how finely."""

from __future__ import annotations

from dataclasses import replace

import pandas as pd
import pytest

from audit.derivation.written_facts import WRITTEN_FACTS, written_facts
from audit.fleet.build import fleet_of
from audit.fleet.column import NO, UNKNOWN, YES
from audit.fleet.fleet import Fleet


def fleet_with(quantity: str, *cells: dict[str, object]) -> Fleet:
    """One relay a cell; the readings as the reader hands them on."""
    rows = [
        {
            "subject": "relay",
            "row": row,
            "quantity": quantity,
            "state": "value",
            "number": 1.0,
            "value": 1.0,
            "unit": "",
            "base": "",
            "written": "1",
            "cell": 100 + row,
            **cell,
        }
        for row, cell in enumerate(cells)
    ]
    # one relay more, of which nothing is read
    return replace(fleet_of(relay=[{}] * (len(cells) + 1)), readings=pd.DataFrame(rows))


def values(fleet: Fleet, fact: str) -> list[float]:
    return dict(written_facts(fleet))[fact].values.tolist()


def test_a_bare_number_a_multiple_and_a_per_cent_are_relative_and_amperes_are_not():
    units = [{"unit": unit} for unit in ("", "x", "pct", "a", "ka")]
    fleet = fleet_with("jam_trip_pickup_a", *units)
    assert values(fleet, "jam_trip_pickup_a_relative") == [YES, YES, YES, NO, NO, NO]


def test_a_base_is_stated_by_word_or_by_a_plain_unit():
    cells = [{"unit": "x", "base": "full_load"}, {"unit": "x"}, {"unit": "", "base": "secondary"}, {}, {"unit": "a"}]
    fleet = fleet_with("jam_trip_pickup_a", *cells)
    assert values(fleet, "jam_trip_pickup_a_base_written")[:5] == [YES, NO, YES, NO, YES]


def test_a_multiple_that_can_be_of_one_thing_only_says_enough():
    # the magnetic trip of a breaker is a multiple of the motor's full load or of nothing
    fleet = fleet_with("magnetic_trip_a", {"unit": "x"}, {"unit": ""})
    assert values(fleet, "magnetic_trip_a_base_written")[:2] == [YES, NO]


@pytest.mark.parametrize("state", ["pending", "bad"])
def test_a_cell_that_could_not_be_read_leaves_the_fact_open(state: str):
    fleet = fleet_with("jam_trip_delay_s", {"state": state}, {"unit": "s"})
    assert values(fleet, "jam_trip_delay_s_unit_lacking") == [UNKNOWN, NO, NO]


def test_a_delay_without_a_unit_is_told_from_one_with_it_and_from_one_that_is_off():
    fleet = fleet_with("jam_trip_delay_s", {"unit": ""}, {"unit": "ms"}, {"state": "off"})
    assert values(fleet, "jam_trip_delay_s_unit_lacking") == [YES, NO, NO, NO]


def test_the_last_digit_is_worth_what_it_is_in_amperes():
    # by hand: '8.7' to 0.1 A; '9' to 1 A; '0.87' x CT 10 A to 0.1 A; '87.5 A' to 0.1 A
    cells = [
        {"written": "8.7", "number": 8.7, "value": 8.7},
        {"written": "9", "number": 9.0, "value": 9.0},
        {"written": "0.87", "number": 0.87, "value": 8.7, "unit": "x", "base": "ct"},
        {"written": "87,5 A", "number": 87.5, "value": 87.5, "unit": "a"},
    ]
    digits = values(fleet_with("relay_full_load_a", *cells), "relay_full_load_last_digit_a")
    assert digits[:4] == pytest.approx([0.1, 1.0, 0.1, 0.1])
    assert digits[4] != digits[4]


def test_every_fact_has_a_column_whether_or_not_anything_was_read():
    for fleet in (fleet_of(relay=[{}]), fleet_with("jam_trip_delay_s", {})):
        assert {name for name, _ in written_facts(fleet)} == set(WRITTEN_FACTS)


def test_a_fact_carries_the_cell_of_its_setting():
    column = dict(written_facts(fleet_with("jam_trip_delay_s", {}, {})))["jam_trip_delay_s_unit_lacking"]
    assert column.cell.tolist() == [100, 101, -1]

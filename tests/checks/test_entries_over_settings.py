"""Entries over several settings: the words filled in, whose the cases are, and what is refused."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest

from audit.checks.entry import Check, read_entry
from audit.limits.limits import BadRule

FILE = Path("site.toml")


def entry(**more: object) -> dict[str, Any]:
    words = ("says", "severity_because", "why", "blind_spots", "remedy", "source")
    case = {"gives": "breach", "working": "by hand", "motor": {"{setting}": 5}}
    return {
        **{word: f"{word} of {{setting}}" for word in words},
        "subject": "motor",
        "function": "50",
        "severity": "observation",
        "for_each": ["jam_trip_delay_s", "unbalance_trip_delay_s"],
        "judges": "{setting}",
        "at_most": "10",
        "case": [case],
        **more,
    }


def read(**more: object) -> list[Check]:
    return read_entry(FILE, "delays-bounded", entry(**more), "core")


def test_each_setting_makes_a_check_with_a_key_of_its_own():
    checks = read()
    assert [check.key for check in checks] == [
        "delays-bounded/jam_trip_delay_s",
        "delays-bounded/unbalance_trip_delay_s",
    ]
    assert checks[1].says == "says of unbalance_trip_delay_s"


def test_further_words_of_a_setting_are_filled_in():
    each = [{"setting": "jam_trip_delay_s", "switch": "jam_trip_on"}]
    assert read(for_each=each, when="{switch}")[0].when_text == "jam_trip_on"


def test_a_case_stands_for_the_first_setting_unless_it_names_another():
    case = {"gives": "meets", "working": "by hand", "motor": {"{setting}": 5}}
    first, second = read(case=[case, {**case, "setting": "unbalance_trip_delay_s"}])
    assert first.cases[0].given == {"motor": {"jam_trip_delay_s": 5}}
    assert second.cases[0].given == {"motor": {"unbalance_trip_delay_s": 5}}


@pytest.mark.parametrize(
    ("more", "problem"),
    [
        ({"for_each": [{"switch": "jam_trip_on"}]}, "has no 'setting'"),
        ({"for_each": [{"setting": 5}]}, "lists settings"),
        ({"case": [{"gives": "meets", "working": "x", "setting": "full_load_a"}]}, "a case is for 'full_load_a'"),
        ({"slips": ["slip_ten"]}, "'slips' lists factors by unit"),
    ],
)
def test_what_is_not_complete_is_refused(more: dict[str, object], problem: str):
    with pytest.raises(BadRule, match=problem):
        read(**more)

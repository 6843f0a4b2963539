"""Units are checked at load: what cannot be added or compared is refused, with the nearest known name."""

from __future__ import annotations

import pytest

from audit.derivation.functions import FUNCTIONS
from audit.expression.parse import BadExpression, parse
from audit.expression.units import Meaning, UnitCheck
from audit.vocabulary.units import UNITS, Unit

NAMES = {
    name: Meaning("number", UNITS[unit])
    for name, unit in {
        "load_a": "a", "start_a": "a", "fault_ka": "ka", "supply_v": "v", "delay_s": "s", "delay_min": "min",
        "trip_c": "c", "alarm_c": "c", "rise_k": "k", "power_kw": "kw", "read_date": "date", "today_date": "date",
        "age_days": "days", "share_pct": "pct", "share_ratio": "1",
    }.items()
} | {"fused": Meaning("truth"), "device": Meaning("choice", None, ("breaker", "contactor"))}  # fmt: skip


def unit_of(text: str) -> Unit | None:
    return UnitCheck(NAMES.get, NAMES, FUNCTIONS).meaning(parse(text)).unit


@pytest.mark.parametrize(
    ("text", "symbol"),
    [
        ("load_a + start_a", "A"),
        ("supply_v / load_a", "ohm"),
        ("trip_c - alarm_c", "K"),
        ("alarm_c + rise_k", "°C"),
        ("today_date - read_date", "days"),
        ("share_pct / share_pct", ""),
        ("greater(load_a, start_a) * share_ratio", "A"),
    ],
)
def test_units_follow_from_the_operands(text: str, symbol: str) -> None:
    found = unit_of(text)
    assert found is not None
    assert found.symbol == symbol


@pytest.mark.parametrize(
    "text",
    [
        "load_a + supply_v",
        "load_a + fault_ka",
        "delay_s < delay_min",
        "trip_c > rise_k",
        "trip_c + alarm_c",
        "trip_c * share_ratio",
        "share_pct < share_ratio",
        "load_a > 5",
        "load_a + 5",
        "fused + load_a",
        "load_a and fused",
        "device == lader",
        "device < breaker",
        "device == 3",
        "greater(load_a, fault_ka)",
        "stall_time_at_voltage_s(load_a, share_ratio)",
        "stall_time_at_voltage_s(delay_s)",
        "no_such_function(load_a)",
        "choose(load_a, load_a, load_a)",
    ],
)
def test_what_does_not_fit_is_refused(text: str) -> None:
    with pytest.raises(BadExpression):
        unit_of(text)


def test_an_unknown_name_is_answered_with_the_nearest_known_one() -> None:
    with pytest.raises(BadExpression, match="nearest known name is 'start_a'"):
        unit_of("strat_a * 2")

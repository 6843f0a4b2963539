"""What counts as changed, and what only follows."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest

from audit.checks.catalogue import Catalogue
from audit.findings.audit import Audit
from audit.findings.comparison import Comparison, compare
from audit.intake import read_fleet
from audit.pipeline import audit_fleet
from tests.findings.comparison.conftest import DAY, plant, sheet_rows, usual_files, write_site

Judge = Callable[..., Audit]


def read(folder: Path, catalogue: Catalogue) -> Audit:
    return audit_fleet(read_fleet(folder), catalogue, audited_on=DAY)


def compared(tmp_path: Path, catalogue: Catalogue, **changed: list[tuple[object, ...]]) -> Comparison:
    before = read(write_site(tmp_path / "before", usual_files()), catalogue)
    return compare(before, read(write_site(tmp_path / "after", usual_files(**changed)), catalogue))


def with_cell(table: str, row: int, column: int, value: object) -> list[tuple[object, ...]]:
    rows = [list(one) for one in sheet_rows()[table]]
    rows[row][column] = value
    return [tuple(one) for one in rows]


def test_a_change_names_both_values_and_the_cell(tmp_path: Path, catalogue: Catalogue) -> None:
    comparison = compared(tmp_path, catalogue, bus=with_cell("bus", 0, 2, 31.5))
    (change,) = comparison.changed
    assert (change.subject, change.name, change.quantity) == ("bus", "B-1", "fault_max_ka")
    assert (change.before, change.after, change.unit) == (20.0, 31.5, "kA")
    assert change.after_cell is not None
    assert tuple(change.after_cell) == ("buss.xlsx", "bus", "C2")


def test_a_value_written_in_another_unit_is_no_change(tmp_path: Path, catalogue: Catalogue) -> None:
    assert compared(tmp_path, catalogue, bus=with_cell("bus", 0, 2, "20000 A")).is_empty()


def test_a_pickup_in_multiples_follows_the_ct_that_the_relay_is_set_to(tmp_path: Path, catalogue: Catalogue) -> None:
    # 5.1 x CT stays as written; 5.1 x 150 A = 765 A becomes 5.1 x 200 A = 1020 A
    comparison = compared(tmp_path, catalogue, relay=with_cell("relay", 0, 5, 200))
    by_name = {change.quantity: change for change in comparison.changed}
    assert set(by_name) == {"relay_ct_primary_a", "short_circuit_trip_pickup_a"}
    pickup = by_name["short_circuit_trip_pickup_a"]
    assert (pickup.before, pickup.after) == pytest.approx((765.0, 1020.0))
    assert pickup.kind == "follows"
    assert pickup.follows == ("relay_ct_primary_a",)
    (relay,) = comparison.relays
    assert (relay.settings, relay.follow) == (("CT primary set in the relay",), ("short-circuit pickup",))


def test_a_pickup_that_is_typed_anew_does_not_only_follow(tmp_path: Path, catalogue: Catalogue) -> None:
    rows = [list(one) for one in sheet_rows()["relay"]]
    rows[0][2], rows[0][5] = 4, 200
    comparison = compared(tmp_path, catalogue, relay=[tuple(row) for row in rows])
    assert {change.quantity: change.kind for change in comparison.changed} == {
        "relay_ct_primary_a": "changed",
        "short_circuit_trip_pickup_a": "changed",
    }


def test_a_datum_that_is_given_now_and_one_given_no_longer(judged: Judge) -> None:
    after = plant(1)
    after["motor"][0]["safe_stall_hot_s"] = 12
    after["motor"][0]["running_current_a"] = None
    changed = compare(judged(**plant(1)), judged(**after)).changed
    assert [(one.quantity, one.kind, one.before, one.after) for one in changed] == [
        ("safe_stall_hot_s", "now given", None, 12.0),
        ("running_current_a", "no longer given", 70.0, None),
    ]


def test_motors_relays_and_buses_that_come_and_go(judged: Judge) -> None:
    after = plant(2)
    after["bus"].append({**after["bus"][0], "bus_name": "B-9"})
    rows = compare(judged(**plant(3)), judged(**after)).rows
    assert {(row.kind, row.subject, row.name) for row in rows} == {
        ("removed", "motor", "P-3"),
        ("removed", "relay", "R-3"),
        ("added", "bus", "B-9"),
    }


def test_starts_are_counted_as_new_and_gone(judged: Judge) -> None:
    old = [{"start_motor": "P-1", "start_moment": f"2026-0{n}-01", "start_time_s": 5.0} for n in (1, 2, 3)]
    new = [*old[1:], {"start_motor": "P-1", "start_moment": "2026-09-01", "start_time_s": 8.9}]
    comparison = compare(judged(**plant(2), start=old), judged(**plant(2), start=new[::-1]))
    assert [(one.motor, one.new, one.gone) for one in comparison.starts] == [("P-1", 1, 1)]


def test_case_and_spaces_of_a_tag_make_no_other_motor(judged: Judge) -> None:
    after = plant(1)
    after["motor"][0]["motor"] = " p-1"
    assert compare(judged(**plant(1)), judged(**after)).is_empty()

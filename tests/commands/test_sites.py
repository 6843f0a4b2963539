"""Several sites in one go: a summary by site and function, what is common, and a bad one that stops no other."""

from __future__ import annotations

import json
from pathlib import Path

from openpyxl import load_workbook

from audit.commands.sites import site_names
from tests.commands.conftest import Run, small_site

DAY = ("--on", "2026-11-30")


def test_each_site_leaves_its_record_and_the_summary_names_all(run: Run, tmp_path: Path) -> None:
    north = small_site(tmp_path / "north", fault=26)
    south = small_site(tmp_path / "south", pickup=700)
    empty = tmp_path / "empty"
    empty.mkdir()
    out = tmp_path / "out"
    status, printed, _ = run("audit", north, empty, south, "--out", out, *DAY)
    assert status == 2
    told = json.loads((out / "sites.json").read_text("utf-8"))
    by_name = {one["site"]: one for one in told["sites"]}
    assert "holds no workbook" in by_name["empty"]["problem"]
    assert "holds no workbook" in " ".join(printed.split())
    for name in ("north", "south"):
        assert by_name[name]["problem"] == ""
        assert by_name[name]["counts"]["motors"] == 3
        record = json.loads((out / name / "findings.json").read_text("utf-8"))
        for function, of_site in told["by_function"].items():
            assert of_site[name] == sum(finding["function"] == function for finding in record["findings"])
    shared = {one["check"]: one for one in told["common_checks"]}
    assert all(one["everywhere"] and set(one["by_site"]) == {"north", "south"} for one in shared.values())
    found = [
        {finding["check"] for finding in json.loads((out / name / "findings.json").read_text("utf-8"))["findings"]}
        for name in ("north", "south")
    ]
    assert set(shared) == found[0] & found[1] != set()
    # 900 / 82 = 10.98 and 700 / 82 = 8.54 times full load for motors of one make and type
    (pickup,) = [one for one in told["same_type_other_settings"] if one["quantity"] == "short_circuit_trip_pickup_a"]
    assert {site: round(value, 2) for site, value in pickup["by_site"].items()} == {"north": 10.98, "south": 8.54}
    assert load_workbook(out / "sites.xlsx").sheetnames == ["Sites", "Functions", "Common", "Same type, other settings"]


def test_sites_that_are_set_alike_differ_in_nothing(run: Run, tmp_path: Path) -> None:
    sites = small_site(tmp_path / "a" / "works"), small_site(tmp_path / "b" / "works")
    status, printed, _ = run("audit", *sites, "--out", tmp_path / "out", "--json", *DAY)
    assert status == 0
    told = json.loads(printed)
    assert [one["site"] for one in told["sites"]] == ["works", "works-2"]
    assert told["same_type_other_settings"] == []


def test_a_severity_that_fails_counts_over_all_sites(run: Run, tmp_path: Path) -> None:
    sites = small_site(tmp_path / "a"), small_site(tmp_path / "b")
    words = ("audit", *sites, "--out", tmp_path / "out", "--fail-on", "observation", *DAY)
    status, _, _ = run(*words)
    record = json.loads((tmp_path / "out" / "a" / "findings.json").read_text("utf-8"))
    assert status == (1 if record["findings"] else 0)
    assert record["findings"]


def test_the_record_of_each_site_of_last_year_is_found(run: Run, tmp_path: Path) -> None:
    sites = small_site(tmp_path / "a"), small_site(tmp_path / "b")
    run("audit", *sites, "--out", tmp_path / "y1", "--on", "2025-11-30")
    run("audit", *sites, "--out", tmp_path / "y2", "--on", "2026-11-30", "--previous", tmp_path / "y1")
    record = json.loads((tmp_path / "y2" / "b" / "findings.json").read_text("utf-8"))
    assert record["previous"]["audited_on"] == "2025-11-30"
    assert {finding["status"] for finding in record["findings"]} <= {"repeated", "new"}


def test_names_of_sites_stay_apart() -> None:
    assert site_names([Path("x/Works A"), Path("y/works-a"), Path("works-a.xlsx")]) == [
        "works-a",
        "works-a-2",
        "works-a-3",
    ]

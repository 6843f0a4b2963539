"""What `compare` prints and writes: tables, comparison.json, a workbook to sign, and refusals."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from openpyxl import load_workbook

from audit.cautions import CAUTIONS
from audit.refusal import Refusal
from audit.report.record.parts import RECORD_VERSION
from tests.commands.conftest import Run, small_site

DAY = ("--on", "2026-11-30")


@pytest.fixture
def sites(tmp_path: Path) -> tuple[Path, Path]:
    before = small_site(tmp_path / "before")
    return before, small_site(tmp_path / "after", fault=26, pickup=700, motors=4)


def test_compare_writes_a_record_and_a_workbook(run: Run, sites: tuple[Path, Path], tmp_path: Path) -> None:
    status, printed, _ = run("compare", *sites, "--out", tmp_path / "out", *DAY)
    assert status == 0
    assert "fault_max_ka" not in printed
    assert "greatest three-phase fault current at the bus" in printed
    assert all(line in " ".join(printed.split()) for line in CAUTIONS)
    told = json.loads((tmp_path / "out" / "comparison.json").read_text("utf-8"))
    assert {(one["name"], one["quantity"], one["after"]) for one in told["changed"]} >= {("B-1", "fault_max_ka", 26.0)}
    assert {(row["kind"], row["subject"], row["name"]) for row in told["rows"]} == {("added", "motor", "P-4")}
    assert told["after"]["inputs"][0]["sha256"]


def test_the_workbook_has_a_row_to_sign_for_everything_looked_at(
    run: Run, sites: tuple[Path, Path], tmp_path: Path
) -> None:
    run("compare", *sites, "--out", tmp_path / "out", *DAY)
    told = json.loads((tmp_path / "out" / "comparison.json").read_text("utf-8"))
    book = load_workbook(tmp_path / "out" / "comparison.xlsx")
    assert book.sheetnames == ["Change", "Changed", "Findings", "Touched", "No longer provable", "Looked at"]
    rows = list(book["Looked at"].iter_rows(min_row=5, values_only=True))
    assert len([row for row in rows if row[4]]) == len(told["looked_at"])
    headings = [cell.value for cell in book["Looked at"][4]]
    assert headings[-2:] == ["initials", "date"]
    cover = {str(row[0]) for row in book["Change"].iter_rows(values_only=True)}
    assert {"prepared", "checked", "approved", "cleared for energising"} <= cover


def test_text_of_a_workbook_never_becomes_a_formula(run: Run, tmp_path: Path) -> None:
    before, after = small_site(tmp_path / "before"), small_site(tmp_path / "after")
    motors = after / "motors.csv"
    motors.write_text(motors.read_text("utf-8").replace("HV800-4", "=1+1", 1), "utf-8")
    run("compare", before, after, "--out", tmp_path / "out", *DAY)
    cells = [cell for row in load_workbook(tmp_path / "out" / "comparison.xlsx")["Changed"].iter_rows() for cell in row]
    assert [cell.data_type for cell in cells if cell.value == "=1+1"] == ["s"]


def test_a_record_stands_for_its_fleet_on_either_side(run: Run, sites: tuple[Path, Path], tmp_path: Path) -> None:
    before, after = sites
    for name, fleet in (("one", before), ("two", after)):
        run("audit", fleet, "--out", tmp_path / name, *DAY)
    records = tmp_path / "one", tmp_path / "two" / "findings.json"
    told = []
    for sides in ((before, after), (records[0], after), (before, records[1]), records):
        status, out, _ = run("compare", *sides, "--json", *DAY)
        assert status == 0
        part = json.loads(out)
        told.append({name: value for name, value in part.items() if name not in ("before", "after")})
    assert told[0]["counts"]["touched"] > 0
    assert told[1:] == [told[0]] * 3


def test_what_was_supposed_stands_in_the_record_and_on_the_cover(run: Run, tmp_path: Path) -> None:
    fleet = small_site(tmp_path / "site")
    words = ("--set", "bus=B-1:fault_max_ka=31.5", "--set", "motor=P-2:locked_rotor_a=600")
    status, printed, _ = run("compare", fleet, *words, "--out", tmp_path / "out", *DAY)
    assert status == 0
    assert "supposed: bus B-1" in printed
    told = json.loads((tmp_path / "out" / "comparison.json").read_text("utf-8"))
    assert [(one["name"], one["quantity"], one["was"], one["supposed"]) for one in told["supposed"]] == [
        ("B-1", "fault_max_ka", "20 kA", "31.5 kA"),
        ("P-2", "locked_rotor_a", "490 A", "600 A"),
    ]
    cover = " ".join(
        str(cell.value) for row in load_workbook(tmp_path / "out" / "comparison.xlsx")["Change"] for cell in row
    )
    assert "Supposed, not read" in cover
    assert "31.5 kA (read: 20 kA)" in cover
    assert "31.5" not in (fleet / "buses.csv").read_text("utf-8")


def test_no_news_is_said_as_such(run: Run, tmp_path: Path) -> None:
    fleet = small_site(tmp_path / "site")
    _, out, _ = run("compare", fleet, fleet, "--json", *DAY)
    told = json.loads(out)
    assert (told["changed"], told["rows"], told["touched"], told["looked_at"]) == ([], [], [], [])
    assert set(told["counts"]["findings"]) - {"still there"} == {
        name for name, number in told["counts"]["findings"].items() if number == 0 and name != "still there"
    }


@pytest.mark.parametrize(
    ("words", "said"),
    [
        ((), "compare wants BEFORE and AFTER"),
        (("{site}", "--set", "bus=B-1:fault_max_ka=21"), "--set goes with one FLEET"),
        (("{nowhere}.json",), "there is no such file"),
        (("{site}", "--out", "{site}"), "inputs stand there"),
        (("{site}", "--share", "-1"), "below nought"),
    ],
)
def test_wrong_words_are_refused(run: Run, tmp_path: Path, words: tuple[str, ...], said: str) -> None:
    site = small_site(tmp_path / "site")
    filled = [word.format(site=site, nowhere=tmp_path / "nowhere") for word in words]
    status, out, err = run("compare", site, *filled, *DAY)
    assert (status, out) == (2, "")
    assert said in err
    assert "Traceback" not in err


def test_a_newer_record_is_refused(run: Run, tmp_path: Path) -> None:
    site = small_site(tmp_path / "site")
    run("audit", site, "--out", tmp_path / "record", *DAY)
    file = tmp_path / "record" / "findings.json"
    file.write_text(
        file.read_text("utf-8").replace(f'"record_version": {RECORD_VERSION}', '"record_version": 99'), "utf-8"
    )
    for words in (("compare", file, site), ("audit", site, "--previous", file, "--out", tmp_path / "new")):
        status, _, err = run(*words, *DAY)
        assert status == 2
        assert "version 99" in err


def test_rules_that_changed_since_a_record_are_said(run: Run, tmp_path: Path) -> None:
    site = small_site(tmp_path / "site", fault=24)
    run("audit", site, "--out", tmp_path / "record", *DAY)
    rules = tmp_path / "rules"
    rules.mkdir()
    (rules / "own.toml").write_text(
        '[limits]\nbus_dip_lowest_share = { value = 0.999, reason = "a weak supply" }\n', "utf-8"
    )
    _, out, _ = run("compare", tmp_path / "record", site, "--rules", rules, "--json", *DAY)
    told = json.loads(out)
    assert any("1 of its verdicts" in notice for notice in told["notices"])
    assert told["counts"]["findings"]["new"] == 0


def test_a_refusal_is_an_error_of_its_own_kind() -> None:
    assert issubclass(Refusal, Exception)

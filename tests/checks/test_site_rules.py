"""A site's own rules: limits overridden, checks added, checks switched off; each change is seen wherever it matters."""

from __future__ import annotations

import io
import json
from datetime import date
from pathlib import Path

import pytest
from openpyxl import Workbook
from rich.console import Console

from audit.checks.catalogue import load_catalogue
from audit.findings.audit import Audit
from audit.findings.render import FindingRenderer
from audit.limits.limits import BadRule
from audit.pipeline import audit_path
from audit.report.record.write import write_json
from audit.report.terminal.summary import print_summary
from audit.report.workbook.sheets.cover import write_cover
from audit.rule_folder import sample_folder

LIMITS = """
[limits]
start_offset_multiple = { value = 3.5, reason = "two trips on starts of the long feeders" }

[switched_off]
start-timer-on = "all starts are timed by the control system"
speed-switch-where-start-outlasts-stall = "judged by the maker of the mills"
"""
ADDED = """
[pumps-have-an-undercurrent-trip]
subject = "motor"
function = "37"
says = "A pump has no undercurrent trip"
when = "motor_relay_fitted and driven_machine == pump"
judges = "undercurrent_trip_on"
must_be = "on"
severity = "observation"
severity_because = "rule of the site"
why = "The site has lost two pumps that ran dry."
blind_spots = "A throttled pump is not told from a dry one."
remedy = "Switch the undercurrent trip on."
source = "rule of the site"
  [[pumps-have-an-undercurrent-trip.case]]
  gives = "breach"
  working = "off"
  motor = { overload_device = "motor_relay", driven_machine = "pump", undercurrent_trip_on = false }
"""
CHANGED = {
    "start_offset_multiple": ("limit", "1.7", "3.5", "two trips on starts of the long feeders"),
    "start-timer-on": ("check switched off", "on", "off", "all starts are timed by the control system"),
    "speed-switch-where-start-outlasts-stall": (
        "check switched off", "on", "off", "judged by the maker of the mills",
    ),
    "pumps-have-an-undercurrent-trip": (
        "check added", "", "observation", "The site has lost two pumps that ran dry.",
    ),
}  # fmt: skip
"""By name: kind, what it was, what it is, reason. 1.7 is the value of common practice that the rules come with."""


@pytest.fixture(scope="module")
def site_rules(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Write the site's rules, in two files."""
    folder = tmp_path_factory.mktemp("site") / "rules"
    folder.mkdir()
    (folder / "changes.toml").write_text(LIMITS, "utf-8")
    (folder / "pumps.toml").write_text(ADDED, "utf-8")
    return folder


@pytest.fixture(scope="module")
def plain() -> Audit:
    """Audit the sound works by the rules as they come."""
    return audit_path(sample_folder() / "sound", audited_on=date(2026, 11, 30))


@pytest.fixture(scope="module")
def changed(site_rules: Path) -> Audit:
    """Audit the same works by the site's rules."""
    return audit_path(sample_folder() / "sound", site_rules=site_rules, audited_on=date(2026, 11, 30))


def test_without_site_rules_nothing_is_changed(plain: Audit) -> None:
    assert plain.catalogue.changes == ()


def test_every_change_is_listed_with_what_it_was_and_why(changed: Audit) -> None:
    assert {c.name: (c.kind, c.was, c.now, c.reason) for c in changed.catalogue.changes} == CHANGED


def test_an_overridden_limit_is_the_one_that_judges(plain: Audit, changed: Audit) -> None:
    check = "short-circuit-rides-through-start"
    assert not [f for f in FindingRenderer(plain).all() if f.check == check]
    found = [f for f in FindingRenderer(changed).all() if f.check == check]
    assert found
    by_tag = dict(zip(changed.fleet.tables["motor"].keys, range(10**6), strict=False))
    greatest = changed.workings.column("motor", "upper_start_current_a").values
    rms = [f for f in found if f.low == pytest.approx(3.5 * greatest[by_tag[f.motor]])]
    assert rms
    limit = changed.catalogue.limits["start_offset_multiple"]
    assert (limit.value, limit.overridden_from) == (3.5, 1.7)


def test_an_added_check_judges_like_any_other(plain: Audit, changed: Audit) -> None:
    name = "pumps-have-an-undercurrent-trip"
    assert name not in plain.check_names()
    assert name in changed.check_names()
    found = [f for f in FindingRenderer(changed).all() if f.check == name]
    assert found
    assert {f.severity for f in found} == {"observation"}
    assert {f.pack for f in found} == {"core"}


def test_a_check_switched_off_judges_nothing(plain: Audit, changed: Audit) -> None:
    for name, (kind, *_) in CHANGED.items():
        if kind == "check switched off":
            assert name in plain.check_names()
            assert name not in changed.check_names()
    assert len(changed.check_names()) == len(plain.check_names()) - 2 + 1


def test_the_record_lists_every_change(changed: Audit) -> None:
    stream = io.StringIO()
    write_json(changed, stream)
    overrides = json.loads(stream.getvalue())["rules"]["overrides"]
    assert {o["name"]: (o["kind"], o["was"], o["now"], o["reason"]) for o in overrides} == CHANGED


def test_the_cover_names_every_change_with_its_reason(plain: Audit, changed: Audit) -> None:
    def cover(audit: Audit) -> list[str]:
        sheet = Workbook().worksheets[0]
        write_cover(audit, sheet)
        return [" ".join(str(cell) for cell in row if cell is not None) for row in sheet.iter_rows(values_only=True)]

    for name, (kind, was, now, reason) in CHANGED.items():
        assert any(all(part in row for part in (kind, name, was, now if was else "", reason)) for row in cover(changed))
    assert any("site rules none" in row for row in cover(plain))


def test_the_summary_names_every_change_with_its_reason(plain: Audit, changed: Audit) -> None:
    def summary(audit: Audit) -> str:
        console = Console(file=io.StringIO(), width=200)
        print_summary(audit, console)
        assert isinstance(console.file, io.StringIO)
        return console.file.getvalue()

    lines = [line for line in summary(changed).splitlines() if line.startswith("site rule: ")]
    assert len(lines) == len(CHANGED)
    for name, (kind, was, now, reason) in CHANGED.items():
        assert any(all(part in line for part in (kind, name, was, now if was else "", reason)) for line in lines)
    assert "site rule" not in summary(plain)


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        pytest.param("[limits]\nstart_offset_multipel = {value = 2, reason = 'x'}", "start_offset_multiple", id="near"),
        pytest.param("[limits]\nstart_offset_multiple = {value = 2}", "a value and a reason", id="no reason"),
        pytest.param("[limits]\nstart_offset_multiple = {value = 2, reason = ' '}", "a value and a reason", id="blank"),
        pytest.param("[limits]\nstart_offset_multiple = 2", "a value and a reason", id="bare"),
        pytest.param("[limits]\nstart_offset_multiple = {value = nan, reason = 'x'}", "finite number", id="nan"),
        pytest.param("[limits]\nstart_offset_multiple = {value = '2', reason = 'x'}", "finite number", id="text"),
        pytest.param("limits = 5", "table of names", id="limits are no table"),
        pytest.param("switched_off = 'start-timer-on'", "table of names", id="switched off is no table"),
        pytest.param("[switched_off]\nstart-timer-onn = 'x'", "start-timer-on", id="unknown check"),
        pytest.param("[switched_off]\nstart-timer-on = ''", "without a reason", id="off without a reason"),
        pytest.param("[switched_off]\nstart-timer-on = true", "without a reason", id="off with a truth"),
        pytest.param(ADDED.replace("pumps-have-an-undercurrent-trip", "start-timer-on"), "of this name", id="same"),
        pytest.param(ADDED.replace("remedy", "remedie"), "not a key of a check", id="unknown key"),
        pytest.param(ADDED.replace('why = "The', 'source_two = 1\nwhy = "The'), "not a key", id="another key"),
        pytest.param(ADDED.replace("driven_machine == pump", "driven_machin == pump"), "driven_machine", id="name"),
        pytest.param(ADDED.replace('"undercurrent_trip_on"', '"undercurrent_trip_delay_s"'), "truth", id="sort"),
        pytest.param(
            ADDED.replace('must_be = "on"', 'at_most = "full_load_a"').replace("_trip_on", "_trip_delay_s", 1),
            "is judged against", id="unit",
        ),
        pytest.param(ADDED.replace("driven_machine == pump", "__import__('os').remove('x')"), "", id="code"),
        pytest.param(ADDED.replace("driven_machine == pump", "(" * 5000 + "yes" + ")" * 5000), "", id="deep"),
        pytest.param("[limits\n", "not valid TOML", id="broken"),
        pytest.param("x = " + "[" * 50_000, "nested too deep", id="nested"),
    ],
)  # fmt: skip
def test_a_wrong_rule_is_refused_with_its_file_and_what_is_wrong(tmp_path: Path, text: str, problem: str) -> None:
    (tmp_path / "ours.toml").write_text(text, "utf-8")
    with pytest.raises(BadRule) as refused:
        load_catalogue(tmp_path)
    assert "ours.toml" in str(refused.value)
    assert problem in str(refused.value)


@pytest.mark.parametrize("content", [b"\xff\xfe[limits]", b"# " + b"x" * 2_100_000], ids=["not UTF-8", "too large"])
def test_a_file_that_is_no_rule_file_is_refused(tmp_path: Path, content: bytes) -> None:
    (tmp_path / "ours.toml").write_bytes(content)
    with pytest.raises(BadRule, match=r"ours\.toml"):
        load_catalogue(tmp_path)


def test_a_folder_that_is_not_there_is_refused(tmp_path: Path) -> None:
    with pytest.raises(BadRule, match="no such folder"):
        load_catalogue(tmp_path / "nowhere")


def test_a_derived_quantity_of_the_tool_cannot_be_replaced(tmp_path: Path) -> None:
    (tmp_path / "derived").mkdir()
    recipe = '[upper_start_current_a]\nlabel = "ours"\nstated = "full_load_a"\n'
    (tmp_path / "derived" / "ours.toml").write_text(recipe, "utf-8")
    with pytest.raises(BadRule, match="already derived"):
        load_catalogue(tmp_path)

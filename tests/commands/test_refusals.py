"""Wrong input: one clear message on stderr, exit 2, no traceback, nothing half written."""

from __future__ import annotations

import sys
import zipfile
from pathlib import Path

import pytest
from openpyxl import Workbook

from audit.cli import main
from audit.rule_folder import sample_folder


def run(capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, *words: str) -> tuple[int, str, str]:
    monkeypatch.setattr(sys, "argv", ["motor-audit", *words])
    with pytest.raises(SystemExit) as ended:
        main()
    output = capsys.readouterr()
    return int(ended.value.code or 0), output.out, output.err


@pytest.fixture
def refused(capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, tmp_path: Path):
    def check(fleet: Path, *more: str) -> str:
        out = tmp_path / "out"
        status, printed, message = run(capsys, monkeypatch, "audit", str(fleet), "--out", str(out), *more)
        assert status == 2
        assert printed == ""
        assert message.startswith("motor-audit: ")
        assert "Traceback" not in message
        assert not out.exists(), "nothing is written where nothing can be judged"
        return message

    return check


def motors(path: Path, *rows: list[object]) -> Path:
    book = Workbook()
    sheet = book.worksheets[0]
    for row in rows:
        sheet.append(row)
    book.save(path)
    return path


def test_a_folder_that_is_not_there(refused, tmp_path: Path) -> None:
    assert "nowhere" in refused(tmp_path / "nowhere")


def test_a_folder_without_workbooks(refused, tmp_path: Path) -> None:
    (tmp_path / "site").mkdir()
    assert "holds no workbook" in refused(tmp_path / "site")


@pytest.mark.parametrize("content", [b"", b"not a workbook at all", b"PK\x03\x04 cut off", b"%PDF-1.7 ..."])
def test_a_file_that_is_no_workbook(refused, tmp_path: Path, content: bytes) -> None:
    path = tmp_path / "motors.xlsx"
    path.write_bytes(content)
    assert "motors.xlsx" in refused(path)


def test_a_truncated_workbook(refused, tmp_path: Path) -> None:
    whole = (sample_folder() / "motor_list.xlsx").read_bytes()
    path = tmp_path / "motors.xlsx"
    path.write_bytes(whole[: len(whole) // 2])
    assert "motors.xlsx" in refused(path)


def test_a_workbook_without_a_motor_list(refused, tmp_path: Path) -> None:
    path = motors(tmp_path / "notes.xlsx", ["Minutes of the meeting"], ["Coffee was served"])
    assert "list of motors" in refused(path)


def test_a_zip_that_grows_beyond_measure(refused, tmp_path: Path) -> None:
    path = tmp_path / "motors.xlsx"
    with zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as archive:
        archive.writestr("[Content_Types].xml", "<Types/>")
        archive.writestr("xl/worksheets/sheet1.xml", b"0" * 400_000_000)
    assert "times its size" in refused(path)


GOOD = (
    ["Tag", "kW", "Voltage (V)", "FLA (A)", "Starting Method"],
    ["P-1", 75, 400, 133, "DOL"],
    ["P-2", 90, 400, 160, "DOL"],
)


@pytest.mark.parametrize(
    ("text", "part"),
    [
        ("[my-check]\nsubjct = 'motor'\n", "nearest known name is 'subject'"),
        ("not toml at all [", "not valid TOML"),
        ("[limits]\nstart_offset_multipel = {value = 1.6, reason = 'x'}\n", "start_offset_multiple"),
        ("[limits]\nstart_offset_multiple = {value = 1.6, reason = ''}\n", "reason"),
        ("[limits]\nstart_offset_multiple = {value = nan, reason = 'x'}\n", "finite"),
        ("[switched_off]\nno-such-check = 'x'\n", "not a known check"),
        ("[switched_off]\nunbalance-trip-on = ''\n", "without a reason"),
    ],
)
def test_a_site_rule_with_a_typo(refused, tmp_path: Path, text: str, part: str) -> None:
    fleet = motors(tmp_path / "motors.xlsx", *GOOD)
    rules = tmp_path / "rules"
    rules.mkdir()
    (rules / "site.toml").write_text(text, encoding="utf-8")
    message = refused(fleet, "--rules", str(rules))
    assert "site.toml" in message
    assert part in message


HOSTILE = """
[evil]
subject = "motor"
function = "50"
says = "x"
judges = "full_load_a"
at_most = "%s"
severity = "unsafe"
severity_because = "x"
why = "x"
blind_spots = "x"
remedy = "x"
source = "x"
case = [{gives = "breach", working = "x", motor = {}}]
"""


@pytest.mark.parametrize(
    "expression",
    [
        "__import__('os').system('true')",
        "full_load_a.__class__",
        "full_load_a ** 99999",
        "rated_voltage_v",
        "full_load_aa",
        "1e400 * full_load_a",
    ],
)
def test_a_hostile_site_rule(refused, tmp_path: Path, expression: str) -> None:
    fleet = motors(tmp_path / "motors.xlsx", *GOOD)
    rules = tmp_path / "rules"
    rules.mkdir()
    (rules / "site.toml").write_text(HOSTILE % expression, encoding="utf-8")
    assert "evil" in refused(fleet, "--rules", str(rules))


def test_the_output_folder_may_not_be_the_input_folder(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    motors(tmp_path / "motors.xlsx", *GOOD)
    before = sorted(path.name for path in tmp_path.iterdir())
    status, _, message = run(capsys, monkeypatch, "audit", str(tmp_path), "--out", str(tmp_path))
    assert status == 2
    assert "never written to" in message
    assert sorted(path.name for path in tmp_path.iterdir()) == before


def test_an_unknown_severity(refused, tmp_path: Path) -> None:
    assert "unsafe, nuisance" in refused(motors(tmp_path / "motors.xlsx", *GOOD), "--fail-on", "bad")


def test_one_unreadable_workbook_does_not_stop_the_others(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    site = tmp_path / "site"
    site.mkdir()
    motors(site / "motors.xlsx", *GOOD)
    (site / "broken.xlsx").write_bytes(b"PK\x03\x04 cut off")
    status, printed, _ = run(capsys, monkeypatch, "audit", str(site), "--out", str(tmp_path / "out"))
    assert status == 0
    assert "broken.xlsx" in printed
    assert (tmp_path / "out" / "findings.json").exists()


def test_findings_at_or_above_a_severity_give_exit_one(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    words = ("audit", str(sample_folder()), "--out", str(tmp_path / "out"), "--fail-on", "unsafe")
    assert run(capsys, monkeypatch, *words)[0] == 1


def test_the_inputs_are_never_written_to(
    capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch, tmp_path: Path
) -> None:
    before = {path: path.read_bytes() for path in sample_folder().glob("*.*") if path.is_file()}
    run(capsys, monkeypatch, "audit", str(sample_folder()), "--out", str(tmp_path / "out"))
    assert {path: path.read_bytes() for path in sample_folder().glob("*.*") if path.is_file()} == before


def test_a_pack_that_does_not_exist(refused, tmp_path: Path) -> None:
    fleet = motors(tmp_path / "motors.xlsx", *GOOD)
    message = refused(fleet, "--pack", "metring")
    assert "'metring' is not a pack" in message
    assert "nearest known name is 'metering'" in message

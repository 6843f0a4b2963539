"""The comparison of two fleets is written whatever kind of value has changed."""

from __future__ import annotations

import json
import sys
from pathlib import Path

import pytest

from audit.cli import main

HEADERS = "Tag,kW,Voltage [V],FLC [A],Must Run\n"


def site(folder: Path, must_run: str) -> Path:
    folder.mkdir()
    (folder / "motors.csv").write_text(f"{HEADERS}P-1,30,400,55,{must_run}\nP-2,30,400,55,N\n", encoding="utf-8")
    return folder


def test_a_changed_yes_or_no_is_written(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    before, after = site(tmp_path / "before", "N"), site(tmp_path / "after", "Y")
    out = tmp_path / "out"
    monkeypatch.setattr(sys, "argv", ["motor-audit", "compare", str(before), str(after), "--out", str(out)])
    with pytest.raises(SystemExit) as ended:
        main()
    assert not ended.value.code
    changed = json.loads((out / "comparison.json").read_text(encoding="utf-8"))["changed"]
    assert [(one["name"], one["before"], one["after"]) for one in changed] == [("P-1", False, True)]

"""Run commands as a user does, and small sites to run them on."""

from __future__ import annotations

import sys
from collections.abc import Callable
from pathlib import Path

import pytest

from audit.cli import main

Run = Callable[..., tuple[int, str, str]]
MOTORS = (
    "Tag No.,Bus,Rated Power (kW),Rated Voltage (V),Full Load Current (A),Locked Rotor Current (A),Starting Method,"
    "Make,Motor Type,50 Enable,50 Pickup (A),Switching Device,Breaking Capacity (kA)\n"
)
BUSES = "Switchboard,Nominal Voltage (V),Ik max (kA),Ik min (kA),X/R\nB-1,6600,{fault},10,15\n"


@pytest.fixture
def run(capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch) -> Run:
    """Run a command; give its exit status, stdout and stderr."""

    def command(*words: str | Path) -> tuple[int, str, str]:
        monkeypatch.setenv("COLUMNS", "100")
        monkeypatch.setattr(sys, "argv", ["motor-audit", *map(str, words)])
        with pytest.raises(SystemExit) as ended:
            main()
        output = capsys.readouterr()
        return int(ended.value.code or 0), output.out, output.err

    return command


def small_site(folder: Path, *, fault: float = 20, pickup: float = 900, motors: int = 3) -> Path:
    """Write a site of a few motors as plain tables."""
    folder.mkdir(parents=True)
    rows = "".join(
        f"P-{number},B-1,800,6600,82,490,DOL,Vexmoor Electric,HV800-4,Y,{pickup},CB,15\n"
        for number in range(1, motors + 1)
    )
    (folder / "motors.csv").write_text(MOTORS + rows, "utf-8")
    (folder / "buses.csv").write_text(BUSES.format(fault=fault), "utf-8")
    return folder

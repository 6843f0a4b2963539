"""Where the rules and the sample stand: beside the package when installed, beside the checkout otherwise."""

from __future__ import annotations

from importlib.resources import files
from pathlib import Path


def _shipped(name: str) -> Path:
    installed = Path(str(files("audit"))) / "shipped" / name
    return installed if installed.is_dir() else Path(str(files("audit"))).parent / name


def rules_folder() -> Path:
    """Give the folder of the rules that come with the tool."""
    return _shipped("rules")


def sample_folder() -> Path:
    """Give the folder of the sample fleet that comes with the tool."""
    return _shipped("sample_fleet")

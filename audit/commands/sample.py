"""A copy of the sample fleet as a command."""

from __future__ import annotations

import shutil
from pathlib import Path

from audit.commands.consoles import table_console
from audit.refusal import Refusal
from audit.rule_folder import sample_folder


def run_sample(folder: Path) -> int:
    """Copy the sample fleet into a new folder."""
    if folder.exists():
        raise Refusal(f"{folder}: exists already. Give the name of a folder that does not exist yet.")
    shutil.copytree(sample_folder(), folder, ignore=shutil.ignore_patterns("__pycache__", "*.py"))
    table_console().print(f"The sample fleet stands in {folder}. Try: motor-audit audit {folder}")
    return 0

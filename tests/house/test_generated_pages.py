"""Generated pages agree with the files that they are made from."""

from __future__ import annotations

import difflib
from pathlib import Path

import pytest

from audit.report.pages import pages
from audit.rule_folder import rules_folder


@pytest.mark.parametrize("name", ["README.md", "QUANTITIES.md", "FUNCTIONS.md"])
def test_page_is_what_the_files_give(name: str) -> None:
    page: Path = rules_folder() / name
    wanted = pages()[name].splitlines()
    lines = difflib.unified_diff(page.read_text("utf-8").splitlines(), wanted, "as it is", "as made", n=0)
    assert "\n".join(lines) == "", "run: python -m audit.report.pages"

"""Generated pages agree with the files that they are made from."""

from __future__ import annotations

import difflib
from pathlib import Path

import pytest

from audit.checks.catalogue import load_catalogue
from audit.report.pages import quantities_page, rules_page
from audit.rule_folder import rules_folder


@pytest.mark.parametrize("name", ["README.md", "QUANTITIES.md"])
def test_page_is_what_the_files_give(name: str) -> None:
    page: Path = rules_folder() / name
    wanted = rules_page(load_catalogue()) if name == "README.md" else quantities_page()
    lines = difflib.unified_diff(page.read_text("utf-8").splitlines(), wanted.splitlines(), "as it is", "as made", n=0)
    assert "\n".join(lines) == "", "run: python -m audit.report.pages"

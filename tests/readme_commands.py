"""Print one of the README's two commands, so that what is run here is what a reader runs."""

from __future__ import annotations

import re
import sys
from pathlib import Path

README = Path(__file__).parent.parent / "README.md"


def command(name: str) -> str:
    """Give the command in the first code block below the line that ends in 'the main job:' or 'the tests:'."""
    ending = {"job": "the main job:", "tests": "the tests:"}[name]
    text = README.read_text("utf-8")
    found = re.search(rf"{re.escape(ending)}\s*\n+```sh\n(.+?)\n```", text, re.DOTALL)
    if found is None:
        raise SystemExit(f"README.md has no command below '{ending}'")
    return found.group(1)


if __name__ == "__main__":
    print(command(sys.argv[1]))

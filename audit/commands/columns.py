"""How the workbooks were understood, as a command; saved as fleet.toml for correction."""

from __future__ import annotations

from pathlib import Path

from audit.commands.consoles import progress_console, table_console
from audit.intake import gather
from audit.intake.sitemap_text import save_map
from audit.refusal import Refusal
from audit.report.terminal.reading import print_reading


def run_columns(fleet: Path, *, save: bool) -> int:
    """Print how every column was read; with `save`, write fleet.toml beside the workbooks."""
    with progress_console().status("reading", spinner="line"):
        gathered = gather(fleet)
    console = table_console()
    print_reading(gathered, console)
    if save:
        target = (fleet if fleet.is_dir() else fleet.parent) / "fleet.toml"
        if target.exists():
            raise Refusal(f"{target}: exists already and rules the reading. Move it away first, then save again.")
        save_map(gathered, target)
        console.print(f"written: {target}; correct it, and it rules from then on")
    return 0

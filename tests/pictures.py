"""Make the README's two pictures from a run on the sample: python -m tests.pictures (needs soffice and pdftoppm)."""

from __future__ import annotations

import subprocess
import tempfile
from datetime import date
from io import StringIO
from pathlib import Path

from rich.console import Console
from rich.terminal_theme import TerminalTheme
from rich.text import Text

from audit.pipeline import audit_path
from audit.report.terminal.findings import print_findings
from audit.report.terminal.summary import print_summary
from audit.report.workbook.write import write_workbooks
from audit.rule_folder import sample_folder

ROOT = Path(__file__).parent.parent
PICTURES = ROOT / ".pictures"
WIDTH = 118
# rich's own frame asks a font from the network; a picture in a repository needs neither font nor frame
FRAME = """<svg xmlns="http://www.w3.org/2000/svg" xml:space="preserve" viewBox="0 0 {width} {height}">
<style>
.{unique_id}-matrix {{ font-family: "DejaVu Sans Mono", Menlo, Consolas, monospace; font-size: {char_height}px;
line-height: {line_height}px; }}
{styles}
</style>
<defs>{lines}</defs>
<rect fill="#ffffff" width="100%" height="100%"/>
<g transform="translate(9, 9)">{backgrounds}<g class="{unique_id}-matrix">{matrix}</g></g>
</svg>
"""
LIGHT = TerminalTheme(
    (255, 255, 255),
    (30, 30, 30),
    [(0, 0, 0), (178, 34, 34), (0, 110, 0), (140, 90, 0), (25, 75, 160), (130, 40, 130), (0, 110, 110), (90, 90, 90)],
    [(0, 0, 0), (178, 34, 34), (0, 110, 0), (140, 90, 0), (25, 75, 160), (130, 40, 130), (0, 110, 110), (90, 90, 90)],
)
SHOWN_LINES = 40


def main() -> None:
    """Write terminal.svg and workbook.png."""
    result = audit_path(sample_folder(), audited_on=date(2026, 11, 30))
    whole = Console(file=StringIO(), record=True, width=WIDTH, highlight=False)
    print_findings(result, whole)
    lines = whole.export_text(styles=True).splitlines()
    start = next(number for number, line in enumerate(lines) if "unsafe" in line)
    console = Console(file=StringIO(), record=True, width=WIDTH, highlight=False)
    for line in lines[start : start + SHOWN_LINES]:
        console.print(Text.from_ansi(line))
    console.print("…")
    print_summary(result, console)
    PICTURES.mkdir(exist_ok=True)
    picture = console.export_svg(theme=LIGHT, code_format=FRAME, unique_id="run")
    (PICTURES / "terminal.svg").write_text(picture, encoding="utf-8")
    with tempfile.TemporaryDirectory() as scratch:
        folder = Path(scratch)
        motor_list = next(w.path for w in write_workbooks(result, folder) if "motor_list" in w.path.name)
        convert = ["soffice", "--headless", "--convert-to", "pdf", "--outdir", scratch, str(motor_list)]
        subprocess.run(convert, check=True, capture_output=True)
        page = ["pdftoppm", "-r", "80", "-f", "2", "-l", "2", "-singlefile", "-png"]
        subprocess.run([*page, str(motor_list.with_suffix(".pdf")), str(PICTURES / "workbook")], check=True)


if __name__ == "__main__":
    main()

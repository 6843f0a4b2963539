"""How severities look: a letter and a colour, never a colour alone."""

from __future__ import annotations

from rich.text import Text

LETTER = {"unsafe": "U", "nuisance": "N", "inconsistent": "I", "observation": "O"}
STYLE = {"unsafe": "bold red", "nuisance": "bold magenta", "inconsistent": "bold blue", "observation": "bold"}
MEANING = {
    "unsafe": "damage or injury can come before the protection acts",
    "nuisance": "a healthy motor can be tripped",
    "inconsistent": "records or like motors disagree",
    "observation": "practice is divided, or a better choice exists",
}
WIDE = 120
"""From this width on, a finding's cell and reason stand in columns of their own."""


def severity_word(severity: str) -> Text:
    """Give a severity as a word with its letter and colour."""
    return Text(f"{LETTER[severity]} {severity}", STYLE[severity])


def counted(number: int, noun: str) -> str:
    """Write a number with its noun.

    >>> counted(1, "motor"), counted(1200, "check"), counted(2, "bus")
    ('1 motor', '1,200 checks', '2 buses')
    """
    plural = noun if number == 1 else f"{noun}es" if noun.endswith("s") else f"{noun}s"
    return f"{number:,} {plural}"

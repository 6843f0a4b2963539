"""The catalogue as a command."""

from __future__ import annotations

import json
import sys
from dataclasses import asdict
from pathlib import Path

from audit.checks.cases import run_cases
from audit.checks.catalogue import Catalogue, load_catalogue
from audit.checks.wording import requirement_in_words
from audit.commands.consoles import table_console
from audit.expression.units import nearest
from audit.refusal import Refusal
from audit.report.terminal.catalogue import print_catalogue, print_check, print_verification


def run_checks(name: str | None, *, verify: bool, as_json: bool, rules: Path | None) -> int:
    """Print the catalogue, one check, or the outcome of all worked cases."""
    catalogue = load_catalogue(rules)
    if name is not None and not catalogue.named(name):
        known = [check.name for check in catalogue.checks]
        raise Refusal(f"'{name}' is not a check{nearest(name, known)}. 'motor-audit checks' lists all.")
    console = table_console()
    if verify:
        results = [r for r in run_cases(catalogue) if name is None or r.check.name == name]
        print_verification(results, console)
        return 1 if any(not result.holds() for result in results) else 0
    if as_json:
        json.dump([_plain(catalogue, number) for number in range(len(catalogue.checks))], sys.stdout, indent=1)
        sys.stdout.write("\n")
    elif name is not None:
        print_check(catalogue.named(name)[0], catalogue, console)
    else:
        print_catalogue(catalogue, console)
    return 0


def _plain(catalogue: Catalogue, number: int) -> dict[str, object]:
    check = catalogue.checks[number]
    words = ("name", "pack", "subject", "function", "severity", "says", "severity_because", "why", "blind_spots",
             "remedy", "source", "when_text", "each")  # fmt: skip
    entry: dict[str, object] = {word: getattr(check, word) for word in words}
    entry["requires"] = [requirement_in_words(r, str, str) for r in check.requirements]
    entry["cases"] = [{**asdict(case), "given": dict(case.given)} for case in check.cases]
    return entry

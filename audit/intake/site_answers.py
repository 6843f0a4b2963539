"""What fleet.toml says put to use: what columns hold, and which motors must run."""

from __future__ import annotations

import numpy as np

from audit.fleet.addresses import NO_CELL
from audit.fleet.fleet import Complaint
from audit.fleet.folding import exact
from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.header_rows import Heading
from audit.intake.recognition.plans import MAPPED, UNREAD, Plan
from audit.intake.recognition.sheets import said
from audit.intake.recognition.source import Source
from audit.intake.recognition.tables import Verdict
from audit.intake.run import Run
from audit.intake.sitemap import MappedSheet, same_header


def plans_of_map(heading: Heading, verdict: Verdict, entry: MappedSheet | None, source: Source) -> dict[int, Plan]:
    """Give the plans of the columns that the site map speaks of."""
    plans: dict[int, Plan] = {}
    labels = {column: heading.label(column) for column in heading.texts}
    for said_of in entry.columns if entry else ():
        headed = [c for c, label in labels.items() if said_of.header and same_header(label, said_of.header)]
        if said_of.column and (not said_of.header or said_of.column in headed):
            headed = [said_of.column]
        if not headed:
            source.remark(
                -1,
                f"fleet.toml speaks of a column '{said_of.header or said_of.column}', which the sheet does not have",
                "headers as they stand on the sheet",
                "Correct the header in fleet.toml.",
            )
        combined = said_of.quantity if said_of.quantity in combined_readings() else ""
        for column in headed:
            found = verdict.matches.get(column)
            plans[column] = Plan(
                column,
                labels.get(column, ""),
                "" if combined else said_of.quantity,
                combined,
                said_of.unit,
                found.group if found else "",
                MAPPED if said_of.quantity else UNREAD,
            )
    return plans


def mark_must_run(run: Run) -> None:
    """Mark the motors that the site map names as must-run."""
    wanted = {exact(tag) for tag in run.map.must_run}
    if not wanted:
        return
    met: set[str] = set()
    for block in [block for block in run.readings if block.quantity == "motor" and block.table == "motor"]:
        tags = [exact(text) if isinstance(text, str) else "" for text in block.text.tolist()]
        places = np.array([place for place, tag in enumerate(tags) if tag in wanted], dtype=np.int64)
        met.update(tags[place] for place in places.tolist())
        if places.size:
            size = len(places)
            made = said(
                "must_run", block.record[places], ["yes"] * size, np.full(size, NO_CELL, dtype=np.int64), "fleet.toml"
            )
            made.table = "motor"
            run.readings.append(made)
    for tag in run.map.must_run:
        if exact(tag) not in met:
            run.complaints.append(
                Complaint(
                    "fleet.toml",
                    "",
                    "",
                    f"must_run names '{tag}', which no motor list has",
                    "tags of the motor list",
                    "Correct the tag.",
                    "must_run",
                    weight="remark",
                )
            )

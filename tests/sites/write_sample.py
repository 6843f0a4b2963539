"""Write the sample works, its sound twin and its state after a modification: python -m tests.sites.write_sample."""

from __future__ import annotations

import csv
from pathlib import Path

from tests.sites.tarnholt.expected import EXPECTED_OBSERVATIONS
from tests.sites.tarnholt.modification import modified_site
from tests.sites.tarnholt.sample import Rows, sample_site
from tests.sites.tarnholt.sound import sound_site
from tests.sites.writing.site_folder import write_site

SAMPLE_FLEET = Path(__file__).parents[2] / "sample_fleet"


def write_table(rows: Rows, path: Path, headers: tuple[str, ...]) -> None:
    """Write a plain table."""
    with path.open("w", encoding="utf-8", newline="") as file:
        writer = csv.DictWriter(file, headers, lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)


def write_all(folder: Path) -> None:
    """Write everything that the generator owns into a folder."""
    sample = sample_site()
    write_site(sample.site, folder, ("planted_defects.csv", "missing_data.csv"))
    write_table(
        sample.defects,
        folder / "planted_defects.csv",
        ("subject_key", "check", "severity", "setting_or_datum", "planted_value", "sound_value", "why"),
    )
    write_table(
        sample.missing, folder / "missing_data.csv", ("subject", "subject_key", "datum", "stands_in_cell", "why")
    )
    write_site(sound_site(), folder / "sound", ("expected_observations.csv",))
    write_table(
        EXPECTED_OBSERVATIONS, folder / "sound" / "expected_observations.csv", ("subject_key", "check", "reason")
    )
    modified = modified_site()
    after = folder / "after_modification"
    write_site(modified.site, after, ("changes.csv", "expected_findings.csv", "expected_comparison.csv"))
    write_table(modified.changes, after / "changes.csv", ("subject", "subject_key", "datum", "before", "after", "why"))
    write_table(modified.findings, after / "expected_findings.csv", ("subject_key", "check", "turn", "cause"))


if __name__ == "__main__":
    write_all(SAMPLE_FLEET)

"""A fleet compared with itself is no news, whatever the order of rows, files and sheets."""

from __future__ import annotations

import random
import tempfile
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from audit.checks.catalogue import Catalogue
from audit.findings.audit import Audit
from audit.findings.comparison import compare
from audit.fleet.fleet import Fleet
from audit.intake import read_fleet
from audit.pipeline import audit_fleet, judge_fleet
from audit.report.record.read import read_record
from audit.report.record.write import write_record
from tests.findings.comparison.conftest import DAY, sheet_rows, usual_files, write_site
from tests.sites.tarnholt.sample import sample_site
from tests.sites.writing.site_folder import write_site as write_whole_site


def shuffled_files(choose: random.Random) -> dict[str, list[tuple[str, str, list[tuple[object, ...]]]]]:
    """Spread the same rows in any order over sheets and files of any name."""
    sheets = []
    for table, rows in sheet_rows().items():
        order = choose.sample(rows, len(rows))
        cut = choose.randint(1, len(order))
        sheets += [(f"{table} {part}", table, some) for part, some in enumerate((order[:cut], order[cut:])) if some]
    choose.shuffle(sheets)
    files: dict[str, list[tuple[str, str, list[tuple[object, ...]]]]] = {}
    for sheet in sheets:
        files.setdefault(choose.choice(("a.xlsx", "m.xlsx", "z.xlsx")), []).append(sheet)
    return files


@pytest.fixture(scope="module")
def usual(catalogue: Catalogue, tmp_path_factory: pytest.TempPathFactory) -> Audit:
    folder = write_site(tmp_path_factory.mktemp("usual") / "site", usual_files())
    return audit_fleet(read_fleet(folder), catalogue, audited_on=DAY)


def told(fleet: Fleet) -> list[int]:
    return [fleet.rows(subject) for subject in ("motor", "relay", "bus")]


@settings(max_examples=12, deadline=None)
@given(seed=st.integers(0, 10**9))
def test_order_of_rows_files_and_sheets_is_no_news(usual: Audit, catalogue: Catalogue, seed: int) -> None:
    with tempfile.TemporaryDirectory() as scratch:
        fleet = read_fleet(write_site(Path(scratch) / "site", shuffled_files(random.Random(seed))))
    assert told(fleet) == told(usual.fleet) == [6, 6, 2]
    after = audit_fleet(fleet, catalogue, audited_on=DAY)
    assert compare(usual, after).is_empty()
    assert compare(after, usual).is_empty()


def test_a_fleet_and_its_record_are_no_news(usual: Audit, catalogue: Catalogue, tmp_path: Path) -> None:
    write_record(usual, tmp_path)
    record = read_record(tmp_path)
    assert record.fleet is not None
    judged = judge_fleet(record.fleet, catalogue, audited_on=record.audited_on, packs=usual.packs_in_scope)
    assert compare(judged, usual).is_empty()
    assert compare(usual, judged).is_empty()


def test_the_whole_sample_in_another_order_is_no_news(catalogue: Catalogue, tmp_path: Path) -> None:
    site = sample_site().site
    write_whole_site(site, tmp_path / "one")
    choose = random.Random(20261130)
    for rows in (site.motors, site.relays, site.starts, site.buses):
        choose.shuffle(rows)
    write_whole_site(site, tmp_path / "other")
    one, other = (audit_fleet(read_fleet(tmp_path / name), catalogue, audited_on=DAY) for name in ("one", "other"))
    comparison = compare(one, other)
    assert comparison.standing_counts()["still there"] > 100
    assert comparison.is_empty()

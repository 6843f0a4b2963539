"""Time of judging large fleets, against reading one motor after the other.

The sample's motors are repeated until the fleet is large enough; only judging is timed, reading is not. The baseline
walks one check's expression motor by motor in plain Python, as a first attempt would, and is scaled to all checks.

Run: python -m tests.benchmarks.judge_fleet [motors ...]
"""

from __future__ import annotations

import resource
import sys
import time
from dataclasses import replace
from datetime import date

import numpy as np

from audit.checks.catalogue import load_catalogue
from audit.fleet.column import Column
from audit.fleet.fleet import Fleet, Table
from audit.intake import read_fleet
from audit.pipeline import audit_fleet
from audit.rule_folder import sample_folder

DAY = date(2026, 11, 30)


def repeated(fleet: Fleet, times: int) -> Fleet:
    """Give a fleet with every table repeated, links within each repetition."""
    tables = {}
    for subject, table in fleet.tables.items():
        columns = {
            name: Column(
                c.kind, np.tile(c.values, times), np.tile(c.basis, times), np.tile(c.cell, times), choices=c.choices
            )
            for name, c in table.columns.items()
        }
        keys = tuple(f"{key}~{number}" for number in range(times) for key in table.keys)
        tables[subject] = Table(subject, keys, columns)
    links = {}
    for (child, parent), rows in fleet.links.items():
        size = len(fleet.tables[parent])
        shift = np.repeat(np.arange(times) * size, len(rows))
        links[(child, parent)] = np.where(np.tile(rows, times) >= 0, np.tile(rows, times) + shift, -1)
    return replace(fleet, tables=tables, links=links, other_groups=())


def motor_by_motor(fleet: Fleet) -> float:
    """Time a plain loop over the motors for one simple comparison with its lookups."""
    full_load = fleet.tables["motor"].columns["full_load_a"].values
    pickup = fleet.tables["relay"].columns["thermal_pickup_a"].values
    relay = fleet.links[("motor", "relay")]
    started = time.perf_counter()
    verdicts = []
    for row in range(len(full_load)):
        at = relay[row]
        value = pickup[at] if at >= 0 else float("nan")
        bound = full_load[row] * 1.25
        verdicts.append("unproven" if value != value or bound != bound else "meets" if value <= bound else "breach")
    return time.perf_counter() - started


def main(sizes: list[int]) -> None:
    """Print time, memory and ratio for each size."""
    catalogue = load_catalogue()
    sample = read_fleet(sample_folder())
    for size in sizes:
        fleet = repeated(sample, max(size // sample.rows("motor"), 1))
        started = time.perf_counter()
        result = audit_fleet(fleet, catalogue, audited_on=DAY)
        took = time.perf_counter() - started
        loop = motor_by_motor(fleet) * len(result.outcomes)
        peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
        print(
            f"{fleet.rows('motor'):>8,} motors, {len(result.outcomes)} checks: {took:.2f} s, peak {peak:.0f} MB, "
            f"{len(result.codes):,} findings; one simple check motor by motor x {len(result.outcomes)}: {loop:.2f} s "
            f"(ratio {took / loop:.2f})"
        )


if __name__ == "__main__":
    main([int(word) for word in sys.argv[1:]] or [1_000, 10_000, 100_000])

"""The sample written anew: its lists in other units, its settings in amperes or as multiples and secondary values."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from pathlib import Path
from tempfile import TemporaryDirectory

import pytest

from tests.proofs.cells import Restated, change_workbooks
from tests.sites.notation import LAYOUTS, Written
from tests.sites.plant import Site
from tests.sites.writing.site_folder import write_site

US = {
    "kW": ("hp", 1 / 0.745_699_871_582_270_22),
    "V": ("kV", 1e-3),
    "kA": ("A", 1e3),
    "A": ("kA", 1e-3),
    "s": ("ms", 1e3),
    "ms": ("s", 1e-3),
    "min": ("h", 1 / 60),
    "m": ("ft", 1 / 0.3048),
    "kg m2": ("lb ft2", 1 / 0.042_140_110_093_804_813),
    "ohm": ("mohm", 1e3),
    "A2s": ("kA2s", 1e-6),
}
"""Horsepower of 550 ft lbf/s; international foot and avoirdupois pound."""
PLAIN = {"s": ("min", 1 / 60), "kA": ("A", 1e3), "kW": ("PS", 1 / 0.735_498_75)}

PRIMARY = {
    "x FLA": "A", "% FLA": "A", "x CT": "A", "A sec": "A", "A sec earth": "A", "V sec": "V", "% motor Un": "V",
    "ms": "s", "cycles": "s", "min": "s",
}  # fmt: skip
RELATIVE = {
    "x FLA": "% FLA", "% FLA": "x CT", "x CT": "A sec", "A sec": "x FLA", "A": "A sec", "V sec": "% motor Un",
    "% motor Un": "V sec", "ms": "cycles", "cycles": "ms", "min": "s", "s": "ms",
}  # fmt: skip
OF_EARTH_FAULT = {"x CT": "A sec earth", "A": "A sec earth", "A sec earth": "A"}
WITHOUT_A_UNIT = ("start_timer_pickup_a", "jam_trip_delay_s")
"""Settings that the list of the low-voltage relays writes without a unit here and there."""


def notation(units: Mapping[str, str]) -> dict[str, dict[str, Written]]:
    """Give the notation of all exports in other units."""
    return {layout: {name: _other(layout, name, one, units) for name, one in known.items()}
            for layout, known in LAYOUTS.items()}  # fmt: skip


def _other(layout: str, name: str, written: Written, units: Mapping[str, str]) -> Written:
    if layout == "lv_long" and name in WITHOUT_A_UNIT:
        return written
    if name == "relay_full_load_a":
        return replace(written, unit="x CT" if units is RELATIVE and written.unit == "A" else "A")
    if name.startswith("earth_fault") and written.unit in OF_EARTH_FAULT:
        # the list with a row a setting names the unit alone, which would be that of the phases
        in_amperes = units is PRIMARY or layout == "lv_long"
        return replace(written, unit="A" if in_amperes else OF_EARTH_FAULT[written.unit])
    return replace(written, unit=units.get(written.unit, written.unit))


def write_in_other_units(
    site: Site, folder: Path, settings: Mapping[str, str], lists: Mapping[str, tuple[str, float]]
) -> None:
    """Write the workbooks of a site with its settings and its lists in other units."""
    with pytest.MonkeyPatch.context() as patch, TemporaryDirectory() as between:
        for layout, written in notation(settings).items():
            patch.setitem(LAYOUTS, layout, written)
        write_site(site, Path(between) / "site")
        restated = Restated(lists)
        change_workbooks(
            site,
            Path(between) / "site",
            folder,
            lambda column: column if column.file.startswith("relay_settings") else restated(column),
        )

"""Four kinds of sound fleets, 200 motors each, by seed."""

from __future__ import annotations

from pathlib import Path

from tests.sites.fleets.drawing import Maker
from tests.sites.fleets.fused_contactors import fused_contactors
from tests.sites.fleets.high_voltage_plant import high_voltage_plant
from tests.sites.fleets.low_voltage_works import low_voltage_works
from tests.sites.fleets.mixed_starters import mixed_starters
from tests.sites.plant import Site
from tests.sites.writing.site_folder import write_site

FLEETS: dict[str, Maker] = {
    "low_voltage_works": low_voltage_works,
    "high_voltage_plant": high_voltage_plant,
    "fused_contactors": fused_contactors,
    "mixed_starters": mixed_starters,
}


def write_fleet(name: str, folder: Path, seed: int = 1) -> Site:
    """Write the workbooks of one of the four fleets into a folder and give what they hold."""
    site = FLEETS[name](seed)
    write_site(site, folder)
    return site

"""The sound state of the Tarnholt works."""

from __future__ import annotations

import numpy as np

from tests.sites.design import add_family, settle_buses
from tests.sites.plant import Site
from tests.sites.tarnholt import high_voltage, low_voltage
from tests.sites.tarnholt.buses import tarnholt_buses

SEED = 20261130


def _second_group(site: Site, tag: str) -> None:
    """Give a relay a second group that an input can select, set like the first."""
    relay = site.relay_of(tag)
    second = relay | {"setting_group": "2", "group_active": False}
    site.relays.insert(site.relays.index(relay) + 1, second)


def sound_site() -> Site:
    """Make the site as a careful engineer would leave it."""
    site = Site("Tarnholt Quarry and Lime Works", buses=tarnholt_buses())
    random = np.random.default_rng(SEED)
    for families in (
        high_voltage.FAMILIES_6600,
        high_voltage.FAMILIES_3300,
        low_voltage.FAMILIES_690,
        low_voltage.FAMILIES_RELAY,
        low_voltage.FAMILIES_OVERLOAD,
        low_voltage.FAMILIES_STARTED_SOFTLY,
    ):
        for family in families:
            add_family(site, family, random)
    for tag in ("BC-110A", "BC-110B"):
        _second_group(site, tag)
    settle_buses(site, site.buses)
    return site

"""The sound state of the Tarnholt works."""

from __future__ import annotations

import numpy as np

from tests.sites.design import add_family, settle_buses
from tests.sites.plant import Site
from tests.sites.tarnholt.buses import tarnholt_buses
from tests.sites.tarnholt.families_3300 import FAMILIES_3300
from tests.sites.tarnholt.families_6600 import FAMILIES_6600
from tests.sites.tarnholt.families_overload import FAMILIES_OVERLOAD
from tests.sites.tarnholt.families_relays import FAMILIES_690, FAMILIES_RELAY, FAMILIES_STARTED_SOFTLY

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
        FAMILIES_6600,
        FAMILIES_3300,
        FAMILIES_690,
        FAMILIES_RELAY,
        FAMILIES_OVERLOAD,
        FAMILIES_STARTED_SOFTLY,
    ):
        for family in families:
            add_family(site, family, random)
    for tag in ("BC-110A", "BC-110B"):
        _second_group(site, tag)
    settle_buses(site, site.buses)
    return site

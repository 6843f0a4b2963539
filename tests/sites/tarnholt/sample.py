"""The Tarnholt works as found: the sound state with defects planted and some data missing."""

from __future__ import annotations

from dataclasses import dataclass

from tests.sites.plant import Site
from tests.sites.tarnholt.planted.current_elements import CURRENT_ELEMENTS
from tests.sites.tarnholt.planted.data import DATA
from tests.sites.tarnholt.planted.defect import plant
from tests.sites.tarnholt.planted.low_voltage import LOW_VOLTAGE
from tests.sites.tarnholt.planted.missing import take_away
from tests.sites.tarnholt.planted.other_elements import OTHER_ELEMENTS
from tests.sites.tarnholt.planted.several_rows import SEVERAL_ROWS
from tests.sites.tarnholt.sound import sound_site

Rows = list[dict[str, str]]


@dataclass(frozen=True)
class Sample:
    """A site, the defects planted in it and the data that it lacks."""

    site: Site
    defects: Rows
    missing: Rows


def sample_site() -> Sample:
    """Make the site as found."""
    site = sound_site()
    defects: Rows = []
    for change in SEVERAL_ROWS:
        defects += change(site)
    for defect in (*CURRENT_ELEMENTS, *OTHER_ELEMENTS, *LOW_VOLTAGE, *DATA):
        defects += plant(site, defect)
    missing = take_away(site)
    return Sample(site, sorted(defects, key=lambda row: (row["check"], row["subject_key"])), missing)

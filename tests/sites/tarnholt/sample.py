"""The Tarnholt works as found: the sound state with defects planted and some data missing."""

from __future__ import annotations

from dataclasses import dataclass

from tests.sites.plant import Site
from tests.sites.tarnholt.planted.data import DATA
from tests.sites.tarnholt.planted.defect import Defect, plant
from tests.sites.tarnholt.planted.earth_fault import DIFFERENTIAL, EARTH_FAULT
from tests.sites.tarnholt.planted.low_voltage import LOW_VOLTAGE
from tests.sites.tarnholt.planted.missing import take_away
from tests.sites.tarnholt.planted.overload import THERMAL, UNBALANCE
from tests.sites.tarnholt.planted.several_rows import SEVERAL_ROWS
from tests.sites.tarnholt.planted.short_circuit import FUSES, SHORT_CIRCUIT
from tests.sites.tarnholt.planted.starting import JAM, STARTING, UNDERCURRENT
from tests.sites.tarnholt.planted.voltage import STARTS, TEMPERATURE, VOLTAGE
from tests.sites.tarnholt.sound import sound_site

Rows = list[dict[str, str]]


@dataclass(frozen=True)
class Sample:
    """A site, the defects planted in it and the data that it lacks."""

    site: Site
    defects: Rows
    missing: Rows


def _all_defects() -> tuple[Defect, ...]:
    """Give the defects of single values, in the order in which they are planted."""
    currents = (*SHORT_CIRCUIT, *FUSES, *THERMAL, *UNBALANCE, *EARTH_FAULT, *DIFFERENTIAL)
    others = (*STARTING, *JAM, *UNDERCURRENT, *VOLTAGE, *STARTS, *TEMPERATURE)
    return (*currents, *others, *LOW_VOLTAGE, *DATA)


def sample_site() -> Sample:
    """Make the site as found."""
    site = sound_site()
    defects: Rows = []
    for change in SEVERAL_ROWS:
        defects += change(site)
    for defect in _all_defects():
        defects += plant(site, defect)
    missing = take_away(site)
    return Sample(site, sorted(defects, key=lambda row: (row["check"], row["subject_key"])), missing)

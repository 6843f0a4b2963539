"""One small fleet written in many ways is read as one and the same fleet."""

from __future__ import annotations

import numpy as np
import pytest

from audit.intake import read_fleet
from tests.intake.fleet_writing import (
    BUSES,
    FORMATS,
    HEADERS,
    LAYOUTS,
    MOTORS,
    SETTINGS,
    STARTS,
    SURROUNDINGS,
    UNITS,
    pairwise,
    write_fleet,
)

WAYS = pairwise(LAYOUTS, HEADERS, UNITS, FORMATS, SURROUNDINGS)
NAMES = {"service", "starting_method", "earthing"}
LINKED = {"bus", "relay"}


def test_every_pair_of_styles_occurs():
    assert len(WAYS) < 45
    assert {(way[0], way[2]) for way in WAYS} == {(a, b) for a in LAYOUTS for b in UNITS}
    assert {(way[1], way[3]) for way in WAYS} == {(a, b) for a in HEADERS for b in FORMATS}


@pytest.mark.parametrize("way", WAYS, ids=["; ".join(way) for way in WAYS])
def test_the_fleet_is_read_as_it_is(tmp_path, way):
    write_fleet(tmp_path, *way)
    fleet = read_fleet(tmp_path)
    assert fleet.questions == ()
    assert [complaint.sentence() for complaint in fleet.complaints if complaint.weight != "remark"] == []
    _holds(fleet, "motor", MOTORS, way)
    _holds(fleet, "relay", SETTINGS, way)
    _holds(fleet, "bus", BUSES, way)
    motors = fleet.tables["motor"]
    for row, tag in enumerate(motors.keys):
        assert fleet.tables["bus"].keys[fleet.links[("motor", "bus")][row]] == MOTORS[tag]["bus"]
        assert fleet.tables["relay"].keys[fleet.links[("motor", "relay")][row]] == MOTORS[tag]["relay"]
    starts = fleet.tables["start"].columns
    seconds = starts["start_time_s"].values
    current = starts["start_current_a"].values
    days = starts["start_moment"].values
    epoch = np.array([start[1].timestamp() for start in STARTS])
    assert sorted(seconds) == pytest.approx(sorted(start[2] for start in STARTS))
    assert sorted(current) == pytest.approx(sorted(start[3] for start in STARTS))
    assert np.diff(np.sort(days)) * 86400 == pytest.approx(np.diff(np.sort(epoch)), abs=4000)


def _holds(fleet, subject, facts, way):
    table = fleet.tables[subject]
    assert sorted(table.keys) == sorted(facts)
    for row, key in enumerate(table.keys):
        for quantity, value in facts[key].items():
            if quantity in LINKED:
                continue
            read = table.columns[quantity].values[row]
            if value is None:
                assert np.isnan(read), (key, quantity)
                on = quantity.replace("_pickup_a", "_on")
                if on in table.columns and on != quantity:
                    assert table.columns[on].values[row] == 0, (key, quantity, "is off")
            elif quantity in NAMES:
                assert read is not None
                assert read != -1, (key, quantity)
            else:
                assert read == pytest.approx(value, rel=1e-6), (key, quantity)

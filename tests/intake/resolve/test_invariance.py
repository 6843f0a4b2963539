"""What must not matter does not: the unit and base a value is written in, and the order of the rows."""

from __future__ import annotations

import random

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

KW_PER_HP = 0.3048 * 0.453_592_37 * 9.806_65 * 550 / 1000  # 550 ft lbf/s
QUICK = settings(max_examples=30, deadline=None)
CT_PRIMARIES = (50, 75, 100, 150, 200, 300, 400, 600)


def written(site, ways, subject, quantity, motor=None, relay=None, bus=None):
    """Values of a quantity that like motors, relays or buses have written in these ways."""
    cells = {
        "motor": {"motor": "P", "relay": "R", "bus": "B", **(motor or {})},
        "relay": {"relay_tag": "R", **(relay or {})},
        "bus": {"bus_name": "B", **(bus or {})},
    }
    plant = site()
    for table, row in cells.items():
        rows = [{**row, **({quantity: way} if table == subject else {})} for way in ways]
        names = ("motor", "relay", "bus", "relay_tag", "bus_name")
        plant.add(
            table,
            [
                {name: f"{cell}-{number}" if name in names else cell for name, cell in one.items()}
                for number, one in enumerate(rows)
            ],
        )
    return plant.fleet().tables[subject].columns[quantity].values.tolist()


@QUICK
@given(
    multiple=st.floats(1.0, 8.0),
    full_load=st.floats(10, 300),
    ct=st.sampled_from(CT_PRIMARIES),
    secondary=st.sampled_from((1, 5)),
    quantity=st.sampled_from(("jam_trip_pickup_a", "overcurrent_trip_pickup_a", "start_timer_pickup_a")),
)
def test_a_current_setting_is_the_same_in_any_unit_and_on_any_base(site, multiple, full_load, ct, secondary, quantity):
    amperes = multiple * full_load
    ways = (
        f"{amperes!r} A",
        f"{amperes / 1000!r} kA",
        f"{amperes!r} A pri",
        f"{multiple!r} x FLA",
        f"{100 * multiple!r} % FLA",
        f"{amperes / ct!r} x CT",
        f"{100 * amperes / ct!r} % CT",
        f"{amperes / ct * secondary!r} A sec",
        f"{amperes / ct * secondary * 1000!r} mA sec",
    )
    motor = {"full_load_a": f"{full_load!r} A", "ct_primary_a": f"{ct} A", "ct_secondary_a": f"{secondary} A"}
    relay = {"relay_full_load_a": f"{full_load!r} A", "relay_ct_primary_a": f"{ct} A"}
    values = written(site, ways, "relay", quantity, motor, relay)
    assert values == pytest.approx([amperes] * len(ways), rel=1e-9)


@QUICK
@given(
    seconds=st.floats(0.02, 50),
    frequency=st.sampled_from((50, 60)),
    where=st.sampled_from(("motor", "bus", "relay")),
)
def test_a_time_is_the_same_in_any_unit(site, seconds, frequency, where):
    name = {"motor": "frequency_hz", "bus": "bus_frequency_hz", "relay": "relay_frequency_hz"}[where]
    ways = (
        f"{seconds!r} s",
        f"{seconds * 1000!r} ms",
        f"{seconds / 60!r} min",
        f"{seconds / 3600!r} h",
        f"{seconds * frequency!r} cycles",
    )
    cells = {"motor": {}, "bus": {}, "relay": {}}
    cells[where][name] = f"{frequency} Hz"
    values = written(site, ways, "relay", "jam_trip_delay_s", **cells)
    assert values == pytest.approx([seconds] * len(ways), rel=1e-9)


@QUICK
@given(
    per_unit=st.floats(0.3, 1.3),
    rated=st.sampled_from((400, 690, 3300, 6600)),
    system=st.floats(1.0, 1.1),
    star=st.booleans(),
)
def test_a_voltage_setting_is_the_same_in_any_unit_and_on_any_base(site, per_unit, rated, system, star):
    volts = per_unit * rated
    nominal = rated * system
    secondary = volts / rated * 110 / (3**0.5 if star else 1)
    ways = (
        f"{volts!r} V",
        f"{volts / 1000!r} kV",
        f"{100 * per_unit!r} % motor voltage",
        f"{per_unit!r} x motor voltage",
        f"{100 * volts / nominal!r} % system voltage",
        f"{100 * per_unit!r} % VT",
        f"{secondary!r} V sec",
    )
    motor = {
        "rated_voltage_v": f"{rated} V",
        "vt_primary_v": f"{rated} V",
        "vt_secondary_v": "110 V",
        "vt_connection": "star" if star else "open delta",
    }
    relay, bus = {"relay_vt_primary_v": f"{rated} V"}, {"bus_nominal_v": f"{nominal!r} V"}
    values = written(site, ways, "relay", "undervoltage_trip_pickup_v", motor, relay, bus)
    assert values == pytest.approx([volts] * len(ways), rel=1e-9)


@QUICK
@given(kilowatts=st.floats(0.1, 39_000))
def test_a_power_is_the_same_in_any_unit(site, kilowatts):
    ways = (
        f"{kilowatts!r} kW",
        f"{kilowatts * 1000!r} W",
        f"{kilowatts / 1000!r} MW",
        f"{kilowatts / KW_PER_HP!r} hp",
        f"{kilowatts / 0.735_498_75!r} PS",  # 75 kgf m/s
    )
    values = written(site, ways, "motor", "rated_power_kw")
    assert values == pytest.approx([kilowatts] * len(ways), rel=1e-9)


@QUICK
@given(celsius=st.floats(61, 249))
def test_a_temperature_is_the_same_in_any_unit(site, celsius):
    ways = (f"{celsius!r} °C", f"{celsius * 1.8 + 32!r} °F", f"{celsius + 273.15!r} K")
    values = written(site, ways, "relay", "stator_temperature_trip_c")
    assert values == pytest.approx([celsius] * len(ways), rel=1e-9)


def _rows(count):
    pick = random.Random(7)
    motors, relays, starts = [], [], []
    for number in range(count):
        load = pick.choice((22.0, 55.0, 104.0, 210.0))
        motors.append(
            {
                "motor": f"P-{number}",
                "relay": f"R {number}" if number % 5 else None,
                "bus": f"B-{number % 3}",
                "rated_power_kw": pick.choice(("55 kW", "75 hp", "55000 W", "xyz")),
                "full_load_a": pick.choice((f"{load} A", f"{load / 1000} kA", "999 kA")),
                "starting_method": pick.choice(("DOL", "star-delta", "by hand")),
                "must_run": pick.choice(("yes", "no", None, "perhaps")),
            }
        )
        relays.append(
            {
                "relay_tag": f"R-{number}" if number % 5 else f"P-{number}",
                "relay_full_load_a": f"{load} A",
                "jam_trip_pickup_a": pick.choice(("2 x FLA", "180 % FLA", "OFF", "-", "2 x In", "TBC")),
                "jam_trip_delay_s": pick.choice(("2 s", "500 ms", "30 cyc")),
                "thermal_pickup_a": pick.choice(("1.05 x FLA", "105 % FLA", "0.8 x CT")),
            }
        )
        starts.append({"start_motor": f"p-{number}", "start_time_s": f"{pick.randint(2, 9)} s"})
    return motors, relays, starts


def _resolved(site, motors, relays, starts):
    fleet = site().add("motor", motors).add("relay", relays).add("start", starts).fleet()
    found = {}
    for subject, table in fleet.tables.items():
        for row, key in enumerate(table.keys):
            name = key if subject != "start" else fleet.tables["motor"].keys[fleet.links["start", "motor"][row]]
            for quantity, column in table.columns.items():
                value = column.values[row]
                shown = value if isinstance(value, (str, type(None))) else round(float(np.nan_to_num(value, nan=-9)), 9)
                found[subject, name, quantity] = (shown, int(column.basis[row]))
    links = {
        (child, fleet.tables[child].keys[row]): fleet.tables[parent].keys[target] if target >= 0 else None
        for (child, parent), rows in fleet.links.items()
        if child != "start"
        for row, target in enumerate(rows.tolist())
    }
    about = sorted(
        (complaint.found, complaint.key) for complaint in fleet.complaints if "more of this" not in complaint.found
    )
    return found, links, about


@settings(max_examples=15, deadline=None)
@given(seed=st.integers(0, 10_000))
def test_the_order_of_rows_does_not_matter(site, seed):
    motors, relays, starts = _rows(20)
    in_order = _resolved(site, motors, relays, starts)
    shuffle = random.Random(seed).shuffle
    for rows in (motors, relays, starts):
        shuffle(rows)
    mixed = _resolved(site, motors, relays, starts)
    assert mixed[0] == in_order[0]
    assert mixed[1] == in_order[1]
    assert {key for _, key in mixed[2]} == {key for _, key in in_order[2]}


def test_the_order_of_the_tables_does_not_matter(site):
    motors, relays, starts = _rows(20)
    forward = site().add("motor", motors).add("relay", relays).add("start", starts).fleet()
    backward = site().add("start", starts).add("relay", relays).add("motor", motors).fleet()
    for subject, table in forward.tables.items():
        for quantity, column in table.columns.items():
            other = backward.tables[subject].columns[quantity].values
            assert np.array_equal(column.values, other, equal_nan=column.kind in ("number", "date")), quantity

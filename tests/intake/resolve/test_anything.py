"""Whatever readings come, resolution ends in a fleet whose columns fit its tables."""

from __future__ import annotations

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st

from audit.fleet.addresses import SheetBook, pack
from audit.fleet.column import NO_CELL
from audit.intake.gathered import STATES, TABLES, Gathered, readings_frame
from audit.intake.resolve import resolve
from audit.vocabulary.quantities import vocabulary
from audit.vocabulary.spellings import spellings

KNOWN = vocabulary().quantities
UNITS = sorted({unit for dimension in spellings().dimensions.values() for unit in dimension.units})
BASES = ("", "full_load", "ct", "earth_ct", "secondary", "primary", "motor_voltage", "system_voltage", "vt", "device")
WORDS = ("P-1", "P 1", "p-1", "P-2", "R-1", "off", "yes", "Group 1", "-", "", "{written}", "1", "§ ½ \u2028", "x" * 300)
READING = st.tuples(
    st.sampled_from(TABLES),
    st.integers(0, 8),
    st.sampled_from(sorted(KNOWN)) | st.sampled_from(("motor", "relay_tag", "relay", "start_motor", "bus_name", "bus")),
    st.sampled_from(("", "", "1", "G2 (active)")),
    st.sampled_from(STATES),
    st.floats(allow_nan=True, allow_infinity=True) | st.sampled_from((0.0, 1.0, 5.0, 100.0)),
    st.sampled_from(WORDS) | st.none(),
    st.sampled_from(("", *UNITS)),
    st.sampled_from(BASES),
)  # fmt: skip


@settings(max_examples=120, deadline=None)
@given(st.lists(READING, max_size=40))
def test_any_readings_resolve_to_a_fleet_that_fits_together(given_readings):
    book = SheetBook()
    sheets = {table: book.index("any.xlsx", table) for table in TABLES}
    columns = {name: [] for name in readings_frame().columns}
    for place, (table, record, quantity, group, state, number, text, unit, base) in enumerate(given_readings):
        values = {
            "table": table, "record": record * len(TABLES) + TABLES.index(table), "quantity": quantity, "group": group,
            "state": state, "number": number, "text": text, "unit": unit, "base": base, "written": text or str(number),
            "cell": int(pack(sheets[table], record + 2, place + 1)), "header": quantity,
        }  # fmt: skip
        for name, value in values.items():
            columns[name].append(value)
    fleet = resolve(Gathered("any", {}, book, (), readings_frame(columns)))
    for subject, table in fleet.tables.items():
        assert len(set(table.keys)) == len(table.keys) or subject == "bus"
        wanted = {name for name, q in KNOWN.items() if q.subject == subject and q.role != "derived"}
        assert set(table.columns) == wanted
        for name, column in table.columns.items():
            assert len(column.values) == len(column.basis) == len(column.cell) == len(table), name
            if column.kind == "number":
                assert not np.isinf(column.values).any(), name
                span = KNOWN[name].plausible
                known = column.values[~np.isnan(column.values)]
                assert span is None or ((known >= span[0] * (1 - 1e-6)) & (known <= span[1] * (1 + 1e-6))).all(), name
    for (child, parent), rows in fleet.links.items():
        assert len(rows) == len(fleet.tables[child])
        assert ((rows >= -1) & (rows < len(fleet.tables[parent]))).all()
    for complaint in fleet.complaints:
        assert complaint.found
        assert complaint.expected
    places = fleet.book.places([cell for cell in fleet.readings["cell"] if cell != NO_CELL])
    assert all(place is not None for place in places)

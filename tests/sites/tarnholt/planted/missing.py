"""Data that the works never had, or that stand in the workbook as something else than a value."""

from __future__ import annotations

from dataclasses import dataclass

from tests.sites.families import lettered, numbered
from tests.sites.plant import Record, Site


@dataclass(frozen=True)
class Missing:
    """A datum that is not known."""

    table: str
    keys: tuple[str, ...]
    quantity: str
    stands: str
    """What stands in the cell: blank, TBC or N/A."""
    why: str


MISSING = (
    Missing("motor", lettered("P-115"), "safe_stall_hot_s", "blank", "no data sheet found"),
    Missing("motor", lettered("P-115"), "safe_stall_cold_s", "blank", "no data sheet found"),
    Missing(
        "motor", lettered("BC-110"), "safe_stall_cold_s", "blank", "the data sheet gives one stall time, taken as hot"
    ),
    Missing("motor", ("KM-203",), "safe_stall_hot_s", "TBC", "asked of the maker"),
    Missing("motor", ("KM-203",), "safe_stall_cold_s", "TBC", "asked of the maker"),
    Missing(
        "motor",
        numbered("SC-", 601, 3),
        "stated_start_time_at_lowest_voltage_s",
        "blank",
        "only the time at full voltage is stated",
    ),
    Missing("motor", lettered("BC-110"), "ct_connected_burden_ohm", "blank", "pilot cable lengths not recorded"),
    Missing("motor", lettered("F-350"), "cable_length_m", "blank", "cable schedule lost"),
    Missing("motor", numbered("SC-", 621, 4), "efficiency_pct", "N/A", "plates overpainted"),
    Missing("motor", lettered("P-720"), "running_current_a", "blank", "never measured"),
    Missing("motor", lettered("VS-110"), "safe_stall_cold_s", "TBC", "asked of the maker"),
    Missing("motor", lettered("FD-10", "1234"), "driven_machine", "blank", "not entered"),
    Missing("relay", lettered("P-150"), "unbalance_base", "blank", "the export does not name the base"),
    Missing("bus", ("MCC-44",), "fault_x_r_ratio", "blank", "the study gives no angle for this board"),
)


def take_away(site: Site) -> list[dict[str, str]]:
    """Remove what is not known and give the table of missing data."""
    rows = []
    for missing in MISSING:
        for key in missing.keys:
            record = _record(site, missing, key)
            if missing.stands == "blank":
                record.pop(missing.quantity, None)
            else:
                record[missing.quantity] = missing.stands
            rows.append(
                {
                    "subject": missing.table,
                    "subject_key": key,
                    "datum": missing.quantity,
                    "stands_in_cell": missing.stands,
                    "why": missing.why,
                }
            )
    return rows


def _record(site: Site, missing: Missing, key: str) -> Record:
    if missing.table == "bus":
        return site.bus(key)
    return site.motor(key) if missing.table == "motor" else site.relay_of(key)

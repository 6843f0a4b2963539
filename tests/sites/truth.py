"""What a site's workbooks are meant to say, in the words and units of the vocabulary."""

from __future__ import annotations

from tests.sites.plant import Record, Site, text

STEERING = (
    "relay_filter",
    "relay_unbalance_base",
    "relay_jam",
    "relay_blocks_jam_by_state",
    "relay_trips_on_winding",
    "relay_backup_51",
    "relay_hot_curve",
    "relay_jam_multiple",
)
"""Entries of a motor's record that steer the choice of settings and stand in no workbook."""
OF_OVERLOAD_RELAY = (
    "overload_dial_a",
    "overload_range_low_a",
    "overload_range_high_a",
    "overload_trip_class",
    "overload_class_standard",
    "overload_phase_loss_on",
    "magnetic_trip_a",
)
"""Settings that stand in the motor list and belong to the motor's own overload device or breaker."""


def motor_truth(site: Site) -> dict[str, Record]:
    """Give for each motor tag what the motor list says of it, settings of its overload device left out.

    A motor that is listed twice has its second row under its tag and ' (2)'. Texts such as TBC are left out.
    """
    truth: dict[str, Record] = {}
    for motor in site.motors:
        tag = text(motor, "motor")
        key = tag if tag not in truth else f"{tag} (2)"
        left_out = (*STEERING, *OF_OVERLOAD_RELAY)
        truth[key] = {
            name: value for name, value in motor.items() if name not in left_out and value not in ("TBC", "N/A")
        }
    return truth


def setting_truth(site: Site) -> dict[str, Record]:
    """Give for each motor tag the primary settings of its relay's active group, or of its overload device.

    A value whose unit the export leaves out, though several are possible, is left out.
    """
    relays = {text(relay, "relay_tag"): relay for relay in site.relays if relay.get("group_active", True)}
    truth: dict[str, Record] = {}
    for motor in site.motors:
        own: Record = {name: motor[name] for name in OF_OVERLOAD_RELAY if name in motor}
        relay = relays.get(str(motor.get("relay", "")), {})
        switched = {
            name: value for name, value in relay.items() if name not in ("layout", "motor", "relay_tag", "without_unit")
        }
        if "without_unit" in relay:
            switched.pop(text(relay, "without_unit"))
        truth[text(motor, "motor")] = own | switched
    return truth


def bus_truth(site: Site) -> dict[str, Record]:
    """Give for each bus what the bus list says of it."""
    return {text(bus, "bus_name"): dict(bus) for bus in site.buses}


def start_truth(site: Site) -> dict[str, list[Record]]:
    """Give for each motor tag its recorded starts."""
    truth: dict[str, list[Record]] = {}
    for start in site.starts:
        truth.setdefault(text(start, "start_motor"), []).append(dict(start))
    return truth

"""Where a finding stands: motor with service, relay, bus and cubicle."""

from __future__ import annotations

from dataclasses import dataclass

from audit.derivation.workings import CHILD_OF, Workings
from audit.fleet.column import NO_ROW


@dataclass(frozen=True, slots=True)
class Place:
    """Motor, relay and bus of one row of a subject; '' where there is none."""

    motor: str
    service: str
    relay: str
    bus: str
    cubicle: str


def motor_row_of(workings: Workings, subject: str, row: int, deciding: int) -> int:
    """Give the motor that a row of a subject speaks of, the deciding one of a group, or none."""
    if subject == "motor":
        return row
    if deciding >= 0 and CHILD_OF.get(subject) == "motor":
        return deciding
    if subject == "relay":
        rows = workings.fleet.parent_rows("relay", "motor")
        return int(rows[row]) if rows is not None and len(rows) else NO_ROW
    return NO_ROW


def place_of(workings: Workings, motor_row: int, subject: str, row: int) -> Place:
    """Give the place of a row of a subject, by the motor that it speaks of."""
    fleet = workings.fleet
    bus = fleet.tables["bus"].keys[row] if subject == "bus" else ""
    relay = fleet.tables["relay"].keys[row] if subject == "relay" else ""
    if motor_row < 0:
        return Place("", "", relay, bus, "")
    relays = fleet.parent_rows("motor", "relay")
    if relays is not None and len(relays) and relays[motor_row] >= 0:
        relay = relay or fleet.tables["relay"].keys[int(relays[motor_row])]
    texts = {}
    for name in ("service", "bus", "cubicle"):
        value = workings.column("motor", name).values[motor_row]
        texts[name] = str(value) if value is not None else ""
    return Place(fleet.tables["motor"].keys[motor_row], texts["service"], relay, bus or texts["bus"], texts["cubicle"])

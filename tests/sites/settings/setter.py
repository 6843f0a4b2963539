"""A relay that is told what is fitted, and settings put on it in its own steps."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date

from tests.sites.current_transformers import told_to_relay
from tests.sites.notation import LAYOUTS, in_steps
from tests.sites.plant import Record, number, text
from tests.sites.supply import FREQUENCY_HZ


@dataclass
class Setter:
    """Puts settings on a relay in the steps that it has."""

    relay: Record
    motor: Record

    def put(self, quantity: str, value: float, way: str = "near") -> None:
        """Set a quantity to the step at, above or below a primary value."""
        written = LAYOUTS[text(self.relay, "layout")].get(quantity)
        self.relay[quantity] = value if written is None else in_steps(value, written, self.relay, self.motor, way)

    def turn(self, element: str, on: bool) -> bool:
        """Turn an element's trip on or off."""
        self.relay[f"{element}_trip_on" if element not in ("start_timer", "starts_limit") else f"{element}_on"] = on
        return on


def new_relay(motor: Record, layout: str, relay_type: str, exported: date) -> Record:
    """Make a relay that is told what is fitted."""
    relay: Record = {
        "relay_tag": text(motor, "relay"),
        "layout": layout,
        "motor": text(motor, "motor"),
        "relay_role": "motor",
        "relay_type": relay_type,
        "settings_export_date": exported,
        "relay_frequency_hz": FREQUENCY_HZ,
        "relay_phase_rotation": "abc",
        **told_to_relay(motor),
    }
    if layout != "lv_long":
        relay |= {"setting_group": "1", "group_active": True, "group_selectable": True}
    full_load = number(motor, "full_load_a")
    Setter(relay, motor).put("relay_full_load_a", full_load)
    return relay

"""What an invented site consists of: plain records with the names of the vocabulary, in primary units."""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import date, datetime

Value = float | bool | str | date | datetime
Record = dict[str, Value]


@dataclass
class Site:
    """Motors, relays, buses and recorded starts of one site.

    A record holds what is known; what is not known has no entry. Motors are found by their tag, relays by
    `relay_tag`; a relay record also names its `layout` (how its export is written) and its `motor`.
    """

    name: str
    buses: list[Record] = field(default_factory=list)
    motors: list[Record] = field(default_factory=list)
    relays: list[Record] = field(default_factory=list)
    starts: list[Record] = field(default_factory=list)

    def motor(self, tag: str) -> Record:
        """Find a motor."""
        return next(motor for motor in self.motors if motor["motor"] == tag)

    def relay(self, tag: str) -> Record:
        """Find the (active) settings of a relay."""
        return next(relay for relay in self.relays if relay["relay_tag"] == tag)

    def relay_of(self, tag: str) -> Record:
        """Find the relay of a motor."""
        return self.relay(text(self.motor(tag), "relay"))

    def bus(self, name: str) -> Record:
        """Find a bus."""
        return next(bus for bus in self.buses if bus["bus_name"] == name)

    def starts_of(self, tag: str) -> list[Record]:
        """Find the recorded starts of a motor, oldest first."""
        return [start for start in self.starts if start["start_motor"] == tag]


def number(record: Record, name: str) -> float:
    """Give a number of a record."""
    value = record[name]
    if isinstance(value, bool) or not isinstance(value, int | float):
        raise TypeError(f"{name} is {value!r}, not a number")
    return float(value)


def text(record: Record, name: str) -> str:
    """Give a text of a record."""
    value = record[name]
    if not isinstance(value, str):
        raise TypeError(f"{name} is {value!r}, not a text")
    return value

"""Families of like motors: what a designer decides once for a pump and its standby, or for a row of conveyors."""

from __future__ import annotations

from dataclasses import dataclass, field

from tests.sites.plant import Value


@dataclass(frozen=True)
class Family:
    """Like motors on one kind of starter."""

    tags: tuple[str, ...]
    service: str
    area: str
    driven_machine: str
    bus: str
    power_kw: float
    poles: int = 4
    starting_method: str = "direct_on_line"
    switching_device: str = "breaker"
    overload_device: str = "motor_relay"
    start_multiple: float = 6.8
    premium: bool = True
    rated_voltage_v: float | None = None
    """Where it differs from the nominal voltage of the bus."""
    load: str = "square"
    inertia: float = 0.30
    """External inertia, as a part of the limit that IEC 60034-12 sets for the size."""
    loading: float = 0.85
    least_loading: float = 0.50
    length_m: tuple[float, float] = (60, 160)
    earth_ct: str = "none"
    layout: str = ""
    starts: int = 0
    """Recorded starts a motor."""
    facts: dict[str, Value] = field(default_factory=dict)
    """Further facts, by their names in the vocabulary; `relay_...` among them steer the choice of settings."""


def lettered(tag: str, letters: str = "AB") -> tuple[str, ...]:
    """Give the tags of like machines: P-101A, P-101B."""
    return tuple(f"{tag}{letter}" for letter in letters)


def numbered(prefix: str, first: int, count: int) -> tuple[str, ...]:
    """Give consecutive tags: C-301, C-302."""
    return tuple(f"{prefix}{first + step}" for step in range(count))

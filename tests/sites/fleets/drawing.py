"""Draw families of motors by chance, within what plants of a kind have."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field

import numpy as np

from tests.sites.cables import start_voltage_pu
from tests.sites.design import add_family
from tests.sites.families import Family
from tests.sites.plant import Record, Site, Value, number, text
from tests.sites.supply import Transformer, protect_incomer, transformer_bus

LETTERS = "ABCD"


@dataclass(frozen=True)
class Machines:
    """A kind of driven machine: how it loads its motor, and what its motor needs."""

    driven_machine: str
    prefix: str
    service: str
    load: str
    loading: tuple[float, float]
    least: tuple[float, float]
    inertia: tuple[float, float]
    facts: Mapping[str, Value] = field(default_factory=dict)


PUMP = Machines("pump", "P", "Process pump", "square", (0.72, 0.92), (0.50, 0.65), (0.08, 0.35))
FAN = Machines("fan", "F", "Ventilation fan", "square", (0.70, 0.90), (0.45, 0.60), (0.35, 1.10))
CONVEYOR = Machines("conveyor", "BC", "Belt conveyor", "constant", (0.60, 0.78), (0.42, 0.50), (0.15, 0.45))
COUPLED_CONVEYOR = Machines("conveyor", "BC", "Coupled conveyor", "unloaded", (0.70, 0.88), (0.42, 0.50), (0.20, 0.60))
SCREW = Machines("screw", "SC", "Screw conveyor", "unloaded", (0.70, 0.88), (0.42, 0.52), (0.08, 0.30))
MIXER = Machines("mixer", "MX", "Agitator", "unloaded", (0.70, 0.90), (0.45, 0.55), (0.08, 0.35))
COMPRESSOR = Machines("compressor", "C", "Compressor", "unloaded", (0.78, 0.92), (0.42, 0.55), (0.15, 0.40))
MILL = Machines("mill", "KM", "Mill", "unloaded", (0.78, 0.90), (0.42, 0.50), (0.30, 0.70))
CRUSHER = Machines("crusher", "CR", "Crusher", "unloaded", (0.78, 0.90), (0.40, 0.48), (0.25, 0.60))


@dataclass(frozen=True)
class Starter:
    """How a motor is started, switched and protected."""

    starting_method: str = "direct_on_line"
    switching_device: str = "moulded_case_breaker"
    overload_device: str = "overload_relay"
    layout: str = ""
    earth_ct: str = "none"
    starts: int = 0
    facts: Mapping[str, Value] = field(default_factory=dict)


@dataclass(frozen=True)
class Draw:
    """What may be drawn for the buses of a part of a site."""

    machines: tuple[Machines, ...]
    starters: tuple[Starter, ...]
    sizes_kw: tuple[float, ...]
    poles: tuple[int, ...] = (2, 4, 4, 4, 6)
    start_multiple: tuple[float, float] = (6.3, 7.2)
    length_m: tuple[float, float] = (25, 170)
    earth_ct: str = ""
    """Earth-fault CT of all relays of this part, where it is not the starter's."""


def board(name: str, nominal_v: float, rating_mva: float, earthing: str) -> Record:
    """Make a bus behind a transformer of usual impedance, its incomer set to carry the transformer's load."""
    impedance = 12.0 if nominal_v > 5000 else 7.0 if nominal_v > 1000 else 6.0
    source = 1200.0 if nominal_v > 5000 else 150.0
    bus = transformer_bus(
        name,
        nominal_v,
        Transformer(rating_mva, impedance, source, 0.75 * source),
        earthing,
        running_motors_mva=0.3 * rating_mva,
    )
    rated = rating_mva * 1e6 / 3**0.5 / nominal_v
    protect_incomer(bus, float(round(1.1 * rated / 50) * 50), 0.3, 0.0, 0.0)
    return bus


def draw_family(draw: Draw, bus: str, first: int, most: int, random: np.random.Generator) -> Family:
    """Draw one family of one to four like motors."""
    machines = draw.machines[int(random.integers(len(draw.machines)))]
    starter = draw.starters[int(random.integers(len(draw.starters)))]
    load = machines.load if machines.load == "square" or starter.starting_method == "direct_on_line" else "unloaded"
    count = min(int(random.integers(1, 5)), most)
    facts = dict(machines.facts) | dict(starter.facts)
    if starter.layout:
        facts |= {"relay_jam_multiple": round(float(random.uniform(1.8, 2.2)), 1)}
    return Family(
        tuple(f"{machines.prefix}-{first}{letter}" for letter in LETTERS[:count]),
        machines.service,
        f"Area {bus[-2:]}",
        machines.driven_machine,
        bus,
        draw.sizes_kw[int(random.integers(len(draw.sizes_kw)))],
        draw.poles[int(random.integers(len(draw.poles)))],
        starting_method=starter.starting_method,
        switching_device=starter.switching_device,
        overload_device=starter.overload_device,
        start_multiple=round(float(random.uniform(*draw.start_multiple)), 1),
        premium=bool(random.uniform() < 0.7),
        load=load,
        inertia=round(float(random.uniform(*machines.inertia)), 2),
        loading=round(float(random.uniform(*machines.loading)), 2),
        least_loading=round(float(random.uniform(*machines.least)), 2),
        length_m=draw.length_m,
        earth_ct=draw.earth_ct or starter.earth_ct,
        layout=starter.layout,
        starts=starter.starts,
        facts=facts,
    )


def fill(
    site: Site, buses: list[Record], draw: Draw, count: int, random: np.random.Generator, first: int = 1000
) -> None:
    """Add motors to buses in turn until there are so many; what cannot be built or overloads a bus is drawn anew."""
    wanted = len(site.motors) + count
    tries = 0
    while len(site.motors) < wanted:
        tries += 1
        if tries > 40 * count:
            raise RuntimeError(f"{site.name}: no room for {wanted - len(site.motors)} more motors")
        bus = buses[tries % len(buses)]
        family = draw_family(draw, text(bus, "bus_name"), first + tries, wanted - len(site.motors), random)
        trial = Site(site.name, buses=[bus])
        try:
            add_family(trial, family, random)
        except ValueError:
            continue
        if _fits(site, trial, bus):
            site.motors += trial.motors
            site.relays += trial.relays
            site.starts += trial.starts


def _fits(site: Site, trial: Site, bus: Record) -> bool:
    running = sum(
        number(motor, "running_current_a") for motor in (*site.motors, *trial.motors) if motor["bus"] == bus["bus_name"]
    )
    if running > 0.8 * number(bus, "incomer_pickup_a"):
        return False
    motor = trial.motors[0]
    if motor["starting_method"] != "direct_on_line":
        return True
    at_bus, _ = start_voltage_pu(bus, 0j, number(motor, "rated_voltage_v"), number(motor, "locked_rotor_a"))
    return at_bus >= 0.88


Maker = Callable[[int], Site]

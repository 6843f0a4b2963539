"""What a planted defect is, and how it is put into a site."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import date, datetime

from tests.sites.notation import LAYOUTS, in_steps
from tests.sites.plant import Record, Site, Value, number, text
from tests.sites.rounding import clean


@dataclass(frozen=True)
class Of:
    """A value given as a multiple of another figure of the same motor or relay."""

    quantity: str
    factor: float


Planted = Value | Of | None
"""What is written instead of the sound value; None takes it away."""


@dataclass(frozen=True)
class Finding:
    """A check that must fail."""

    check: str
    severity: str
    why: str


@dataclass(frozen=True)
class Defect:
    """One wrong value on one or several subjects."""

    keys: tuple[str, ...]
    quantity: str
    value: Planted
    findings: tuple[Finding, ...]
    table: str = "relay"
    """Where the wrong value stands: with the relay, the motor or the bus."""
    alongside: Mapping[str, Planted] = field(default_factory=dict)
    """Further values that change with it, so that nothing else fails."""


def unsafe(check: str, why: str) -> Finding:
    """Give a finding of that severity."""
    return Finding(check, "unsafe", why)


def nuisance(check: str, why: str) -> Finding:
    """Give a finding of that severity."""
    return Finding(check, "nuisance", why)


def inconsistent(check: str, why: str) -> Finding:
    """Give a finding of that severity."""
    return Finding(check, "inconsistent", why)


def observation(check: str, why: str) -> Finding:
    """Give a finding of that severity."""
    return Finding(check, "observation", why)


def record_of(site: Site, table: str, key: str) -> Record:
    """Find the record that a defect changes; relays are named by their motor."""
    if table == "relay":
        return site.relay_of(key)
    return site.motor(key) if table == "motor" else site.bus(key)


def plant(site: Site, defect: Defect) -> list[dict[str, str]]:
    """Put a defect into a site and give its rows of the table of planted defects."""
    rows = []
    for key in defect.keys:
        record = record_of(site, defect.table, key)
        sound = record.get(defect.quantity)
        _change(site, defect, key, record, defect.quantity, defect.value)
        for quantity, value in defect.alongside.items():
            _change(site, defect, key, record, quantity, value)
        for finding in defect.findings:
            rows.append(
                {
                    "subject_key": key,
                    "check": finding.check,
                    "severity": finding.severity,
                    "setting_or_datum": defect.quantity,
                    "planted_value": shown(record.get(defect.quantity)),
                    "sound_value": shown(sound),
                    "why": finding.why,
                }
            )
    return rows


def _change(site: Site, defect: Defect, key: str, record: Record, quantity: str, value: Planted) -> None:
    if value is None:
        record.pop(quantity, None)
        return
    motor = site.motor(key) if defect.table != "bus" else {}
    if isinstance(value, Of):
        source = record if value.quantity in record else motor
        value = clean(value.factor * number(source, value.quantity))
    if defect.table == "relay" and isinstance(value, float | int) and not isinstance(value, bool):
        written = LAYOUTS[text(record, "layout")].get(quantity)
        if written is not None:
            value = in_steps(float(value), written, record, motor)
    record[quantity] = value


def shown(value: Value | None) -> str:
    """Give a value as the table of planted defects shows it."""
    if value is None:
        return ""
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, datetime | date):
        return value.isoformat()
    return f"{value:.6g}" if isinstance(value, int | float) else value

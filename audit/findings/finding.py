"""A finding as a reader sees it, and as it is kept: a few codes, rendered when shown."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from audit.checks.entry import Severity

Status = Literal["new", "open", "repeated", "returned", "accepted"]


@dataclass(frozen=True, slots=True)
class FindingCode:
    """Where a finding stands in the outcomes: enough to render it."""

    outcome: int
    row: int
    requirement: int
    present: float
    low: float
    high: float
    group: str = ""
    """Name of the setting group judged, where it is not the active one."""


@dataclass(frozen=True, slots=True)
class FindingCell:
    """A cell that a finding rests on."""

    file: str
    sheet: str
    cell: str
    quantity: str


@dataclass(frozen=True, slots=True)
class Finding:
    """A breach or a conflict, complete enough to be acted on."""

    key: str
    subject: str
    name: str
    """Tag of the motor, or name of the relay, bus or group."""
    motor: str
    service: str
    relay: str
    bus: str
    cubicle: str
    function: str
    check: str
    pack: str
    severity: Severity
    says: str
    judges: str
    label: str
    present: float | bool | str | None
    present_text: str
    unit: str
    low: float | None
    high: float | None
    range_text: str
    low_set_by: str
    high_set_by: str
    range_state: str
    """'', or one or more of: provisional, moving, conflict."""
    margin_pct: float | None
    because: str
    why: str
    remedy: str
    source: str
    cells: tuple[FindingCell, ...]
    assumptions: tuple[str, ...]
    provisional: bool
    setting_group: str
    status: Status = "open"
    since: str = ""
    """Day of the audit that found it first."""
    audits: int = 1
    """Number of audits that found it, this one with them."""

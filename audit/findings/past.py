"""How the findings of an audit stand to those of earlier audits."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

from audit.fleet.folding import exact

Identity = tuple[str, str, str, str, str]
"""Subject, folded name, check, setting, setting group: never the folder, the row or the cell."""
PastStatus = Literal["new", "repeated", "returned"]


def identity_of(subject: str, name: str, check: str, setting: str, group: str) -> Identity:
    """Give what makes a finding the same finding in another audit.

    >>> identity_of("motor", " p-1 ", "jam-trip-on", "jam_trip_on", "")
    ('motor', 'p-1', 'jam-trip-on', 'jam_trip_on', '')
    """
    return subject, exact(name), check, setting, group


@dataclass(frozen=True, slots=True)
class Past:
    """How often and since when a finding was found."""

    status: PastStatus
    since: str
    """Day of the audit that found it first."""
    audits: int
    """Number of audits that found it, this one with them."""


@dataclass(frozen=True, slots=True)
class Cleared:
    """A finding of an earlier audit that is not found any more."""

    subject: str
    name: str
    check: str
    setting: str
    setting_group: str
    severity: str
    says: str
    since: str
    audits: int
    cleared_on: str
    """Day of the audit that did not find it any more; '' while it is open, because it can no longer be proven."""
    how: str
    """meets now, no longer applies, no longer provable, motor removed, …"""
    what_changed: tuple[str, ...]

    def identity(self) -> Identity:
        """Give the identity of the finding."""
        return identity_of(self.subject, self.name, self.check, self.setting, self.setting_group)


@dataclass(frozen=True, slots=True)
class SettingDrift:
    """A setting that changed since the last record."""

    relay: str
    motor: str
    quantity: str
    label: str
    before_text: str
    after_text: str
    file: str
    sheet: str
    cell: str
    explained_by: str
    """The change that is listed, or the finding that asked for it; '' where nothing says why."""


@dataclass(frozen=True)
class Previous:
    """What the record of an earlier audit says of this one."""

    audited_on: str
    pasts: Mapping[Identity, Past] = field(default_factory=dict)
    cleared: tuple[Cleared, ...] = ()
    """Findings cleared since then, and earlier ones: a finding that comes back is known again."""
    settings: tuple[SettingDrift, ...] = ()
    notices: tuple[str, ...] = ()

    def cleared_now(self, today: str) -> tuple[Cleared, ...]:
        """Give the findings that this audit does not find any more."""
        return tuple(one for one in self.cleared if one.cleared_on in ("", today))

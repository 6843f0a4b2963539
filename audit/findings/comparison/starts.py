"""Start records that came or went, motor by motor; starts have no names, so like ones are counted."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from dataclasses import dataclass

from audit.findings.audit import Audit
from audit.fleet.folding import exact

_TELL = ("start_moment", "start_clock", "start_time_s", "start_current_a", "start_voltage_pct", "start_completed")
_DIGITS = 9


@dataclass(frozen=True, slots=True)
class StartsChange:
    """How many starts of a motor are new and how many are gone."""

    motor: str
    new: int
    gone: int

    def words(self) -> str:
        """Say it.

        >>> StartsChange("P-1", 12, 0).words()
        '12 new'
        """
        return ", ".join(f"{number} {word}" for number, word in ((self.new, "new"), (self.gone, "gone")) if number)


def _starts(audit: Audit) -> Counter[tuple[object, ...]]:
    link = audit.fleet.links.get(("start", "motor"))
    size = audit.fleet.rows("start")
    if link is None or not size:
        return Counter()
    keys = (*audit.fleet.tables["motor"].keys, "")
    columns = [list(_plain(audit, name)) for name in _TELL]
    motors = [exact(keys[row]) for row in link.tolist()]
    return Counter(zip(motors, *columns, strict=True))


def _plain(audit: Audit, name: str) -> Iterator[object]:
    column = audit.workings.home_column(name)
    for value, missing in zip(column.values.tolist(), column.missing().tolist(), strict=True):
        yield None if missing else float(f"{value:.{_DIGITS}g}") if isinstance(value, float) else value


def starts_changed(before: Audit, after: Audit) -> dict[str, StartsChange]:
    """Give for each motor there on both sides (by its folded tag) whose starts differ how they do."""
    old, now = _starts(before), _starts(after)
    there = {exact(key) for key in before.fleet.tables["motor"].keys}
    names = {exact(key): key for key in after.fleet.tables["motor"].keys if exact(key) in there}
    new: Counter[str] = Counter()
    gone: Counter[str] = Counter()
    for start in old.keys() | now.keys():
        surplus = now[start] - old[start]
        (new if surplus > 0 else gone)[str(start[0])] += abs(surplus)
    found = {motor for motor in names if new[motor] or gone[motor]}
    return {motor: StartsChange(names[motor], new[motor], gone[motor]) for motor in sorted(found)}

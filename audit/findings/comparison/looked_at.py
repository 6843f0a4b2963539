"""What has to be looked at again because of a change, each with the verdict that it has now."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from audit.checks.verdicts import VERDICT_NAMES, Outcome
from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair
from audit.findings.comparison.changes import Change, RowChange
from audit.findings.comparison.impact_table import ChangeKind, Look, Sign
from audit.fleet.column import NO_ROW, Integers
from audit.fleet.folding import exact

BY_HAND = "to be looked at by hand"
EVERY = "*"
OWN_SUBJECTS = ("motor", "relay")
"""Every check of a motor means those of the motor and of its relay, not those of its bus and of its like."""
_ACTIONS = {
    "meets": "looked at, no action",
    "meets, provisional": "looked at; rests on an assumption",
    "not applicable": "looked at, does not apply",
    "breach": "finding: see there",
    "breach, provisional": "finding, provisional: see there",
    "unproven": "cannot be proven: see data to collect",
}


@dataclass(frozen=True, slots=True)
class LookedAt:
    """One check of some rows that a change asks to look at again; all of them have the same verdict."""

    change: str
    change_says: str
    subject: str
    name: str
    """What was changed: a motor, relay or bus."""
    shown_by: tuple[str, ...]
    """Labels of the data that changed."""
    at: str
    check: str
    """Name of the check; for what is to be looked at by hand, what it is."""
    function: str
    check_subject: str
    verdict: str
    action: str
    names: tuple[str, ...]
    why: str


@dataclass(frozen=True, slots=True)
class _Event:
    """A kind of change that happened to one motor or bus."""

    kind: ChangeKind
    subject: str
    name: str
    motor: int
    """The motor as a row after, NO_ROW for none and for one that is gone."""
    buses: tuple[int, ...]
    partner: str
    shown_by: tuple[str, ...]


def looked_at(
    pair: Pair, changed: Sequence[Change], rows: Sequence[RowChange], table: Iterable[ChangeKind]
) -> tuple[LookedAt, ...]:
    """Give everything that is to be looked at again, by change and check."""
    after = pair.after
    names: dict[str, list[Outcome]] = {}
    for outcome in after.outcomes:
        if outcome.check.stage == "rows":
            names.setdefault(outcome.check.name, []).append(outcome)
    out_of_scope = {check.name: check.pack for check in after.catalogue.checks if check.name not in names}
    found: list[LookedAt] = []
    for kind in table:
        for event in _events(pair, kind, changed, rows):
            seen: set[tuple[str, int]] = set()
            for look in kind.looks:
                members = _members(pair, event, look.at)
                if members.size or (look.at in ("the bus", "motors of the bus") and event.buses):
                    found += _verdicts(pair, event, look, members, names, seen)
                    found += _by_hand(event, look, names, out_of_scope)
    return tuple(found)


def _events(pair: Pair, kind: ChangeKind, changed: Sequence[Change], rows: Sequence[RowChange]) -> Iterator[_Event]:
    """Give each motor or bus to which this kind of change happened, once."""
    shown: dict[tuple[str, str], list[str]] = {}
    for change in changed:
        if change.kind != "follows" and any(_shows(sign, change) for sign in kind.signs):
            shown.setdefault((change.subject, change.name), []).append(change.label)
    for (subject, name), labels in shown.items():
        row = _row(pair.after, subject, name)
        yield _event(pair, kind, subject, name, row, tuple(labels))
    for one in rows:
        if any(sign.rows == one.kind and sign.subject == one.subject for sign in kind.signs):
            yield _event(pair, kind, one.subject, one.name, _row(pair.after, one.subject, one.name), (one.kind,))


def _shows(sign: Sign, change: Change) -> bool:
    if sign.subject != change.subject or sign.rows:
        return False
    if sign.role:
        return change.role == sign.role
    if change.quantity not in sign.data:
        return False
    if sign.becomes:
        return change.after == sign.becomes.replace("_", " ")
    if sign.way:
        if not isinstance(change.before, float) or not isinstance(change.after, float):
            return True
        return (change.after > change.before) == (sign.way == "up")
    return True


def _row(audit: Audit, subject: str, name: str) -> int:
    keys = audit.fleet.tables[subject].keys
    folded = exact(name)
    return next((row for row, key in enumerate(keys) if exact(key) == folded), NO_ROW)


def _event(pair: Pair, kind: ChangeKind, subject: str, name: str, row: int, shown: tuple[str, ...]) -> _Event:
    """Find the motor and the buses that a change belongs to, on both sides of it."""
    motor, buses = NO_ROW, set[int]()
    if subject == "bus":
        buses = {row} - {NO_ROW}
        return _Event(kind, subject, name, motor, tuple(sorted(buses)), "", shown)
    partner = ""
    for audit in (pair.before, pair.after):
        at = _motor_row(audit, subject, name)
        if at < 0:
            continue
        bus = _linked(audit, "motor", "bus", at)
        if bus >= 0:
            buses.add(bus if audit is pair.after else pair.as_after("bus", bus))
        told = audit.workings.home_column("duty_standby_with").values[at]
        partner = str(told) if told is not None else partner
        if audit is pair.after:
            motor = at
    return _Event(kind, subject, name, motor, tuple(sorted(buses - {NO_ROW})), partner, shown)


def _motor_row(audit: Audit, subject: str, name: str) -> int:
    row = _row(audit, subject, name)
    return row if subject == "motor" or row < 0 else _linked(audit, subject, "motor", row)


def _linked(audit: Audit, subject: str, home: str, row: int) -> int:
    rows = audit.fleet.parent_rows(subject, home)
    return int(rows[row]) if rows is not None and len(rows) else NO_ROW


def _members(pair: Pair, event: _Event, at: str) -> Integers:
    """Give the motors, as rows after, that a look is about."""
    fleet = pair.after.fleet
    one = np.array([event.motor] if event.motor >= 0 else [], dtype=np.int64)
    if at == "the motor":
        return one
    if at == "its sisters":
        of = fleet.parent_rows("motor", "sisters")
        if of is None or event.motor < 0 or of[event.motor] < 0:
            return np.empty(0, dtype=np.int64)
        return np.flatnonzero(of == of[event.motor])
    if at == "its partner":
        row = _row(pair.after, "motor", event.partner) if event.partner else NO_ROW
        return np.array([row] if row >= 0 else [], dtype=np.int64)
    of = fleet.parent_rows("motor", "bus")
    if of is None:
        return np.empty(0, dtype=np.int64)
    on_bus = np.flatnonzero(np.isin(of, event.buses))
    return on_bus[on_bus != event.motor] if at == "neighbours" else on_bus


def _rows_of(pair: Pair, subject: str, members: Integers, buses: tuple[int, ...]) -> Integers:
    """Give the rows of a check's subject that some motors, or some buses, stand for."""
    if subject == "bus":
        return np.array(buses, dtype=np.int64)
    if subject == "motor":
        return members
    rows = pair.after.fleet.parent_rows("motor", subject)
    if rows is None:
        return np.empty(0, dtype=np.int64)
    return np.unique(rows[members][rows[members] >= 0])


def _verdicts(
    pair: Pair,
    event: _Event,
    look: Look,
    members: Integers,
    names: dict[str, list[Outcome]],
    seen: set[tuple[str, int]],
) -> Iterator[LookedAt]:
    for name in look.matching(names):
        for outcome in names[name]:
            subject = outcome.check.subject
            if EVERY in look.checks and subject not in OWN_SUBJECTS:
                continue
            rows = _rows_of(pair, subject, members, event.buses).tolist()
            fresh = [row for row in rows if (outcome.check.key, row) not in seen]
            seen |= {(outcome.check.key, row) for row in fresh}
            keys = pair.keys(subject)
            by_verdict: dict[str, list[str]] = {}
            for row in fresh:
                by_verdict.setdefault(_verdict(outcome, row), []).append(keys[row])
            for verdict, of in by_verdict.items():
                yield _looked(event, look, outcome, verdict, tuple(of))


def _verdict(outcome: Outcome, row: int) -> str:
    word = VERDICT_NAMES[int(outcome.verdict[row])]
    return f"{word}, provisional" if outcome.provisional[row] else word


def _looked(event: _Event, look: Look, outcome: Outcome, verdict: str, names: tuple[str, ...]) -> LookedAt:
    check = outcome.check
    return LookedAt(
        event.kind.name, event.kind.says, event.subject, event.name, event.shown_by, look.at, check.key,
        check.function, check.subject, verdict, _ACTIONS[verdict], names, look.why,
    )  # fmt: skip


def _by_hand(
    event: _Event, look: Look, names: dict[str, list[Outcome]], out_of_scope: dict[str, str]
) -> Iterator[LookedAt]:
    told = list(look.by_hand)
    for name in look.unmatched(names):
        pack = out_of_scope.get(name)
        told.append(f"{name} (pack {pack} is not in scope)" if pack else f"{name.replace('-', ' ')} (no check)")
    for text in told:
        yield LookedAt(
            event.kind.name, event.kind.says, event.subject, event.name, event.shown_by, look.at, text,
            "", "", "", BY_HAND, (), look.why,
        )  # fmt: skip

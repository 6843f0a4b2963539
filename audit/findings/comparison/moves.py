"""What moved: verdicts, margins of checks, ends of permissible ranges, over all rows at once."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from audit.checks.ranges import NO_CHECK, SettingRange
from audit.checks.verdicts import BREACH, MEETS, VERDICT_NAMES, Judged, Outcome
from audit.expression.nodes import Node
from audit.expression.values import YES
from audit.findings.audit import Audit
from audit.findings.comparison.alignment import Pair

Floats = NDArray[np.float64]
What = Literal["verdict", "margin", "range"]


@dataclass(frozen=True, slots=True)
class Move:
    """Something of one row that moved, and the expressions through which it did."""

    subject: str
    row: int
    what: What
    check: str
    function: str
    setting: str
    before: str | float | None
    after: str | float | None
    end: Literal["", "low", "high"] = ""
    nodes: tuple[Node | None, ...] = ()


def outcomes_by_key(audit: Audit) -> dict[tuple[str, int], Outcome]:
    """Give the outcomes by the key of their check; one that stands several times by its place among them."""
    found: dict[tuple[str, int], Outcome] = {}
    for outcome in audit.outcomes:
        place = 0
        while (outcome.check.key, place) in found:
            place += 1
        found[outcome.check.key, place] = outcome
    return found


def margin_share_pct(judged: Judged) -> Floats:
    """Give the distance to the nearer bound in per cent of it, positive inside; missing where no number is judged."""
    if judged.requirement.kind == "must_be":
        return np.full(len(judged.present), np.nan)
    with np.errstate(divide="ignore", invalid="ignore"):
        low = (judged.present - judged.low) / np.abs(judged.low) * 100
        high = (judged.high - judged.present) / np.abs(judged.high) * 100
    margin = np.fmin(low, high)
    margin[~np.isfinite(margin)] = np.nan
    return margin


def moves(pair: Pair, share_pct: float) -> Iterator[Move]:
    """Give everything that moved in rows there on both sides: verdicts at all, figures by more than a share."""
    before, after = outcomes_by_key(pair.before), outcomes_by_key(pair.after)
    for key, outcome in after.items():
        other = before.get(key)
        if other is not None and outcome.check.stage == "rows":
            yield from _of_check(pair, other, outcome, share_pct, nodes_of(outcome, after))
    for setting, band in pair.after.ranges.items():
        yield from _of_range(pair, pair.before.ranges.get(setting), band, share_pct)


def _of_check(
    pair: Pair, before: Outcome, after: Outcome, share_pct: float, nodes: tuple[Node | None, ...]
) -> Iterator[Move]:
    check = after.check
    rows = pair.row_before(check.subject)
    there = rows >= 0
    old = np.append(before.verdict, np.int8(-1))[rows]
    moved = there & (old != after.verdict)
    for row in np.flatnonzero(moved).tolist():
        names = VERDICT_NAMES[int(old[row])], VERDICT_NAMES[int(after.verdict[row])]
        yield Move(check.subject, row, "verdict", check.key, check.function, _setting(after), *names, nodes=nodes)
    judged = (MEETS, BREACH)
    settled = there & ~moved & np.isin(after.verdict, judged)
    for one, other in zip(after.judged, before.judged, strict=True):
        if _has_range(pair, one, check.subject):
            continue
        now = margin_share_pct(one)
        was = np.append(margin_share_pct(other), np.nan)[rows]
        active = settled & (one.active == YES) & (np.append(other.active, np.int8(0))[rows] == YES)
        with np.errstate(invalid="ignore"):
            far = active & (np.abs(now - was) > share_pct)
        requirement = one.requirement
        for row in np.flatnonzero(far).tolist():
            yield Move(
                check.subject, row, "margin", check.key, check.function, requirement.setting() or "",
                float(was[row]), float(now[row]), nodes=(requirement.judged, requirement.bound, requirement.within),
            )  # fmt: skip


def _has_range(pair: Pair, judged: Judged, subject: str) -> bool:
    """Margins of settings are told by their permissible ranges."""
    return subject == "motor" and (judged.requirement.setting() or "") in pair.after.ranges


def _setting(outcome: Outcome) -> str:
    for judged in outcome.judged:
        setting = judged.requirement.setting()
        if setting:
            return setting
    return ""


def nodes_of(outcome: Outcome, outcomes: Mapping[tuple[str, int], Outcome]) -> tuple[Node | None, ...]:
    """Give what the verdict of a check rests on; where another finding replaces it, what that one rests on too."""
    nodes: list[Node | None] = [outcome.check.when]
    for judged in outcome.judged:
        requirement = judged.requirement
        nodes += [requirement.when, requirement.judged, requirement.bound, requirement.within]
    other = outcomes.get((outcome.check.unless_found or "", 0))
    return (*nodes, *nodes_of(other, {})) if other is not None else tuple(nodes)


def _of_range(pair: Pair, before: SettingRange | None, after: SettingRange, share_pct: float) -> Iterator[Move]:
    rows = pair.row_before(after.subject)
    nothing = np.full(len(rows), np.nan)
    for end in ("low", "high"):
        now: Floats = getattr(after, end)
        was = np.append(getattr(before, end), np.nan)[rows] if before is not None else nothing
        moved = (rows >= 0) & (_apart(was, now, share_pct))
        for row in np.flatnonzero(moved).tolist():
            setter = _setter(pair.after, after, end, row) or _setter(pair.before, before, end, int(rows[row]))
            if setter is None:
                continue
            yield Move(
                after.subject, row, "range", setter.check.key, setter.check.function, after.setting,
                _known(was[row]), _known(now[row]), "low" if end == "low" else "high",
                nodes=_range_nodes(pair, before, after, end, row, int(rows[row])),
            )  # fmt: skip


def _apart(was: Floats, now: Floats, share_pct: float) -> NDArray[np.bool_]:
    gone, new = np.isnan(now), np.isnan(was)
    with np.errstate(invalid="ignore"):
        far = np.abs(now - was) > share_pct / 100 * np.abs(was)
    return np.asarray((gone != new) | (far & ~gone & ~new))


def _known(value: float) -> float | None:
    return None if value != value else float(value)


def _setter(audit: Audit, band: SettingRange | None, end: str, row: int) -> Outcome | None:
    if band is None or row < 0:
        return None
    number = int((band.low_check if end == "low" else band.high_check)[row])
    return None if number == NO_CHECK else audit.outcomes[number]


def _range_nodes(
    pair: Pair, before: SettingRange | None, after: SettingRange, end: str, row: int, old: int
) -> tuple[Node | None, ...]:
    """Give what the checks that set an end rest on, on either side; whether they apply counts where they changed."""
    setters = (_setter(pair.before, before, end, old), _setter(pair.after, after, end, row))
    names = [setter.check.key if setter is not None else "" for setter in setters]
    nodes: list[Node | None] = []
    for setter in setters:
        for judged in setter.judged if setter is not None else ():
            if judged.requirement.setting() == after.setting:
                nodes += [judged.requirement.bound, judged.requirement.within, judged.requirement.when]
        if setter is not None and names[0] != names[1]:
            nodes.append(setter.check.when)
    return tuple(nodes)

"""The rows of the hand-over: each finding whose remedy is a setting of a relay, what to set, and how it is judged."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from audit.checks.ranges import settings_beneath
from audit.checks.verdicts import UNPROVEN, Outcome, data_lacking
from audit.findings.audit import Audit
from audit.findings.collect import label_of
from audit.findings.figures import known_or_none
from audit.findings.finding import Finding, FindingCode
from audit.findings.handover.moving import Movements, MovingEnds
from audit.findings.handover.propose import Proposal, propose_number, propose_switch
from audit.findings.handover.written import WrittenSetting, WrittenSettings
from audit.fleet.column import NO_ROW
from audit.vocabulary.quantities import Quantity, vocabulary

AGAIN = "run the audit again"
"""What a cell says where no formula of a sheet can judge a value."""


@dataclass(frozen=True, slots=True)
class WorkRow:
    """One finding as work: the setting in the export's words, the range, and what is proposed."""

    finding: Finding
    relay_row: int
    relay_key: str
    """The relay, or its setting group, as the table of relays names it."""
    setting: str
    """The quantity whose cell is to be changed."""
    function: str
    label: str
    kind: str
    symbol: str
    written: WrittenSetting
    present: float
    low: float | None
    high: float | None
    moving: MovingEnds
    words_wanted: tuple[str, ...]
    """For a setting in words: those that the check allows."""
    again: str
    """Why a formula cannot judge the issued value alone, or ''."""
    held: str
    """Why nothing may be issued yet, or ''."""
    proposal: Proposal

    @property
    def key(self) -> str:
        """Give the key by which the row is known when it comes back."""
        return self.finding.key

    @property
    def setting_key(self) -> str:
        """Give the setting that the row is about; several findings may speak of one."""
        return setting_key(self.finding.relay, self.setting, self.finding.setting_group)


def setting_key(relay: str, setting: str, group: str) -> str:
    """Give the name of one setting of one relay.

    >>> setting_key("R-1", "jam_trip_delay_s", "2")
    'R-1|jam_trip_delay_s|group 2'
    """
    return "|".join([relay, setting, *([f"group {group}"] if group else [])])


def work_rows(audit: Audit, findings: Iterable[Finding]) -> list[WorkRow]:
    """Give the rows of the hand-over, ordered by bus, panel, motor and relay."""
    maker = _Maker(audit)
    rows = [
        maker.row(code, finding)
        for code, finding in zip(audit.codes, findings, strict=True)
        if finding.status != "accepted"
    ]
    kept = _with_words([row for row in rows if row is not None])
    return sorted(kept, key=lambda row: place_order(row.finding))


def _with_words(rows: list[WorkRow]) -> list[WorkRow]:
    """Let no formula judge a range that rests on a switch or choice which another row is to change."""
    changed: dict[str, set[str]] = {}
    for row in rows:
        if row.kind != "number":
            changed.setdefault(row.finding.relay, set()).add(row.setting)
    result = []
    for row in rows:
        others = row.moving.words & changed.get(row.finding.relay, set())
        if others and not row.again:
            labels = ", ".join(vocabulary().quantities[name].label for name in sorted(others))
            row = replace(row, again=f"{AGAIN}: the range rests on {labels}")
        result.append(row)
    return result


def place_order(finding: Finding) -> tuple[str, ...]:
    """Give the order in which one visit does one panel."""
    return (
        finding.bus,
        finding.cubicle,
        finding.motor or finding.name,
        finding.relay,
        finding.function,
        finding.check,
        finding.setting_group,
    )


class _Maker:
    def __init__(self, audit: Audit) -> None:
        self.audit = audit
        self._written = WrittenSettings(audit.fleet)
        self._movements = Movements(audit.outcomes, audit.workings)
        self._motors = {key: row for row, key in enumerate(audit.fleet.tables["motor"].keys)}
        self._relays = {key: row for row, key in enumerate(audit.fleet.tables["relay"].keys)}
        self._groups = dict(audit.fleet.other_groups)
        self._lacking: dict[int, dict[str, NDArray[np.bool_]]] = {}
        self._beneath: dict[tuple[int, int], set[str]] = {}

    def row(self, code: FindingCode, finding: Finding) -> WorkRow | None:
        motor_row = self._motors.get(finding.motor, NO_ROW)
        relay_row = self._relay_row(finding, motor_row)
        judged = self._setting(code, finding)
        if relay_row == NO_ROW or judged is None:
            return None
        written = self._written.of(judged, relay_row)
        quantity = vocabulary().quantities[written.quantity]
        symbol = quantity.unit.symbol if quantity.unit and quantity.kind == "number" else ""
        low, high, moving = self._ends(finding, quantity, motor_row)
        wanted = self._words_wanted(code, finding, quantity, written)
        again = self._again(finding, quantity, moving, wanted)
        held = self._held(finding, quantity, motor_row)
        return WorkRow(
            finding=finding,
            relay_row=relay_row,
            relay_key=self.audit.fleet.tables["relay"].keys[relay_row],
            setting=quantity.name,
            function=_function(quantity, finding),
            label=quantity.label,
            kind=quantity.kind,
            symbol=symbol,
            written=written,
            present=self._present(quantity, relay_row),
            low=low,
            high=high,
            moving=moving,
            words_wanted=wanted,
            again=again,
            held=held,
            proposal=self._proposal(finding, quantity, written, (low, high), moving, wanted, held, again),
        )

    def _relay_row(self, finding: Finding, motor_row: int) -> int:
        if finding.setting_group and finding.setting_group in self._groups and motor_row != NO_ROW:
            return int(self._groups[finding.setting_group][motor_row])
        return self._relays.get(finding.relay, NO_ROW)

    def _setting(self, code: FindingCode, finding: Finding) -> str | None:
        """Give the setting that the finding judges, else the first one beneath what it judges."""
        settings = vocabulary().settings()
        if finding.judges in settings:
            return finding.judges
        outcome = self.audit.outcomes[code.outcome]
        if outcome.check.stage == "ranges" or not outcome.judged:
            return None
        key = (code.outcome, code.requirement)
        if key not in self._beneath:
            requirement = outcome.judged[code.requirement].requirement
            node = requirement.bound if requirement.kind == "requires" else requirement.judged
            self._beneath[key] = set() if node is None else settings_beneath(node, self.audit.workings, set())
        found = [cell.quantity for cell in finding.cells if cell.quantity in self._beneath[key]]
        numbers = [name for name in found if settings[name].kind == "number"]
        return next(iter(numbers or found), None)

    def _present(self, quantity: Quantity, relay_row: int) -> float:
        column = self.audit.fleet.tables["relay"].columns.get(quantity.name)
        if column is None or quantity.kind != "number":
            return float("nan")
        return float(column.values[relay_row])

    def _ends(
        self, finding: Finding, quantity: Quantity, motor_row: int
    ) -> tuple[float | None, float | None, MovingEnds]:
        if quantity.kind != "number":
            return None, None, MovingEnds()
        if finding.judges == quantity.name:
            low, high, moves = finding.low, finding.high, "moving" in finding.range_state
        else:
            band = self.audit.ranges.get(quantity.name)
            if band is None or motor_row == NO_ROW:
                return None, None, MovingEnds()
            low, high = known_or_none(float(band.low[motor_row])), known_or_none(float(band.high[motor_row]))
            moves = bool(band.moving[motor_row])
        if not moves or motor_row == NO_ROW:
            return low, high, MovingEnds()
        if finding.setting_group:
            return low, high, MovingEnds(again=True)
        return low, high, self._movements.of(quantity.name, motor_row)

    def _words_wanted(
        self, code: FindingCode, finding: Finding, quantity: Quantity, written: WrittenSetting
    ) -> tuple[str, ...]:
        if quantity.kind != "truth" or finding.judges != quantity.name:
            return ()
        outcome = self.audit.outcomes[code.outcome]
        if outcome.check.stage == "ranges":
            return ()
        requirement = outcome.judged[code.requirement].requirement
        if requirement.kind != "must_be":
            return ()
        words = (written.on_word, "on") if requirement.text == "on" else (written.off_word, "off")
        return tuple(dict.fromkeys(word.strip().casefold() for word in words))

    def _again(self, finding: Finding, quantity: Quantity, moving: MovingEnds, wanted: tuple[str, ...]) -> str:
        if finding.judges != quantity.name:
            return f"{AGAIN}: the check judges {finding.label or finding.says}"
        if moving.again:
            return f"{AGAIN}: the range moves with other settings"
        if quantity.kind != "number" and not wanted:
            return f"{AGAIN}: a word is judged with all others"
        return ""

    def _held(self, finding: Finding, quantity: Quantity, motor_row: int) -> str:
        """Say which datum must come first where an end of the range is provisional."""
        if quantity.kind != "number" or not (finding.provisional or "provisional" in finding.range_state):
            return ""
        lacks = list(finding.assumptions) if finding.provisional else []
        if "provisional" in finding.range_state and motor_row != NO_ROW:
            lacks += self._labels_lacking(quantity.name, motor_row)
        named = "; ".join(dict.fromkeys(lacks)) or "an assumption sets an end of the range"
        return f"HELD BACK: {named}"

    def _labels_lacking(self, setting: str, motor_row: int) -> list[str]:
        labels = []
        for number, outcome in enumerate(self.audit.outcomes):
            if not _judges(outcome, setting) or outcome.verdict[motor_row] != UNPROVEN:
                continue
            if number not in self._lacking:
                self._lacking[number] = data_lacking(outcome, self.audit.workings)
            labels += [
                f"{label_of(datum, self.audit.workings)} is not known"
                for datum, rows in self._lacking[number].items()
                if rows[motor_row]
            ]
        return labels

    def _proposal(
        self,
        finding: Finding,
        quantity: Quantity,
        written: WrittenSetting,
        ends: tuple[float | None, float | None],
        moving: MovingEnds,
        wanted: Sequence[str],
        held: str,
        again: str,
    ) -> Proposal:
        if held:
            return Proposal(None, "none: a datum is provisional")
        if "conflict" in finding.range_state:
            return Proposal(None, "none: the range is in conflict, no value satisfies all checks")
        if moving.again or moving.low or moving.high or "moving" in finding.range_state:
            return Proposal(None, "none: the range moves with another setting")
        if wanted:
            return propose_switch(finding.range_text == "on", written)
        if again or quantity.kind != "number":
            return Proposal(None, "none: the check judges several data together")
        return propose_number(self._present(quantity, self._relays.get(finding.relay, NO_ROW)), *ends, written,
                              quantity.unit.symbol if quantity.unit else "")  # fmt: skip


def _judges(outcome: Outcome, setting: str) -> bool:
    return (
        outcome.check.subject == "motor"
        and outcome.check.stage == "rows"
        and any(judged.requirement.setting() == setting for judged in outcome.judged)
    )


def _function(quantity: Quantity, finding: Finding) -> str:
    element = vocabulary().elements.get(quantity.element or "")
    return f"{element.function} {element.label}" if element else finding.function

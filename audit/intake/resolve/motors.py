"""The rows of the motor table: one a motor or winding, from one list or from several that complete each other."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field

import pandas as pd

from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.names import Names, exact, loose
from audit.intake.resolve.records import Name, Record

IDENTITY = frozenset({"motor", "service", "area", "bus", "cubicle", "relay", "winding"})
SPEEDS = {"rated_speed_rpm": "r/min", "poles": "poles"}
_ONE = re.compile(r"\s*1(?:\D|$)|\s*single\b", re.IGNORECASE)
Facts = Mapping[int, frozenset[str]]


@dataclass
class MotorRows:
    """The motors: key and winding of each row, the row of each record, and the names that find a row."""

    keys: list[str] = field(default_factory=list)
    windings: list[Name | None] = field(default_factory=list)
    """Winding and its cell, where the list or a differing speed tells one."""
    records: list[list[Record]] = field(default_factory=list)
    row_of_record: dict[int, int] = field(default_factory=dict)
    names: Names = field(default_factory=Names)

    def first(self, row: int, attribute: str) -> Name | None:
        """Give the first name that the records of a motor give for its relay, bus, cubicle or winding."""
        for record in self.records[row]:
            name: Name | None = getattr(record, attribute)
            if name is not None:
                return name
        return None


@dataclass
class _Motor:
    """Records that speak of one row of the motor table."""

    tag: Name
    records: list[Record]
    sheets: set[int]

    def winding(self) -> Name | None:
        return next((record.winding for record in self.records if record.winding), None)


def motor_rows(readings: pd.DataFrame, records: Iterable[Record], ledger: Ledger) -> MotorRows:
    """Find the motors among the records of the motor lists."""
    listed = [record for record in records if record.table == "motor"]
    for record in listed:
        if record.motor is None:
            ledger.complain(
                record.cell,
                "a row of the motor list has no tag",
                "a tag in each row",
                "Give the motor a tag; the row is left out.",
                quantity="motor",
                subject="motor",
            )
    tagged = _three_phase(readings, [record for record in listed if record.motor], ledger)
    facts = _facts_of_sheets(readings, tagged)
    by_tag: dict[str, list[_Motor]] = {}
    for record in tagged:
        if record.motor:
            _settle(by_tag.setdefault(exact(record.motor.text), []), record, record.motor, facts)
    _fold(by_tag, facts, ledger)
    return _named(by_tag, readings, ledger)


def _three_phase(readings: pd.DataFrame, tagged: list[Record], ledger: Ledger) -> list[Record]:
    """Leave out the motors that are said to have one phase, and say so."""
    said = readings[readings["quantity"] == "phases"]
    single = said[(said["number"] == 1) | (said["number"].isna() & said["written"].astype(str).str.match(_ONE))]
    if single.empty:
        return tagged
    ones = dict(zip(single["record"].tolist(), single["cell"].tolist(), strict=True))
    others = set(said["record"].tolist()) - set(ones)
    tag = {record.number: exact(record.motor.text) for record in tagged if record.motor}
    dropped = {tag[number] for number in ones if number in tag} - {tag[number] for number in others if number in tag}
    for record in tagged:
        if record.number in ones and record.motor:
            ledger.complain(
                ones[record.number],
                f"motor {record.motor.text} has one phase",
                "three-phase motors",
                "It is left out of the audit.",
                quantity="phases",
                subject="motor",
                key=record.motor.text,
                weight="remark",
            )
    return [record for record in tagged if record.number not in ones and tag[record.number] not in dropped]


def _facts_of_sheets(readings: pd.DataFrame, tagged: list[Record]) -> Facts:
    """Give the quantities that each sheet of motors tells, who and where they are left aside."""
    sheets = pd.Series({record.number: record.sheet for record in tagged}, dtype="int64")
    told = readings[readings["record"].isin(sheets.index) & ~readings["quantity"].isin(IDENTITY)]
    pairs = set(zip(sheets.reindex(told["record"]).tolist(), told["quantity"].tolist(), strict=True))
    return {sheet: frozenset(name for home, name in pairs if home == sheet) for sheet in set(sheets.tolist())}


def _complete_each_other(sheet: int, others: set[int], facts: Facts) -> bool:
    """Tell whether a sheet adds to others rather than listing motors a second time: few facts in common."""
    mine = facts.get(sheet, frozenset())
    for other in others:
        theirs = facts.get(other, frozenset())
        if sheet == other or 2 * len(mine & theirs) > min(len(mine), len(theirs)):
            return False
    return True


def _settle(motors: list[_Motor], record: Record, tag: Name, facts: Facts) -> None:
    for motor in motors:
        known = motor.winding()
        same = record.winding is None or known is None or exact(record.winding.text) == exact(known.text)
        if same and _complete_each_other(record.sheet, motor.sheets, facts):
            motor.records.append(record)
            motor.sheets.add(record.sheet)
            return
    motors.append(_Motor(tag, [record], {record.sheet}))


def _fold(by_tag: dict[str, list[_Motor]], facts: Facts, ledger: Ledger) -> None:
    """Join tags that are equal after folding across sheets that complete each other; ask within one list."""
    alike: dict[str, list[str]] = {}
    for tag in by_tag:
        alike.setdefault(loose(tag), []).append(tag)
    for tags in alike.values():
        if len(tags) < 2:
            continue
        first, second = by_tag[tags[0]][0], by_tag[tags[1]][0]
        single = len(tags) == 2 and all(len(by_tag[tag]) == 1 for tag in tags)
        if single and all(_complete_each_other(sheet, first.sheets, facts) for sheet in second.sheets):
            first.records += second.records
            first.sheets |= second.sheets
            del by_tag[tags[1]]
            ledger.complain(
                second.tag.cell,
                f"'{second.tag.text}' taken as '{first.tag.text}': the same but for dashes, spaces, dots, underscores",
                "one spelling of a tag in all tables",
                "If they are two motors, write their tags so that they differ.",
                subject="motor",
                key=first.tag.text,
                weight="remark",
            )
        else:
            spelled = " and ".join(f"'{by_tag[tag][0].tag.text}'" for tag in tags)
            ledger.ask(
                second.tag.cell,
                f"{spelled} differ only in dashes, spaces, dots or underscores",
                "Are they one motor or several? They are kept apart until then.",
                ("one motor", "several motors"),
            )


def _named(by_tag: dict[str, list[_Motor]], readings: pd.DataFrame, ledger: Ledger) -> MotorRows:
    """Give keys to the motors, in the order of the list."""
    told = MotorRows()
    several = {tag: motors for tag, motors in by_tag.items() if len(motors) > 1}
    windings: dict[int, Name] = {}
    if several:
        speeds = _speeds(readings, [motor for motors in several.values() for motor in motors])
        for motors in several.values():
            windings |= _windings(motors, speeds)
    taken: set[str] = set()
    ordered = sorted(
        (motor for motors in by_tag.values() for motor in motors), key=lambda motor: motor.records[0].number
    )
    for motor in ordered:
        tag = exact(motor.tag.text)
        winding = windings.get(motor.records[0].number) if tag in several else motor.winding()
        key = f"{motor.tag.text} ({winding.text})" if winding and tag in several else motor.tag.text
        row = len(told.keys)
        told.names.add(motor.tag.text, row, first_counts=winding is None)
        if exact(key) in taken:
            _complain_twice(motor, by_tag[tag][0], ledger)
        key = _unique(key, taken)
        taken.add(exact(key))
        told.names.add(key, row)
        told.keys.append(key)
        told.windings.append(winding)
        told.records.append(motor.records)
        told.row_of_record.update((record.number, row) for record in motor.records)
    return told


def _unique(key: str, taken: set[str]) -> str:
    number, unique = 2, key
    while exact(unique) in taken:
        unique = f"{key} ({number})"
        number += 1
    return unique


def _complain_twice(motor: _Motor, namesake: _Motor, ledger: Ledger) -> None:
    first = ledger.place(namesake.tag.cell)
    ledger.complain(
        motor.tag.cell,
        f"the tag '{motor.tag.text}' stands a second time, first in {first.file}, sheet '{first.sheet}', "
        f"cell {first.cell}",
        "a tag once, or rows that differ in winding or speed",
        "Both rows are judged; settings and starts that name the tag count for the first.",
        quantity="motor",
        subject="motor",
        key=motor.tag.text,
        weight="remark",
    )


def _speeds(readings: pd.DataFrame, motors: list[_Motor]) -> dict[int, Name]:
    """Give the speed, else the number of poles, that each record of these motors states."""
    records = {record.number for motor in motors for record in motor.records}
    found: dict[int, Name] = {}
    for quantity, unit in SPEEDS.items():
        said = readings[(readings["quantity"] == quantity) & readings["number"].notna()]
        said = said[said["record"].isin(records)]
        for number, speed, cell in zip(
            said["record"].tolist(), said["number"].tolist(), said["cell"].tolist(), strict=True
        ):
            found.setdefault(number, Name(f"{speed:g} {unit}", cell))
    return found


def _windings(motors: list[_Motor], speeds: Mapping[int, Name]) -> dict[int, Name]:
    """Give the winding of each of several rows of one tag, empty where they do not differ in one."""
    for found in (
        [motor.winding() for motor in motors],
        [next((speeds[r.number] for r in motor.records if r.number in speeds), None) for motor in motors],
    ):
        named = [name for name in found if name is not None]
        if len({exact(name.text) for name in named}) == len(motors):
            return {motor.records[0].number: name for motor, name in zip(motors, named, strict=True)}
    return {}

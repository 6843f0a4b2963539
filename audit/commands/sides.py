"""The two sides of a comparison: fleets that are read, records of audits, suppositions; judged by the same rules."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date
from pathlib import Path

from audit.checks.catalogue import Catalogue
from audit.derivation.groups import with_groups
from audit.derivation.register_facts import with_register_facts
from audit.findings.audit import Audit
from audit.findings.comparison import Supposed
from audit.findings.comparison.suppose import Supposition, suppose
from audit.fleet.fleet import Fleet
from audit.intake import gather, resolve
from audit.pipeline import Progress, judge_fleet, packs_in_scope
from audit.refusal import Refusal
from audit.report.record.read import Record, read_record, record_file
from audit.report.record.values import verdict_letters


@dataclass(frozen=True)
class Side:
    """One side of a comparison, not yet judged."""

    path: Path
    fleet: Fleet
    """With its groups and the facts of its register."""
    audited_on: date
    record: Record | None = None
    supposed: tuple[Supposed, ...] = ()

    def kind(self) -> str:
        """Say what the side was read from."""
        if self.supposed:
            return "workbooks, with suppositions"
        return "workbooks" if self.record is None else f"record of {self.audited_on.isoformat()}"


def read_side(path: Path, audited_on: date, progress: Progress | None = None) -> Side:
    """Read a fleet, or the record of an audit, which stands as of its own day."""
    if record_file(path) is None:
        if path.suffix.casefold() == ".json":
            raise Refusal(f"{path}: there is no such file. Give a fleet, the folder of a record, or its findings.json.")
        return Side(path, _whole(resolve(gather(path, progress))), audited_on)
    record = read_record(path)
    if record.fleet is None:
        raise Refusal(
            f"{path}: the record holds no values (record version {record.version}, or its values.jsonl.gz is gone), "
            "so what changed cannot be told. Audit that fleet again, or give its workbooks; "
            "'audit --previous' needs the findings only and takes this record."
        )
    return Side(path, record.fleet, record.audited_on, record)


def read_supposed(
    path: Path, suppositions: Sequence[Supposition], catalogue: Catalogue, audited_on: date, progress: Progress | None
) -> tuple[Side, Side]:
    """Read a fleet once, and give it as it is and as it is supposed to be."""
    if record_file(path) is not None:
        raise Refusal(
            f"{path}: --set wants the workbooks of a fleet, not a record: other values follow from a supposed one."
        )
    gathered = gather(path, progress)
    fleet = resolve(gathered)
    other, supposed = suppose(gathered, fleet, suppositions, catalogue.quantities)
    as_it_is = Side(path, _whole(fleet), audited_on)
    return as_it_is, Side(path, _whole(resolve(other)), audited_on, supposed=supposed)


def _whole(fleet: Fleet) -> Fleet:
    return with_register_facts(with_groups(fleet))


def judge_sides(sides: Sequence[Side], catalogue: Catalogue, packs: Sequence[str]) -> tuple[list[Audit], list[str]]:
    """Judge all sides by the same rules and packs; say where a record was judged otherwise then."""
    scope: dict[str, None] = {}
    for side in sides:
        asked = [*packs, *(side.record.content.get("rules", {}).get("packs", []) if side.record else [])]
        scope |= dict.fromkeys(packs_in_scope(catalogue, side.fleet, asked))
    audits = [judge_fleet(side.fleet, catalogue, audited_on=side.audited_on, packs=list(scope)) for side in sides]
    notices = [
        notice
        for side, audit in zip(sides, audits, strict=True)
        if side.record is not None
        for notice in _rules_changed(side.record, audit)
    ]
    return audits, notices


def _rules_changed(record: Record, judged: Audit) -> list[str]:
    outcomes = {outcome.check.key: outcome for outcome in judged.outcomes if outcome.check.stage == "rows"}
    otherwise = sum(
        sum(now != then for now, then in zip(verdict_letters(outcomes[check]).lower(), letters.lower(), strict=False))
        for check, letters in record.verdicts.items()
        if check in outcomes
    )
    newer = sorted(set(outcomes) - set(record.verdicts))
    gone = sorted(set(record.verdicts) - set(outcomes))
    told = []
    if otherwise:
        told.append(
            f"the record of {record.audited_on.isoformat()} is judged by the rules of today, as both sides must be; "
            f"{otherwise:,} of its verdicts are other than those recorded"
        )
    if newer:
        told.append(f"checks that the record did not have: {', '.join(newer)}")
    if gone:
        told.append(f"checks of the record that are not applied now: {', '.join(gone)}")
    return told

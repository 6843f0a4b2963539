"""Everything that one audit found, before anything is rendered."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import date

from audit.checks.catalogue import Catalogue
from audit.checks.entry import SEVERITIES
from audit.checks.ranges import SettingRange
from audit.checks.verdicts import VERDICT_NAMES, Outcome
from audit.derivation.workings import Workings
from audit.findings.accepted import Accepted, DeviationTable
from audit.findings.collect import DatumWanted, UnprovenGroup
from audit.findings.finding import FindingCode
from audit.findings.past import Previous
from audit.fleet.fleet import Fleet


@dataclass(frozen=True)
class Audit:
    """The outcome of an audit: verdicts, ranges, findings by code, and what is lacking."""

    fleet: Fleet
    catalogue: Catalogue
    workings: Workings
    outcomes: tuple[Outcome, ...]
    ranges: Mapping[str, SettingRange]
    codes: tuple[FindingCode, ...]
    unproven: tuple[UnprovenGroup, ...]
    data_to_collect: tuple[DatumWanted, ...]
    packs_in_scope: tuple[str, ...]
    packs_out_of_scope: tuple[str, ...]
    audited_on: date
    other_groups: Mapping[str, Audit] = field(default_factory=dict)
    """By name the other setting groups that can be selected, each judged as if it were the active one."""
    previous: Previous | None = None
    """What the record of an earlier audit says of this one, where one was given."""
    accepted: tuple[Accepted, ...] = ()
    """Deviations that the site accepted, with the findings that they speak of."""
    accepted_table: DeviationTable | None = None

    def counts(self) -> dict[str, int]:
        """Count verdicts over all checks."""
        totals = dict.fromkeys(VERDICT_NAMES, 0)
        for outcome in self.outcomes:
            for name, number in outcome.counts().items():
                totals[name] += number
        return totals

    def provisional(self) -> int:
        """Count the verdicts that rest on an assumption."""
        return sum(int(outcome.provisional.sum()) for outcome in self.outcomes)

    def without_evidence(self) -> int:
        """Count the pairs that are not applicable because no evidence was given."""
        return sum(int(outcome.no_evidence.sum()) for outcome in self.outcomes)

    def counted(self) -> list[FindingCode]:
        """Give the findings that are not accepted."""
        left = {one.code for one in self.accepted if one.holds}
        return [code for code in self.codes if code not in left]

    def by_severity(self) -> dict[str, int]:
        """Count the findings of each severity, those that are accepted left aside."""
        counts: dict[str, int] = dict.fromkeys(SEVERITIES, 0)
        for code in self.counted():
            counts[self.outcomes[code.outcome].check.severity] += 1
        return counts

    def check_names(self) -> tuple[str, ...]:
        """Give the names of the checks applied, each once."""
        return tuple(dict.fromkeys(outcome.check.name for outcome in self.outcomes))

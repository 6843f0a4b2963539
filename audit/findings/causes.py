"""What a breach points at: the row of a group that decided, the slip that would explain it, the likely cause."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from audit.checks.entry import Requirement
from audit.checks.slips import sign_in_words, slip_in_words
from audit.checks.verdicts import Outcome
from audit.derivation.trace import Trace
from audit.derivation.workings import CHILD_OF
from audit.expression.nodes import names_over_rows
from audit.expression.values import YES
from audit.findings.finding import FindingCode
from audit.vocabulary.units import Unit


def causes_in_words(outcome: Outcome, code: FindingCode, deciding: int, unit: Unit, trace: Trace) -> str:
    """Give what is to be added to the reason of a finding, with its separators; often nothing."""
    requirement = outcome.judged[code.requirement].requirement
    words = [*_deciding_figures(requirement, outcome.check.subject, deciding, trace)]
    words.append(slip_in_words(outcome.check, unit, _figures(outcome, code), code.row, trace.workings))
    words.append(sign_in_words(outcome.check, code.present, trace.workings))
    return "".join(f"; {word}" for word in words if word)


def _deciding_figures(requirement: Requirement, subject: str, deciding: int, trace: Trace) -> Iterator[str]:
    child = CHILD_OF.get(subject)
    if deciding < 0 or child is None or requirement.judged is None:
        return
    for name in names_over_rows(requirement.judged, trace.of_rows):
        quantity = trace.workings.quantities.get(name)
        if quantity is not None and quantity.kind == "number":
            yield f"{quantity.label} {trace.text_of(child, deciding, name)}"


def _figures(outcome: Outcome, code: FindingCode) -> tuple[float, float, float]:
    """Give what is judged and both its ends: a slip must bring the value inside both."""
    judged = outcome.judged[code.requirement].requirement.judged
    alike = [one for one in outcome.judged if one.requirement.judged == judged and one.active[code.row] == YES]
    low = np.fmax.reduce([one.low[code.row] for one in alike], initial=np.nan)
    high = np.fmin.reduce([one.high[code.row] for one in alike], initial=np.nan)
    return code.present, float(low), float(high)

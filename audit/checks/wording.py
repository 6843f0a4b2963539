"""Requirements in words, for the catalogue, the generated pages and the calculation sheet."""

from __future__ import annotations

from collections.abc import Callable

from audit.checks.entry import Requirement
from audit.expression.text import render

Words = Callable[[str], str]
BOUND_WORDS = {
    "at_least": "at least",
    "above": "above",
    "at_most": "at most",
    "below": "below",
    "equals": "equal to",
}


def requirement_in_words(requirement: Requirement, label: Words, reads: Words) -> str:
    """Write a requirement as a sentence without a verb: 'pickup at least 1.7 × start current, where …'."""
    if requirement.kind == "requires":
        assert requirement.bound is not None
        text = render(requirement.bound, label, reads)
    else:
        assert requirement.judged is not None
        judged = render(requirement.judged, label, reads)
        if requirement.kind == "must_be":
            text = f"{judged}: {requirement.text}"
        elif requirement.kind == "must_be_stated":
            text = f"{judged}: stated"
        else:
            assert requirement.bound is not None
            text = f"{judged} {BOUND_WORDS[requirement.kind]} {render(requirement.bound, label, reads)}"
    if requirement.within is not None:
        text += f", within {render(requirement.within, label, reads)}"
    if requirement.when is not None:
        text += f", where {render(requirement.when, label, reads)}"
    return text

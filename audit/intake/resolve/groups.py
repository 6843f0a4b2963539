"""Setting groups: what a group is called, and which group of a relay is the active one."""

from __future__ import annotations

import re
from collections.abc import Iterable, Sequence

from audit.fleet.column import NO, UNKNOWN, YES
from audit.intake.resolve.codes import truth_of
from audit.intake.resolve.names import exact

_WORDS = re.compile(r"\b(?:settings?|group|grp|sg|set|gr)\b\.?|\b(?:sg|grp|gr|g)(?=\d)|[()\[\]:#.-]")
_ACTIVE = re.compile(r"\b(?<!not )(?<!in)active\b", re.IGNORECASE)


def group_key(group: str) -> str:
    """Fold the name of a setting group to what tells it from the others.

    >>> [group_key(name) for name in ("Setting Group 1", "G1 (active)", "SG-2", "A", "")]
    ['1', '1', '2', 'a', '']
    """
    folded = _ACTIVE.sub(" ", exact(group))
    return " ".join(_WORDS.sub(" ", folded).split()) or exact(group)


def active_group(groups: Sequence[str], statements: Iterable[tuple[str, str]]) -> str | None:
    """Give the key of the active group, or None where that is open.

    `groups` are the keys of a relay's groups, `statements` what its records say under 'active': the group of
    the record ("" for the whole relay) and the text, yes or no or the name of a group.

    >>> active_group(["1", "2"], [("", "Group 2")]), active_group(["1", "2"], [("1", "yes"), ("2", "no")])
    ('2', '1')
    >>> active_group(["1", "2"], []) is None, active_group([""], [])
    (True, '')
    """
    if len(groups) == 1:
        return groups[0]
    known = dict.fromkeys(groups, UNKNOWN)
    for group, text in statements:
        if group in known:
            said = truth_of(text)
            known[group] = said if said != UNKNOWN else known[group]
            if _ACTIVE.search(text):
                known[group] = YES
        elif group_key(text) in known:
            known[group_key(text)] = YES
    stated = [group for group, code in known.items() if code == YES]
    if len(stated) == 1:
        return stated[0]
    possible = [group for group, code in known.items() if code != NO]
    return possible[0] if len(possible) == 1 and not stated else None


def says_active(group: str) -> bool:
    """Tell whether the name of a group itself says that it is the active one."""
    return _ACTIVE.search(group) is not None

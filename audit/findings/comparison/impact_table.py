"""Read the table of what has to be looked at again after each kind of change."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from fnmatch import fnmatchcase
from pathlib import Path
from typing import Any

from audit.checks.catalogue import Catalogue
from audit.expression.units import nearest
from audit.limits.limits import BadRule, read_rule_file
from audit.rule_folder import rules_folder

FILE = "change_impact.toml"
PLACES = ("the motor", "neighbours", "its sisters", "its partner", "the bus", "motors of the bus")
WAYS = ("", "up", "down")
_SIGN_KEYS = {"subject", "data", "role", "rows", "way", "becomes"}
_LOOK_KEYS = {"at", "checks", "by_hand", "why"}


@dataclass(frozen=True, slots=True)
class Sign:
    """How a kind of change shows in the data."""

    subject: str
    data: tuple[str, ...] = ()
    role: str = ""
    rows: str = ""
    way: str = ""
    becomes: str = ""


@dataclass(frozen=True, slots=True)
class Look:
    """Which checks of whom to look at again."""

    at: str
    checks: tuple[str, ...]
    by_hand: tuple[str, ...]
    why: str

    def matching(self, names: Mapping[str, object]) -> list[str]:
        """Give the names of checks that are meant, in the order of the catalogue; `names` are those that exist."""
        return [name for name in names if any(fnmatchcase(name, pattern) for pattern in self.checks)]

    def unmatched(self, names: Mapping[str, object]) -> list[str]:
        """Give the names that are meant and do not exist."""
        return [one for one in self.checks if not any(fnmatchcase(name, one) for name in names)]


@dataclass(frozen=True, slots=True)
class ChangeKind:
    """A kind of change."""

    name: str
    says: str
    signs: tuple[Sign, ...]
    looks: tuple[Look, ...]


def read_impact_table(catalogue: Catalogue, path: Path | None = None) -> tuple[ChangeKind, ...]:
    """Read the table, and refuse names of data that are not known.

    Names of checks may be of packs that this catalogue does not hold: what is meant by them is looked at by hand.
    """
    file = path or rules_folder() / FILE
    return tuple(_kind(file, name, entry, catalogue) for name, entry in read_rule_file(file).items())


def _kind(path: Path, name: str, entry: Any, catalogue: Catalogue) -> ChangeKind:
    if not isinstance(entry, dict) or set(entry) != {"says", "shows_in", "look"}:
        raise BadRule(path.name, name, "a kind of change has says, shows_in and look")
    signs = tuple(_sign(path, name, sign, catalogue) for sign in entry["shows_in"])
    return ChangeKind(name, str(entry["says"]), signs, tuple(_look(path, name, look) for look in entry["look"]))


def _sign(path: Path, name: str, entry: Mapping[str, Any], catalogue: Catalogue) -> Sign:
    _refuse_unknown(path, name, entry, _SIGN_KEYS)
    sign = Sign(
        str(entry.get("subject", "")),
        tuple(entry.get("data", ())),
        str(entry.get("role", "")),
        str(entry.get("rows", "")),
        str(entry.get("way", "")),
        str(entry.get("becomes", "")),
    )
    of_subject = {q.name: q for q in catalogue.quantities.values() if q.subject == sign.subject}
    for datum in sign.data:
        if datum not in of_subject:
            raise BadRule(path.name, name, f"'{datum}' is no datum of a {sign.subject}{nearest(datum, of_subject)}")
        if sign.becomes and sign.becomes not in of_subject[datum].choices:
            raise BadRule(path.name, name, f"'{sign.becomes}' is none of the choices of {datum}")
    if sign.way not in WAYS or sign.rows not in ("", "added", "removed"):
        raise BadRule(path.name, name, "way is 'up' or 'down', rows is 'added' or 'removed'")
    if not (sign.data or sign.role or sign.rows):
        raise BadRule(path.name, name, "a sign names data, a role or rows")
    return sign


def _look(path: Path, name: str, entry: Mapping[str, Any]) -> Look:
    _refuse_unknown(path, name, entry, _LOOK_KEYS)
    look = Look(
        str(entry.get("at", "")),
        tuple(entry.get("checks", ())),
        tuple(entry.get("by_hand", ())),
        str(entry.get("why", "")),
    )
    if look.at not in PLACES:
        raise BadRule(path.name, name, f"at '{look.at}' is none of {', '.join(PLACES)}{nearest(look.at, PLACES)}")
    if not look.why or not (look.checks or look.by_hand):
        raise BadRule(path.name, name, "a look has checks or by_hand, and says why")
    return look


def _refuse_unknown(path: Path, name: str, entry: Mapping[str, Any], known: set[str]) -> None:
    unknown = sorted(set(entry) - known)
    if unknown:
        raise BadRule(path.name, name, f"'{unknown[0]}' is not a key here{nearest(unknown[0], known)}")

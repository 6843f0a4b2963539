"""Which headers the vocabulary knows, folded, and what each may mean in each table."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files

from audit.intake.recognition.folding import compact, fold_header
from audit.vocabulary.quantities import vocabulary

TABLES = ("motor", "relay", "bus", "start")
SHORTEST_COMPACT = 5
_RELAY_WORDS = frozenset({"relay", "ied", "group", "export"})


@dataclass(frozen=True, slots=True)
class Entry:
    """A meaning of a header: a quantity, or the name of a combined reading; sure or only possible."""

    name: str
    sure: bool
    combined: bool = False


@dataclass(frozen=True, slots=True)
class Combined:
    """A header whose cells hold several quantities, or one of several that only its cells can tell."""

    name: str
    tables: tuple[str, ...]
    headers: tuple[str, ...]
    quantities: tuple[str, ...]
    order: str
    alone: str
    ask: str


@dataclass(frozen=True)
class Dictionary:
    """Folded header to meanings, for one table."""

    entries: Mapping[str, tuple[Entry, ...]]
    compacted: Mapping[str, tuple[Entry, ...]]

    def find(self, folded: str) -> tuple[Entry, ...]:
        """Give the meanings of a folded header, empty where it is unknown."""
        found = self.entries.get(folded)
        if found is None:
            short = compact(folded)
            if len(short) >= SHORTEST_COMPACT:
                found = self.compacted.get(short)
        return found or ()


@cache
def combined_readings() -> Mapping[str, Combined]:
    """Read the list of combined headers once."""
    text = files("audit.intake.recognition").joinpath("combined.toml").read_text("utf-8")
    return {
        name: Combined(
            name,
            tuple(entry["tables"]),
            tuple(entry["headers"]),
            tuple(entry["quantities"]),
            entry["order"],
            entry.get("alone", ""),
            entry.get("ask", ""),
        )
        for name, entry in tomllib.loads(text).items()
    }


def _layers(table: str) -> list[dict[str, list[Entry]]]:
    """Give the headers of a table in layers: its own, then those of others that may stand in it."""
    own: dict[str, list[Entry]] = {}
    guests: dict[str, list[Entry]] = {}
    for combined in combined_readings().values():
        if table in combined.tables:
            for header in combined.headers:
                own.setdefault(fold_header(header), []).append(Entry(combined.name, True, combined=True))
    for quantity in vocabulary().quantities.values():
        if quantity.subject == table:
            layer = own
        elif (table == "motor" and quantity.subject == "relay") or (table == "relay" and quantity.name in ("motor", "service", "area", "bus")):
            layer = guests
        else:
            continue
        for sure, headers in ((True, quantity.headers), (False, quantity.ambiguous_headers)):
            for header in headers:
                folded = fold_header(header)
                if (
                    table == "motor"
                    and quantity.subject == "relay"
                    and quantity.element is None
                    and not _RELAY_WORDS & set(folded.split())
                ):
                    continue
                layer.setdefault(folded, []).append(Entry(quantity.name, sure))
    return [own, guests]


def _settled(meanings: list[Entry]) -> tuple[Entry, ...]:
    """Give the meanings of one header: a combined reading wins, a sure one beside another becomes a doubt."""
    for entry in meanings:
        if entry.combined:
            return (entry,)
    names = dict.fromkeys(entry.name for entry in meanings)
    if len(names) == 1:
        return (Entry(meanings[0].name, any(entry.sure for entry in meanings)),)
    return tuple(Entry(name, False) for name in names)


@cache
def dictionary(table: str) -> Dictionary:
    """Give the dictionary of a table."""
    entries: dict[str, tuple[Entry, ...]] = {}
    for layer in _layers(table):
        for folded, meanings in layer.items():
            if folded and folded not in entries:
                entries[folded] = _settled(meanings)
    compacted: dict[str, list[Entry]] = {}
    for folded, settled in entries.items():
        short = compact(folded)
        if len(short) >= SHORTEST_COMPACT:
            compacted.setdefault(short, []).extend(settled)
    return Dictionary(entries, {short: _settled(found) for short, found in compacted.items()})

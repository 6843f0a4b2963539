"""Which headers the vocabulary knows, folded, and what each may mean in each table."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cache
from importlib.resources import files

from audit.intake.recognition.folding import compact, fold_header
from audit.vocabulary.quantities import Quantity, vocabulary

SHORTEST_COMPACT = 5
_BUS_WORDS = frozenset({"bus", "system", "fault", "busbar", "incomer", "base", "x/r", "nominal"})
_RELAY_WORDS = frozenset({"relay", "ied", "group", "export", "set", "setting"})


@dataclass(frozen=True, slots=True)
class Entry:
    """A meaning of a header: a quantity or a combined reading; sure, sure with a unit, or only possible."""

    name: str
    sure: bool
    combined: bool = False
    by_unit: bool = False


@dataclass(frozen=True, slots=True)
class Combined:
    """A header whose cells hold several quantities, or one of several that only its cells can tell."""

    name: str
    tables: tuple[str, ...]
    headers: tuple[str, ...]
    headers_with_unit: tuple[str, ...]
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
            tuple(entry.get("headers_with_unit", ())),
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
            for header in combined.headers_with_unit:
                meanings = own.setdefault(fold_header(header), [])
                meanings.append(Entry(combined.name, False, combined=True, by_unit=True))
    for quantity in vocabulary().quantities.values():
        layer = own if quantity.subject == table else guests
        for sure, by_unit, headers in (
            (True, False, quantity.headers),
            (False, True, quantity.headers_with_unit),
            (False, False, quantity.ambiguous_headers),
        ):
            for header in headers:
                folded = fold_header(header)
                if layer is own or _may_stand_in(table, quantity, folded):
                    layer.setdefault(folded, []).append(Entry(quantity.name, sure, by_unit=by_unit))
    return [own, guests]


def _may_stand_in(table: str, quantity: Quantity, folded: str) -> bool:
    """Tell whether a header of another subject may stand in a table: only where its words say whose it is."""
    words = set(folded.split())
    if table == "motor" and quantity.subject == "relay":
        return quantity.element is not None or bool(_RELAY_WORDS & words)
    if table == "motor" and quantity.subject == "bus":
        return quantity.name != "bus_name" and bool(_BUS_WORDS & words)
    return table == "relay" and quantity.name in ("motor", "service", "area", "bus")


def _settled(meanings: list[Entry]) -> tuple[Entry, ...]:
    """Give the meanings of one header, each once; two sure ones are a doubt, a combined one wins over a sure one."""
    for entry in meanings:
        if entry.combined and entry.sure:
            return (entry,)
    once: dict[str, Entry] = {}
    for entry in meanings:
        if entry.name not in once or entry.sure:
            once[entry.name] = entry
    sure = [entry for entry in once.values() if entry.sure]
    if len(sure) > 1:
        return tuple(Entry(entry.name, False, by_unit=True) for entry in once.values())
    return tuple(sorted(once.values(), key=lambda entry: not entry.sure))


@cache
def dictionary(table: str) -> Dictionary:
    """Give the dictionary of a table."""
    meanings: dict[str, list[Entry]] = {}
    for layer in _layers(table):
        for folded, found in layer.items():
            known = meanings.get(folded)
            if known is None:
                meanings[folded] = list(found)
            elif not any(entry.sure for entry in known):
                # where the table itself is in doubt a guest adds to the doubt
                known += [replace(entry, sure=False) for entry in found]
    entries = {folded: _settled(found) for folded, found in meanings.items() if folded}
    compacted: dict[str, list[Entry]] = {}
    for folded, settled in entries.items():
        short = compact(folded)
        if len(short) >= SHORTEST_COMPACT:
            compacted.setdefault(short, []).extend(settled)
    return Dictionary(entries, {short: _settled(found) for short, found in compacted.items()})

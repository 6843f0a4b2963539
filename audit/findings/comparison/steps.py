"""The steps of a way back: a changed datum first, then the derived quantities that moved with it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

MOST_CHAINS = 24
"""A bus total in which hundreds of motors changed keeps this many ways back."""


@dataclass(frozen=True, slots=True)
class Step:
    """A changed datum, or a derived quantity that moved with it."""

    subject: str
    name: str
    quantity: str
    label: str
    before: str
    after: str
    share_pct: float | None = None
    """By how much a number moved, in per cent of what it was."""

    def words(self) -> str:
        """Say it: 'bus B2: greatest three-phase fault current up 25 % (20 kA to 25 kA)'."""
        of = f"{self.subject} {self.name}: " if self.subject != "motor" else f"{self.name}: "
        if self.share_pct is None:
            told = f" ({self.before} to {self.after})" if self.before else f" {self.after}"
        else:
            way = "up" if self.share_pct > 0 else "down"
            told = f" {way} {_share(self.share_pct)} ({self.before} to {self.after})"
        return f"{of if self.name else ''}{self.label}{told}"


def _share(share_pct: float) -> str:
    size = abs(share_pct)
    return f"{size:.0f} %" if size >= 10 else f"{size:.2g} %"


Chain = tuple[Step, ...]
"""From the changed datum to the quantity that moved."""


def chain_words(chain: Chain) -> list[str]:
    """Write the steps of a chain, those left out that only hand a value on."""
    shown = [
        step
        for place, step in enumerate(chain)
        if not place or (step.before, step.after) != (chain[place - 1].before, chain[place - 1].after)
    ]
    return [step.words() for step in shown]


def best(chains: Iterable[Chain]) -> tuple[Chain, ...]:
    """Keep for each root the shortest chain, roots of fewest steps first."""
    shortest: dict[Step, Chain] = {}
    for chain in chains:
        known = shortest.get(chain[0])
        if known is None or (len(chain), _names(chain)) < (len(known), _names(known)):
            shortest[chain[0]] = chain
    ordered = sorted(shortest.values(), key=lambda chain: (len(chain), _names(chain)))
    return tuple(ordered[:MOST_CHAINS])


def _names(chain: Chain) -> tuple[tuple[str, str, str], ...]:
    return tuple((step.subject, step.name, step.quantity) for step in chain)

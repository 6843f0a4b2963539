"""The child rows of a row on both sides, and those among them that decided."""

from __future__ import annotations

from dataclasses import dataclass

from audit.fleet.column import NO_ROW


@dataclass(frozen=True, slots=True)
class Members:
    """Child rows there on both sides and come (as rows after), and gone (as rows before)."""

    both: list[int]
    came: list[int]
    went: list[int]


@dataclass(frozen=True, slots=True)
class Deciding:
    """The child row that decided before (as a row before, and as a row after) and the one after."""

    before: int
    after: int
    before_as_after: int

    def among(self, members: Members) -> Members:
        """Keep of some members those that decided."""
        told = {self.after, self.before_as_after} - {NO_ROW}
        return Members(
            [member for member in members.both if member in told],
            [member for member in members.came if member == self.after],
            [member for member in members.went if member == self.before],
        )

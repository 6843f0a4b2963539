"""Joins that are shown: a folded one as a remark, an ambiguous name as a question."""

from __future__ import annotations

from collections.abc import Sequence

from audit.intake.resolve.ledger import Ledger
from audit.intake.resolve.names import Joined, Names, exact, join
from audit.intake.resolve.records import Name


def joined(
    children: Sequence[Name | None], parents: Names, parent_names: Sequence[str], what: str, ledger: Ledger
) -> Joined:
    """Give the row that each name means, NO_ROW for none; say what was folded and what is open, once a name."""
    met = join([None if child is None else child.text for child in children], parents)
    said: set[str] = set()
    for index in (met.folded | met.ambiguous).nonzero()[0].tolist():
        child = children[index]
        if child is None or exact(child.text) in said:
            continue
        said.add(exact(child.text))
        if met.folded[index]:
            ledger.complain(
                child.cell,
                f"{what} '{child.text}' taken as '{parent_names[met.rows[index]]}': the same but for dashes, spaces, "
                "dots or underscores",
                f"one spelling of a {what} in all tables",
                "If this join is wrong, write the two so that they differ.",
                weight="remark",
            )
        else:
            ledger.ask(
                child.cell,
                f"{what} '{child.text}' may be one of several rows of the list, or is spelled in several ways",
                f"Which {what} is meant? Nothing is joined to it until then.",
            )
    return met

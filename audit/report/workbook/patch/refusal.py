"""The one exception that says why a workbook cannot be patched without loss."""

from __future__ import annotations


class CannotPatch(Exception):
    """The workbook cannot be annotated without loss; the message says why, in the user's terms."""

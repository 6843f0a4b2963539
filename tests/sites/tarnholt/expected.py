"""Observations that remain on the sound works, each with its reason."""

from __future__ import annotations

EXPECTED_OBSERVATIONS: list[dict[str, str]] = []

"""Findings: breaches and conflicts with their reasons, what is unproven, and which data would settle it."""

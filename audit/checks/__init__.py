"""Declared checks: entries, catalogue, verdicts, permissible ranges and worked cases."""

"""Formulas of motor protection: arrays in, arrays out, no spreadsheet in sight."""

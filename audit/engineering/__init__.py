"""Formulas of motor protection: arrays in, arrays out; one subject a file, numpy only."""

"""Proofs over whole fleets, from workbook to verdict."""
